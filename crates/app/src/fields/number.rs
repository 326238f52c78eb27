//! The number field, and the typed field that it is made of.

use eframe::egui::{Align, Align2, Id, Key, Modifiers, Response, TextEdit, Ui, Vec2, accesskit};

use super::draft::Draft;
use super::form::Form;
use super::parse;
use crate::theme::size;

/// What a number field is for.
#[derive(Debug, Clone)]
pub struct Spec<'a> {
    /// Path of the value in the plan.
    pub path: String,
    /// Name for screen readers and the undo list, with the unit.
    pub name: String,
    /// What it is and how it is measured, shown when the pointer rests on it.
    pub help: &'a str,
    /// How far the arrow keys step; zero for a field that is not a number.
    pub step: f64,
    /// Width on screen.
    pub width: f32,
    /// Shown while the field is empty.
    pub hint: &'a str,
    /// Where its text stands.
    pub align: Align,
    /// Sets two fields of one path apart.
    pub place: &'a str,
}

impl<'a> Spec<'a> {
    /// A field of the usual width.
    pub fn new(path: impl Into<String>, name: impl Into<String>, step: f64, help: &'a str) -> Self {
        Self {
            path: path.into(),
            name: name.into(),
            help,
            step,
            width: size::FIELD,
            hint: "",
            align: Align::RIGHT,
            place: "",
        }
    }

    /// The same with another width.
    #[must_use]
    pub fn width(self, width: f32) -> Self {
        Self { width, ..self }
    }

    /// The same with a hint for the empty field.
    #[must_use]
    pub fn hint(self, hint: &'a str) -> Self {
        Self { hint, ..self }
    }

    /// The same for a second field of the same path.
    #[must_use]
    pub fn place(self, place: &'a str) -> Self {
        Self { place, ..self }
    }

    /// A field for text: no steps, from the left.
    #[must_use]
    pub fn words(self) -> Self {
        Self { step: 0.0, align: Align::LEFT, ..self }
    }

    /// What the window knows the field by.
    #[must_use]
    pub fn id(&self) -> Id {
        Id::unique(("field", &self.path, self.place))
    }
}

/// A field for a number.
pub fn number(ui: &mut Ui, form: &mut Form, spec: &Spec, value: &mut f64) -> Response {
    let shown = parse::shown(*value);
    typed(ui, form, spec, &shown, parse::number, |new| *value = new)
}

/// A field for a number that may be left empty.
pub fn optional(ui: &mut Ui, form: &mut Form, spec: &Spec, value: &mut Option<f64>) -> Response {
    let shown = value.map(parse::shown).unwrap_or_default();
    let read = |text: &str| match text.trim() {
        "" => Ok(None),
        some => parse::number(some).map(Some),
    };
    typed(ui, form, spec, &shown, read, |new| *value = new)
}

/// A field for a whole number.
pub fn whole(ui: &mut Ui, form: &mut Form, spec: &Spec, value: &mut u32) -> Response {
    let shown = value.to_string();
    typed(ui, form, spec, &shown, parse::whole, |new| *value = new)
}

/// A field whose text is read as a `T`: it shows the text as typed while that is typed or wrong, else `shown`.
pub fn typed<T>(
    ui: &mut Ui,
    form: &mut Form,
    spec: &Spec,
    shown: &str,
    read: impl Fn(&str) -> Result<T, String>,
    take: impl FnOnce(T),
) -> Response {
    let id = spec.id();
    let mut text = form.drafts.get(&spec.path).map_or_else(|| shown.to_owned(), |draft| draft.text.clone());
    let stepped = step(ui, id, spec.step, &mut text);
    let error = form.error(&spec.path);
    let response = text_box(ui, form, spec, id, &mut text, error.is_some());
    describe(&response, spec, error.as_deref());
    form.arrive(ui, &spec.path, &response);

    if response.changed() || stepped {
        let start = form.drafts.get(&spec.path).map_or_else(|| shown.to_owned(), |draft| draft.start.clone());
        let error = read_or_go_back(&text, &start, read, take).err();
        form.typed(&spec.path, &spec.name, id, Draft { text, start, error });
    } else if response.lost_focus() {
        form.left = true;
        if form.drafts.get(&spec.path).is_some_and(|draft| draft.error.is_none()) {
            form.drafts.forget(&spec.path);
        }
    }
    tip(response, spec, error)
}

/// Takes what `text` says; where it cannot be read, takes what stood there before, so that no half-typed
/// number stays in the plan.
fn read_or_go_back<T>(
    text: &str,
    start: &str,
    read: impl Fn(&str) -> Result<T, String>,
    take: impl FnOnce(T),
) -> Result<(), String> {
    match read(text) {
        Ok(value) => {
            take(value);
            Ok(())
        }
        Err(error) => {
            if let Ok(value) = read(start) {
                take(value);
            }
            Err(error)
        }
    }
}

/// What is wrong and what the field is for, where the pointer rests.
fn tip(response: Response, spec: &Spec, error: Option<String>) -> Response {
    match (error, spec.help) {
        (None, "") => response,
        (None, help) => response.on_hover_text(help),
        (Some(error), "") => response.on_hover_text(error),
        (Some(error), help) => response.on_hover_text(format!("{error}\n\n{help}")),
    }
}

/// Steps the number in `text` by the arrow keys; true if it has been stepped.
fn step(ui: &Ui, id: Id, step: f64, text: &mut String) -> bool {
    if step == 0.0 || !ui.memory(|memory| memory.has_focus(id)) {
        return false;
    }
    let (up, down, large) = ui.input_mut(|input| {
        let large = input.modifiers.shift;
        let modifiers = if large { Modifiers::SHIFT } else { Modifiers::NONE };
        (
            input.count_and_consume_key(modifiers, Key::ArrowUp),
            input.count_and_consume_key(modifiers, Key::ArrowDown),
            large,
        )
    });
    if up == down {
        return false;
    }
    let Ok(value) = parse::number(text) else { return false };
    let steps = up as f64 - down as f64;
    let by = if large { 10.0 * step } else { step };
    *text = parse::shown(rounded(value + steps * by, step));
    true
}

/// The value without the dust that adding decimals in binary leaves: three digits finer than the step.
fn rounded(value: f64, step: f64) -> f64 {
    let decimals = (3.0 - step.abs().log10().floor()).clamp(0.0, 12.0);
    let scale = 10f64.powi(decimals as i32);
    (value * scale).round() / scale
}

fn text_box(ui: &mut Ui, form: &Form, spec: &Spec, id: Id, text: &mut String, wrong: bool) -> Response {
    let edit = TextEdit::singleline(text)
        .id(id)
        .frame(form.frame(ui, id, wrong))
        .hint_text(spec.hint)
        .desired_width(spec.width)
        .clip_text(true)
        .align(Align2([spec.align, Align::Center]))
        .min_size(Vec2::new(0.0, size::FIELD_HEIGHT));
    ui.add(edit)
}

/// Names the field for screen readers and says there what is wrong.
pub fn describe(response: &Response, spec: &Spec, error: Option<&str>) {
    response.ctx.accesskit_node_builder(response.id, |node| {
        node.set_label(spec.name.clone());
        match error {
            Some(error) => {
                node.set_invalid(accesskit::Invalid::True);
                node.set_description(error.to_owned());
            }
            None if !spec.help.is_empty() => node.set_description(spec.help.to_owned()),
            None => {}
        }
    });
}
