//! What to mind before cutting, and the solution's own warnings.

use crestline_drawing::{Anchor, lettering, pt, wrap};
use crestline_plan::Severity;

use crate::block::{Block, small};
use crate::facts::Facts;

/// Distance of lines, mm.
const LINE_MM: f64 = 4.2;
/// Most warnings that are repeated here.
const MOST_WARNINGS: usize = 8;

const CAUTIONS: [&str; 4] = [
    "Measure the check lines of this sheet, and the scale and fret positions of the instrument itself, before cutting.",
    "A model gives where a crest should stand, not how a given string behaves: leave material, string up, check with a tuner, then finish.",
    "Strings under tension can break and bridges can lift. Slacken the strings before work and wear eye protection. \
     Follow the makers' ratings and, for machines and electrical work, licensed practice.",
    "Dust of bone, shell and many woods is harmful: use extraction and a mask.",
];

/// The cautions in lines no wider than a width.
pub(crate) fn cautions(facts: &Facts<'_>, width_mm: f64) -> Block {
    let mut block = Block::new("Cautions", "Before cutting");
    let report = &facts.solution.report;
    let mut points: Vec<String> = CAUTIONS.map(str::to_owned).to_vec();
    if !report.saddle.fits {
        points.insert(0, "Not every crest fits the blank and the travel of this plan.".to_owned());
    }
    let warnings = report.notices.iter().filter(|notice| notice.severity == Severity::Warning);
    points.extend(warnings.take(MOST_WARNINGS).map(|notice| format!("Warning: {}", notice.text)));
    let mut y_mm = 0.0;
    for point in points {
        block.text(small(pt(0.0, y_mm), Anchor::Start, "•"));
        for line in wrap(&point, lettering::SMALL_MM, width_mm - 4.0) {
            block.text(small(pt(4.0, y_mm), Anchor::Start, line));
            y_mm -= LINE_MM;
        }
        y_mm -= 0.8;
    }
    block
}
