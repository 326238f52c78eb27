//! Filling one triangle.
//!
//! A pixel belongs to the triangle that holds its middle; a middle on an edge belongs to the triangle right of
//! the edge or below it, so that triangles which share an edge share no pixel and leave none out.

use eframe::egui::Color32;

use super::canvas::{Canvas, Window, over};
use super::texture::Texture;

/// A corner: its place in pixels, its place in the texture, and its colour, premultiplied.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Corner {
    /// Columns from the left and rows from the top.
    pub at: [f32; 2],
    /// Place in the texture, 0 to 1.
    pub uv: [f32; 2],
    /// Colour, multiplied by the texture's.
    pub colour: Color32,
}

/// What a triangle's inside looks like.
enum Fill<'a> {
    /// The same everywhere.
    Plain(Color32),
    /// Colour, and place in the texture, on planes over the triangle.
    Shaded { colour: [Plane; 4], uv: [Plane; 2], texture: &'a Texture },
    /// The same, with one texel everywhere.
    Graded { colour: [Plane; 4], texel: [f32; 4] },
}

/// A value that grows evenly: at the origin, for each column, for each row.
#[derive(Clone, Copy)]
struct Plane {
    origin: f32,
    column: f32,
    row: f32,
}

impl Plane {
    fn at(&self, x: f32, y: f32) -> f32 {
        self.origin + self.column * x + self.row * y
    }
}

/// Fills a triangle within `clip`. Corners that are not finite leave nothing.
pub fn fill(canvas: &mut Canvas, clip: Window, mut corners: [Corner; 3], texture: &Texture) {
    if corners.iter().any(|corner| !corner.at.iter().all(|place| place.is_finite())) {
        return;
    }
    // One order for each pair of corners: an edge is then computed alike in both triangles that share it.
    corners.sort_by(|a, b| a.at[1].total_cmp(&b.at[1]).then(a.at[0].total_cmp(&b.at[0])));
    let [top, middle, bottom] = corners;
    let Some(fill) = Fill::of(&corners, texture) else { return };
    let rows = between(top.at[1], bottom.at[1], clip.y);
    for y in rows[0]..rows[1] {
        let height = y as f32 + 0.5;
        let long = crossing(top, bottom, height);
        let is_upper = height < middle.at[1];
        let short = if is_upper { crossing(top, middle, height) } else { crossing(middle, bottom, height) };
        let columns = between(long.min(short), long.max(short), clip.x);
        fill.row(canvas, y, columns);
    }
}

/// Where the edge from `upper` to `lower` crosses a height.
fn crossing(upper: Corner, lower: Corner, height: f32) -> f32 {
    let rise = lower.at[1] - upper.at[1];
    if rise <= 0.0 {
        return lower.at[0];
    }
    upper.at[0] + (lower.at[0] - upper.at[0]) * ((height - upper.at[1]) / rise)
}

/// The pixels whose middles lie from `first` up to, but not on, `last`, within `limits`.
fn between(first: f32, last: f32, limits: [usize; 2]) -> [usize; 2] {
    // A negative number becomes 0 here.
    let whole = |place: f32| ((place - 0.5).ceil() as usize).clamp(limits[0], limits[1].max(limits[0]));
    [whole(first), whole(last)]
}

impl<'a> Fill<'a> {
    /// None where the triangle has no area.
    fn of(corners: &[Corner; 3], texture: &'a Texture) -> Option<Self> {
        let [a, b, c] = corners;
        let same_uv = a.uv == b.uv && b.uv == c.uv;
        if same_uv && a.colour == b.colour && b.colour == c.colour {
            let colour = a.colour.to_array().map(f32::from);
            return Some(Self::Plain(product(colour, texture.sample(a.uv))));
        }
        let area = (b.at[0] - a.at[0]) * (c.at[1] - a.at[1]) - (c.at[0] - a.at[0]) * (b.at[1] - a.at[1]);
        if area == 0.0 || !area.is_finite() {
            return None;
        }
        let plane = |values: [f32; 3]| through(corners, values, area);
        let channel = |n: usize| plane([a, b, c].map(|corner| f32::from(corner.colour.to_array()[n])));
        let colour = std::array::from_fn(channel);
        if same_uv {
            return Some(Self::Graded { colour, texel: texture.sample(a.uv) });
        }
        let uv = std::array::from_fn(|n| plane([a, b, c].map(|corner| corner.uv[n])));
        Some(Self::Shaded { colour, uv, texture })
    }

