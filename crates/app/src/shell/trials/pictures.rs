//! A picture of every page, light, dark and with text at twice its size, painted by the processor and compared with the one that is kept.
//!
//! `CRESTLINE_UPDATE_PICTURES=1 cargo test -p crestline pictures` makes them anew; look at them before they are
//! committed.

use std::cell::RefCell;
use std::fs::{self, File};
use std::io::{BufReader, BufWriter};
use std::path::{Path, PathBuf};
use std::rc::Rc;
use std::time::Duration;

use crestline_plan::{example, read};
use eframe::egui::{Color32, TexturesDelta, Theme};
use egui_kittest::{Harness, TestRenderer};

use super::FRAMES;
use crate::painter::canvas::Canvas;
use crate::painter::paint::Painter;
use crate::shell::options::Options;
use crate::shell::window::Window;
use crate::theme::Palette;
use crate::view::Page;

const SIZE: [usize; 2] = [1280, 800];

/// The pictures are kept in so many levels of each channel, which halves their files.
const LEVELS: u32 = 32;
/// A channel may be this far off, in steps of 255: half a level, and what sines and powers of another system's
/// library make of the soft rim of a round mark.
const NEAR: u8 = 4 + 8;
/// So many pixels may be farther off, of a million: a figure that rounds the other way is some thirty, a word that
/// moved by a pixel is more than this.
const MOST_OFF: usize = 100;

/// Keeps the textures for the painter.
#[derive(Clone, Default)]
struct Keeper(Rc<RefCell<Painter>>);

impl TestRenderer for Keeper {
    fn handle_delta(&mut self, delta: &mut TexturesDelta) {
        let mut painter = self.0.borrow_mut();
        painter.take(delta);
        painter.drop_old(delta);
    }
}

/// How a page is looked at.
#[derive(Debug, Clone, Copy, PartialEq)]
struct Look {
    theme: &'static str,
    /// Scale of all text.
    zoom: f32,
}

/// Light, dark, and with text at twice its size.
const LOOKS: [Look; 3] = [
    Look { theme: "light", zoom: 1.0 },
    Look { theme: "dark", zoom: 1.0 },
    Look { theme: "light", zoom: 2.0 },
];

fn picture(page: Page, Look { theme, zoom }: Look) -> Canvas {
    let name = if page == Page::Diagnosis { "steel_six_sharp" } else { "steel_six" };
    let plan = read(example(name).unwrap().text).unwrap();
    let options = Options::read(|variable| match variable {
        "CRESTLINE_PAGE" => Some(Options::page_word(page)),
        "CRESTLINE_THEME" => Some(theme.to_owned()),
        _ => None,
    });
    let options = Options { zoom, ..options };
    let keeper = Keeper::default();
    let builder = Harness::builder()
        .with_size(SIZE.map(|side| side as f32 / zoom))
        .with_max_steps(FRAMES)
        .with_theme(if theme == "dark" { Theme::Dark } else { Theme::Light })
        .renderer(keeper.clone());
    let mut opened: Harness<'_, Window> =
        builder.build_eframe(move |creation| Window::new(&creation.egui_ctx, plan, None, &options));
    opened.run();
    come_to_an_end(&mut opened, page);
    let ground = Palette::of(opened.ctx.theme()).ground;
    let blank = Canvas::new(SIZE[0], SIZE[1], ground);
    let shapes = opened.output().shapes.clone();
    keeper.0.borrow().paint(&opened.ctx, shapes, zoom, blank)
}

/// Waits for the work that a page does beside the window and that its picture shows the end of.
fn come_to_an_end(opened: &mut Harness<'_, Window>, page: Page) {
    const TURNS: usize = 6000;
    let is_done = |window: &Window| match page {
        Page::Compare => !window.view.study.is_working(),
        Page::HowSure => window.view.trust.sampling.shares().is_some(),
        Page::Diagnosis => !window.view.repair.inquiry.is_working(),
        Page::Saddle | Page::FrettedNotes | Page::Sheets | Page::Help => true,
    };
    for _ in 0..TURNS {
        if is_done(opened.state()) {
            opened.run();
            return;
        }
        std::thread::sleep(Duration::from_millis(20));
        opened.run();
    }
    panic!("the page {} never came to an end", page.name());
}

