//! A solution as a table for people.

use crestline_plan::{Datum, FitRule, NutStyle, Plan, SaddleLine, SaddleStyle, Solution, StringReport};

use crate::numbers::{cents, fixed, force, length, percent};
use crate::print::notice_line;
use crate::table::{Column, rendered};
use crate::text::{clipped, safe, wrapped};

/// The widest line, which fits most terminals and a printed page.
pub(crate) const PAGE_WIDTH: usize = 100;
/// The widest string name beside the columns of a compensated nut.
const NAME_WIDTH_WITH_NUT: usize = 8;
/// The widest string name otherwise.
pub(crate) const NAME_LIMIT: usize = 18;

/// What stands below every table that shows tensions.
const CAUTION: &str = "Caution: strings under tension can break and bridges can lift. The string maker's ratings and \
                       the judgement of a qualified maker or repairer come before these figures.";

/// The whole table, from the title to the cautions.
pub(crate) fn text(plan: &Plan, solution: &Solution) -> String {
    let mut text = heading(plan);
    text.push('\n');
    text.push_str(&string_table(plan, solution));
    text.push('\n');
    text.push_str(&saddle_lines(solution));
    text.push_str(&format!("Total pull on the bridge: {} N\n", force(solution.report.total_tension_n)));
    for notice in &solution.report.notices {
        push_wrapped(&mut text, &notice_line(notice));
    }
    text.push('\n');
    push_wrapped(&mut text, CAUTION);
    text
}

/// Adds a sentence, broken into lines of the page's width, the later ones indented.
fn push_wrapped(text: &mut String, sentence: &str) {
    const INDENT: &str = "  ";
    for (number, line) in wrapped(sentence, PAGE_WIDTH - INDENT.len()).iter().enumerate() {
        text.push_str(if number == 0 { "" } else { INDENT });
        text.push_str(line);
        text.push('\n');
    }
}

/// The title and what was asked for.
fn heading(plan: &Plan) -> String {
    let title = if plan.title.trim().is_empty() { "Plan without a title" } else { plan.title.trim() };
    let mut text = String::new();
    push_wrapped(&mut text, &clipped(&safe(title), 3 * PAGE_WIDTH));
    let [first, last] = plan.fit.frets;
    let asked = format!(
        "Saddle {}, nut {}; {} over frets {first} to {last}.",
        saddle_words(plan.saddle.style),
        nut_words(plan.nut.style),
        rule_words(plan.fit.rule),
    );
    push_wrapped(&mut text, &asked);
    let frame = format!(
        "Lengths in mm, errors in cents. Crest x from {}, y from the centre line (positive: treble side), \
         z above the plane of the outer frets' crowns.",
        datum_words(plan.sheet.datum),
    );
    push_wrapped(&mut text, &frame);
    text
}

fn string_table(plan: &Plan, solution: &Solution) -> String {
    let with_nut = plan.nut.style != NutStyle::Plain;
    let mut columns = vec![
        Column::numbers("No.", ""),
        Column::words("Name", ""),
        Column::numbers("Pitch", "Hz"),
        Column::numbers("Tension", "N"),
        Column::numbers("Load", "%"),
        Column::numbers("Setback", "ideal"),
        Column::numbers("Setback", "built"),
    ];
    if with_nut {
        columns.extend([Column::numbers("Nut", "ideal"), Column::numbers("Nut", "built")]);
    }
    columns.extend([
        Column::numbers("Crest", "x"),
        Column::numbers("Crest", "y"),
        Column::numbers("Crest", "z"),
        Column::numbers("Error", "rms"),
        Column::numbers("Error", "worst"),
    ]);
    let datum_x_mm = solution.layout.datum_x_mm;
    let strings = solution.report.strings.iter();
    rendered(&columns, &strings.map(|string| string_row(string, datum_x_mm, with_nut)).collect::<Vec<_>>())
}

fn string_row(string: &StringReport, datum_x_mm: f64, with_nut: bool) -> Vec<String> {
    let name_width = if with_nut { NAME_WIDTH_WITH_NUT } else { NAME_LIMIT };
    let (ideal, built) = (&string.ideal, &string.built);
    let mut row = vec![
        string.string.to_string(),
        clipped(&safe(&string.name), name_width),
        fixed(string.frequency_hz, 2),
        force(string.tension_n),
        string.breaking_fraction.map_or_else(|| "-".to_owned(), percent),
        length(ideal.saddle_setback_mm),
        length(built.saddle_setback_mm),
    ];
    if with_nut {
        row.extend([length(ideal.nut_setback_mm), length(built.nut_setback_mm)]);
    }
    row.extend([
        length(built.crest_mm.x - datum_x_mm),
        length(built.crest_mm.y),
        length(built.crest_mm.z),
        cents(built.rms_cents),
        cents(built.max_cents),
    ]);
    row
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
    }
}

fn datum_words(datum: Datum) -> &'static str {
    match datum {
        Datum::Nut => "the nominal nut line",
        Datum::TwelfthFret => "the crown of fret 12",
        Datum::SaddleLine => "the nominal saddle line",
    }
}
