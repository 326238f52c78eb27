//! Whether another program has changed the plan's file.

use std::fs;
use std::hash::{DefaultHasher, Hasher};
use std::path::{Path, PathBuf};
use std::time::SystemTime;

/// What a file looked like.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
struct Stamp {
    modified: Option<SystemTime>,
    length_bytes: u64,
    /// Told apart by chance only where two contents of 64 equal bits meet, about once in 10¹⁹.
    digest: u64,
}

/// What has become of a file.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Change {
    /// It holds something else.
    Differs,
    /// It is not there any more, or cannot be read.
    Gone,
}

/// A plan file and what it looked like when it was last read or written here.
#[derive(Debug)]
pub struct Watch {
    path: PathBuf,
    seen: Option<Stamp>,
}

impl Watch {
    /// Watches a file from now on.
    #[must_use]
    pub fn new(path: &Path) -> Self {
        Self { path: path.to_owned(), seen: stamp(path) }
    }

    /// What has changed since; asked again, it says the same until [`Watch::accept`].
    ///
    /// Length and time are looked at first, and the content only where they differ: a file that was merely
    /// touched is not a changed one. A change that keeps both, within the clock's step, is not seen.
    pub fn change(&mut self) -> Option<Change> {
        let seen = self.seen?;
        if let Ok(data) = fs::metadata(&self.path)
            && data.len() == seen.length_bytes
            && data.modified().ok() == seen.modified
        {
            return None;
        }
        match stamp(&self.path) {
            None => Some(Change::Gone),
            Some(now) if now.digest == seen.digest && now.length_bytes == seen.length_bytes => {
                self.seen = Some(now);
                None
            }
            Some(_) => Some(Change::Differs),
        }
    }

    /// Takes the file as it is now for seen.
    pub fn accept(&mut self) {
        self.seen = stamp(&self.path);
    }
}

fn stamp(path: &Path) -> Option<Stamp> {
    let data = fs::metadata(path).ok().filter(fs::Metadata::is_file)?;
    let bytes = fs::read(path).ok()?;
    let mut hasher = DefaultHasher::new();
    hasher.write(&bytes);
    Some(Stamp { modified: data.modified().ok(), length_bytes: bytes.len() as u64, digest: hasher.finish() })
}

#[cfg(test)]
mod tests {
    #![allow(clippy::unwrap_used)]
    use super::*;
    use std::time::Duration;

    fn touch(path: &Path, later_s: u64) {
        let file = fs::File::options().write(true).open(path).unwrap();
        file.set_modified(SystemTime::now() + Duration::from_secs(later_s)).unwrap();
    }

    #[test]
    fn a_change_is_told_until_it_is_accepted_and_a_touch_is_none() {
        let folder = tempfile::tempdir().unwrap();
        let path = folder.path().join("a");
        fs::write(&path, "one").unwrap();
        let mut watch = Watch::new(&path);
        assert_eq!(watch.change(), None);
        touch(&path, 5);
        assert_eq!(watch.change(), None, "the same content at another time");
        fs::write(&path, "two").unwrap();
        touch(&path, 9);
        assert_eq!(watch.change(), Some(Change::Differs));
        assert_eq!(watch.change(), Some(Change::Differs));
        watch.accept();
        assert_eq!(watch.change(), None);
        fs::remove_file(&path).unwrap();
        assert_eq!(watch.change(), Some(Change::Gone));
        watch.accept();
        assert_eq!(watch.change(), None, "a file that is not there is not looked for again");
    }
}