fn kept(page: Page, Look { theme, zoom }: Look) -> PathBuf {
    let zoom = if zoom == 1.0 { String::new() } else { format!("-{:.0}", 100.0 * zoom) };
    let name = format!("{}-{theme}{zoom}.png", Options::page_word(page));
    Path::new(env!("CARGO_MANIFEST_DIR")).join("tests/pictures").join(name)
}

fn write(path: &Path, canvas: &Canvas) {
    fs::create_dir_all(path.parent().unwrap()).unwrap();
    let file = BufWriter::new(File::create(path).unwrap());
    let mut encoder = png::Encoder::new(file, canvas.width() as u32, canvas.height() as u32);
    encoder.set_color(png::ColorType::Rgb);
    encoder.set_compression(png::Compression::High);
    encoder.set_filter(png::Filter::Up);
    let colours = canvas.pixels().iter().flat_map(|pixel| [pixel.r(), pixel.g(), pixel.b()]);
    let bytes: Vec<u8> = colours.map(coarse).collect();
    encoder.write_header().unwrap().write_image_data(&bytes).unwrap();
}

/// The nearest of the levels.
fn coarse(byte: u8) -> u8 {
    let level = (u32::from(byte) * (LEVELS - 1) + 127) / 255;
    (level * 255 / (LEVELS - 1)) as u8
}

fn read_back(path: &Path) -> Vec<Color32> {
    let file = File::open(path).unwrap_or_else(|error| panic!("{}: {error}", path.display()));
    let mut reader = png::Decoder::new(BufReader::new(file)).read_info().unwrap();
    let mut bytes = vec![0; reader.output_buffer_size().unwrap()];
    let info = reader.next_frame(&mut bytes).unwrap();
    assert_eq!([info.width as usize, info.height as usize], SIZE, "{}", path.display());
    bytes.chunks_exact(3).map(|pixel| Color32::from_rgb(pixel[0], pixel[1], pixel[2])).collect()
}

fn is_off(a: Color32, b: Color32) -> bool {
    a.to_array().iter().zip(b.to_array()).any(|(a, b)| a.abs_diff(b) > NEAR)
}

#[test]
fn pages_look_as_they_did() {
    let update = std::env::var_os("CRESTLINE_UPDATE_PICTURES").is_some();
    let mut changed = Vec::new();
    for page in Page::ALL {
        for look in LOOKS {
            let (now, path) = (picture(page, look), kept(page, look));
            if update {
                write(&path, &now);
                continue;
            }
            let before = read_back(&path);
            let off = now.pixels().iter().zip(&before).filter(|(a, b)| is_off(**a, **b)).count();
            if off > MOST_OFF {
                let seen =
                    std::env::temp_dir().join(format!("crestline-{}", path.file_name().unwrap().display()));
                write(&seen, &now);
                changed.push(format!(
                    "{}: {off} pixels differ; now it is {}",
                    path.display(),
                    seen.display()
                ));
            }
        }
    }
    assert!(
        changed.is_empty(),
        "look at the pictures, and make them anew if they are right\n{}",
        changed.join("\n")
    );
}

/// The comparison sees a word that moves by one pixel.
#[test]
fn a_small_change_is_seen() {
    let now = picture(Page::Help, LOOKS[0]);
    let mut moved = now.clone();
    for y in 100..120 {
        let row = moved.row(y, [0, SIZE[0]]);
        row.rotate_right(1);
    }
    let off = now.pixels().iter().zip(moved.pixels()).filter(|(a, b)| is_off(**a, **b)).count();
    assert!(off > MOST_OFF, "{off}");
}
