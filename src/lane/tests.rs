//! Every form against plain arithmetic, bit for bit.

use super::{EXP_REACH, Form, Lane, Rows, Task, Words, exp};

/// Every operation of [`Lane`] on rows of two operands.
struct Operations<'a, const W: usize> {
    left: &'a [[f64; W]],
    right: &'a [[f64; W]],
}

const OPERATIONS: usize = 11;

impl<const W: usize> Task<W> for Operations<'_, W> {
    type Output = Vec<[[f64; W]; OPERATIONS]>;
    fn run<L: Lane<W>>(self) -> Self::Output {
        let each = |(a, b): (&[f64; W], &[f64; W])| {
            let (a, b) = (L::load(a), L::load(b));
            let results = [
                a + b,
                a - b,
                a * b,
                a / b,
                -a,
                a.min(b),
                a.max(b),
                a.if_less(b, a * b, b),
                a.abs(),
                a.abs().sqrt(),
                a * L::splat(1.5) + b,
            ];
            results.map(|result| {
                let mut row = [0.0; W];
                result.store(&mut row);
                row
            })
        };
        self.left.iter().zip(self.right).map(each).collect()
    }
}

/// Numbers of every kind; no NaN results but from 0/0 and inf - inf, whose payload is not compared.
fn numbers() -> Vec<f64> {
    let mut numbers = vec![0.0, -0.0, 1.0, -1.5, 5e-324, -3e-310, f64::MIN_POSITIVE, f64::MAX, -f64::MAX];
    numbers.extend([f64::INFINITY, f64::NEG_INFINITY, f64::NAN, 1.0 / 3.0, 1e-200, -7e180, 0.1]);
    numbers
}

fn bits(value: f64) -> u64 {
    if value.is_nan() { f64::NAN.to_bits() } else { value.to_bits() }
}

#[test]
fn every_form_gives_the_bits_of_plain_arithmetic() {
    let pairs: Vec<(f64, f64)> = numbers().iter().flat_map(|a| numbers().into_iter().map(move |b| (*a, b))).collect();
    let alone = Form::PORTABLE.one(Operations {
        left: &pairs.iter().map(|(a, _)| [*a]).collect::<Vec<_>>(),
        right: &pairs.iter().map(|(_, b)| [*b]).collect::<Vec<_>>(),
    });
    let side = |value: fn(&(f64, f64)) -> f64| -> Vec<[f64; 4]> {
        pairs.as_chunks::<4>().0.iter().map(|four| four.each_ref().map(value)).collect()
    };
    let (left, right) = (side(|pair| pair.0), side(|pair| pair.1));
    assert_eq!(left.len() * 4, pairs.len());
    let forms: Vec<Form> = [Some(Form::PORTABLE), Form::avx2()].into_iter().flatten().collect();
    for form in forms {
        let found = form.four(Operations { left: &left, right: &right });
        for (index, expected) in alone.iter().enumerate() {
            for operation in 0..OPERATIONS {
                let (found, expected) = (found[index / 4][operation][index % 4], expected[operation][0]);
                let place = format!("operation {operation} of {:?} in {} form", pairs[index], form.name());
                assert_eq!(bits(found), bits(expected), "{place}: {found:e} for {expected:e}");
            }
        }
    }
}

#[test]
fn plain_arithmetic_is_what_it_says() {
    let found = Form::PORTABLE.one(Operations { left: &[[3.0]], right: &[[-2.0]] });
    let expected = [1.0, 5.0, -6.0, -1.5, -3.0, -2.0, 3.0, -2.0, 3.0, 3f64.sqrt(), 2.5];
    assert_eq!(found[0].map(|[value]| value), expected);
}

/// Every operation of [`Words`] on rows of two operands, and the low halves as numbers.
struct WordOperations<'a, const W: usize> {
    left: &'a [[u64; W]],
    right: &'a [[u64; W]],
}