    fn row(&self, canvas: &mut Canvas, y: usize, columns: [usize; 2]) {
        let row = canvas.row(y, columns);
        let height = y as f32 + 0.5;
        let places = (columns[0]..).map(|x| x as f32 + 0.5);
        match self {
            Self::Plain(colour) if colour.a() == 255 => row.fill(*colour),
            Self::Plain(colour) => row.iter_mut().for_each(|pixel| *pixel = over(*colour, *pixel)),
            Self::Graded { colour, texel } => {
                for (pixel, x) in row.iter_mut().zip(places) {
                    *pixel = over(product(colour.map(|plane| plane.at(x, height)), *texel), *pixel);
                }
            }
            Self::Shaded { colour, uv, texture } => {
                for (pixel, x) in row.iter_mut().zip(places) {
                    let texel = texture.sample(uv.map(|plane| plane.at(x, height)));
                    if texel != [0.0; 4] {
                        *pixel = over(product(colour.map(|plane| plane.at(x, height)), texel), *pixel);
                    }
                }
            }
        }
    }
}

/// The plane through three values at the corners; `area` is twice the triangle's, with its sign.
fn through(corners: &[Corner; 3], values: [f32; 3], area: f32) -> Plane {
    let [a, b, c] = corners.map(|corner| corner.at);
    let (rise_b, rise_c) = (values[1] - values[0], values[2] - values[0]);
    let column = (rise_b * (c[1] - a[1]) - rise_c * (b[1] - a[1])) / area;
    let row = (rise_c * (b[0] - a[0]) - rise_b * (c[0] - a[0])) / area;
    Plane { origin: values[0] - column * a[0] - row * a[1], column, row }
}

/// The product of two colours whose channels go from 0 to 255, rounded to the nearest step.
fn product(a: [f32; 4], b: [f32; 4]) -> Color32 {
    // A negative value or one beyond 255, from rounding at a corner, becomes the nearest that is allowed.
    let [r, g, b, a] = std::array::from_fn(|n| (a[n] * b[n] / 255.0 + 0.5) as u8);
    Color32::from_rgba_premultiplied(r, g, b, a)
}

#[cfg(test)]
mod tests {
    use super::*;
    use eframe::egui::TextureOptions;

    const GREY: Color32 = Color32::from_rgba_premultiplied(100, 100, 100, 100);

    fn white() -> Texture {
        Texture::new([1, 1], vec![Color32::WHITE], TextureOptions::LINEAR)
    }

    fn corner(x: f32, y: f32, colour: Color32) -> Corner {
        Corner { at: [x, y], uv: [0.0, 0.0], colour }
    }

    fn painted(corners: &[[f32; 2]; 3], colour: Color32) -> Canvas {
        let mut canvas = Canvas::new(40, 30, Color32::TRANSPARENT);
        let clip = canvas.whole();
        fill(&mut canvas, clip, corners.map(|[x, y]| corner(x, y, colour)), &white());
        canvas
    }

    fn count(canvas: &Canvas) -> usize {
        canvas.pixels().iter().filter(|pixel| pixel.a() > 0).count()
    }

    #[test]
    fn a_right_triangle_holds_the_middles_that_lie_in_it() {
        // Middles (i + ½, j + ½) with i + j + 1 < 10: 9 + 8 + … + 1 of them.
        assert_eq!(count(&painted(&[[0.0, 0.0], [10.0, 0.0], [0.0, 10.0]], Color32::WHITE)), 45);
        // The other half of the square has those on the diagonal too.
        assert_eq!(count(&painted(&[[10.0, 10.0], [10.0, 0.0], [0.0, 10.0]], Color32::WHITE)), 55);
    }

