//! The number field, and the typed field that it is made of.

use eframe::egui::{Align, Align2, Id, Key, Modifiers, Response, TextEdit, Ui, Vec2, accesskit};

use super::draft::Draft;
use super::form::Form;
use super::parse;
use crate::hints::card::{self, About};
use crate::hints::topic;
use crate::theme::size;
use crate::units::{self, Fineness, LengthUnit};

/// The keys held down with an arrow key, and the steps that it then makes.
const STEPS: [(Modifiers, f64); 3] =
    [(Modifiers::SHIFT, 10.0), (Modifiers::ALT, 0.1), (Modifiers::NONE, 1.0)];

/// What a number field is for.
#[derive(Debug, Clone)]
pub struct Spec<'a> {
    /// Path of the value in the plan.
    pub path: String,
    /// Name for screen readers and the undo list, with the unit.
    pub name: String,
    /// What it is and how it is measured, shown when the pointer rests on it.
    pub help: &'a str,
    /// How far the arrow keys step, for a length in millimetres; zero for a field that is not a number.
    pub step: f64,
    /// How a length is written in inches.
    pub fineness: Fineness,
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
            fineness: Fineness::Decimals,
            width: size::FIELD,
            hint: "",
            align: Align::RIGHT,
            place: "",
        }
    }

    /// The same for a length that the trade names in fractions of an inch.
    #[must_use]
    pub fn fractions(self) -> Self {
        Self { fineness: Fineness::Fractions, ..self }
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

/// A field for a length in the unit of the window; its name gets the unit.
pub fn length(ui: &mut Ui, form: &mut Form, spec: &Spec, value_mm: &mut f64) -> Response {
    length_if(ui, form, spec, value_mm, |_| Ok(()))
}

/// The same for a length in millimetres that has to pass a check.
pub fn length_if(
    ui: &mut Ui,
    form: &mut Form,
    spec: &Spec,
    value_mm: &mut f64,
    check: impl Fn(f64) -> Result<(), String>,
) -> Response {
    let unit = form.unit;
    let shown = unit.shown(*value_mm, spec.fineness);
    let draft = form.drafts.get(&spec.path);
    let start_mm = draft.and_then(|draft| draft.start_mm.as_ref()?.first().copied()).unwrap_or(*value_mm);
    let start = draft.map_or_else(|| shown.clone(), |draft| draft.start.clone());
    // The text that stood there means the length that stood there, whole, however little of it was shown.
    let read = |text: &str| {
        if text == start {
            return Ok(start_mm);
        }
        let length_mm = units::read(text, unit)?;
        check(length_mm).map_err(|error| units::in_unit(&error, unit))?;
        Ok(length_mm)
    };
    let number = |text: &str| read(text).ok().map(|length_mm| unit.from_mm(length_mm));
    let spec = Spec { name: unit.named(&spec.name), step: unit.step(spec.step), ..spec.clone() };
    let stepper = Stepper { number: &number, shown: &parse::shown };
    let response = typed_in_steps(ui, form, &spec, &shown, read, |new| *value_mm = new, &stepper);
    form.drafts.keep_start_mm(&spec.path, vec![start_mm]);
    response
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
    let number = |text: &str| parse::number(text).ok();
    typed_in_steps(ui, form, spec, shown, read, take, &Stepper { number: &number, shown: &parse::shown })
}

/// How the arrow keys read the number in a field's text and write it again.
struct Stepper<'a> {
    number: &'a dyn Fn(&str) -> Option<f64>,
    shown: &'a dyn Fn(f64) -> String,
}

fn typed_in_steps<T>(
    ui: &mut Ui,
    form: &mut Form,
    spec: &Spec,
    shown: &str,
    read: impl Fn(&str) -> Result<T, String>,
    take: impl FnOnce(T),
    stepper: &Stepper,
) -> Response {
    let id = spec.id();
    let mut text = form.drafts.get(&spec.path).map_or_else(|| shown.to_owned(), |draft| draft.text.clone());
    let stepped = step(ui, id, spec.step, &mut text, stepper);
    let error = form.error(&spec.path);
    let response = text_box(ui, form, spec, id, &mut text, error.is_some());
    describe(&response, spec, error.as_deref(), form.unit);
    form.arrive(ui, &spec.path, &response);

    if response.changed() || stepped {
        let start = form.drafts.get(&spec.path).map_or_else(|| shown.to_owned(), |draft| draft.start.clone());
        let error = read_or_go_back(&text, &start, read, take).err();
        form.typed(&spec.path, &spec.name, id, Draft { text, start, start_mm: None, error });
    } else if response.lost_focus() {
        form.left = true;
        if form.drafts.get(&spec.path).is_some_and(|draft| draft.error.is_none()) {
            form.drafts.forget(&spec.path);
        }
    }
    tip(form, response, spec, error)
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

/// What is wrong and what the field is for, where the pointer rests; and for the card where the focus is.
pub fn tip(form: &mut Form, response: Response, spec: &Spec, error: Option<String>) -> Response {
    let about = || About { path: spec.path.clone(), name: spec.name.clone(), what: spec.help.to_owned() };
    if response.has_focus() {
        form.about = Some(about());
    }
    let says_something = error.is_some() || !spec.help.is_empty() || topic(&spec.path).is_some();
    if !says_something {
        return response;
    }
    let (palette, unit) = (form.palette, form.unit);
    response.on_hover_ui(|ui| card::tip(ui, palette, &about(), error.as_deref(), unit))
}

/// Steps the number in `text` by the arrow keys; true if it has been stepped.
fn step(ui: &Ui, id: Id, step: f64, text: &mut String, stepper: &Stepper) -> bool {
    if step == 0.0 || !ui.memory(|memory| memory.has_focus(id)) {
        return false;
    }
    let by: f64 = ui.input_mut(|input| {
        let mut pressed = |modifiers, key| input.count_and_consume_key(modifiers, key) as f64;
        // A key pressed with more modifiers also matches fewer, so the plain keys come last.
        STEPS
            .iter()
            .map(|(keys, size)| size * (pressed(*keys, Key::ArrowUp) - pressed(*keys, Key::ArrowDown)))
            .sum()
    });
    let Some(value) = (stepper.number)(text).filter(|_| by != 0.0) else { return false };
    *text = (stepper.shown)(rounded(value + by * step, step));
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
pub fn describe(response: &Response, spec: &Spec, error: Option<&str>, unit: LengthUnit) {
    response.ctx.accesskit_node_builder(response.id, |node| {
        node.set_label(spec.name.clone());
        match error {
            Some(error) => {
                node.set_invalid(accesskit::Invalid::True);
                node.set_description(error.to_owned());
            }
            None => {
                let help = card::in_words(&spec.path, spec.help, unit);
                if !help.is_empty() {
                    node.set_description(help);
                }
            }
        }
    });
}
