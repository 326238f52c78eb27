//! Where things lie in the repository, and the files of a kind under a folder.

use std::fs;
use std::path::{Path, PathBuf};

/// The repository's top folder.
pub fn top() -> PathBuf {
    Path::new(env!("CARGO_MANIFEST_DIR"))
        .parent()
        .expect("the tests lie in a folder of the repository")
        .to_owned()
}

/// A file's text, or a failed test that names the file.
pub fn text_of(path: &Path) -> String {
    fs::read_to_string(path).unwrap_or_else(|error| panic!("{}: {error}", path.display()))
}

/// All files with an ending under a folder, built ones left out, in the order of their names.
pub fn files_under(folder: &Path, ending: &str) -> Vec<PathBuf> {
    let mut found = Vec::new();
    let mut folders = vec![folder.to_owned()];
    while let Some(folder) = folders.pop() {
        for entry in fs::read_dir(&folder).unwrap_or_else(|error| panic!("{}: {error}", folder.display())) {
            let path = entry.expect("a folder's entry can be read").path();
            if path.is_dir() && path.file_name().is_some_and(|name| name != "target") {
                folders.push(path);
            } else if path.extension().is_some_and(|found| found == ending) {
                found.push(path);
            }
        }
    }
    found.sort();
    found
}

/// Compares a kept page of documentation with what it should say; with `CRESTLINE_WRITE` set, writes it instead.
#[track_caller]
pub fn assert_page(place: &str, text: &str) {
    let path = top().join(place);
    if std::env::var_os("CRESTLINE_WRITE").is_some() {
        fs::create_dir_all(path.parent().expect("a page lies in a folder")).expect("the folder can be made");
        fs::write(&path, text).expect("the page can be written");
    }
    let kept = text_of(&path);
    let mut lines = text.lines().zip(kept.lines());
    if let Some((line, old)) = lines.find(|(line, old)| line != old) {
        panic!(
            "{place} is out of date; it says\n{old}\nand should say\n{line}\nSet CRESTLINE_WRITE=1 to write it."
        );
    }
    assert_eq!(text.lines().count(), kept.lines().count(), "{place} is out of date in its length");
}
