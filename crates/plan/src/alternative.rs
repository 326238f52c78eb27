//! Other sets of strings and other tunings that one saddle must suit.

use serde::Serialize;

use crate::{Pitch, Plan, PlanString};

/// Another set of strings, or another tuning of the plan's own, that the same saddle and nut must suit. Key
/// `alternatives` of the file.
///
/// With alternatives the setbacks are those that suit all sets together: least squares makes the weighted sum of the
/// squared errors of all sets small, the plan's own strings with the weight [`Plan::strings_weight`]; `twelfth` that of
/// their octaves; the smallest largest error is that of all sets, whatever their weights. Every set's errors count
/// from its own open strings, which are at pitch.
///
/// ```
/// use crestline_plan::{Alternative, Fault, OtherStrings, Pitch, check, example, read, solve};
///
/// let mut plan = read(example("steel_six").map_or("", |example| example.text))?;
/// let alone = solve(&check(&plan)?)?.report;
/// // The sixth string a tone lower; the others as they are.
/// let mut pitches = vec![None; 6];
/// pitches[5] = Some(Pitch::Note("D2".to_owned()));
/// plan.alternatives = vec![Alternative::new("Dropped sixth", OtherStrings::Pitches(pitches))];
/// let both = solve(&check(&plan)?)?.report;
/// let [planned, dropped] = &both.alternatives[..] else { panic!("two sets") };
/// // The slack string wants its crest farther back, and the one crest goes between.
/// let place = both.strings[5].ideal.saddle_setback_mm;
/// assert!(planned.strings[5].ideal.saddle_setback_mm < place);
/// assert!(place < dropped.strings[5].ideal.saddle_setback_mm);
/// assert_eq!(planned.strings[5].ideal, alone.strings[5].ideal);
/// # Ok::<(), Vec<Fault>>(())
/// ```
#[derive(Debug, Clone, PartialEq, Serialize)]
pub struct Alternative {
    /// Its name, which no other alternative has.
    pub name: String,
    /// What its squared errors count against those of the other sets, 0.01 to 100.
    pub weight: f64,
    /// What is other about it.
    #[serde(flatten)]
    pub other: OtherStrings,
}

/// What is other about an alternative.
#[derive(Debug, Clone, PartialEq, Serialize)]
#[serde(rename_all = "snake_case")]
pub enum OtherStrings {
    /// A whole set of strings, as many as the plan has, string 1 first.
    Strings(Vec<PlanString>),
    /// The plan's own strings at other pitches, one a string, string 1 first; where there is none the string keeps its
    /// own.
    Pitches(Vec<Option<Pitch>>),
}

impl Alternative {
    /// An alternative that counts as much as the plan's own strings do where the plan says nothing.
    #[must_use]
    pub fn new(name: &str, other: OtherStrings) -> Self {
        Self { name: name.to_owned(), weight: crate::defaults::ALTERNATIVE_WEIGHT, other }
    }

    /// The path in the plan file of what a path names in a plan with this set for its own strings, this being the
    /// alternative of this index; nothing for what does not belong to this set.
    pub(crate) fn outer_path(&self, index: usize, path: &str) -> Option<String> {
        let (string, field) = path.strip_prefix("strings[")?.split_once(']')?;
        match &self.other {
            OtherStrings::Strings(_) => Some(format!("alternatives[{index}].{path}")),
            OtherStrings::Pitches(pitches) => {
                pitches.get(string.parse::<usize>().ok()?)?.as_ref()?;
                let field = field.strip_prefix(".pitch").unwrap_or_default();
                Some(format!("alternatives[{index}].pitches[{string}]{field}"))
            }
        }
    }

    /// The other way round: what a path of the plan file names in a plan with this set for its own strings.
    pub(crate) fn inner_path(index: usize, path: &str) -> Option<String> {
        let rest = path.strip_prefix(&format!("alternatives[{index}]"))?;
        if let Some((string, field)) = rest.strip_prefix(".pitches[").and_then(|rest| rest.split_once(']')) {
            return Some(format!("strings[{string}].pitch{field}"));
        }
        match rest {
            "" | ".pitches" => Some("strings".to_owned()),
            _ => rest.strip_prefix('.').filter(|rest| rest.starts_with("strings")).map(str::to_owned),
        }
    }
}

impl Plan {
    /// This plan with an alternative's strings for its own, and without alternatives, a built saddle and readings,
    /// which belong to the plan's own strings.
    #[must_use]
    pub fn with_alternative(&self, alternative: &Alternative) -> Self {
        let mut plan = Self {
            title: alternative.name.clone(),
            alternatives: vec![],
            strings_weight: crate::defaults::ALTERNATIVE_WEIGHT,
            as_built: None,
            readings: vec![],
            ..self.clone()
        };
        match &alternative.other {
            OtherStrings::Strings(strings) => plan.strings.clone_from(strings),
            OtherStrings::Pitches(pitches) => {
                for (string, pitch) in plan.strings.iter_mut().zip(pitches) {
                    if let Some(pitch) = pitch {
                        string.pitch = pitch.clone();
                    }
                }
            }
        }
        plan
    }
}

/// Whether a weight is the one that goes without saying.
pub(crate) fn is_usual_weight(weight: &f64) -> bool {
    *weight == crate::defaults::ALTERNATIVE_WEIGHT
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn paths_lead_out_of_a_set_and_back_into_it() {
        let strings = Alternative::new("a", OtherStrings::Strings(vec![]));
        let pitches = Alternative::new("b", OtherStrings::Pitches(vec![None, Some(Pitch::FrequencyHz(1.0))]));
        for (alternative, inner, outer) in [
            (&strings, "strings[3].core.diameter_mm", "alternatives[2].strings[3].core.diameter_mm"),
            (&pitches, "strings[1].pitch.note", "alternatives[2].pitches[1].note"),
            (&pitches, "strings[1].pitch", "alternatives[2].pitches[1]"),
        ] {
            assert_eq!(alternative.outer_path(2, inner).as_deref(), Some(outer));
            assert_eq!(Alternative::inner_path(2, outer).as_deref(), Some(inner));
        }
        assert_eq!(pitches.outer_path(2, "strings[1]").as_deref(), Some("alternatives[2].pitches[1]"));
        // The first string keeps its pitch: what is wrong with it is wrong with the plan's own.
        assert_eq!(pitches.outer_path(2, "strings[0].pitch"), None);
        assert_eq!(strings.outer_path(2, "instrument.frets"), None);
        assert_eq!(Alternative::inner_path(2, "alternatives[2]").as_deref(), Some("strings"));
        assert_eq!(Alternative::inner_path(2, "alternatives[2].name"), None);
        assert_eq!(Alternative::inner_path(2, "alternatives[20].strings[0]"), None);
    }
}
