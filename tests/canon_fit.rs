//! What the methods with known sizes refuse and doubt, that they answer the rest in finite numbers, and their worksheets.
#![allow(clippy::unwrap_used, clippy::expect_used, clippy::panic, reason = "a test fails by panicking")]

mod support;

use support::{Sizes, Within, build, close, parts};
use swaybound::approx::{METHODS, find};
use swaybound::compare::{Options, compare};
use swaybound::frame::options::AnalysisOptions;
use swaybound::frame::{Feet, Frame, FrameParts, SizeSource};
use swaybound::response::{Amount, Fit, SheetCell, Step};

fn sound() -> FrameParts {
    parts(&[6.0, 5.0], &[4.0, 3.5, 3.0], &[1e4, 2e4, 3e4]).areas(|_, _| 0.1)
}

/// Why the method refuses the frame; empty where it answers.
fn refusal(method: &str, frame: &Frame) -> String {
    match (find(method).expect("it is listed").fit)(frame) {
        Fit::Refused(reason) => reason.0,
        _ => String::new(),
    }
}

/// The methods that refuse `frame` for a reason with `word` in it.
fn refusing(frame: &Frame, word: &str) -> Vec<&'static str> {
    let ids = METHODS.iter().map(|entry| entry.info.id);
    ids.filter(|id| refusal(id, frame).contains(word)).collect()
}

#[test]
fn what_each_method_refuses() {
    let springs = build(sound().feet(Feet::Springs(vec![1e5; 3])));
    assert_eq!(refusing(&springs, "foot springs"), ["factor", "d-value", "racking", "racking+chord"]);
    assert_eq!(refusing(&springs, "fixed feet only"), ["wilbur", "wilbur+chord"]);
    let pinned = build(sound().feet(Feet::Pinned));
    assert_eq!(refusing(&pinned, "fixed feet only"), ["wilbur", "wilbur+chord"]);
    let relative = build(FrameParts { sizes: SizeSource::AssumedRelative, ..sound() });
    assert_eq!(refusing(&relative, "relative"), ["racking", "wilbur", "racking+chord", "wilbur+chord"]);
    let without = build(parts(&[6.0], &[4.0], &[1e4]));
    assert_eq!(refusing(&without, "area"), ["racking+chord", "wilbur+chord"]);
    assert_eq!(refusing(&build(sound()), ""), METHODS.map(|entry| entry.info.id), "every reason contains nothing");
    assert!(
        METHODS.iter().all(|entry| refusal(entry.info.id, &build(sound())).is_empty()),
        "a sound frame is answered"
    );
}

/// A joint or a floor without beam stiffness is refused by name; a missing beam beside a joint with another one is not.
#[test]
fn beams_without_stiffness_are_refused_where_they_are_needed() {
    let joint = build(sound().beams(|floor, bay| if (floor, bay) == (1, 1) { 0.0 } else { 1.0 }));
    assert_eq!(refusing(&joint, "joint of floor 2 on line C"), ["factor", "d-value", "substitute-frame"]);
    assert!(refusal("racking", &joint).is_empty() && refusal("wilbur+chord", &joint).is_empty());
    let floor = build(sound().beams(|floor, _| if floor == 1 { 0.0 } else { 1.0 }));
    assert_eq!(refusing(&floor, "of floor 2"), METHODS[3..].iter().map(|entry| entry.info.id).collect::<Vec<_>>());
    let wide = parts(&[6.0, 5.0, 4.0], &[4.0, 3.0], &[1e4; 2]).beams(|_, bay| if bay == 1 { 0.0 } else { 1.0 });
    finite(&build(wide.areas(|_, _| 0.1)));
}

/// Every method that does not refuse the frame answers in finite numbers; returns how many answer.
#[track_caller]
fn finite(frame: &Frame) -> usize {
    let willing = METHODS.iter().filter(|entry| !matches!((entry.fit)(frame), Fit::Refused(_)));
    let answers = willing.map(|entry| entry.analyse(frame));
    let checked = answers.inspect(|response| {
        let bad = response.values(frame).into_iter().find(|value| !value.value.is_finite());
        assert!(bad.is_none(), "{}: {bad:?}", response.method);
    });
    checked.count()
}

