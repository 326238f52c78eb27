//! How much the assumptions of the model are worth, in cents over the range of real strings: the study
//! `crates/physics/doc/limits.md` with its plots, made anew and compared with what is kept.

mod effects;
mod plot;
mod strings;

use std::fmt::Write;

use crestline_physics::fretting::Fixities;

use crate::places::assert_page;
use effects::{
    Difference, FRETS, Model, RUNS_ON, closed_form_cents, constant_mass_cents, difference, program,
};
use plot::{Curve, Plot};
use strings::RealString;

const FOLDER: &str = "crates/physics/doc";
const CLAMPED: Fixities = Fixities { nut: 1.0, fret: 1.0, saddle: 1.0 };

const HEAD: &str = "# Limits of the model

How much four assumptions of the model are worth, over the strings of `assets/materials/strings.json`, each set on
its own scale, and the ukulele's also on 330 mm. Written by `tests/src/limits.rs` with the program's own physics:
`CRESTLINE_WRITE=1 cargo test -p crestline-tests limits::`. A test compares this page and its plots with what they would say now.
";

/// Strings whose curves are drawn; the tables hold all.
const DRAWN: [&str; 7] = [
    "acoustic guitar, light, E4",
    "acoustic guitar, light, E2",
    "electric guitar, 10 to 46, G3",
    "bass, 45 to 105, E1",
    "mandolin, medium, G3",
    "classical guitar, G3",
    "tenor ukulele, high G, C4 on 432",
];

/// Wound strings whose curves are drawn against the stiffness of the wrap.
const DRAWN_WOUND: [&str; 6] = [
    "acoustic guitar, light, G3",
    "acoustic guitar, light, E2",
    "electric guitar, 10 to 46, D3",
    "bass, 45 to 105, E1",
    "mandolin, medium, G3",
    "classical guitar, D3",
];

fn drawn<'a>(all: &'a [RealString], names: &[&str]) -> Vec<&'a RealString> {
    let found = names.iter().map(|name| {
        // Without the medium set's name in brackets, as the strings carry it.
        all.iter().find(|string| string.name.starts_with(name)).unwrap_or_else(|| panic!("no string {name}"))
    });
    found.collect()
}

/// Smallest, median and largest.
fn quantiles(values: impl Iterator<Item = f64>) -> [f64; 3] {
    let mut sorted: Vec<_> = values.collect();
    sorted.sort_by(f64::total_cmp);
    [sorted[0], sorted[sorted.len() / 2], sorted[sorted.len() - 1]]
}

/// A number to a few decimals, with a true minus sign and without a sign at zero.
fn shown(value: f64, decimals: usize) -> String {
    let text = format!("{value:.decimals$}");
    let is_zero = text.bytes().all(|byte| !(b'1'..=b'9').contains(&byte));
    if is_zero { text.replace('-', "") } else { text.replace('-', "−") }
}

/// What an effect does on some strings, as rows of a table.
fn push_table(text: &mut String, decimals: usize, groups: &[(&str, &[Difference])]) {
    text.push_str("\n| strings | fret 1, cents | fret 12, cents | fret 24, cents | best setback, mm | left, cents | left with the nut, cents |\n");
    text.push_str("| --- | --- | --- | --- | --- | --- | --- |\n");
    for (name, differences) in groups {
        let _ = write!(text, "| {} {name} |", differences.len());
        let all = |value: &dyn Fn(&Difference) -> f64| quantiles(differences.iter().map(value));
        for [low, middle, high] in [
            all(&|difference| difference.cents[0]),
            all(&|difference| difference.cents[11]),
            all(&|difference| difference.cents[FRETS - 1]),
            all(&|difference| difference.setback_mm),
            all(&|difference| difference.left_cents),
            all(&|difference| difference.left_with_nut_cents),
        ] {
            let [low, middle, high] = [low, middle, high].map(|value| shown(value, decimals));
            let _ = write!(text, " {low} … {middle} … {high} |");
        }
        text.push('\n');
    }
}

/// The differences of all strings that are steel, and of those that are not.
fn by_material(all: &[RealString], of: impl Fn(&RealString) -> Difference) -> [Vec<Difference>; 2] {
    [false, true]
        .map(|is_polymer| all.iter().filter(|string| string.is_polymer == is_polymer).map(&of).collect())
}