impl<const W: usize> Task<W> for WordOperations<'_, W> {
    type Output = Vec<[[u64; W]; 6]>;
    fn run<L: Lane<W>>(self) -> Self::Output {
        let each = |(a, b): (&[u64; W], &[u64; W])| {
            let (a, b) = (L::Words::load(a), L::Words::load(b));
            let mut low = [0.0; W];
            L::of_low(a).store(&mut low);
            let words =
                [a, a ^ b, a.multiply_low(b), a.high(), a ^ L::Words::splat(0x8123_4567_89ab_cdef)].map(|result| {
                    let mut row = [0; W];
                    result.store(&mut row);
                    row
                });
            [words[0], words[1], words[2], words[3], words[4], low.map(f64::to_bits)]
        };
        self.left.iter().zip(self.right).map(each).collect()
    }
}

#[test]
fn words_are_whole_numbers_in_every_form() {
    let some = [0, 1, 0xffff_ffff, 0x1_0000_0000, u64::MAX, 0x9e37_79b9_7f4a_7c15, 0x8000_0000, 0x7fff_ffff_ffff_ffff];
    let pairs: Vec<(u64, u64)> = some.iter().flat_map(|a| some.into_iter().map(move |b| (*a, b))).collect();
    let low = |word: u64| word & 0xffff_ffff;
    let expected = |(a, b): (u64, u64)| {
        let number = (low(a) as f64).to_bits();
        [a, a ^ b, low(a) * low(b), a >> 32, a ^ 0x8123_4567_89ab_cdef, number]
    };
    for (index, pair) in pairs.iter().enumerate() {
        let (left, right) = ([[pair.0]], [[pair.1]]);
        let alone = Form::PORTABLE.one(WordOperations { left: &left, right: &right });
        assert_eq!(alone[0].map(|[word]| word), expected(*pair), "{pair:x?}");
        let side = [0, 1, 2, 3].map(|lane| pairs[(index + lane) % pairs.len()]);
        for form in [Some(Form::PORTABLE), Form::avx2()].into_iter().flatten() {
            let (left, right) = ([side.map(|pair| pair.0)], [side.map(|pair| pair.1)]);
            let found = form.four(WordOperations { left: &left, right: &right });
            for (lane, pair) in side.iter().enumerate() {
                assert_eq!(found[0].map(|row| row[lane]), expected(*pair), "{pair:x?} in {} form", form.name());
            }
        }
    }
}

/// e^x and, for whole x, 2^x.
struct Powers<'a, const W: usize>(&'a [[f64; W]]);

impl<const W: usize> Task<W> for Powers<'_, W> {
    type Output = Vec<[[f64; W]; 2]>;
    fn run<L: Lane<W>>(self) -> Self::Output {
        let each = |x: &[f64; W]| {
            let x = L::load(x);
            let mut rows = [[0.0; W]; 2];
            exp(x).store(&mut rows[0]);
            x.power_of_two().store(&mut rows[1]);
            rows
        };
        self.0.iter().map(each).collect()
    }
}

#[test]
fn powers_of_two_are_exact_in_every_form() {
    let whole: Vec<[f64; 4]> = (-1024..1024).step_by(4).map(|n| [0, 1, 2, 3].map(|lane| f64::from(n + lane))).collect();
    for form in [Some(Form::PORTABLE), Form::avx2()].into_iter().flatten() {
        for (row, powers) in whole.iter().zip(form.four(Powers(&whole))) {
            for (n, found) in row.iter().zip(powers[1]).filter(|(n, _)| **n >= -1022.0) {
                assert_eq!(found, libm::scalbn(1.0, *n as i32), "2^{n} in {} form", form.name());
                assert_eq!(Form::PORTABLE.one(Powers(&[[*n]]))[0][1][0], found, "2^{n}");
            }
        }
    }
}

/// Rows of four over the whole reach of [`exp`], finer near 0.
fn exponents() -> Vec<[f64; 4]> {
    let steps = (-100_000..100_000).map(|step| f64::from(step) + 0.37);
    let all = steps.flat_map(|step| [step * (EXP_REACH / 1e5), step * 1e-5, step * 1e-12, step * 3.7e-4]);
    all.collect::<Vec<_>>().as_chunks::<4>().0.to_vec()
}

#[test]
fn exp_is_right_to_the_last_place() {
    // One unit in the last place for ours, half of one for the reference, which is rounded too.
    let limit = 1.5 * f64::EPSILON;
    let rows = exponents();
    let found = Form::best().four(Powers(&rows));
    let mut worst: f64 = 0.0;
    for (row, found) in rows.iter().zip(&found) {
        for (x, found) in row.iter().zip(found[0]) {
            worst = worst.max((found / libm::exp(*x) - 1.0).abs());
        }
    }
    assert!(worst < limit, "{worst:e}");
    assert_eq!(Form::PORTABLE.one(Powers(&[[0.0]]))[0][0], [1.0]);
}

