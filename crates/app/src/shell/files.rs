//! Plan files in and out, and the drawing out; the command line's file functions do the work.

use std::path::{Path, PathBuf};

use crestline_cli::files::{read_plan_text, replace};
use crestline_plan::Plan;

/// Ending of plan files.
pub const PLAN_ENDING: &str = "json";

/// Reads a plan file. A plan with values out of range is read as well: its fields are then marked.
///
/// # Errors
/// Words for the user: the file cannot be read, or it is not a plan.
pub fn open(path: &Path) -> Result<Plan, String> {
    let text = read_plan_text(path).map_err(|failure| failure.to_string())?;
    crestline_plan::read_draft(&text).map_err(|faults| {
        let first = faults.first().map(ToString::to_string).unwrap_or_default();
        let more = match faults.len() {
            0 | 1 => String::new(),
            n => format!(" (and {} more)", n - 1),
        };
        format!("{} is not a plan that can be opened. {first}{more}", path.display())
    })
}

/// Writes a plan file, whole or not at all.
///
/// # Errors
/// Words for the user.
pub fn save(path: &Path, plan: &Plan) -> Result<(), String> {
    replace(path, crestline_plan::write(plan).as_bytes()).map_err(|failure| failure.to_string())
}

/// Writes a file, whole or not at all.
///
/// # Errors
/// Words for the user.
pub fn write(path: &Path, bytes: &[u8]) -> Result<(), String> {
    replace(path, bytes).map_err(|failure| failure.to_string())
}

/// The path with `ending`, where it has no ending at all.
#[must_use]
pub fn with_ending(path: PathBuf, ending: &str) -> PathBuf {
    if path.extension().is_some() { path } else { path.with_extension(ending) }
}

/// A name for a new file beside the plan, made of the plan's file name or its title.
#[must_use]
pub fn suggested(plan_path: Option<&Path>, title: &str, ending: &str) -> PathBuf {
    if let Some(path) = plan_path {
        return path.with_extension(ending);
    }
    let plain: String =
        title.chars().map(|c| if c.is_alphanumeric() { c.to_ascii_lowercase() } else { '-' }).collect();
    let stem = plain.split('-').filter(|part| !part.is_empty()).collect::<Vec<_>>().join("-");
    let stem: String = stem.chars().take(60).collect();
    PathBuf::from(if stem.is_empty() { "plan".to_owned() } else { stem }).with_extension(ending)
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn names_are_made_of_the_title() {
        assert_eq!(suggested(None, "Small guitar, No. 3", "json"), PathBuf::from("small-guitar-no-3.json"));
        assert_eq!(suggested(None, "../..", "svg"), PathBuf::from("plan.svg"));
        assert_eq!(suggested(Some(Path::new("/a/b.json")), "x", "svg"), PathBuf::from("/a/b.svg"));
    }

    #[test]
    fn an_ending_is_added_only_where_there_is_none() {
        assert_eq!(with_ending(PathBuf::from("a"), "json"), PathBuf::from("a.json"));
        assert_eq!(with_ending(PathBuf::from("a.txt"), "json"), PathBuf::from("a.txt"));
    }
}