fn over_frets(cents: &[f64]) -> Vec<[f64; 2]> {
    cents.iter().zip(1..).map(|(cents, fret)| [f64::from(fret), *cents]).collect()
}

const FRET_MARKS: [f64; 9] = [1.0, 3.0, 5.0, 7.0, 9.0, 12.0, 15.0, 19.0, 24.0];

/// A plot over the frets: for each drawn string one curve an effect, the first of them with the name.
fn fret_plot(
    title: &'static str,
    all: &[RealString],
    effects: &[&dyn Fn(&RealString) -> Difference],
) -> Plot {
    let mut curves = Vec::new();
    for string in drawn(all, &DRAWN) {
        let mut name = string.name.clone();
        for effect in effects {
            curves.push(Curve { name: std::mem::take(&mut name), points: over_frets(&effect(string).cents) });
        }
    }
    Plot { title, x: "fret", y: "cents", x_marks: FRET_MARKS.to_vec(), curves }
}

/// Supports of ½ but for the fret.
fn at_fret(fret: f64) -> Fixities {
    Fixities { fret, ..RUNS_ON }
}

fn fret_effect(fixity: f64) -> impl Fn(&RealString) -> Difference {
    move |string| difference(string, &program(string, at_fret(fixity)), &program(string, RUNS_ON))
}

