//! Frame files spoilt at random: whatever stands in them, the reader answers with a frame or a fault at a place.

use super::*;
use proptest::prelude::*;

const STUDIES: [&str; 5] = [
    include_str!("../../../../studies/research-institute.toml"),
    include_str!("../../../../studies/us-office.toml"),
    include_str!("../../../../studies/workshop-sprung-feet.toml"),
    include_str!("../../../../studies/sizes-unknown.toml"),
    options::FULL,
];

/// One slip; places are shares of the text so that every part of it is met.
#[derive(Debug, Clone)]
enum Slip {
    /// So many letters from a place on give way to a text.
    Replace(f64, usize, String),
    /// A line is taken out.
    Drop(f64),
    /// A line is put in a second time, at another place.
    Repeat(f64, f64),
    /// A value gives way to another.
    Value(f64, &'static str),
    /// All line breaks become those of Windows.
    Windows,
}

fn slips() -> impl Strategy<Value = Vec<Slip>> {
    let values = [
        "0",
        "-1",
        "nan",
        "-inf",
        "1e400",
        "1e-300",
        "99999999999999999999",
        "true",
        "2026-01-31",
        "[]",
        "{}",
        "\"\"",
        "\"0 m\"",
        "\"-3 m\"",
        "\"7,2 m\"",
        "\"é m\"",
        "\"1e300 m4\"",
        "[1, 2, 3]",
        "[\"4 m\"]",
        "{ count = 0 }",
        "\"\\u0000\"",
        "[[[[\"4 m\"]]]]",
        "{ spring = { spring = 1 } }",
        "{ left = \"é\" }",
        "\"5/6\"",
        "\"hinge\"",
        "[0.5, nan]",
        "'12''-6\"'",
        "\"\"\"7 m\n\"\"\"",
    ];
    let share = || 0.0..1.0f64;
    let text = prop_oneof!["[\\[\\]{}\"'=,.#a-z0-9 \n\r-]{0,6}", "[éß日\u{feff}\u{2212}″´]{1,3}", "\\PC{0,4}"];
    let slip = prop_oneof![
        3 => (share(), 0usize..30, text).prop_map(|(at, cut, put)| Slip::Replace(at, cut, put)),
        1 => share().prop_map(Slip::Drop),
        1 => (share(), share()).prop_map(|(from, to)| Slip::Repeat(from, to)),
        3 => (share(), proptest::sample::select(values.to_vec())).prop_map(|(at, value)| Slip::Value(at, value)),
        1 => Just(Slip::Windows),
    ];
    proptest::collection::vec(slip, 1..4)
}

fn spoilt(text: &str, slip: &Slip) -> String {
    let mut lines: Vec<&str> = text.split_inclusive('\n').collect();
    let line = |share: f64| (share * lines.len() as f64) as usize;
    match slip {
        Slip::Replace(at, cut, put) => {
            let letters: Vec<char> = text.chars().collect();
            let at = (at * letters.len() as f64) as usize;
            let end = (at + cut).min(letters.len());
            letters[..at].iter().chain(put.chars().collect::<Vec<_>>().iter()).chain(&letters[end..]).collect()
        }
        Slip::Drop(at) if !lines.is_empty() => {
            lines.remove(line(*at));
            lines.concat()
        }
        Slip::Repeat(from, to) if !lines.is_empty() => {
            let (from, to) = (line(*from), line(*to));
            lines.insert(to, lines[from]);
            lines.concat()
        }
        Slip::Value(at, value) => {
            let keys: Vec<usize> = (0..lines.len()).filter(|line| lines[*line].contains('=')).collect();
            let Some(chosen) = keys.get((at * keys.len() as f64) as usize) else { return text.into() };
            let key = lines[*chosen].split('=').next().unwrap();
            let line = format!("{key}= {value}\n");
            lines[*chosen] = &line;
            lines.concat()
        }
        Slip::Windows => text.replace('\n', "\r\n"),
        Slip::Drop(_) | Slip::Repeat(..) => text.into(),
    }
}

/// A place must lie in the text, between letters, and have a line and column there.
fn lies_in(text: &str, span: &std::ops::Range<usize>, (line, column): (usize, usize)) -> Result<(), TestCaseError> {
    prop_assert!(text.get(span.clone()).is_some(), "{span:?} of {}", text.len());
    let lines: Vec<&str> = text.split('\n').collect();
    prop_assert!((1..=lines.len()).contains(&line), "line {line} of {}", lines.len());
    let width = lines[line - 1].trim_end_matches('\r').chars().count();
    prop_assert!(
        (1..=width + 1 + lines[line - 1].matches('\r').count()).contains(&column),
        "column {column} of {width}"
    );
    Ok(())
}

proptest! {
    #![proptest_config(ProptestConfig::with_cases(1024))]

    #[test]
    fn spoilt_studies_never_panic_and_faults_lie_in_the_text(study in 0..STUDIES.len(), slips in slips()) {
        let text = slips.iter().fold(STUDIES[study].to_string(), |text, slip| spoilt(&text, slip));
        match parse(&text) {
            Ok(file) => {
                for warning in &file.warnings {
                    lies_in(&text, &warning.span, warning.position(&text))?;
                    prop_assert!(!warning.key.is_empty() && !warning.to_string().is_empty() && !warning.help().is_empty());
                }
            }
            Err(fault) => {
                lies_in(&text, &fault.span, fault.position(&text))?;
                if let Some((span, _)) = &fault.related {
                    prop_assert!(text.get(span.clone()).is_some(), "{span:?} of {}", text.len());
                }
                let message = fault.to_string();
                prop_assert!(!message.is_empty() && !message.contains("$__") && !fault.help().is_empty(), "{message}");
            }
        }
    }
}

#[test]
fn the_studies_are_sound_before_they_are_spoilt() {
    STUDIES.iter().for_each(|text| assert!(read(text).warnings.is_empty()));
}
