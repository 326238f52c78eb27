//! The folder in which the window keeps what belongs to the user and not to a plan.

use std::path::{Path, PathBuf};

/// The variable that names the folder; tests set it, and so may whoever wants it elsewhere.
pub const VARIABLE: &str = "CRESTLINE_STATE";

/// The user's state folder, found through `variable`, which looks a name up in the environment; it need not
/// exist yet. None where the system names no place for it.
///
/// On Linux it is where the XDG Base Directory Specification 0.8 puts state; the places on the other systems
/// are their makers' common practice.
pub fn state_folder(variable: impl Fn(&str) -> Option<String>) -> Option<PathBuf> {
    let absolute = |name: &str| variable(name).map(PathBuf::from).filter(|path| path.is_absolute());
    if let Some(folder) = absolute(VARIABLE) {
        return Some(folder);
    }
    let usual = if cfg!(windows) {
        absolute("LOCALAPPDATA")
    } else if cfg!(target_os = "macos") {
        absolute("HOME").map(|home| home.join("Library/Application Support"))
    } else {
        absolute("XDG_STATE_HOME").or_else(|| absolute("HOME").map(|home| home.join(".local/state")))
    };
    usual.map(|folder| folder.join("crestline"))
}

/// Replaces a file of the state folder, which is made if need be.
///
/// # Errors
/// Words for the user.
pub fn write(path: &Path, text: &str) -> Result<(), String> {
    if let Some(folder) = path.parent() {
        std::fs::create_dir_all(folder)
            .map_err(|error| format!("cannot make the folder {}: {error}", folder.display()))?;
    }
    crestline_cli::files::replace(path, text.as_bytes()).map_err(|failure| failure.to_string())
}

/// The text of a file of the state folder; none where it is missing, too large, or no text.
#[must_use]
pub fn text(path: &Path) -> Option<String> {
    crestline_cli::files::read_plan_text(path).ok()
}

#[cfg(test)]
mod tests {
    use super::*;

    fn found(set: &[(&str, &str)]) -> Option<PathBuf> {
        let value = |name: &str| set.iter().find(|(n, _)| *n == name).map(|(_, value)| (*value).to_owned());
        state_folder(value)
    }

    #[test]
    fn the_variable_of_ours_comes_first_and_a_relative_folder_is_passed_over() {
        assert_eq!(found(&[(VARIABLE, "/a"), ("HOME", "/h")]), Some(PathBuf::from("/a")));
        assert_eq!(found(&[(VARIABLE, "a")]), None);
        assert_eq!(found(&[]), None);
    }

    #[cfg(all(unix, not(target_os = "macos")))]
    #[test]
    fn the_places_are_those_of_the_base_directory_specification() {
        assert_eq!(found(&[("XDG_STATE_HOME", "/s"), ("HOME", "/h")]), Some(PathBuf::from("/s/crestline")));
        assert_eq!(found(&[("HOME", "/h")]), Some(PathBuf::from("/h/.local/state/crestline")));
        // The specification: a relative path is invalid and is to be ignored.
        assert_eq!(
            found(&[("XDG_STATE_HOME", "s"), ("HOME", "/h")]),
            Some(PathBuf::from("/h/.local/state/crestline"))
        );
    }
}
