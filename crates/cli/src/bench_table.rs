//! Where everything stands from the datum, and how each blank's top is shaped, for people.

use crestline_plan::{BenchLayout, BenchPiece, BenchString, Point};

use crate::numbers::{fixed, length, percent};
use crate::solve_table::{NARROW_NAME, datum_words};
use crate::table::{Column, rendered};
use crate::text::{clipped, push_paragraph, safe};

/// The strings' crests and nut edges, then the blanks.
pub(crate) fn text(layout: &BenchLayout) -> String {
    let strings: Vec<_> = layout.strings.iter().map(string_row).collect();
    let pieces: Vec<_> = layout.pieces.iter().map(piece_row).collect();
    let mut text = String::new();
    let frame = format!(
        "Lengths in mm, x from {}, y from the centre line (positive: treble side), z above the plane of the outer \
         frets' crowns. A crest breaks at a distance from the blank's front, the face on the nut's side, square to it.",
        datum_words(layout.datum),
    );
    push_paragraph(&mut text, &frame);
    for table in [rendered(&string_columns(), &strings), rendered(&piece_columns(), &pieces)] {
        text.push('\n');
        text.push_str(&table);
    }
    text
}

fn string_columns() -> Vec<Column> {
    vec![
        Column::numbers("No.", ""),
        Column::words("Name", ""),
        Column::numbers("Piece", ""),
        Column::numbers("Crest", "x"),
        Column::numbers("Crest", "y"),
        Column::numbers("Crest", "z"),
        Column::numbers("Drop", "to next"),
        Column::numbers("Break", "from front"),
        Column::numbers("Break", "% of top"),
        Column::numbers("Nut edge", "x"),
        Column::numbers("Nut edge", "y"),
    ]
}

fn string_row(string: &BenchString) -> Vec<String> {
    vec![
        string.string.to_string(),
        clipped(&safe(&string.name), NARROW_NAME),
        string.piece.to_string(),
        length(string.crest_mm.x),
        length(string.crest_mm.y),
        length(string.crest_mm.z),
        string.drop_to_next_mm.map_or_else(String::new, length),
        length(string.break_from_front_mm),
        percent(string.break_fraction),
        length(string.nut_edge_mm.x),
        length(string.nut_edge_mm.y),
    ]
}

fn piece_columns() -> Vec<Column> {
    vec![
        Column::numbers("Piece", ""),
        Column::words("Strings", ""),
        Column::words("Treble end", "x, y"),
        Column::words("Bass end", "x, y"),
        Column::numbers("Length", ""),
        Column::numbers("Thickness", ""),
        Column::numbers("Slant", "degrees"),
    ]
}

fn piece_row(piece: &BenchPiece) -> Vec<String> {
    let strings = if piece.first_string == piece.last_string {
        piece.first_string.to_string()
    } else {
        format!("{} to {}", piece.first_string, piece.last_string)
    };
    vec![
        piece.piece.to_string(),
        strings,
        place(piece.treble_end_mm),
        place(piece.bass_end_mm),
        length(piece.length_mm),
        length(piece.thickness_mm),
        fixed(piece.slant_degrees, 2),
    ]
}

fn place(point: Point) -> String {
    format!("{}, {}", length(point.x), length(point.y))
}