#[test]
fn exp_is_the_rounded_value_where_fifty_digits_are_known() {
    // Computed with 50 digits, rounded to 20.
    let known = [
        (1.0, "2.7182818284590452354"),
        (-1.0, "0.36787944117144232160"),
        (0.5, "1.6487212707001281468"),
        (700.0, "1.0142320547350045095e304"),
        (-700.0, "9.8596765437597708567e-305"),
    ];
    for (x, expected) in known {
        let found = Form::PORTABLE.one(Powers(&[[x]]))[0][0][0];
        let expected: f64 = expected.parse().unwrap();
        assert!((found / expected - 1.0).abs() <= f64::EPSILON, "e^{x} = {found:e}, not {expected:e}");
    }
}

#[test]
fn exp_has_the_same_bits_in_every_form() {
    let rows = exponents();
    let alone: Vec<[f64; 1]> = rows.iter().flatten().map(|x| [*x]).collect();
    let expected = Form::PORTABLE.one(Powers(&alone));
    for form in [Some(Form::PORTABLE), Form::avx2()].into_iter().flatten() {
        let four = form.four(Powers(&rows));
        let one = form.one(Powers(&alone));
        for (index, [expected, _]) in expected.iter().enumerate() {
            let place = format!("e^{} in {} form", alone[index][0], form.name());
            assert_eq!(four[index / 4][0][index % 4].to_bits(), expected[0].to_bits(), "{place}");
            assert_eq!(one[index][0][0].to_bits(), expected[0].to_bits(), "{place}, one lane");
        }
    }
}

#[test]
fn rows_start_on_a_cache_line_and_copy_as_they_are() {
    for count in [0, 1, 3, 1000] {
        let mut rows = Rows::<4>::zeros(count);
        rows.iter_mut().enumerate().for_each(|(index, row)| *row = [index as f64; 4]);
        let copy = rows.clone();
        assert_eq!((rows.len(), &copy), (count, &rows));
        for rows in [&rows, &copy] {
            assert_eq!(rows.as_ptr().addr() % 64, 0, "{count} rows");
        }
    }
}

#[test]
fn several_reciprocals_are_those_of_each() {
    let numbers = [0.3, -7e8, 1e-9, 4.0, 1.0 / 3.0, -2e30, 5e5];
    for count in 0..=numbers.len() {
        let mut row: Vec<[f64; 1]> = numbers[..count].iter().map(|number| [*number]).collect();
        super::invert::<f64, 1>(&mut row);
        for ([found], number) in row.iter().zip(numbers) {
            assert!((found * number - 1.0).abs() < 4.0 * f64::EPSILON, "{number}: {found}");
        }
    }
    let [a, b]: [f64; 2] = super::reciprocals([8.0, 0.25]);
    assert_eq!((a, b), (0.125, 4.0));
}

/// Whether any lane of the left row is less than that of the right one, row by row.
struct AnyLess<'a, const W: usize>(&'a [([f64; W], [f64; W])]);

impl<const W: usize> Task<W> for AnyLess<'_, W> {
    type Output = Vec<bool>;
    fn run<L: Lane<W>>(self) -> Vec<bool> {
        self.0.iter().map(|(a, b)| L::load(a).any_less(L::load(b))).collect()
    }
}

#[test]
fn any_less_asks_every_lane() {
    let mut rows = vec![([1.0; 4], [1.0; 4]), ([2.0; 4], [1.0; 4]), ([f64::NAN; 4], [1.0; 4])];
    rows.extend((0..4).map(|lane| {
        let mut left = [3.0; 4];
        left[lane] = 0.5;
        (left, [1.0; 4])
    }));
    for form in [Some(Form::PORTABLE), Form::avx2()].into_iter().flatten() {
        let expected = [false, false, false, true, true, true, true];
        assert_eq!(form.four(AnyLess(&rows)), expected, "{}", form.name());
    }
    assert_eq!(Form::PORTABLE.one(AnyLess(&[([1.0], [2.0]), ([2.0], [2.0])])), [true, false]);
}
