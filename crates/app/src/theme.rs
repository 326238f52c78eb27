//! The look of the window: colours, spacings, and how strings are told apart.
//!
//! Every text colour keeps a contrast of 4.5 to 1 against the grounds it stands on, and every mark
//! 3 to 1 (W3C, Web Content Accessibility Guidelines 2.1, criteria 1.4.3 and 1.4.11); a test holds it.
//! The strings' hues follow the idea of M. Okabe and K. Ito's colour-universal set, darkened or lightened
//! to keep that contrast; markers tell the strings apart without colour.

use std::sync::Arc;

use eframe::egui::{
    Color32, Context, CornerRadius, FontData, FontDefinitions, FontFamily, FontId, Stroke, TextStyle, Theme,
    ThemePreference, Visuals,
};
use egui_plot::MarkerShape;

use crate::view::ThemeChoice;

/// Spacings and sizes in points.
pub mod size {
    use eframe::egui::{CornerRadius, Margin};

    /// Width of a field.
    pub const FIELD: f32 = 78.0;
    /// Height of a field's text.
    pub const FIELD_HEIGHT: f32 = 18.0;
    /// Margin inside a field.
    pub const FIELD_MARGIN: Margin = Margin::symmetric(4, 2);
    /// Width of the labels in front of fields.
    pub const LABEL: f32 = 148.0;
    /// Gap between things that belong together.
    pub const GAP: f32 = 6.0;
    /// Gap between things that do not.
    pub const WIDE_GAP: f32 = 12.0;
    /// Width of an ordinary edge.
    pub const EDGE: f32 = 1.0;
    /// Width of an edge that must be seen.
    pub const STRONG_EDGE: f32 = 1.8;
    /// Corners.
    pub const CORNER: CornerRadius = CornerRadius::same(3);
    /// Text of the usual size.
    pub const TEXT: f32 = 13.5;
    /// Small text.
    pub const SMALL: f32 = 12.0;
    /// Headings.
    pub const HEADING: f32 = 15.0;
}

/// The colours of one theme.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub struct Palette {
    /// Whether light stands on dark.
    pub is_dark: bool,
    /// Behind everything.
    pub ground: Color32,
    /// Behind groups and plots.
    pub sheet: Color32,
    /// Behind headings and the top bar.
    pub band: Color32,
    /// Behind text that is typed.
    pub field: Color32,
    /// Text.
    pub ink: Color32,
    /// Text that matters less.
    pub quiet: Color32,
    /// Edges and grid.
    pub edge: Color32,
    /// What is chosen or has the focus.
    pub accent: Color32,
    /// Behind what is chosen.
    pub accent_ground: Color32,
    /// What is wrong.
    pub fault: Color32,
    /// Behind what is wrong.
    pub fault_ground: Color32,
    /// What wants care.
    pub caution: Color32,
    /// Behind what wants care.
    pub caution_ground: Color32,
    /// The saddle blank in plan.
    pub blank: Color32,
    /// The strings.
    pub strings: [Color32; 8],
    /// The four parts of an error: length, tension, mass, stiffness.
    pub parts: [Color32; 4],
    /// The causes that a diagnosis names; letters in the colour of the sheet stand on them.
    pub causes: [Color32; 8],
}

