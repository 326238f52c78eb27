//! The list in which every command is found by its name.

use eframe::egui::{Button, Id, Key, Modifiers, RichText, ScrollArea, TextEdit, Ui};

use super::ask::{Reply, first_focus, heading};
use crate::edit::catalogue::Offer;
use crate::theme::Palette;

/// Height of the list, points.
const HEIGHT: f32 = 330.0;

/// A search in the list of commands.
#[derive(Debug)]
pub struct Finder {
    text: String,
    chosen: usize,
    offers: Vec<Offer>,
}

impl Finder {
    /// A search among these commands.
    #[must_use]
    pub fn new(offers: Vec<Offer>) -> Self {
        Self { text: String::new(), chosen: 0, offers }
    }

    /// Shows the search.
    pub fn show(&mut self, ui: &mut Ui, palette: &Palette) -> Option<Reply> {
        heading(ui, "Find a command");
        // Taken before the field sees them, where they would move its cursor.
        let key = |key: Key| ui.input_mut(|input| input.consume_key(Modifiers::NONE, key));
        let (up, down, enter) = (key(Key::ArrowUp), key(Key::ArrowDown), key(Key::Enter));
        let field = TextEdit::singleline(&mut self.text)
            .id(Id::unique("find a command"))
            .desired_width(f32::INFINITY)
            .hint_text("Part of its name");
        let field = ui.add(field);
        field.ctx.accesskit_node_builder(field.id, |node| node.set_label("Part of the command's name"));
        first_focus(ui, &field);
        if field.changed() {
            self.chosen = 0;
        }
        let found = found(&self.offers, &self.text);
        let last = found.len().saturating_sub(1);
        self.chosen = (self.chosen + usize::from(down)).saturating_sub(usize::from(up)).min(last);
        ui.label(RichText::new(count(found.len())).small().color(palette.quiet));
        let clicked = list(ui, palette, &found, self.chosen, up || down);
        let taken = clicked.or_else(|| found.get(self.chosen).copied().filter(|_| enter));
        taken.map(|offer| Reply::Do(offer.command.clone()))
    }
}

fn count(found: usize) -> String {
    match found {
        0 => "No command has this in its name.".to_owned(),
        1 => "One command. Enter does it, Escape leaves.".to_owned(),
        many => format!("{many} commands. Arrow keys choose, Enter does it, Escape leaves."),
    }
}

/// The commands that were found, each with its key; gives the one that was clicked.
fn list<'a>(
    ui: &mut Ui,
    palette: &Palette,
    found: &[&'a Offer],
    chosen: usize,
    moved: bool,
) -> Option<&'a Offer> {
    let mut clicked = None;
    ScrollArea::vertical().max_height(HEIGHT).auto_shrink([false, true]).show(ui, |ui| {
        for (index, offer) in found.iter().enumerate() {
            let is_chosen = index == chosen;
            let mut button = Button::selectable(is_chosen, RichText::new(&offer.name).color(palette.ink))
                .min_size([ui.available_width(), 22.0].into())
                .truncate();
            if let Some(key) = offer.command.shortcut() {
                let key = RichText::new(ui.ctx().format_shortcut(&key)).color(palette.quiet);
                button = button.right_text(key);
            }
            let response = ui.add(button);
            response.ctx.accesskit_node_builder(response.id, |node| {
                node.set_label(offer.name.as_str());
                node.set_selected(is_chosen);
            });
            if is_chosen && moved {
                response.scroll_to_me(None);
            }
            if response.clicked() {
                clicked = Some(*offer);
            }
        }
    });
    clicked
}

/// The commands that a search finds, the best first; all of them in their order where nothing is typed.
fn found<'a>(offers: &'a [Offer], text: &str) -> Vec<&'a Offer> {
    let mut scored: Vec<(u32, &Offer)> =
        offers.iter().filter_map(|offer| Some((score(&offer.name, text)?, offer))).collect();
    scored.sort_by_key(|(score, _)| std::cmp::Reverse(*score));
    scored.into_iter().map(|(_, offer)| offer).collect()
}

/// How well a name fits what was typed; none where a word of it is not in the name at all.
fn score(name: &str, text: &str) -> Option<u32> {
    let name = name.to_lowercase();
    text.to_lowercase().split_whitespace().map(|word| word_score(&name, word)).sum()
}

/// Three where the name begins with the word, two where a word of the name does, one where it is inside, and
/// nothing where only its letters come in this order.
fn word_score(name: &str, word: &str) -> Option<u32> {
    if name.starts_with(word) {
        return Some(3);
    }
    if name.split(|c: char| !c.is_alphanumeric()).any(|part| part.starts_with(word)) {
        return Some(2);
    }
    if name.contains(word) {
        return Some(1);
    }
    let mut letters = name.chars();
    word.chars().all(|wanted| letters.any(|letter| letter == wanted)).then_some(0)
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::edit::command::Command;

    fn names(text: &str) -> Vec<String> {
        let offers = ["Save", "Save as…", "Write PDF…", "Usual text size", "Undo: Relief"]
            .map(|name| Offer { command: Command::Save, name: name.to_owned() });
        found(&offers, text).into_iter().map(|offer| offer.name.clone()).collect()
    }

    #[test]
    fn what_fits_best_stands_first() {
        assert_eq!(names("pdf"), ["Write PDF…"]);
        assert_eq!(names("sa")[..2], ["Save", "Save as…"], "a beginning before letters in order");
        assert_eq!(names("size text"), ["Usual text size"], "words in any order");
        assert_eq!(names("rlf"), ["Undo: Relief"], "letters in order");
        assert_eq!(names("xyz"), Vec::<String>::new());
        assert_eq!(names(" ").len(), 5);
    }
}
