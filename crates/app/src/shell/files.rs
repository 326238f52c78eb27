//! Plan files in and out, and the drawing out; the command line's file functions do the work.

use std::path::{Path, PathBuf};

use crestline_cli::files::{read_plan_text, replace};
use crestline_plan::Plan;

/// Ending of plan files that are read.
pub const PLAN_ENDING: &str = "json";
/// Ending of plan files that are written first here; the desktop knows plans by it.
pub const NEW_PLAN_ENDING: &str = "crestline.json";

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

/// A name for a new file, made of the plan's file name or its title; for a plan that has a file, that file itself.
#[must_use]
pub fn suggested(plan_path: Option<&Path>, title: &str, ending: &str) -> PathBuf {
    if let Some(path) = plan_path {
        return if ending == NEW_PLAN_ENDING { path.to_owned() } else { beside(path, ending) };
    }
    let plain: String =
        title.chars().map(|c| if c.is_alphanumeric() { c.to_ascii_lowercase() } else { '-' }).collect();
    let stem = plain.split('-').filter(|part| !part.is_empty()).collect::<Vec<_>>().join("-");
    let stem: String = stem.chars().take(60).collect();
    PathBuf::from(if stem.is_empty() { "plan".to_owned() } else { stem }).with_extension(ending)
}

/// The plan's path with another ending in place of its own, which may have two parts.
fn beside(path: &Path, ending: &str) -> PathBuf {
    let name = path.file_name().map(|name| name.to_string_lossy().into_owned()).unwrap_or_default();
    match name.strip_suffix(&format!(".{NEW_PLAN_ENDING}")) {
        Some(stem) if !stem.is_empty() => path.with_file_name(format!("{stem}.{ending}")),
        _ => path.with_extension(ending),
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn names_are_made_of_the_title() {
        assert_eq!(
            suggested(None, "Small guitar, No. 3", NEW_PLAN_ENDING),
            PathBuf::from("small-guitar-no-3.crestline.json")
        );
        assert_eq!(suggested(None, "../..", "svg"), PathBuf::from("plan.svg"));
        assert_eq!(suggested(Some(Path::new("/a/b.json")), "x", "svg"), PathBuf::from("/a/b.svg"));
        let plan = Path::new("/a/no.3.crestline.json");
        assert_eq!(suggested(Some(plan), "x", "svg"), PathBuf::from("/a/no.3.svg"));
        assert_eq!(suggested(Some(plan), "x", NEW_PLAN_ENDING), plan);
        assert_eq!(suggested(Some(Path::new("/a/b.json")), "x", NEW_PLAN_ENDING), PathBuf::from("/a/b.json"));
    }

    #[test]
    fn an_ending_is_added_only_where_there_is_none() {
        assert_eq!(with_ending(PathBuf::from("a"), "json"), PathBuf::from("a.json"));
        assert_eq!(with_ending(PathBuf::from("a"), NEW_PLAN_ENDING), PathBuf::from("a.crestline.json"));
        assert_eq!(with_ending(PathBuf::from("a.txt"), "json"), PathBuf::from("a.txt"));
    }
}