/// Dark on light, like a workshop drawing.
pub const LIGHT: Palette = Palette {
    is_dark: false,
    ground: Color32::from_rgb(0xEC, 0xE8, 0xDF),
    sheet: Color32::from_rgb(0xFB, 0xF9, 0xF4),
    band: Color32::from_rgb(0xDF, 0xD9, 0xCC),
    field: Color32::from_rgb(0xFF, 0xFF, 0xFF),
    ink: Color32::from_rgb(0x22, 0x26, 0x29),
    quiet: Color32::from_rgb(0x55, 0x58, 0x5A),
    edge: Color32::from_rgb(0xB5, 0xAD, 0x9E),
    accent: Color32::from_rgb(0x0B, 0x5E, 0x63),
    accent_ground: Color32::from_rgb(0xC9, 0xE2, 0xE0),
    fault: Color32::from_rgb(0xA3, 0x1F, 0x12),
    fault_ground: Color32::from_rgb(0xFC, 0xE9, 0xE4),
    caution: Color32::from_rgb(0x75, 0x4A, 0x00),
    caution_ground: Color32::from_rgb(0xF8, 0xEB, 0xCB),
    blank: Color32::from_rgb(0xE3, 0xDB, 0xC6),
    strings: [
        Color32::from_rgb(0x0A, 0x4C, 0x8C),
        Color32::from_rgb(0xA8, 0x3C, 0x08),
        Color32::from_rgb(0x00, 0x69, 0x52),
        Color32::from_rgb(0x95, 0x36, 0x73),
        Color32::from_rgb(0x6B, 0x5A, 0x00),
        Color32::from_rgb(0x17, 0x61, 0x8E),
        Color32::from_rgb(0x8A, 0x53, 0x00),
        Color32::from_rgb(0x2B, 0x2F, 0x33),
    ],
    parts: [
        Color32::from_rgb(0x3B, 0x84, 0xC4),
        Color32::from_rgb(0xA8, 0x3C, 0x08),
        Color32::from_rgb(0x4D, 0x52, 0x57),
        Color32::from_rgb(0x00, 0x8B, 0x6C),
    ],
    causes: [
        Color32::from_rgb(0x00, 0x5F, 0x6B),
        Color32::from_rgb(0x7A, 0x3E, 0x9D),
        Color32::from_rgb(0xB0, 0x30, 0x5C),
        Color32::from_rgb(0x8C, 0x5A, 0x00),
        Color32::from_rgb(0x3F, 0x6B, 0x1F),
        Color32::from_rgb(0x4A, 0x55, 0x68),
        Color32::from_rgb(0xB8, 0x3A, 0x08),
        Color32::from_rgb(0x1D, 0x4E, 0xD8),
    ],
};

/// Light on dark.
pub const DARK: Palette = Palette {
    is_dark: true,
    ground: Color32::from_rgb(0x17, 0x1B, 0x1D),
    sheet: Color32::from_rgb(0x20, 0x25, 0x28),
    band: Color32::from_rgb(0x2B, 0x31, 0x35),
    field: Color32::from_rgb(0x12, 0x15, 0x17),
    ink: Color32::from_rgb(0xE9, 0xE5, 0xDC),
    quiet: Color32::from_rgb(0xB3, 0xB1, 0xAA),
    edge: Color32::from_rgb(0x56, 0x5F, 0x64),
    accent: Color32::from_rgb(0x6C, 0xCB, 0xC3),
    accent_ground: Color32::from_rgb(0x1E, 0x4A, 0x4B),
    fault: Color32::from_rgb(0xFF, 0x9B, 0x85),
    fault_ground: Color32::from_rgb(0x3F, 0x1E, 0x19),
    caution: Color32::from_rgb(0xF0, 0xC0, 0x63),
    caution_ground: Color32::from_rgb(0x3A, 0x30, 0x1A),
    blank: Color32::from_rgb(0x3A, 0x3B, 0x36),
    strings: [
        Color32::from_rgb(0x7F, 0xB2, 0xFF),
        Color32::from_rgb(0xFF, 0x8F, 0x60),
        Color32::from_rgb(0x36, 0xC9, 0xA0),
        Color32::from_rgb(0xE6, 0x97, 0xC7),
        Color32::from_rgb(0xE3, 0xD6, 0x4A),
        Color32::from_rgb(0x5F, 0xBF, 0xEF),
        Color32::from_rgb(0xEC, 0xA8, 0x2C),
        Color32::from_rgb(0xD6, 0xD6, 0xD6),
    ],
    parts: [
        Color32::from_rgb(0x5F, 0xA4, 0xE8),
        Color32::from_rgb(0xFF, 0x8F, 0x60),
        Color32::from_rgb(0xB9, 0xBD, 0xC2),
        Color32::from_rgb(0x36, 0xC9, 0xA0),
    ],
    causes: [
        Color32::from_rgb(0x5E, 0xC4, 0xCF),
        Color32::from_rgb(0xC7, 0x9B, 0xEA),
        Color32::from_rgb(0xF2, 0x8A, 0xAE),
        Color32::from_rgb(0xE0, 0xB0, 0x4A),
        Color32::from_rgb(0x9C, 0xCB, 0x6E),
        Color32::from_rgb(0xAE, 0xB9, 0xC7),
        Color32::from_rgb(0xFF, 0x9A, 0x62),
        Color32::from_rgb(0x8F, 0xB0, 0xFF),
    ],
};

/// Markers of the strings. Ten markers and eight hues: no two of sixteen strings share both.
const MARKERS: [MarkerShape; 10] = [
    MarkerShape::Circle,
    MarkerShape::Square,
    MarkerShape::Diamond,
    MarkerShape::Up,
    MarkerShape::Down,
    MarkerShape::Cross,
    MarkerShape::Left,
    MarkerShape::Right,
    MarkerShape::Plus,
    MarkerShape::Asterisk,
];