/// One storey or many, one bay or many, beams from a billionth to 1e12 times the columns, and nothing.
#[test]
fn answers_are_finite_numbers() {
    for (storeys, bays) in [(1, 1), (1, 3), (2, 1), (12, 2)] {
        for exponent in [-300, -30, -12, -9, -8, -4, 0, 4, 8, 12, 25, 200, 300] {
            for feet in [Feet::Fixed, Feet::Pinned, Feet::Springs(vec![0.5; bays + 1])] {
                let forces: Vec<f64> = (0..storeys).map(|floor| 1.0 + floor as f64).collect();
                let bare = parts(&vec![6.0; bays], &vec![3.5; storeys], &forces).areas(|_, _| 0.1);
                let sized = bare.beams(|_, _| 10f64.powi(exponent)).feet(feet.clone());
                let answers = finite(&build(sized.clone()));
                let all = match feet {
                    Feet::Fixed => 10,
                    Feet::Pinned => 8,
                    Feet::Springs(_) => 4,
                };
                let sound = (-8..=25).contains(&exponent);
                assert_eq!(answers, if sound { all } else { 3 }, "{storeys} x {bays}, 1e{exponent}, {feet:?}");
                finite(&build(sized.beams(|floor, _| if floor % 2 == 0 { 10f64.powi(exponent) } else { 0.0 })));
            }
        }
    }
}

fn cautions(method: &str, frame: &Frame) -> String {
    match (find(method).expect("it is listed").fit)(frame) {
        Fit::Doubtful(cautions) => cautions.into_iter().map(|caution| caution.0).collect::<Vec<_>>().join("; "),
        _ => String::new(),
    }
}

#[test]
fn what_each_method_doubts() {
    let pinned = build(sound().feet(Feet::Pinned));
    assert!(
        cautions("factor", &pinned).contains("storey 2 come out too small, by a factor of 1.3 to 1.6 in the median")
    );
    assert!(cautions("factor", &build(sound())).is_empty());
    let single = build(parts(&[6.0], &[4.0], &[1e4]).feet(Feet::Pinned));
    assert!(cautions("factor", &single).is_empty(), "there is no storey 2");
    let slender = build(parts(&[4.0], &[3.0; 5], &[1e4; 5]).areas(|_, _| 0.1));
    for method in ["d-value", "substitute-frame", "racking", "wilbur"] {
        assert!(cautions(method, &slender).contains("height over width is 3.8"), "{method}");
    }
    assert!(cautions("racking+chord", &slender).is_empty() && cautions("factor", &slender).is_empty());
    let flexible = build(sound().beams(|_, _| 0.1));
    assert!(
        cautions("d-value", &flexible).contains("K is 0.05 at column A, storey 3"),
        "{}",
        cautions("d-value", &flexible)
    );
    for method in ["racking", "racking+chord"] {
        assert!(cautions(method, &flexible).contains("too small where beams are flexible"), "{method}");
    }
    for method in ["wilbur", "wilbur+chord"] {
        assert!(cautions(method, &flexible).contains("upper storeys too large"), "{method}");
    }
}

/// A comparison leaves refused methods out and keeps the reason.
#[test]
fn a_comparison_passes_over_refused_methods() {
    let frame = build(sound().feet(Feet::Springs(vec![1e5; 3])));
    let comparison = compare(&frame, &AnalysisOptions::plain(&frame), Options::default()).expect("the frame stands");
    assert_eq!(comparison.quick.len(), METHODS.len());
    for quick in &comparison.quick {
        let refused = matches!(quick.fit, Fit::Refused(_));
        assert_eq!(refused, quick.response.is_none(), "{}", quick.entry.info.id);
        let measured = comparison.errors.iter().any(|(method, _)| *method == quick.entry.info.id);
        assert_eq!(refused, !measured, "{}", quick.entry.info.id);
    }
    assert_eq!(comparison.quick_responses().count(), 4);
}

fn frames() -> Vec<Frame> {
    let mut frames = vec![build(FrameParts { sizes: SizeSource::AssumedRelative, ..sound() })];
    for feet in [Feet::Fixed, Feet::Pinned, Feet::Springs(vec![0.5, 0.9, 0.2])] {
        frames.push(build(sound().columns(|storey, line| 1.0 + storey as f64 + line as f64).feet(feet)));
    }
    frames
}

fn number(step: &Step, row: usize, head: &str) -> f64 {
    let column = step.columns.iter().position(|column| column.head == head).expect("the column is there");
    match step.rows[row][column] {
        SheetCell::Number(value) => value,
        _ => panic!("no number under {head}"),
    }
}

