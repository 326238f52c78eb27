//! Moving about in the grid by keys.

use eframe::egui::text::CCursorRange;
use eframe::egui::text_edit::TextEditState;
use eframe::egui::{Context, Event, Id, Key, Modifiers, Ui};

use super::place::{Place, Sounded};

/// The cells that there are.
#[derive(Debug, Clone, Copy)]
pub struct Field<'a> {
    /// The columns.
    pub columns: &'a [Sounded],
    /// Number of strings.
    pub strings: usize,
}

/// A step to a cell beside.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
enum Step {
    Left,
    Right,
    Up,
    Down,
    /// Down, and from the last string to the first in the next column.
    On,
    /// The way back of that.
    Back,
}

/// Takes the keys that lead out of the cell `at`, whose field is `id`; says where they lead.
pub fn steps(ui: &Ui, field: Field<'_>, at: Place, id: Id) -> Option<Place> {
    let ends = ends(ui.ctx(), id);
    let pressed = |modifiers, key| ui.input_mut(|input| input.consume_key(modifiers, key));
    // The more particular combination first: a key pressed with more modifiers also matches fewer.
    let step = if pressed(Modifiers::SHIFT, Key::Enter) {
        Step::Back
    } else if pressed(Modifiers::NONE, Key::Enter) {
        Step::On
    } else if pressed(Modifiers::NONE, Key::ArrowUp) {
        Step::Up
    } else if pressed(Modifiers::NONE, Key::ArrowDown) {
        Step::Down
    } else if ends[0] && pressed(Modifiers::NONE, Key::ArrowLeft) {
        Step::Left
    } else if ends[1] && pressed(Modifiers::NONE, Key::ArrowRight) {
        Step::Right
    } else {
        return None;
    };
    Some(beside(field, at, step))
}

/// Whether the arrows to the left and to the right lead out of the field: all of its text is chosen, or the cursor
/// stands at that end.
fn ends(ctx: &Context, id: Id) -> [bool; 2] {
    let range = TextEditState::load(ctx, id).and_then(|state| state.cursor.char_range());
    let Some(range) = range else { return [true, true] };
    let chosen = range.as_sorted_char_range();
    let length = ctx.data(|data| data.get_temp::<usize>(id)).unwrap_or_default();
    let (first, last) = (chosen.start.0 == 0, chosen.end.0 >= length);
    let all = first && last;
    [all || (range.is_empty() && first), all || (range.is_empty() && last)]
}

/// Notes how long the text of a field is, for the arrows.
pub fn note_length(ctx: &Context, id: Id, text: &str) {
    ctx.data_mut(|data| data.insert_temp(id, text.chars().count()));
}

/// The cell that a step leads to; the cell itself at the grid's edge.
fn beside(field: Field<'_>, at: Place, step: Step) -> Place {
    let Field { columns, strings } = field;
    let Some(column) = columns.iter().position(|column| *column == at.sounded) else { return at };
    let last = strings.saturating_sub(1);
    let (string, column) = match step {
        Step::Left => (at.string, column.saturating_sub(1)),
        Step::Right => (at.string, (column + 1).min(columns.len() - 1)),
        Step::Up => (at.string.saturating_sub(1), column),
        Step::Down => ((at.string + 1).min(last), column),
        Step::On if at.string < last => (at.string + 1, column),
        Step::On if column + 1 < columns.len() => (0, column + 1),
        Step::Back if at.string > 0 => (at.string - 1, column),
        Step::Back if column > 0 => (last, column - 1),
        Step::On | Step::Back => (at.string, column),
    };
    Place { string, sounded: columns[column] }
}

/// Chooses all text of a field, so that typing replaces it.
pub fn choose_all(ctx: &Context, id: Id, text: &str) {
    let mut state = TextEditState::load(ctx, id).unwrap_or_default();
    state.cursor.set_char_range(Some(CCursorRange::select_all_str(text)));
    state.store(ctx, id);
}

/// Takes a pasted text for which `wanted` holds out of what happened in this frame.
pub fn pasted(ui: &Ui, wanted: impl Fn(&str) -> bool) -> Option<String> {
    let mut found = None;
    ui.input_mut(|input| {
        input.events.retain(|event| match event {
            Event::Paste(text) if found.is_none() && wanted(text) => {
                found = Some(text.clone());
                false
            }
            _ => true,
        });
    });
    found
}

#[cfg(test)]
mod tests {
    use super::*;

    const COLUMNS: [Sounded; 3] = [Sounded::Open, Sounded::Fretted(5), Sounded::Fretted(12)];

    fn to(string: usize, column: usize, step: Step) -> (usize, usize) {
        let field = Field { columns: &COLUMNS, strings: 2 };
        let place = beside(field, Place { string, sounded: COLUMNS[column] }, step);
        (place.string, COLUMNS.iter().position(|c| *c == place.sounded).unwrap_or(usize::MAX))
    }

    #[test]
    fn arrows_stay_in_the_grid_and_enter_goes_on_in_the_next_column() {
        assert_eq!(to(0, 0, Step::Left), (0, 0));
        assert_eq!(to(1, 2, Step::Right), (1, 2));
        assert_eq!(to(1, 1, Step::Down), (1, 1));
        assert_eq!(to(0, 1, Step::Down), (1, 1));
        assert_eq!(to(1, 1, Step::On), (0, 2));
        assert_eq!(to(1, 2, Step::On), (1, 2));
        assert_eq!(to(0, 2, Step::Back), (1, 1));
    }
}
