//! Solved plans for the tests: every example, every style, and plans at the limits of what is legal.
#![allow(dead_code, clippy::unwrap_used, clippy::expect_used)]

use crestline_plan::{
    Across, Datum, EXAMPLES, NutStyle, Paper, Plan, PlanString, SaddleStyle, Scale, Solution, Spread, check,
    read, solve,
};
use crestline_sheets::{LengthUnits, SheetOptions};

/// A solved plan with its name.
pub struct Case {
    pub name: String,
    pub plan: Plan,
    pub solution: Solution,
}

/// Text that markup, DXF and spreadsheets would take for more than text.
pub const HOSTILE: &str =
    "=cmd()<b>&\"'</b> %%c ^J \\P\\U+0041 {x} é♭弦 שלום \u{202E}\u{0}\n]]> and on and on and on and on";

pub fn solved(name: &str, plan: Plan) -> Case {
    let checked = check(&plan).unwrap_or_else(|faults| panic!("{name}: {faults:?}"));
    let solution = solve(&checked).unwrap_or_else(|faults| panic!("{name}: {faults:?}"));
    Case { name: name.to_owned(), plan, solution }
}

/// An example's plan.
pub fn example(name: &str) -> Plan {
    read(crestline_plan::example(name).unwrap().text).unwrap()
}

/// All examples as they stand.
pub fn examples() -> Vec<Case> {
    EXAMPLES.iter().map(|example| solved(example.name, read(example.text).unwrap())).collect()
}

/// The examples, then each with every style of saddle, then the limits.
pub fn cases() -> Vec<Case> {
    let mut cases = examples();
    for (index, example) in EXAMPLES.iter().enumerate() {
        let plan = read(example.text).unwrap();
        for style in
            [SaddleStyle::Separate, SaddleStyle::Shaped, SaddleStyle::Straight, SaddleStyle::TwoPiece]
        {
            let mut plan = plan.clone();
            plan.saddle.style = style;
            plan.saddle.split_after = (style == SaddleStyle::TwoPiece).then_some(1 + index as u32 % 2);
            plan.nut.style = if index % 2 == 0 { NutStyle::Shaped } else { NutStyle::Common };
            cases.push(solved(&format!("{} {style:?}", example.name), plan));
        }
    }
    cases.extend([hostile(), crowded(), widest(), single(), banded("steel_six"), banded("fanned_eight")]);
    cases
}

/// Names and title of every script, markup and codes, and far too long.
pub fn hostile() -> Case {
    let mut plan = example("steel_six");
    plan.title = HOSTILE.repeat(3);
    for string in &mut plan.strings {
        string.name = HOSTILE.to_owned();
    }
    solved("hostile", plan)
}

/// Sixteen strings a millimetre apart at the nut.
pub fn crowded() -> Case {
    let mut plan = sixteen();
    plan.instrument.spread_mm = Some(Spread { nut: 15.0, saddle: 18.0 });
    solved("crowded", plan)
}

/// As wide as is legal, on a fanned neck, with a thick blank.
pub fn widest() -> Case {
    let mut plan = sixteen();
    plan.instrument.spread_mm = Some(Spread { nut: 160.0, saddle: 300.0 });
    plan.instrument.scale =
        Scale::Fanned(crestline_plan::Fan { bass: 700.0, treble: 600.0, square_fret: 7.0 });
    plan.saddle.style = SaddleStyle::Shaped;
    plan.saddle.thickness_mm = 20.0;
    solved("widest", plan)
}

/// With tolerances, so that the schedule has a column more.
pub fn banded(name: &str) -> Case {
    let mut plan = example(name);
    plan.tolerances = Some(crestline_plan::Tolerances::default());
    solved(&format!("{name} with tolerances"), plan)
}

/// One string only.
pub fn single() -> Case {
    let mut plan = example("tenor_ukulele");
    plan.strings.truncate(1);
    plan.instrument.spread_mm = None;
    plan.instrument.across_mm = Some(Across { nut: vec![0.0], saddle: vec![0.0] });
    solved("single", plan)
}

fn sixteen() -> Plan {
    let mut plan = example("steel_six");
    let strings: Vec<PlanString> = plan.strings.iter().cycle().take(16).cloned().collect();
    plan.strings = strings;
    plan.instrument.across_mm = None;
    plan
}

/// For an example every paper, unit and datum; for other cases each of them once.
pub fn options_for(case: &Case) -> Vec<SheetOptions> {
    let all = all_options(&case.plan);
    let plain = EXAMPLES.iter().any(|example| example.name == case.name);
    // Three of the 27, with every paper, every unit and every datum once.
    let kept = |i: usize| plain || i.is_multiple_of(13);
    all.into_iter().enumerate().filter(|(i, _)| kept(*i)).map(|(_, options)| options).collect()
}

/// Every paper, unit and datum, as a plan may ask for them.
pub fn all_options(plan: &Plan) -> Vec<SheetOptions> {
    let mut all = vec![];
    for paper in [Paper::A4, Paper::A3, Paper::Letter] {
        for units in [LengthUnits::Millimetres, LengthUnits::InchDecimal, LengthUnits::InchFraction] {
            for datum in [Datum::Nut, Datum::TwelfthFret, Datum::SaddleLine] {
                let date = Some("2031-05-04".to_owned());
                all.push(SheetOptions { paper, units, datum, date, ..SheetOptions::for_plan(plan) });
            }
        }
    }
    all
}