    /// Triangles that share edges leave no gap and paint nothing twice: a fan around points that are no
    /// middles, on middles, and on corners of pixels.
    #[test]
    fn triangles_that_share_edges_cover_each_pixel_once() {
        let ring = [[3.3, 2.1], [20.0, 1.7], [37.2, 4.4], [36.1, 25.5], [18.5, 28.0], [2.9, 22.2]];
        for hub in [[17.3, 14.9], [17.5, 14.5], [18.0, 15.0], [5.1, 6.7]] {
            let mut canvas = Canvas::new(40, 30, Color32::TRANSPARENT);
            let clip = canvas.whole();
            for (index, from) in ring.iter().enumerate() {
                let to = ring[(index + 1) % ring.len()];
                let corners = [*from, to, hub].map(|[x, y]| corner(x, y, GREY));
                fill(&mut canvas, clip, corners, &white());
            }
            let twice = canvas.pixels().iter().filter(|pixel| pixel.a() > 100).count();
            assert_eq!(twice, 0, "hub {hub:?}");
            for (y, x) in [(14, 17), (10, 20), (20, 10), (5, 30)] {
                assert_eq!(canvas.at(x, y), GREY, "hub {hub:?}, pixel {x}, {y}");
            }
            // As many pixels as a hand counts by the rule of the polygon: the shoelace area, to within its outline.
            let area = shoelace(&ring);
            assert!((count(&canvas) as f32 - area).abs() < 60.0, "{} of {area}", count(&canvas));
        }
    }

    fn shoelace(ring: &[[f32; 2]]) -> f32 {
        let pairs = ring.iter().zip(ring.iter().cycle().skip(1));
        pairs.map(|(a, b)| a[0] * b[1] - b[0] * a[1]).sum::<f32>().abs() / 2.0
    }

    #[test]
    fn colours_grow_evenly_between_the_corners() {
        let mut canvas = Canvas::new(40, 30, Color32::BLACK);
        let clip = canvas.whole();
        let bright = Color32::from_rgb(200, 0, 0);
        let corners =
            [corner(0.0, 0.0, Color32::BLACK), corner(40.0, 0.0, bright), corner(0.0, 30.0, Color32::BLACK)];
        fill(&mut canvas, clip, corners, &white());
        // Red is 200·x/40 at the middle x of a pixel: 2.5 and 52.5, a step to round.
        assert_eq!(canvas.at(0, 0).r(), 3);
        assert_eq!(canvas.at(10, 5).r(), 53);
    }

    #[test]
    fn the_clip_and_the_canvas_bound_it_and_odd_corners_do_nothing() {
        let mut canvas = Canvas::new(40, 30, Color32::TRANSPARENT);
        let clip = Window { x: [5, 8], y: [6, 10] };
        let all_over = [[-900.0, -900.0], [900.0, -900.0], [0.0, 9000.0]];
        fill(&mut canvas, clip, all_over.map(|[x, y]| corner(x, y, GREY)), &white());
        assert_eq!(count(&canvas), 12);
        for odd in [f32::NAN, f32::INFINITY, f32::NEG_INFINITY] {
            assert_eq!(count(&painted(&[[0.0, 0.0], [odd, 0.0], [0.0, 10.0]], GREY)), 0);
        }
        assert_eq!(count(&painted(&[[1.0, 1.0], [9.0, 9.0], [5.0, 5.0]], GREY)), 0, "no area");
    }

    #[test]
    fn a_texture_is_laid_over_it_and_takes_the_colour() {
        let texels = vec![Color32::WHITE, Color32::TRANSPARENT];
        let texture = Texture::new([2, 1], texels, TextureOptions::NEAREST);
        let mut canvas = Canvas::new(4, 4, Color32::BLACK);
        let clip = canvas.whole();
        let at = |x: f32, y: f32| Corner { at: [x, y], uv: [x / 4.0, y / 4.0], colour: GREY };
        fill(&mut canvas, clip, [at(0.0, 0.0), at(8.0, 0.0), at(0.0, 8.0)], &texture);
        assert_eq!(canvas.at(1, 1), over(GREY, Color32::BLACK));
        assert_eq!(canvas.at(2, 1), Color32::BLACK);
    }
}