impl Palette {
    /// The palette of the theme in use.
    #[must_use]
    pub fn of(theme: Theme) -> &'static Self {
        match theme {
            Theme::Light => &LIGHT,
            Theme::Dark => &DARK,
        }
    }

    /// The ground of a figure that is off, deeper for a larger `share` of 0 to 1.
    #[must_use]
    pub fn error_ground(&self, is_sharp: bool, share: f32) -> Color32 {
        const LEAST: f32 = 0.10;
        const MOST: f32 = 0.32;
        let hue = if is_sharp { self.caution } else { self.accent };
        self.sheet.lerp_to_gamma(hue, LEAST + (MOST - LEAST) * share)
    }

    /// The colour of a string, 0 first.
    #[must_use]
    pub fn string(&self, index: usize) -> Color32 {
        self.strings[index % self.strings.len()]
    }
}

/// The marker of a string, 0 first. Strings beyond the markers share one with a string whose hue is a neighbour of
/// theirs, because neighbouring hues are told apart also by those who see fewer colours.
#[must_use]
pub fn marker(index: usize) -> MarkerShape {
    const NEIGHBOUR: usize = 3;
    MARKERS[(index + NEIGHBOUR * (index / MARKERS.len())) % MARKERS.len()]
}

/// Puts fonts, sizes and both palettes into the context.
pub fn install(ctx: &Context) {
    ctx.set_fonts(fonts());
    // The size of all text is a command of the window's own, with its own limits.
    ctx.options_mut(|options| options.zoom_with_keyboard = false);
    for theme in [Theme::Light, Theme::Dark] {
        let palette = Palette::of(theme);
        ctx.set_visuals_of(theme, visuals(theme, palette));
    }
    ctx.all_styles_mut(|style| {
        let body = |size| FontId::new(size, FontFamily::Proportional);
        style.text_styles = [
            (TextStyle::Small, body(size::SMALL)),
            (TextStyle::Body, body(size::TEXT)),
            (TextStyle::Button, body(size::TEXT)),
            (TextStyle::Heading, body(size::HEADING)),
            (TextStyle::Monospace, FontId::new(size::TEXT, FontFamily::Monospace)),
        ]
        .into();
        style.spacing.item_spacing = [size::GAP, 5.0].into();
        style.spacing.button_padding = [7.0, 3.0].into();
        style.spacing.interact_size.y = 22.0;
        style.animation_time = 0.0;
        style.visuals.text_cursor.blink = false;
        style.interaction.tooltip_delay = 0.4;
        style.interaction.selectable_labels = false;
    });
}

/// Light, dark, or as the system has it.
pub fn choose(ctx: &Context, choice: ThemeChoice) {
    ctx.set_theme(match choice {
        ThemeChoice::System => ThemePreference::System,
        ThemeChoice::Light => ThemePreference::Light,
        ThemeChoice::Dark => ThemePreference::Dark,
    });
}

/// One font for everything: it has the signs of the trade, and its figures are all of one width.
fn fonts() -> FontDefinitions {
    const NAME: &str = "DejaVu Sans";
    const BYTES: &[u8] = include_bytes!("../../../assets/fonts/DejaVuSans.ttf");
    let mut fonts = FontDefinitions::default();
    fonts.font_data.insert(NAME.to_owned(), Arc::new(FontData::from_static(BYTES)));
    for family in [FontFamily::Proportional, FontFamily::Monospace] {
        fonts.families.entry(family).or_default().insert(0, NAME.to_owned());
    }
    fonts
}

