//! A solution as a table for people.

use crestline_plan::{
    Datum, FitRule, NutStyle, Plan, SaddleLine, SaddleStyle, Solution, StringLine, StringReport,
};

use crate::arguments::Solve;
use crate::fret_errors;
use crate::numbers::{cents, fixed, force, length, percent};
use crate::print::notice_line;
use crate::sets_table;
use crate::table::{Column, rendered};
use crate::text::{PAGE_WIDTH, clipped, push_paragraph, safe};

/// The widest string name in a table of many columns.
pub(crate) const NARROW_NAME: usize = 8;
/// The widest string name otherwise.
pub(crate) const NAME_LIMIT: usize = 14;

/// What stands below every table that shows tensions.
const CAUTION: &str = "Caution: strings under tension can break and bridges can lift. The string maker's ratings and \
                       the judgement of a qualified maker or repairer come before these figures.";

/// Everything that `solve` was asked to print of one plan.
pub(crate) fn asked(options: &Solve, plan: &Plan, solution: &Solution) -> String {
    let mut printed = text(plan, solution);
    if options.frets {
        printed.push_str(&fret_errors::text(&solution.report));
        printed.push_str(&sets_table::fret_errors(&solution.report));
    }
    printed
}

/// The whole table, from the title to the cautions.
pub(crate) fn text(plan: &Plan, solution: &Solution) -> String {
    let mut text = heading(plan);
    text.push('\n');
    text.push_str(&string_table(solution));
    text.push('\n');
    if plan.nut.style != NutStyle::Plain {
        text.push_str(&nut_table(solution));
        text.push('\n');
    }
    text.push_str(&sets_table::text(plan, &solution.report));
    text.push_str(&saddle_lines(solution));
    text.push_str(&format!("Total pull on the bridge: {} N\n", force(solution.report.total_tension_n)));
    for notice in &solution.report.notices {
        push_paragraph(&mut text, &notice_line(notice));
    }
    text.push('\n');
    push_paragraph(&mut text, CAUTION);
    text
}

/// The title and what was asked for.
fn heading(plan: &Plan) -> String {
    let title = if plan.title.trim().is_empty() { "Plan without a title" } else { plan.title.trim() };
    let mut text = String::new();
    push_paragraph(&mut text, &clipped(&safe(title), 3 * PAGE_WIDTH));
    let [first, last] = plan.fit.frets;
    let asked = format!(
        "Saddle {}, nut {}; {} over frets {first} to {last}.",
        saddle_words(plan.saddle.style),
        nut_words(plan.nut.style),
        rule_words(plan.fit.rule),
    );
    push_paragraph(&mut text, &asked);
    let frame = format!(
        "Setbacks and lengths in mm, errors in cents. Crest x from {}, y from the centre line (positive: treble side), \
         z above the plane of the outer frets' crowns.",
        datum_words(plan.sheet.datum),
    );
    push_paragraph(&mut text, &frame);
    text
}

fn string_table(solution: &Solution) -> String {
    let columns = [
        Column::numbers("No.", ""),
        Column::words("Name", ""),
        Column::numbers("Pitch", "Hz"),
        Column::numbers("Tension", "N"),
        Column::numbers("Load", "%"),
        Column::numbers("Setback", "ideal"),
        Column::numbers("Setback", "built"),
        Column::numbers("Crest", "x"),
        Column::numbers("Crest", "y"),
        Column::numbers("Crest", "z"),
        Column::numbers("Error", "rms"),
        Column::numbers("Error", "worst"),
    ];
    let datum_x_mm = solution.layout.datum_x_mm;
    let strings = solution.report.strings.iter();
    rendered(&columns, &strings.map(|string| string_row(string, datum_x_mm)).collect::<Vec<_>>())
}

fn string_row(string: &StringReport, datum_x_mm: f64) -> Vec<String> {
    let built = &string.built;
    vec![
        string.string.to_string(),
        clipped(&safe(&string.name), NAME_LIMIT),
        fixed(string.frequency_hz, 2),
        force(string.tension_n),
        string.breaking_fraction.map_or_else(|| "-".to_owned(), percent),
        length(string.ideal.saddle_setback_mm),
        length(built.saddle_setback_mm),
        length(built.crest_mm.x - datum_x_mm),
        length(built.crest_mm.y),
        length(built.crest_mm.z),
        cents(built.rms_cents),
        cents(built.max_cents),
    ]
}

/// Setbacks of the nut, which only a compensated one has, and where each edge stands from the datum.
fn nut_table(solution: &Solution) -> String {
    let columns = [
        Column::numbers("No.", ""),
        Column::words("Name", ""),
        Column::numbers("Nut setback", "ideal"),
        Column::numbers("Nut setback", "built"),
        Column::numbers("Nut edge", "x"),
        Column::numbers("Nut edge", "y"),
    ];
    let row = |(string, line): (&StringReport, &StringLine)| {
        vec![
            string.string.to_string(),
            clipped(&safe(&string.name), NAME_LIMIT),
            length(string.ideal.nut_setback_mm),
            length(string.built.nut_setback_mm),
            length(line.nut_edge.x - solution.layout.datum_x_mm),
            length(line.nut_edge.y),
        ]
    };
    let strings = solution.report.strings.iter().zip(&solution.layout.strings);
    rendered(&columns, &strings.map(row).collect::<Vec<_>>())
}

/// The ends and slant of every straight line of the saddle, and whether the crests fit.
fn saddle_lines(solution: &Solution) -> String {
    let datum_x_mm = solution.layout.datum_x_mm;
    let saddle = &solution.report.saddle;
    let mut text = String::new();
    for (number, line) in saddle.lines.iter().enumerate() {
        let name = if saddle.lines.len() == 1 {
            "Saddle line".to_owned()
        } else {
            format!("Saddle line {}", number + 1)
        };
        text.push_str(&saddle_line(&name, line, datum_x_mm));
    }
    if !saddle.fits {
        text.push_str("Not every crest fits the blank and its travel; see the notices.\n");
    }
    text
}

fn saddle_line(name: &str, line: &SaddleLine, datum_x_mm: f64) -> String {
    format!(
        "{name}: treble end x {}, y {}; bass end x {}, y {}; slant {}°\n",
        length(line.treble.x - datum_x_mm),
        length(line.treble.y),
        length(line.bass.x - datum_x_mm),
        length(line.bass.y),
        fixed(line.slant_degrees, 2),
    )
}

/// A saddle style in the words of the trade.
pub(crate) fn saddle_words(style: SaddleStyle) -> &'static str {
    match style {
        SaddleStyle::Separate => "separate pieces",
        SaddleStyle::Shaped => "shaped",
        SaddleStyle::Straight => "straight",
        SaddleStyle::TwoPiece => "two-piece",
    }
}

/// A nut style in the words of the trade.
pub(crate) fn nut_words(style: NutStyle) -> &'static str {
    match style {
        NutStyle::Plain => "plain",
        NutStyle::Common => "common",
        NutStyle::Shaped => "shaped",
    }
}

fn rule_words(rule: FitRule) -> &'static str {
    match rule {
        FitRule::LeastSquares => "least squares",
        FitRule::Twelfth => "twelfth true",
        FitRule::Minimax => "smallest largest error",
        FitRule::Robust => "least expected squares",
    }
}

/// A datum in words that follow "from".
pub(crate) fn datum_words(datum: Datum) -> &'static str {
    match datum {
        Datum::Nut => "the nominal nut line",
        Datum::TwelfthFret => "the crown of fret 12",
        Datum::SaddleLine => "the nominal saddle line",
    }
}
