//! Pictures that triangles are filled from: the letters, above all.

use std::collections::HashMap;

use eframe::egui::epaint::ImageDelta;
use eframe::egui::{Color32, ImageData, TextureFilter, TextureId, TextureOptions, TexturesDelta};

/// One picture.
#[derive(Debug, Clone)]
pub struct Texture {
    size: [usize; 2],
    texels: Vec<Color32>,
    options: TextureOptions,
}

/// All pictures by their name.
#[derive(Debug, Default)]
pub struct Textures(HashMap<TextureId, Texture>);

impl Textures {
    /// The picture of a name.
    #[must_use]
    pub fn get(&self, id: TextureId) -> Option<&Texture> {
        self.0.get(&id)
    }

    /// Takes what is new in.
    pub fn take(&mut self, delta: &TexturesDelta) {
        for (id, images) in &delta.set {
            images.iter().for_each(|image| self.set(*id, image));
        }
    }

    /// Lets go of what is not wanted after this frame.
    pub fn drop_old(&mut self, delta: &TexturesDelta) {
        for id in &delta.free {
            self.0.remove(id);
        }
    }

    fn set(&mut self, id: TextureId, delta: &ImageDelta) {
        let ImageData::Color(image) = &delta.image;
        match (delta.pos, self.0.get_mut(&id)) {
            (Some(at), Some(texture)) => texture.put(at, image.size, &image.pixels),
            (Some(_), None) => {}
            (None, _) => {
                let texture =
                    Texture { size: image.size, texels: image.pixels.clone(), options: delta.options };
                self.0.insert(id, texture);
            }
        }
    }
}

impl Texture {
    /// A picture of these texels, row after row.
    #[must_use]
    pub fn new(size: [usize; 2], texels: Vec<Color32>, options: TextureOptions) -> Self {
        Self { size, texels, options }
    }

    /// Replaces a part; what would lie outside is left out.
    fn put(&mut self, at: [usize; 2], size: [usize; 2], texels: &[Color32]) {
        for (row, line) in texels.chunks_exact(size[0].max(1)).enumerate() {
            for (column, texel) in line.iter().enumerate() {
                let (x, y) = (at[0] + column, at[1] + row);
                if x < self.size[0] && y < self.size[1] {
                    self.texels[y * self.size[0] + x] = *texel;
                }
            }
        }
    }

    fn texel(&self, x: i64, y: i64) -> Color32 {
        // Beyond the edge, the edge goes on.
        let inside = |at: i64, size: usize| at.clamp(0, size as i64 - 1).max(0) as usize;
        let index = inside(y, self.size[1]) * self.size[0] + inside(x, self.size[0]);
        self.texels.get(index).copied().unwrap_or_default()
    }

    /// The colour at `uv`, from 0 at the first edge to 1 at the last, each channel from 0 to 255: of the texel
    /// there, or bilinear between the four nearest, as the texture's options say.
    #[must_use]
    pub fn sample(&self, uv: [f32; 2]) -> [f32; 4] {
        let [x, y] = [uv[0] * self.size[0] as f32, uv[1] * self.size[1] as f32];
        if self.options.magnification == TextureFilter::Nearest {
            return self.texel(x.floor() as i64, y.floor() as i64).to_array().map(f32::from);
        }
        let (left, top) = ((x - 0.5).floor(), (y - 0.5).floor());
        let (right_share, bottom_share) = (x - 0.5 - left, y - 0.5 - top);
        let corner =
            |dx: i64, dy: i64| self.texel(left as i64 + dx, top as i64 + dy).to_array().map(f32::from);
        let above = mix(corner(0, 0), corner(1, 0), right_share);
        let below = mix(corner(0, 1), corner(1, 1), right_share);
        mix(above, below, bottom_share)
    }
}

fn mix(a: [f32; 4], b: [f32; 4], share: f32) -> [f32; 4] {
    std::array::from_fn(|channel| a[channel] + (b[channel] - a[channel]) * share)
}

#[cfg(test)]
mod tests {
    use super::*;

    fn two_by_two(options: TextureOptions) -> Texture {
        let grey = |level| Color32::from_rgb(level, level, level);
        Texture::new([2, 2], vec![grey(0), grey(100), grey(40), grey(200)], options)
    }

    #[test]
    fn between_texels_it_is_bilinear_and_beyond_them_the_edge_goes_on() {
        let texture = two_by_two(TextureOptions::LINEAR);
        assert_eq!(texture.sample([0.25, 0.25])[0], 0.0, "the middle of a texel is that texel");
        assert_eq!(texture.sample([0.75, 0.75])[0], 200.0);
        assert_eq!(texture.sample([0.5, 0.25])[0], 50.0);
        assert_eq!(texture.sample([0.5, 0.5])[0], 85.0, "the mean of all four");
        assert_eq!(texture.sample([-3.0, 0.0])[0], 0.0);
        assert_eq!(texture.sample([9.0, 9.0])[0], 200.0);
    }

    #[test]
    fn the_nearest_is_taken_where_that_is_wanted() {
        let texture = two_by_two(TextureOptions::NEAREST);
        assert_eq!(texture.sample([0.49, 0.1])[0], 0.0);
        assert_eq!(texture.sample([0.51, 0.1])[0], 100.0);
    }

    #[test]
    fn a_part_is_replaced_and_no_more() {
        let mut texture = two_by_two(TextureOptions::NEAREST);
        texture.put([1, 1], [2, 1], &[Color32::from_rgb(7, 7, 7), Color32::WHITE]);
        assert_eq!(texture.texel(1, 1).r(), 7);
        assert_eq!(texture.texel(0, 1).r(), 40);
    }
}