fn visuals(theme: Theme, p: &Palette) -> Visuals {
    let mut v = if theme == Theme::Dark { Visuals::dark() } else { Visuals::light() };
    v.override_text_color = None;
    v.weak_text_color = Some(p.quiet);
    v.panel_fill = p.ground;
    v.window_fill = p.sheet;
    v.window_stroke = Stroke::new(1.0, p.edge);
    v.extreme_bg_color = p.field;
    v.text_edit_bg_color = Some(p.field);
    v.faint_bg_color = p.band;
    v.code_bg_color = p.band;
    v.hyperlink_color = p.accent;
    v.warn_fg_color = p.caution;
    v.error_fg_color = p.fault;
    v.selection.bg_fill = p.accent_ground;
    v.selection.stroke = Stroke::new(1.0, p.ink);
    v.window_corner_radius = CornerRadius::same(5);
    v.menu_corner_radius = CornerRadius::same(4);
    let widgets = &mut v.widgets;
    for w in [
        &mut widgets.noninteractive,
        &mut widgets.inactive,
        &mut widgets.hovered,
        &mut widgets.active,
        &mut widgets.open,
    ] {
        w.corner_radius = size::CORNER;
        w.fg_stroke = Stroke::new(1.0, p.ink);
        w.bg_stroke = Stroke::new(1.0, p.edge);
        w.bg_fill = p.band;
        w.weak_bg_fill = p.band;
        w.expansion = 0.0;
    }
    widgets.noninteractive.bg_fill = p.sheet;
    widgets.inactive.fg_stroke = Stroke::new(1.3, p.ink);
    widgets.hovered.bg_stroke = Stroke::new(1.4, p.accent);
    widgets.active.bg_stroke = Stroke::new(2.0, p.accent);
    widgets.active.weak_bg_fill = p.accent_ground;
    widgets.open.weak_bg_fill = p.accent_ground;
    v
}

#[cfg(test)]
mod sight;

#[cfg(test)]
mod tests {
    use super::*;

    /// Contrast that text needs (WCAG 2.1, 1.4.3).
    const TEXT_CONTRAST: f64 = 4.5;
    /// Contrast that a mark or bar needs (WCAG 2.1, 1.4.11).
    const MARK_CONTRAST: f64 = 3.0;

    /// Relative luminance as WCAG 2.1 defines it.
    fn luminance(colour: Color32) -> f64 {
        let linear = |byte: u8| {
            let c = f64::from(byte) / 255.0;
            if c <= 0.03928 { c / 12.92 } else { ((c + 0.055) / 1.055).powf(2.4) }
        };
        0.2126 * linear(colour.r()) + 0.7152 * linear(colour.g()) + 0.0722 * linear(colour.b())
    }

    fn contrast(a: Color32, b: Color32) -> f64 {
        let (a, b) = (luminance(a), luminance(b));
        (a.max(b) + 0.05) / (a.min(b) + 0.05)
    }

    #[test]
    fn text_stands_out_from_every_ground_it_is_on() {
        for p in [LIGHT, DARK] {
            let grounds = [p.ground, p.sheet, p.band, p.field];
            let pairs = grounds
                .iter()
                .flat_map(|g| [(p.ink, *g), (p.quiet, *g), (p.accent, *g), (p.fault, *g), (p.caution, *g)]);
            let own = [
                (p.ink, p.accent_ground),
                (p.fault, p.fault_ground),
                (p.ink, p.fault_ground),
                (p.caution, p.caution_ground),
                (p.ink, p.caution_ground),
                (p.ink, p.blank),
                (p.accent, p.accent_ground),
                (p.quiet, p.accent_ground),
            ];
            for (text, ground) in pairs.chain(own) {
                assert!(
                    contrast(text, ground) >= TEXT_CONTRAST,
                    "{text:?} on {ground:?}: {}",
                    contrast(text, ground)
                );
            }
        }
    }

    #[test]
    fn figures_stand_out_from_the_grounds_that_errors_give_them() {
        for p in [LIGHT, DARK] {
            for ground in [p.error_ground(true, 1.0), p.error_ground(false, 1.0)] {
                assert!(contrast(p.ink, ground) >= TEXT_CONTRAST, "{ground:?}: {}", contrast(p.ink, ground));
            }
        }
    }

    #[test]
    fn strings_causes_and_parts_stand_out() {
        for p in [LIGHT, DARK] {
            for (text, ground) in p.strings.iter().flat_map(|s| [(*s, p.sheet), (*s, p.field), (*s, p.blank)])
            {
                assert!(
                    contrast(text, ground) >= TEXT_CONTRAST,
                    "{text:?} on {ground:?}: {}",
                    contrast(text, ground)
                );
            }
            for cause in p.causes {
                assert!(contrast(cause, p.sheet) >= TEXT_CONTRAST, "{cause:?}: {}", contrast(cause, p.sheet));
            }
            for part in p.parts {
                assert!(contrast(part, p.sheet) >= MARK_CONTRAST, "{part:?}: {}", contrast(part, p.sheet));
            }
        }
    }

    #[test]
    fn sixteen_strings_look_different() {
        for a in 0..16usize {
            for b in 0..a {
                let same_hue = a % LIGHT.strings.len() == b % LIGHT.strings.len();
                assert!(!(same_hue && marker(a) == marker(b)), "{a} and {b}");
            }
        }
    }
}
