//! Every form against plain arithmetic, bit for bit.

use super::{Form, Lane, Rows, Task};

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
