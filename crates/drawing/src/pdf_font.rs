//! The font as a PDF wants it: a subset with its own glyph numbers, widths and the way back to Unicode.

use std::collections::BTreeMap;

use pdf_writer::types::{CidFontType, FontFlags, SystemInfo, UnicodeCmap};
use pdf_writer::{Name, Pdf, Rect, Ref, Str};
use subsetter::GlyphRemapper;

use crate::font::{FONT, advance_em, face, glyph};

/// The tag of six letters marks a subset (ISO 32000-1, 9.6.4).
const BASE_FONT: Name = Name(b"CRESTL+DejaVuSans");
/// Number of objects of the font.
const OBJECTS: i32 = 5;
const SYSTEM: SystemInfo = SystemInfo { registry: Str(b"Adobe"), ordering: Str(b"Identity"), supplement: 0 };

/// The first free object number after the font's.
pub(crate) fn reserve(first: i32) -> i32 {
    first + OBJECTS
}

/// The characters of a drawing with their numbers in the embedded font.
pub(crate) struct PdfFont {
    numbers: BTreeMap<char, u16>,
    remapper: GlyphRemapper,
}

impl PdfFont {
    /// The font for all characters of some texts.
    pub(crate) fn for_text<'a>(texts: impl Iterator<Item = &'a str>) -> Self {
        let mut numbers: BTreeMap<char, u16> = texts.flat_map(str::chars).map(|c| (c, 0)).collect();
        let mut remapper = GlyphRemapper::new();
        for (character, number) in &mut numbers {
            *number = glyph(*character).map_or(0, |glyph| remapper.remap(glyph.0));
        }
        Self { numbers, remapper }
    }

    /// A text as the numbers of its glyphs, two bytes each.
    pub(crate) fn encode(&self, text: &str) -> Vec<u8> {
        let number = |c: char| self.numbers.get(&c).copied().unwrap_or(0);
        text.chars().flat_map(|c| number(c).to_be_bytes()).collect()
    }

    /// Writes the font's objects, numbered from `first`; the first is the font itself.
    pub(crate) fn write(&self, pdf: &mut Pdf, first: i32) {
        let id = |offset: i32| Ref::new(first + offset);
        let (font, cid, descriptor, file, unicode) = (id(0), id(1), id(2), id(3), id(4));
        let mut type0 = pdf.type0_font(font);
        type0.base_font(BASE_FONT).encoding_predefined(Name(b"Identity-H"));
        type0.descendant_font(cid).to_unicode(unicode);
        drop(type0);
        self.write_cid_font(pdf, cid, descriptor);
        write_descriptor(pdf, descriptor, file);
        // The font is the program's own and its subset is tested; whole, it is still right but large.
        let subset = subsetter::subset(FONT, 0, &self.remapper).unwrap_or_else(|_| FONT.to_vec());
        let length = i32::try_from(subset.len()).unwrap_or(i32::MAX);
        pdf.stream(file, &subset).pair(Name(b"Length1"), length);
        let mut map = UnicodeCmap::new(Name(b"Custom"), SYSTEM);
        for (character, number) in &self.numbers {
            map.pair(*number, *character);
        }
        pdf.cmap(unicode, &map.finish());
    }

    fn write_cid_font(&self, pdf: &mut Pdf, cid: Ref, descriptor: Ref) {
        let widths: BTreeMap<u16, f32> =
            self.numbers.iter().map(|(c, n)| (*n, thousandths(advance_em(*c)))).collect();
        let mut font = pdf.cid_font(cid);
        font.subtype(CidFontType::Type2).base_font(BASE_FONT).system_info(SYSTEM);
        font.font_descriptor(descriptor).default_width(0.0).cid_to_gid_map_predefined(Name(b"Identity"));
        let mut list = font.widths();
        for (number, width) in widths {
            list.same(number, number, width);
        }
    }
}

fn write_descriptor(pdf: &mut Pdf, id: Ref, file: Ref) {
    let Some(face) = face() else { return };
    let em = f64::from(face.units_per_em());
    let units = |value: i16| thousandths(f64::from(value) / em);
    let bounds = face.global_bounding_box();
    let bbox = Rect::new(units(bounds.x_min), units(bounds.y_min), units(bounds.x_max), units(bounds.y_max));
    let mut descriptor = pdf.font_descriptor(id);
    descriptor.name(BASE_FONT).flags(FontFlags::SYMBOLIC).bbox(bbox).italic_angle(0.0);
    descriptor.ascent(units(face.ascender())).descent(units(face.descender()));
    descriptor.cap_height(thousandths(crate::font::ink_em('H').1)).stem_v(90.0).font_file2(file);
}

/// PDF measures glyphs in thousandths of the em.
#[allow(clippy::cast_possible_truncation)]
fn thousandths(em: f64) -> f32 {
    (em * 1000.0) as f32
}
