//! The schedule of crests and the table of slots or pieces.

use crestline_plan::SaddleStyle;

use crate::block::Block;
use crate::facts::{Facts, StringFacts};
use crate::lengths::{cents, decimals};
use crate::table::{Column, Table};

/// One row a string.
pub(crate) fn schedule(facts: &Facts<'_>) -> Block {
    let unit = facts.options.units.sign();
    let mut block = Block::new("Schedule", format!("Schedule of crests, x from {}", facts.datum_short()));
    let number = |a, b, unit, width_mm| Column { heading: [a, b], unit, width_mm, number: true };
    let columns = vec![
        Column { heading: ["String", ""], unit: "", width_mm: 20.0, number: false },
        number("Gauge", "w wound", unit, 17.5),
        number("Ideal", "setback", unit, 16.0),
        number("Built", "setback", unit, 16.0),
        number("Crest", "x", unit, 18.5),
        number("Crest", "y", unit, 18.5),
        number("Slot", "offset", unit, 15.5),
        number("Crest", "height", unit, 14.5),
        number("Fret 12", "error", "cents", 14.5),
        number("Worst", "error", "cents", 14.5),
    ];
    let rows = facts.strings.iter().map(|s| {
        let gauge = facts.options.units.gauge(s.gauge_mm);
        vec![
            s.label(),
            if s.wound { format!("{gauge} w") } else { gauge },
            facts.text(s.ideal_setback_mm),
            facts.text(s.built.saddle_setback_mm),
            facts.x_text(s.crest.x),
            facts.text(s.crest.y),
            s.built.slot_offset_mm.map_or_else(|| "–".to_owned(), |mm| facts.text(mm)),
            facts.text(s.built.crest_mm.z),
            s.octave_cents.map_or_else(|| "–".to_owned(), cents),
            decimals(s.built.max_cents, 1),
        ]
    });
    Table { columns, rows: rows.collect() }.draw(&mut block);
    block
}

/// How sure every ideal setback is; `None` where the plan has no tolerances. The schedule has no room for more columns.
pub(crate) fn bands(facts: &Facts<'_>) -> Option<Block> {
    if !facts.has_bands() {
        return None;
    }
    let unit = facts.options.units.sign();
    let mut block = Block::new("Bands", "How sure the ideal setbacks are");
    let number = |a, b, unit, width_mm| Column { heading: [a, b], unit, width_mm, number: true };
    let columns = vec![
        Column { heading: ["String", ""], unit: "", width_mm: 20.0, number: false },
        number("Ideal", "setback", unit, 20.0),
        number("±, nine", "of ten", unit, 20.0),
        number("From", "", unit, 20.0),
        number("To", "", unit, 20.0),
    ];
    let row = |s: &StringFacts| {
        let by_mm = s.plus_minus_mm?;
        let ends = [s.ideal_setback_mm - by_mm, s.ideal_setback_mm + by_mm];
        let lengths = [s.ideal_setback_mm, by_mm, ends[0], ends[1]].map(|mm| facts.text(mm));
        Some(std::iter::once(s.label()).chain(lengths).collect())
    };
    Table { columns, rows: facts.strings.iter().filter_map(row).collect() }.draw(&mut block);
    Some(block)
}

/// The ends of every slot or piece; `None` where there is none.
pub(crate) fn slots(facts: &Facts<'_>) -> Option<Block> {
    if facts.slots.is_empty() {
        return None;
    }
    let unit = facts.options.units.sign();
    let (name, what) = match facts.plan.saddle.style {
        SaddleStyle::Separate => ("Pieces", "each piece"),
        _ if facts.slots.len() > 1 => ("Slots", "each slot"),
        _ => ("Slot", "the slot"),
    };
    let title = format!("Centre line of {what}, x from {}", facts.datum_short());
    let mut block = Block::new(name, title);
    let number = |a, b, unit, width_mm| Column { heading: [a, b], unit, width_mm, number: true };
    let columns = vec![
        Column { heading: ["", ""], unit: "", width_mm: 26.0, number: false },
        number("Treble", "end x", unit, 20.0),
        number("Treble", "end y", unit, 20.0),
        number("Bass", "end x", unit, 20.0),
        number("Bass", "end y", unit, 20.0),
        number("Length", "", unit, 20.0),
        number("Width", "", unit, 20.0),
        number("Slant", "", "degrees", 20.0),
    ];
    let rows = facts.slots.iter().map(|slot| {
        vec![
            slot.name.clone(),
            facts.x_text(slot.treble_end.x),
            facts.text(slot.treble_end.y),
            facts.x_text(slot.bass_end.x),
            facts.text(slot.bass_end.y),
            facts.text(slot.length_mm()),
            facts.text(slot.width_mm),
            decimals(slot.slant_degrees(), 2),
        ]
    });
    Table { columns, rows: rows.collect() }.draw(&mut block);
    Some(block)
}
