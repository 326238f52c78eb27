//! Moving crests, alone and with the nut edges.

use crestline_physics::PhysicsError;
use crestline_physics::fit::chebyshev_line;
use crestline_physics::neck::PlanPoint;

use super::words::amounts_words;
use super::{Bench, Job};
use crate::{RemedyKind, SaddleStyle};

/// Work in units of filing one nut slot (common practice): a top filed anew, pieces or a slot moved, the end of a
/// fingerboard shortened besides.
const RESHAPE_WORK: f64 = 4.0;
const PIECES_WORK: f64 = 3.0;
const NEW_SLOT_WORK: f64 = 12.0;
const NUT_WORK: f64 = 6.0;
/// Moves below this cannot be set by hand, mm.
const LEAST_MOVE_MM: f64 = 0.05;

/// Every string's crest moved alone.
pub(super) fn saddle(bench: &Bench) -> Result<Option<Job>, PhysicsError> {
    let moves_mm: Vec<f64> = bench
        .found
        .strings
        .iter()
        .map(|string| match string.saddle {
            Some(saddle) if !string.is_suspect => saddle.saddle_mm,
            _ => 0.0,
        })
        .collect();
    let strings = moved(&moves_mm);
    if strings.is_empty() {
        return Ok(None);
    }
    let errors_cents = moved_errors(bench, &moves_mm, &vec![0.0; moves_mm.len()])?;
    let (kind, work, fit) = way(bench, &moves_mm);
    let amounts: Vec<f64> = strings.iter().map(|&string| moves_mm[string as usize - 1]).collect();
    let verb = if kind == RemedyKind::ReshapeSaddle { "Reshape the saddle" } else { "Move the saddle" };
    let named = amounts_words(&strings, &amounts, true);
    let text = format!("{verb}, crests away from the nut (+) by: {named}. {fit}");
    Ok(Some(Job { kind, text, work, strings, saddle_moves_mm: Some(moves_mm), errors_cents }))
}

/// Crests and nut edges moved together.
pub(super) fn nut_and_saddle(bench: &Bench) -> Result<Option<Job>, PhysicsError> {
    let both = bench.found.strings.iter().map(|string| match string.saddle_and_nut {
        Some(both) if !string.is_suspect => (both.saddle_mm, both.nut_mm),
        _ => (0.0, 0.0),
    });
    let (moves_mm, nuts_mm): (Vec<f64>, Vec<f64>) = both.unzip();
    let edges = moved(&nuts_mm);
    if edges.is_empty() || bench.checked.plan().instrument.zero_fret {
        return Ok(None);
    }
    let errors_cents = moved_errors(bench, &moves_mm, &nuts_mm)?;
    let (_, work, fit) = way(bench, &moves_mm);
    let crests = moved(&moves_mm);
    let strings: Vec<u32> = (1..=moves_mm.len() as u32)
        .filter(|string| edges.contains(string) || crests.contains(string))
        .collect();
    let amounts =
        |of: &[u32], all: &[f64]| of.iter().map(|&string| all[string as usize - 1]).collect::<Vec<_>>();
    let nut_amounts = amounts(&edges, &nuts_mm);
    let (kind, verb) = if nut_amounts.iter().all(|&mm| mm > 0.0) {
        (RemedyKind::ShortenNutEnd, "Shorten the nut end")
    } else {
        (RemedyKind::MoveNutEdge, "Move the nut edges")
    };
    let text = format!(
        "{verb}, edges toward the bridge (+) by: {}; crests away from the nut (+) by: {}. {fit}",
        amounts_words(&edges, &nut_amounts, true),
        if crests.is_empty() {
            "nothing".to_owned()
        } else {
            amounts_words(&crests, &amounts(&crests, &moves_mm), true)
        },
    );
    Ok(Some(Job {
        kind,
        text,
        work: work + NUT_WORK,
        strings,
        saddle_moves_mm: Some(moves_mm),
        errors_cents,
    }))
}

fn moved(moves_mm: &[f64]) -> Vec<u32> {
    let counts = |string: &usize| moves_mm[*string].abs() >= LEAST_MOVE_MM;
    (0..moves_mm.len()).filter(counts).map(|string| string as u32 + 1).collect()
}

fn moved_errors(bench: &Bench, saddle_mm: &[f64], nut_mm: &[f64]) -> Result<Vec<Vec<f64>>, PhysicsError> {
    (0..bench.strings())
        .map(|string| {
            bench.after(string, |_, contacts| {
                contacts.saddle_setback_mm += saddle_mm[string];
                contacts.nut_setback_mm += nut_mm[string];
            })
        })
        .collect()
}

/// How crests are moved on this kind of saddle, the work of it, and whether the blank that is there has room.
fn way(bench: &Bench, moves_mm: &[f64]) -> (RemedyKind, f64, String) {
    let saddle = &bench.checked.plan().saddle;
    if saddle.style == SaddleStyle::Separate {
        return (RemedyKind::MoveSaddle, PIECES_WORK, "Each piece is moved by itself.".to_owned());
    }
    let usable_mm = 0.5 * saddle.thickness_mm - saddle.edge_margin_mm;
    let now = crests(bench, &vec![0.0; moves_mm.len()]);
    let then = crests(bench, moves_mm);
    // The blank that is there lies about the crests that are there.
    let farthest = |line: [PlanPoint; 2]| {
        bench.cases.lines.iter().zip(&then).filter_map(move |(string, crest)| {
            let centre_mm = string.crossing_mm(line[0], line[1])?;
            Some((string.at(centre_mm).distance_mm(*crest)).abs())
        })
    };
    let needed_mm = match chebyshev_line(&now) {
        Some(line) => farthest(line.ends).fold(0.0, f64::max),
        None => moves_mm.iter().fold(0.0, |most: f64, mm| most.max(mm.abs())),
    };
    let thickness_mm = saddle.thickness_mm;
    if needed_mm <= usable_mm {
        let fit = format!(
            "The crests fit the blank that is there ({thickness_mm:.1} mm): {needed_mm:.2} mm from its middle, \
             room for {usable_mm:.2} mm."
        );
        return (RemedyKind::ReshapeSaddle, RESHAPE_WORK, fit);
    }
    let wide_mm = chebyshev_line(&then).map_or(needed_mm, |line| line.half_width_mm);
    let slot = if wide_mm <= usable_mm {
        format!("A blank of the same {thickness_mm:.1} mm in a new slot has room for them.")
    } else {
        let enough_mm = 2.0 * (wide_mm + saddle.edge_margin_mm);
        format!("A blank in a new slot must be {enough_mm:.1} mm thick for them.")
    };
    let fit = format!(
        "The crests do not fit the blank that is there ({thickness_mm:.1} mm): {needed_mm:.2} mm from its middle, \
         room for {usable_mm:.2} mm. {slot}"
    );
    (RemedyKind::MoveSaddle, NEW_SLOT_WORK, fit)
}

/// The crests in plan after these moves.
fn crests(bench: &Bench, moves_mm: &[f64]) -> Vec<PlanPoint> {
    let place = |string: usize| {
        let line = bench.cases.lines[string];
        line.at(line.scale_mm() + bench.found.strings[string].contacts.saddle_setback_mm + moves_mm[string])
    };
    (0..moves_mm.len()).map(place).collect()
}