fn fret_section(text: &mut String, all: &[RealString]) -> Plot {
    let (clamped, pinned) = (fret_effect(1.0), fret_effect(0.0));
    let [steel, polymer] = by_material(all, &clamped);
    let [steel_pinned, polymer_pinned] = by_material(all, &pinned);
    let octave = quantiles(steel.iter().map(|difference| difference.cents[11]));
    let setback = quantiles(steel.iter().chain(&polymer).map(|difference| difference.setback_mm));
    let left = quantiles(steel.iter().chain(&polymer).map(|difference| difference.left_cents));
    let with_nut = quantiles(steel.iter().chain(&polymer).map(|difference| difference.left_with_nut_cents));
    let _ = write!(
        text,
        "\n## Bending at the fret\n
How a fret holds the string is not known: pinned (fixity 0), running on (½, the program's choice unless told otherwise) or
clamped (1). The table gives what the two ends of the range add to the errors of ½, with no setback: smallest … median … largest.

A steel string clamped at the fret sounds {} to {} cents sharper at the octave than one that runs on, and a pinned one as much flatter. The
core counts, whatever the gauge over it. Half a bending length at the fret is the same length at every fret, so the effect doubles with every
octave up the neck, as does that of a setback, but it does not vanish toward fret 0 as that of a setback does. The crest therefore moves
by {} to {} mm between clamped and ½ and yet leaves up to {} cents at frets 1 to 12, sharp at the low frets; a nut edge set forward takes that up too,
and leaves at most {} cent. What is not known of the fret thus moves setbacks of crest and nut together and hardly changes how well they can do.
",
        shown(octave[0], 1),
        shown(octave[2], 1),
        shown(setback[0], 2),
        shown(setback[2], 2),
        shown(left[2], 1),
        shown(with_nut[2], 2),
    );
    push_table(
        text,
        2,
        &[
            ("steel, clamped", &steel),
            ("nylon and fluorocarbon, clamped", &polymer),
            ("steel, pinned", &steel_pinned),
            ("nylon and fluorocarbon, pinned", &polymer_pinned),
        ],
    );
    fret_plot(
        "Clamped (above) and pinned (below) at the fret, against a string that runs on",
        all,
        &[&clamped, &pinned],
    )
}

fn closed_effect(fixities: Fixities) -> impl Fn(&RealString) -> Difference {
    move |string| {
        let exact = program(string, fixities);
        difference(string, &Model { added_cents: closed_form_cents, ..program(string, fixities) }, &exact)
    }
}

fn closed_section(text: &mut String, all: &[RealString]) -> Plot {
    let (runs_on, clamped) = (closed_effect(RUNS_ON), closed_effect(CLAMPED));
    let [steel, polymer] = by_material(all, &runs_on);
    let [steel_clamped, polymer_clamped] = by_material(all, &clamped);
    let largest = |list: [&[Difference]; 2], value: &dyn Fn(&Difference) -> f64| {
        list.into_iter().flatten().map(value).fold(0.0, |most: f64, found| most.max(found.abs()))
    };
    let _ = write!(
        text,
        "\n## The closed form against the exact mode\n
The closed form f ≈ √(T/μ)/(2(L − (κ_a + κ_b)λ))·√(1 + (πλ/L)²) is right to second order in λ/L; the program solves for the
exact first mode. At the same tension the closed form would be off by at most {} cent at fret 12 and {} cent at fret 24 with ends that run
on, {} and {} with clamped ones. For setbacks it would be good enough on any of these strings (at most {} mm, with ends that run on); the exact mode is
kept because it costs little, holds for short and thick strings too, and leaves no doubt.
",
        shown(largest([&steel, &polymer], &|found| found.cents[11]), 4),
        shown(largest([&steel, &polymer], &|found| found.cents[FRETS - 1]), 4),
        shown(largest([&steel_clamped, &polymer_clamped], &|found| found.cents[11]), 3),
        shown(largest([&steel_clamped, &polymer_clamped], &|found| found.cents[FRETS - 1]), 3),
        shown(largest([&steel, &polymer], &|found| found.setback_mm), 4),
    );
    push_table(
        text,
        4,
        &[
            ("steel, ends that run on", &steel),
            ("nylon and fluorocarbon, ends that run on", &polymer),
            ("steel, clamped ends", &steel_clamped),
            ("nylon and fluorocarbon, clamped ends", &polymer_clamped),
        ],
    );
    fret_plot("The closed form less the exact mode, clamped ends", all, &[&clamped])
}

/// A wrap that adds a share of what a solid string of the core's modulus would have beyond the core.
fn wrap_effect(share: f64) -> impl Fn(&RealString) -> Difference {
    move |string| {
        let plain = program(string, RUNS_ON);
        let core = plain.bending_stiffness_n_mm2;
        let solid = string.solid_stiffness_n_mm2.unwrap_or(core);
        let bending_stiffness_n_mm2 = core + share * (solid - core);
        difference(string, &Model { bending_stiffness_n_mm2, ..program(string, RUNS_ON) }, &plain)
    }
}

fn wrap_section(text: &mut String, all: &[RealString]) -> Plot {
    const SHARES: [(f64, &str); 4] = [(0.01, "1 %"), (0.05, "5 %"), (0.2, "20 %"), (1.0, "100 %")];
    let wound = || all.iter().filter(|string| string.solid_stiffness_n_mm2.is_some());
    let with = |share| wound().map(wrap_effect(share)).collect::<Vec<_>>();
    let octave = |share| quantiles(with(share).iter().map(|found| found.cents[11]));
    let (little, whole) = (octave(0.05), octave(1.0));
    let setback = quantiles(with(0.05).iter().map(|found| found.setback_mm));
    let left = quantiles(with(1.0).iter().map(|found| found.left_cents));
    let farthest = quantiles(with(1.0).iter().map(|found| found.setback_mm));
    let _ = write!(
        text,
        "\n## Stiffness of the wrap\n
The wrap of a wound string is taken to add no bending stiffness: its turns slide on each other. A solid rod as thick as the string and of
the core's modulus is the most it could ever be; the table and the plot go from the core alone to that.

Were the wrap to add 5 % of it, the octave would be {} to {} cents sharper (median {}) and the best crest {} to {} mm farther back. A full solid
would be worth {} to {} cents at the octave and up to {} mm of setback; setbacks in the trade are some millimetres (common practice), so wraps
are far from that. This is the first thing to measure on a wound string whose octave will not come right;
`measured.bending_stiffness_n_mm2` of the plan takes the value in. A crest in its right place takes most of it up again: even of the full solid at
most {} cents stay at frets 1 to 12.
",
        shown(little[0], 1),
        shown(little[2], 1),
        shown(little[1], 1),
        shown(setback[0], 1),
        shown(setback[2], 1),
        shown(whole[0], 0),
        shown(whole[2], 0),
        shown(farthest[2], 0),
        shown(left[2], 1),
    );
    let tables = SHARES.map(|(share, name)| (format!("wound, {name} of a solid"), with(share)));
    let rows: Vec<_> = tables.iter().map(|(name, found)| (name.as_str(), found.as_slice())).collect();
    push_table(text, 2, &rows);
    let octave_of = |string: &RealString| {
        (0..=20).map(f64::from).map(|step| [5.0 * step, wrap_effect(step / 20.0)(string).cents[11]]).collect()
    };
    let curves = drawn(all, &DRAWN_WOUND)
        .into_iter()
        .map(|string| Curve { name: string.name.clone(), points: octave_of(string) });
    Plot {
        title: "The wrap's bending stiffness and the octave",
        x: "share of a solid's bending stiffness, %",
        y: "cents at fret 12",
        x_marks: (0..=10).map(|mark| 10.0 * f64::from(mark)).collect(),
        curves: curves.collect(),
    }
}

fn mass_effect(string: &RealString) -> Difference {
    let exact = program(string, RUNS_ON);
    difference(string, &Model { added_cents: constant_mass_cents, ..program(string, RUNS_ON) }, &exact)
}

fn mass_section(text: &mut String, all: &[RealString]) -> Plot {
    let [steel, polymer] = by_material(all, mass_effect);
    let octave = |found: &[Difference]| quantiles(found.iter().map(|found| -found.cents[11]));
    let setback = quantiles(steel.iter().chain(&polymer).map(|found| found.setback_mm));
    let _ = write!(
        text,
        "\n## The change of mass\n
A string that is pressed is stretched, and so lighter for its length. Taking the mass to stay the same would make notes flatter than
they are: by up to {} cent at the octave on steel and {} cent on nylon and fluorocarbon, and it would put the best crest up to {} mm
too near. It is kept because it is one factor and exact; it is far below what can be heard.
",
        shown(octave(&steel)[2], 3),
        shown(octave(&polymer)[2], 3),
        shown(-setback[0], 3),
    );
    push_table(text, 3, &[("steel, mass held", &steel), ("nylon and fluorocarbon, mass held", &polymer)]);
    fret_plot("The mass held, less the mass that changes with the stretch", all, &[&mass_effect])
}

/// A part of the study: writes its text and hands back its plot.
type Section = fn(&mut String, &[RealString]) -> Plot;

#[test]
fn the_study_says_what_the_physics_does() {
    let all = strings::all();
    let scales = quantiles(all.iter().map(|string| string.scale_mm));
    assert!(all.len() > 50 && scales[0] <= 330.0 && scales[2] >= 864.0, "{} strings, {scales:?}", all.len());
    let mut text = HEAD.to_owned();
    let _ = write!(
        text,
        "
{} strings, {} of them wound and {} of nylon or fluorocarbon; scales of {} to {} mm; frets 1 to 24; relief 0.15 mm; over frets 1 and 12 the strings
stand 0.45 and 2.0 mm (steel) or 0.6 and 3.3 mm (nylon, fluorocarbon) high. \"Best setback\" is the least squares of frets 1 to 12 with the
nut where it is. \"Left\" is the largest difference at frets 1 to 12 once both ways of reckoning have their own best crest, or crest and nut edge.
",
        all.len(),
        all.iter().filter(|string| string.solid_stiffness_n_mm2.is_some()).count(),
        all.iter().filter(|string| string.is_polymer).count(),
        scales[0],
        scales[2],
    );
    let sections: [(&str, Section); 4] = [
        ("fret", fret_section),
        ("closed-form", closed_section),
        ("wrap", wrap_section),
        ("mass", mass_section),
    ];
    for (name, section) in sections {
        let plot = section(&mut text, &all);
        let _ = write!(text, "\n![{}](limits-{name}.svg)\n", plot.title);
        assert_page(&format!("{FOLDER}/limits-{name}.svg"), &plot.svg());
    }
    assert_page(&format!("{FOLDER}/limits.md"), &text);
}

/// The exact parts of the study against what first-order reckoning gives: one bending length more or less at one end.
#[test]
fn a_clamped_fret_takes_half_a_bending_length_off() {
    // Second order in λ/L, which is below 0.02 at fret 12 on all these strings: a tenth of the effect.
    const SECOND_ORDER: f64 = 0.1;
    for string in strings::all() {
        let found = fret_effect(1.0)(&string).cents[11];
        let pull_n =
            string.properties.unit_mass_kg_per_m * (2e-3 * string.scale_mm * string.frequency_hz).powi(2);
        let bending_mm = (string.properties.bending_stiffness_n_mm2 / pull_n).sqrt();
        let expected = 1200.0 / 2f64.ln() * 0.5 * bending_mm / (string.scale_mm / 2.0);
        assert!((found / expected - 1.0).abs() < SECOND_ORDER, "{}: {found}, {expected}", string.name);
    }
}
