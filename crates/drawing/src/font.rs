//! The program's one font: its bytes, which characters it has, and how wide they are.

use std::sync::OnceLock;

use ttf_parser::{Face, GlyphId};

/// DejaVu Sans, embedded in the program, so that screen, paper and tests measure the same letters.
pub const FONT: &[u8] = include_bytes!("../../../assets/fonts/DejaVuSans.ttf");

/// The family name by which the font is asked for in SVG.
pub const FONT_FAMILY: &str = "DejaVu Sans";

/// Height of the capital H over the em, read from the glyph's outline (1493 of 2048 units).
/// ISO 3098 gives the height of capitals; files want the size of the em.
const CAP_HEIGHT_EM: f64 = 1493.0 / 2048.0;

/// What stands in for a character that cannot be shown.
pub const SUBSTITUTE: char = '\u{25A1}';

/// The em that gives capitals of a height, mm.
#[must_use]
pub fn font_size_mm(height_mm: f64) -> f64 {
    height_mm / CAP_HEIGHT_EM
}

/// The font, parsed once.
pub(crate) fn face() -> Option<&'static Face<'static>> {
    static FACE: OnceLock<Option<Face<'static>>> = OnceLock::new();
    FACE.get_or_init(|| Face::parse(FONT, 0).ok()).as_ref()
}

/// The glyph of a character.
pub(crate) fn glyph(character: char) -> Option<GlyphId> {
    face()?.glyph_index(character)
}

/// What is measured of a character, over the em.
#[derive(Clone, Copy, Default)]
struct Measures {
    /// Advance width.
    advance: f64,
    /// Lowest and highest ink, from the baseline.
    ink: (f64, f64),
}

/// Advance width of a character over the em.
pub(crate) fn advance_em(character: char) -> f64 {
    measures(character).advance
}

/// Lowest and highest ink of a character over the em, from the baseline.
pub(crate) fn ink_em(character: char) -> (f64, f64) {
    measures(character).ink
}

/// The measures of a character; those of ASCII are kept, since most text is.
fn measures(character: char) -> Measures {
    static ASCII: OnceLock<Vec<Measures>> = OnceLock::new();
    let ascii = ASCII.get_or_init(|| ('\0'..='\x7f').map(|c| read_measures(c).unwrap_or_default()).collect());
    let code = usize::try_from(u32::from(character)).unwrap_or(usize::MAX);
    ascii.get(code).copied().or_else(|| read_measures(character)).unwrap_or_default()
}

fn read_measures(character: char) -> Option<Measures> {
    let face = face()?;
    let em = f64::from(face.units_per_em());
    let glyph = face.glyph_index(character)?;
    let advance = f64::from(face.glyph_hor_advance(glyph)?) / em;
    // A space has no ink.
    let bounds = face.glyph_bounding_box(glyph);
    let ink = bounds.map_or((0.0, 0.0), |b| (f64::from(b.y_min) / em, f64::from(b.y_max) / em));
    Some(Measures { advance, ink })
}

#[cfg(test)]
#[allow(clippy::unwrap_used)]
mod tests {
    use super::*;

    #[test]
    fn font_is_readable_and_has_the_trades_signs() {
        let face = face().unwrap();
        assert_eq!(face.units_per_em(), 2048);
        for sign in ['⌀', '♭', '♯', '′', '″', '→', '…', '°', '±', '½', '⁄', SUBSTITUTE] {
            assert!(glyph(sign).is_some(), "{sign}");
        }
    }

    #[test]
    fn capitals_stand_as_high_as_the_lettering_height() {
        let (bottom, top) = ink_em('H');
        assert!(bottom.abs() < 1e-12);
        assert!((font_size_mm(3.5) * top - 3.5).abs() < 1e-9);
    }
}
