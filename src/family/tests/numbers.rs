//! The generator against published words, and the way numbers are dealt out.

use super::*;
use crate::family::numbers::{MEMBERS, Numbers, SIZES, WITHIN_ALL, WITHIN_BEAMS};
use crate::family::philox::Philox;

/// `tests/kat_vectors` of the authors' reference implementation (Random123), the three lines `philox4x32 10`: counter,
/// key, words.
const KNOWN: [([u32; 4], [u32; 2], [u32; 4]); 3] = [
    ([0; 4], [0; 2], [0x6627_e8d5, 0xe169_c58d, 0xbc57_ac4c, 0x9b00_dbd8]),
    ([u32::MAX; 4], [u32::MAX; 2], [0x408f_276d, 0x41c8_3b0e, 0xa20b_c7c6, 0x6d54_51fd]),
    (
        [0x243f_6a88, 0x85a3_08d3, 0x1319_8a2e, 0x0370_7344],
        [0xa409_3822, 0x299f_31d0],
        [0xd16c_fe09, 0x94fd_cceb, 0x5001_e420, 0x2412_6ea1],
    ),
];

/// Words of `W` counters under one key; high halves of the counters hold noise.
struct Blocks<const W: usize> {
    counters: [[u32; 4]; W],
    key: [u32; 2],
}

impl<const W: usize> Task<W> for Blocks<W> {
    type Output = [[u32; 4]; W];
    fn run<L: Lane<W>>(self) -> [[u32; 4]; W] {
        let word = |index: usize| {
            L::Words::load(&self.counters.map(|counter| u64::from(counter[index]) | 0xdead_beef_0000_0000))
        };
        let words = Philox::<L, W>::new(self.key).words([word(0), word(1), word(2), word(3)]);
        let mut found = [[0; 4]; W];
        for (index, word) in words.into_iter().enumerate() {
            let mut row = [0; W];
            word.store(&mut row);
            row.iter().zip(&mut found).for_each(|(word, found)| found[index] = *word as u32);
        }
        found
    }
}

#[test]
fn words_are_the_published_ones() {
    for (counter, key, words) in KNOWN {
        assert_eq!(philox(counter, key), words, "{counter:x?}");
    }
}

#[test]
fn four_counters_at_once_give_the_words_of_each() {
    let mut counters = KNOWN.map(|(counter, ..)| counter).to_vec();
    counters.extend((0..61u32).map(|step| [step, !step, step.wrapping_mul(0x9e37_79b9), step << 20]));
    for key in KNOWN.map(|(_, key, _)| key) {
        for four in counters.as_chunks::<4>().0 {
            let expected = four.map(|counter| philox(counter, key));
            for form in forms() {
                assert_eq!(form.four(Blocks { counters: *four, key }), expected, "{} form", form.name());
                assert_eq!(form.one(Blocks { counters: [four[1]], key }), [expected[1]]);
            }
        }
    }
}

struct Deal<const W: usize> {
    draws: [u64; W],
    first: usize,
    count: usize,
}

impl<const W: usize> Task<W> for Deal<W> {
    /// Shares of the block of `first`, and `count` centred numbers from `first` on.
    type Output = ([[f64; W]; 4], Vec<[f64; W]>);
    fn run<L: Lane<W>>(self) -> Self::Output {
        let numbers = Numbers::<L, W>::new(Source { seed: SEED, stream: 7 }, self.draws);
        let shares = numbers.shares(self.first / 4).map(|share| {
            let mut row = [0.0; W];
            share.store(&mut row);
            row
        });
        let mut rows = vec![[f64::NAN; W]; self.count];
        numbers.centred(self.first, 0.3, &mut rows);
        (shares, rows)
    }
}

#[test]
fn a_parameter_has_its_number_wherever_a_run_of_them_starts() {
    let source = Source { seed: SEED, stream: 7 };
    for form in forms() {
        for (first, count) in (30..37).flat_map(|first| (0..11).map(move |count| (first, count))) {
            let (shares, rows) = form.four(Deal { draws: DRAWS, first, count });
            for (lane, draw) in DRAWS.iter().enumerate() {
                for (place, row) in shares.iter().enumerate() {
                    assert_eq!(row[lane], source.share(*draw, first / 4 * 4 + place));
                }
                for (index, row) in rows.iter().enumerate() {
                    let expected = 0.3 * (2.0 * source.share(*draw, first + index) - 1.0);
                    assert!((row[lane] - expected).abs() <= f64::EPSILON * expected.abs(), "{first} + {index}");
                }
            }
            assert_eq!(rows.len(), count);
        }
    }
}

#[test]
fn a_share_is_made_of_its_word_alone() {
    let source = Source { seed: 0, stream: 0 };
    // Draw 0 under seed 0: the first published words are those of parameters 0 to 3.
    for (parameter, word) in KNOWN[0].2.into_iter().enumerate() {
        assert_eq!(source.share(0, parameter), (f64::from(word) + 0.5) / 4_294_967_296.0);
    }
    let last = Source { seed: u64::MAX, stream: u32::MAX };
    let words = philox([u32::MAX, u32::MAX, 9, u32::MAX], [u32::MAX; 2]);
    assert_eq!(last.share(u64::MAX, 38), (f64::from(words[2]) + 0.5) / 4_294_967_296.0);
}

#[test]
fn seeds_streams_draws_and_parameters_share_no_number() {
    let source = Source::new(SEED);
    let others = [Source::new(SEED + 1), Source::new(SEED ^ (1 << 40)), Source { seed: SEED, stream: 1 }];
    let mut seen = Vec::new();
    for source in others.into_iter().chain([source]) {
        for draw in [0, 1, 2, 1 << 32, 1 << 33] {
            seen.extend((0..100).map(|parameter| source.share(draw, parameter).to_bits()));
        }
    }
    let count = seen.len();
    seen.sort_unstable();
    seen.dedup();
    // Of 2000 words of 32 bits a pair is alike by chance in one trial of 2000.
    assert_eq!((count, seen.len()), (2000, 2000));
    const { assert!(SIZES.end <= WITHIN_BEAMS && WITHIN_BEAMS < WITHIN_ALL && WITHIN_ALL < MEMBERS) };
}
