//! The paper drawing: views, tables and template on sheets of a paper size.

use crestline_drawing::{Drawing, Sheet};
use crestline_plan::{Plan, Solution};

use crate::SheetOptions;
use crate::block::Block;
use crate::cautions::cautions;
use crate::facts::Facts;
use crate::furniture::{Page, TitleBlock, paper_name};
use crate::layers::paper_drawing;
use crate::legend::legend;
use crate::nut_view::nut_view;
use crate::pack::{column_width_mm, pack};
use crate::plan_view::plan_view;
use crate::profile::profile;
use crate::tables::{bands, schedule, slots};
use crate::template::template;

/// The dimensioned drawing of a solved plan on paper. Views are never scaled: what does not fit a sheet
/// goes on the next, and a view larger than a sheet is spread over several with registration marks.
#[must_use]
pub fn sheets(plan: &Plan, solution: &Solution, options: &SheetOptions) -> Drawing {
    let facts = Facts::new(plan, solution, options);
    let page = Page::new(options.paper);
    let mut pages = pack(blocks(&facts, column_width_mm(page.content)), page.content);
    if pages.is_empty() {
        pages.push(vec![]);
    }
    let count = pages.len();
    let mut drawing = paper_drawing(&facts.plan.title);
    for (index, blocks) in pages.into_iter().enumerate() {
        let texts = title_block(&facts, &blocks, &format!("{} of {count}", index + 1));
        let mut sheet =
            Sheet::new(format!("{}: {}", texts.sheet, texts.contents), page.width_mm, page.height_mm);
        for block in blocks.into_iter().chain([page.furniture(&texts)]) {
            sheet.items.extend(block.items);
        }
        drawing.sheets.push(sheet);
    }
    drawing
}

fn blocks(facts: &Facts<'_>, width_mm: f64) -> Vec<Block> {
    let contents = facts.options.contents;
    let mut blocks = vec![];
    if contents.plan_view {
        blocks.extend([plan_view(facts), legend()]);
    }
    if contents.tables {
        blocks.extend(slots(facts));
        blocks.push(schedule(facts));
        blocks.extend(bands(facts));
    }
    if contents.nut_view {
        blocks.extend(nut_view(facts));
    }
    if contents.profile {
        blocks.extend(profile(facts, width_mm.min(170.0)));
    }
    if contents.cautions {
        blocks.push(cautions(facts, width_mm.min(170.0)));
    }
    if contents.template {
        blocks.push(template(facts));
    }
    blocks
}

fn title_block(facts: &Facts<'_>, blocks: &[Block], sheet: &str) -> TitleBlock {
    let mut names: Vec<&str> =
        blocks.iter().map(|b| b.name.as_str()).filter(|name| !name.is_empty()).collect();
    names.dedup();
    let mut scales: Vec<&str> = blocks.iter().filter_map(|b| b.scale).collect();
    scales.dedup();
    let title = if facts.plan.title.trim().is_empty() { "Saddle" } else { facts.plan.title.as_str() };
    TitleBlock {
        title: title.to_owned(),
        contents: names.join(", "),
        scale: if scales.is_empty() { "none".to_owned() } else { scales.join(", ") },
        units: facts.options.units.words().to_owned(),
        datum: facts.datum_words().to_owned(),
        date: facts.options.date.clone().unwrap_or_default(),
        sheet: sheet.to_owned(),
        paper: paper_name(facts.options.paper),
    }
}
