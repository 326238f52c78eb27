//! The window's own way to ask for a file: a path that is typed, with the files of its folder to choose from.

use std::path::{Path, PathBuf};

use eframe::egui::{Id, Label, RichText, ScrollArea, Sense, TextEdit, Ui, WidgetInfo, accesskit};

use super::ask::{Reply, entered, first_focus, strong_button};
use super::files::with_ending;
use super::picker::Purpose;
use crate::theme::Palette;

/// The most entries that are listed.
const MOST_ENTRIES: usize = 200;

/// A path being typed.
#[derive(Debug)]
pub struct PathBox {
    purpose: Purpose,
    text: String,
    error: Option<String>,
    listing: Listing,
}

/// The entries of a folder, read when the folder changes and not each frame.
#[derive(Debug, Default)]
struct Listing {
    folder: PathBuf,
    entries: Vec<Entry>,
}

#[derive(Debug, Clone, PartialEq, Eq, PartialOrd, Ord)]
struct Entry {
    is_file: bool,
    name: String,
}

impl PathBox {
    /// A box that begins with `suggested`, taken from the working folder where it is not absolute.
    #[must_use]
    pub fn new(purpose: Purpose, suggested: &Path) -> Self {
        let folder = std::env::current_dir().unwrap_or_default();
        let whole = folder.join(suggested);
        let start = match purpose {
            Purpose::Open | Purpose::Readings => whole.parent().map_or(folder, Path::to_owned).join(""),
            Purpose::Save | Purpose::Write(_) => whole,
        };
        Self { purpose, text: start.display().to_string(), error: None, listing: Listing::default() }
    }

    /// Shows the box.
    pub fn show(&mut self, ui: &mut Ui, palette: &Palette) -> Option<Reply> {
        ui.label(RichText::new(self.purpose.title()).heading().strong());
        let edit = TextEdit::singleline(&mut self.text)
            .id(Id::unique("path"))
            .desired_width(f32::INFINITY)
            .hint_text("Path of the file");
        let field = ui.add(edit);
        field.ctx.accesskit_node_builder(field.id, |node| node.set_label("Path of the file"));
        first_focus(ui, &field);
        if field.changed() {
            self.error = None;
        }
        if let Some(error) = &self.error {
            ui.label(RichText::new(format!("▲ {error}")).small().color(palette.fault));
        }
        self.entries(ui, palette);
        let mut reply = None;
        let enter = entered(ui, &field);
        ui.horizontal(|ui| {
            if ui.add(strong_button(palette, self.purpose.verb())).clicked() || enter {
                reply = self.propose();
            }
            if ui.button("Cancel").clicked() {
                reply = Some(Reply::Cancel);
            }
        });
        if enter && reply.is_none() {
            field.request_focus();
        }
        reply
    }

    /// The path that is typed, if it can be used.
    fn propose(&mut self) -> Option<Reply> {
        let typed = self.text.trim();
        let path = PathBuf::from(typed);
        let refusal = match self.purpose {
            _ if typed.is_empty() => Some("a path is wanted here".to_owned()),
            _ if path.is_dir() => Some("this is a folder; give the name of a file in it".to_owned()),
            Purpose::Open | Purpose::Readings if !path.exists() => Some("there is no such file".to_owned()),
            Purpose::Save | Purpose::Write(_) if !folder_of(&path).is_dir() => {
                Some("there is no such folder".to_owned())
            }
            _ => None,
        };
        self.error = refusal;
        if self.error.is_some() {
            return None;
        }
        let path = if self.purpose.writes() { with_ending(path, self.purpose.new_ending()) } else { path };
        Some(Reply::Propose(self.purpose, path))
    }

    /// The files of the folder that is typed: a click takes one over.
    fn entries(&mut self, ui: &mut Ui, palette: &Palette) {
        let path = PathBuf::from(self.text.trim());
        let (folder, begun) = if self.text.ends_with('/') || path.is_dir() && path.file_name().is_none() {
            (path, String::new())
        } else {
            let begun =
                path.file_name().map(|name| name.to_string_lossy().to_lowercase()).unwrap_or_default();
            (folder_of(&path), begun)
        };
        self.listing.follow(&folder, self.purpose.ending());
        let matching: Vec<&Entry> = self
            .listing
            .entries
            .iter()
            .filter(|entry| entry.name.to_lowercase().starts_with(&begun))
            .collect();
        let shown = if matching.is_empty() { self.listing.entries.iter().collect() } else { matching };
        let mut taken = None;
        ScrollArea::vertical().max_height(180.0).auto_shrink([false, true]).show(ui, |ui| {
            for entry in shown {
                let words = if entry.is_file { entry.name.clone() } else { format!("{}/", entry.name) };
                let colour = if entry.is_file { palette.ink } else { palette.accent };
                let label = Label::new(RichText::new(&words).color(colour)).sense(Sense::click()).truncate();
                let response = ui.add(label);
                response.widget_info(|| {
                    WidgetInfo::labeled(accesskit::Role::Link, true, format!("Take {words}"))
                });
                if response.clicked() {
                    taken = Some(self.listing.folder.join(&entry.name).join(if entry.is_file {
                        ""
                    } else {
                        "."
                    }));
                }
            }
        });
        if let Some(path) = taken {
            self.text = plain(&path);
            self.error = None;
        }
    }
}

/// A path without the `/.` that stands for an open folder, and without the slash behind a file.
fn plain(path: &Path) -> String {
    let text = path.display().to_string();
    match text.strip_suffix('.') {
        Some(folder) if folder.ends_with('/') => folder.to_owned(),
        _ => text.trim_end_matches('/').to_owned(),
    }
}

fn folder_of(path: &Path) -> PathBuf {
    match path.parent() {
        Some(folder) if folder != Path::new("") => folder.to_owned(),
        _ => PathBuf::from("."),
    }
}

impl Listing {
    fn follow(&mut self, folder: &Path, ending: &str) {
        if self.folder == folder {
            return;
        }
        self.folder = folder.to_owned();
        self.entries = std::fs::read_dir(folder).map(|entries| list(entries, ending)).unwrap_or_default();
    }
}

/// Folders first, then the files with the ending; hidden ones are left out.
fn list(entries: std::fs::ReadDir, ending: &str) -> Vec<Entry> {
    let entry = |entry: std::fs::DirEntry| {
        let path = entry.path();
        let name = entry.file_name().to_string_lossy().into_owned();
        let is_file = !path.is_dir();
        let wanted = !is_file || path.extension().is_some_and(|found| found.eq_ignore_ascii_case(ending));
        (wanted && !name.starts_with('.')).then_some(Entry { is_file, name })
    };
    let mut list: Vec<Entry> = entries.flatten().filter_map(entry).collect();
    list.sort();
    list.truncate(MOST_ENTRIES);
    list
}
