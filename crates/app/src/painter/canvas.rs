//! The pixels.

use eframe::egui::Color32;

/// A picture in premultiplied colours of the sRGB curve, row after row from the top.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct Canvas {
    width: usize,
    height: usize,
    pixels: Vec<Color32>,
}

/// Pixels from the first column and row up to, but not with, the last.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub struct Window {
    /// First and last column.
    pub x: [usize; 2],
    /// First and last row.
    pub y: [usize; 2],
}

impl Canvas {
    /// A canvas of one colour.
    #[must_use]
    pub fn new(width: usize, height: usize, colour: Color32) -> Self {
        Self { width, height, pixels: vec![colour; width * height] }
    }

    /// Width in pixels.
    #[must_use]
    pub fn width(&self) -> usize {
        self.width
    }

    /// Height in pixels.
    #[must_use]
    pub fn height(&self) -> usize {
        self.height
    }

    /// All pixels, row after row.
    #[must_use]
    pub fn pixels(&self) -> &[Color32] {
        &self.pixels
    }

    /// The colour at a place; transparent outside.
    #[must_use]
    pub fn at(&self, x: usize, y: usize) -> Color32 {
        let is_inside = x < self.width && y < self.height;
        if is_inside { self.pixels[y * self.width + x] } else { Color32::TRANSPARENT }
    }

    /// Everything.
    #[must_use]
    pub fn whole(&self) -> Window {
        Window { x: [0, self.width], y: [0, self.height] }
    }

    /// The pixels of a row between two columns; none where there are none.
    pub fn row(&mut self, y: usize, x: [usize; 2]) -> &mut [Color32] {
        let end = x[1].min(self.width);
        if y >= self.height || x[0] >= end {
            return &mut [];
        }
        &mut self.pixels[y * self.width + x[0]..y * self.width + end]
    }
}

/// A colour laid over another, both premultiplied (T. Porter and T. Duff, Compositing digital images,
/// SIGGRAPH 1984: A over B = A + B·(1 − α)), rounded to the nearest step.
#[must_use]
pub fn over(top: Color32, below: Color32) -> Color32 {
    let through = 255 - u32::from(top.a());
    let one = |top: u8, below: u8| {
        let sum = u32::from(top) + (u32::from(below) * through + 127) / 255;
        sum.min(255) as u8
    };
    Color32::from_rgba_premultiplied(
        one(top.r(), below.r()),
        one(top.g(), below.g()),
        one(top.b(), below.b()),
        one(top.a(), below.a()),
    )
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn over_covers_leaves_and_mixes() {
        let red = Color32::from_rgb(200, 0, 0);
        let blue = Color32::from_rgb(0, 0, 100);
        assert_eq!(over(red, blue), red);
        assert_eq!(over(Color32::TRANSPARENT, blue), blue);
        // Half of white over black: by the equation 128 + 0, and 255 − 128 of the alpha below.
        let half = Color32::from_rgba_premultiplied(128, 128, 128, 128);
        assert_eq!(over(half, Color32::BLACK), Color32::from_rgb(128, 128, 128));
        // 0 + 100·127/255 = 49.8
        let veil = Color32::from_rgba_premultiplied(0, 0, 0, 128);
        assert_eq!(over(veil, blue), Color32::from_rgb(0, 0, 50));
        // Without alpha, light is added.
        assert_eq!(over(Color32::from_rgba_premultiplied(9, 0, 0, 0), blue), Color32::from_rgb(9, 0, 100));
    }

    #[test]
    fn nothing_outside_is_touched() {
        let mut canvas = Canvas::new(4, 3, Color32::BLACK);
        assert_eq!(canvas.row(2, [1, 9]).len(), 3);
        assert!(canvas.row(3, [0, 4]).is_empty());
        assert!(canvas.row(0, [5, 9]).is_empty());
        assert!(canvas.row(0, [3, 1]).is_empty());
        assert_eq!(canvas.at(9, 0), Color32::TRANSPARENT);
    }
}