/// Every row of a hand calculation is as long as its head, every number finite, and the last drifts those of the answer.
#[test]
fn worksheets_are_whole() {
    for frame in frames() {
        for entry in METHODS.iter().filter(|entry| !matches!((entry.fit)(&frame), Fit::Refused(_))) {
            let response = entry.analyse(&frame);
            let sheet = (entry.worksheet)(&frame, &response);
            for step in &sheet.steps {
                assert!(!step.title.is_empty() && !step.rule.is_empty() && !step.rows.is_empty());
                for row in &step.rows {
                    assert_eq!(row.len(), step.columns.len(), "{}: {}", entry.info.id, step.title);
                    let whole = |cell: &SheetCell| !matches!(cell, SheetCell::Number(value) if !value.is_finite());
                    assert!(row.iter().all(whole), "{}: {}", entry.info.id, step.title);
                }
            }
            let drifts = sheet.steps.iter().find(|step| step.title == "Storey drifts and sways");
            assert_eq!(drifts.is_some(), response.movement(0).is_some(), "{}", entry.info.id);
            if let (Some(step), Some(top)) = (drifts, response.movement(2)) {
                assert_eq!((number(step, 0, "drift"), number(step, 0, "sway")), (top.drift, top.sway));
            }
        }
    }
}

/// The equations that the substitute frame's sheet states hold for the numbers beside them, foot row included.
#[test]
fn the_substitute_frames_sheet_can_be_checked_by_itself() {
    for frame in frames() {
        let entry = find("substitute-frame").expect("it is listed");
        let sheet = (entry.worksheet)(&frame, &entry.analyse(&frame));
        let step = sheet.steps.iter().find(|step| step.title.starts_with("Rotations")).expect("there is such a step");
        let pinned = *frame.feet() == Feet::Pinned;
        // Rows run from the roof: 0 is storey 3.
        for row in 0..3 {
            let of = |head: &str| number(step, row, head);
            let mut left = of("12 G") * of("θ");
            if !(row == 2 && pinned) {
                left += of("C") * (of("θ") - of("θ below"));
            }
            if row > 0 {
                left += number(step, row - 1, "C") * (of("θ") - number(step, row - 1, "θ"));
            }
            close("row", left, of("right side"), Within::Relative(1e-10));
        }
        if let Feet::Springs(springs) = frame.feet() {
            let (c, foot) = (number(step, 2, "C"), number(step, 2, "θ below"));
            let left = (springs.iter().sum::<f64>() + c) * foot - c * number(step, 2, "θ");
            close("feet", left, frame.storey_shear(0) * 4.0 / 2.0, Within::Relative(1e-10));
        }
    }
}

/// The steps of the D-value and factor sheets lead to the answer: shear by D, inflection height by its parts, moment by factors.
#[test]
fn sheets_lead_to_the_answer() {
    let frame = &frames()[1];
    let sheet = |id: &str| {
        let entry = find(id).expect("it is listed");
        let response = entry.analyse(frame);
        ((entry.worksheet)(frame, &response).steps, response)
    };
    let titled = |steps: &[Step], title: &str| steps.iter().find(|s| s.title.starts_with(title)).expect(title).clone();
    let (steps, response) = sheet("d-value");
    let d = titled(&steps, "Stiffness D");
    let parts = ["Standard", "Corrections y1", "Corrections y2", "Corrections y3"].map(|title| titled(&steps, title));
    for row in 0..3 {
        let column = response.column(2 - row, 1);
        let shear = frame.storey_shear(2 - row) * number(&d, row, "B") / number(&d, row, "sum");
        close("shear", column.shear, shear, Within::Relative(1e-12));
        let y: f64 = parts.iter().map(|step| number(step, row, "B")).sum();
        close("foot", -column.foot, shear * y * frame.storey_height(2 - row), Within::Relative(1e-12));
    }
    let (steps, response) = sheet("factor");
    let (factors, scale) = (titled(&steps, "Column factors"), titled(&steps, "Factor A"));
    assert_eq!(scale.columns[3].amount, Amount::Rotation);
    for row in 0..3 {
        let column = response.column(2 - row, 1);
        let [head, foot] = [2 * row, 2 * row + 1].map(|end| number(&factors, end, "B") * number(&scale, row, "A"));
        close("head", -column.head, head, Within::Relative(1e-12));
        close("foot", -column.foot, foot, Within::Relative(1e-12));
    }
}
