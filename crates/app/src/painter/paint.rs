//! What egui wants painted, onto a canvas.

use eframe::egui::epaint::{ClippedPrimitive, ClippedShape, Primitive};
use eframe::egui::{Context, Rect, TexturesDelta};

use super::canvas::{Canvas, Window};
use super::texture::Textures;
use super::triangle::{Corner, fill};

/// The painter: it holds the textures from frame to frame.
#[derive(Debug, Default)]
pub struct Painter {
    textures: Textures,
}

impl Painter {
    /// The largest texture, in texels on a side, that egui may ask for; letters take far less.
    pub const LARGEST_TEXTURE: usize = 8192;

    /// Takes new textures in, before the frame that wants them is painted.
    pub fn take(&mut self, delta: &TexturesDelta) {
        self.textures.take(delta);
    }

    /// Lets textures go that are not wanted after this frame, and says that the delta is dealt with.
    pub fn drop_old(&mut self, delta: &mut TexturesDelta) {
        self.textures.drop_old(delta);
        delta.clear();
    }

    /// Paints shapes, `scale` pixels to a point, onto a canvas.
    #[must_use]
    pub fn paint(&self, ctx: &Context, shapes: Vec<ClippedShape>, scale: f32, mut canvas: Canvas) -> Canvas {
        for primitive in ctx.tessellate(shapes, scale) {
            self.primitive(&mut canvas, &primitive, scale);
        }
        canvas
    }

    fn primitive(&self, canvas: &mut Canvas, primitive: &ClippedPrimitive, scale: f32) {
        // Calls into a graphics library are the only other kind, and nothing here makes one.
        let Primitive::Mesh(mesh) = &primitive.primitive else { return };
        let Some(texture) = self.textures.get(mesh.texture_id) else { return };
        let clip = pixels(primitive.clip_rect, scale, canvas.whole());
        let corner = |index: u32| {
            let vertex = mesh.vertices.get(index as usize)?;
            let at = [vertex.pos.x * scale, vertex.pos.y * scale];
            Some(Corner { at, uv: vertex.uv.into(), colour: vertex.color })
        };
        for index in mesh.indices.chunks_exact(3) {
            if let (Some(a), Some(b), Some(c)) = (corner(index[0]), corner(index[1]), corner(index[2])) {
                fill(canvas, clip, [a, b, c], texture);
            }
        }
    }
}

/// The pixels of a rectangle of points.
fn pixels(rect: Rect, scale: f32, whole: Window) -> Window {
    // A number that is negative, or none, becomes 0 here.
    let place = |points: f32, end: usize| ((points * scale).round() as usize).min(end);
    Window {
        x: [place(rect.min.x, whole.x[1]), place(rect.max.x, whole.x[1])],
        y: [place(rect.min.y, whole.y[1]), place(rect.max.y, whole.y[1])],
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use eframe::egui::{Color32, CornerRadius, FullOutput, RawInput, Sense, pos2, vec2};

    /// A frame with one square of 20 points at (10, 10), clipped to its upper half.
    fn square(ctx: &Context) -> FullOutput {
        let input = RawInput {
            screen_rect: Some(Rect::from_min_size(pos2(0.0, 0.0), vec2(60.0, 60.0))),
            ..RawInput::default()
        };
        ctx.run_ui(input, |ui| {
            let _ = ui.allocate_response(vec2(1.0, 1.0), Sense::hover());
            let rect = Rect::from_min_size(pos2(10.0, 10.0), vec2(20.0, 20.0));
            let upper = Rect::from_min_max(rect.min, pos2(30.0, 20.0));
            ui.painter().with_clip_rect(upper).rect_filled(rect, CornerRadius::ZERO, Color32::RED);
        })
    }

    #[test]
    fn a_square_is_painted_where_it_stands_and_clipped() {
        let ctx = Context::default();
        let mut painter = Painter::default();
        let mut output = square(&ctx);
        painter.take(&output.textures_delta);
        let canvas = painter.paint(&ctx, output.shapes, 1.0, Canvas::new(60, 60, Color32::WHITE));
        painter.drop_old(&mut output.textures_delta);
        for (x, y) in [(12, 12), (28, 19), (20, 15)] {
            assert_eq!(canvas.at(x, y), Color32::RED, "{x}, {y}");
        }
        for (x, y) in [(20, 20), (20, 25), (5, 15), (35, 15)] {
            assert_eq!(canvas.at(x, y), Color32::WHITE, "{x}, {y}");
        }
    }
}
