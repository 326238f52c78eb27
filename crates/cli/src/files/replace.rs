//! Replacing a file whole or not at all.

use std::fs::{self, File, Metadata};
use std::io::{self, Write};
use std::path::{Path, PathBuf};

use tempfile::{Builder, NamedTempFile};

use crate::Failure;

/// Writes `bytes` to the file at `path`, which may exist: whoever reads it sees the old bytes or the new
/// ones, never part of them, even where the machine stops in between.
///
/// The new bytes go to a temporary file in the same folder, reach the disk, and take the old file's name
/// and permissions. A link is followed, so that it stays a link. What is no ordinary file (a pipe, a
/// device) is written to directly.
///
/// # Errors
/// [`Failure::Write`] with the system's reason: no such folder, no room, a file that may only be read.
pub fn replace(path: &Path, bytes: &[u8]) -> Result<(), Failure> {
    replace_raw(path, bytes).map_err(|source| Failure::Write { name: path.display().to_string(), source })
}

/// Whether two paths name one existing file.
#[must_use]
pub fn is_same_file(a: &Path, b: &Path) -> bool {
    matches!((a.canonicalize(), b.canonicalize()), (Ok(a), Ok(b)) if a == b)
}

fn replace_raw(path: &Path, bytes: &[u8]) -> io::Result<()> {
    let target = followed(path)?;
    let old = match fs::metadata(&target) {
        Ok(old) => Some(old),
        Err(error) if error.kind() == io::ErrorKind::NotFound => None,
        Err(error) => return Err(error),
    };
    match &old {
        Some(old) if old.is_dir() => Err(io::Error::from(io::ErrorKind::IsADirectory)),
        Some(old) if !old.is_file() => File::create(&target)?.write_all(bytes),
        Some(old) if old.permissions().readonly() => {
            Err(io::Error::new(io::ErrorKind::PermissionDenied, "the file may only be read"))
        }
        _ => replace_ordinary(&target, old.as_ref(), bytes),
    }
}

/// The file that a path means in the end. A link to nothing yet gives the place that it points to.
fn followed(path: &Path) -> io::Result<PathBuf> {
    /// As many links as common systems follow before they call it a circle.
    const MOST_LINKS: usize = 40;
    let mut target = path.to_owned();
    for _ in 0..MOST_LINKS {
        match fs::read_link(&target) {
            Ok(next) => target = folder_of(&target).join(next),
            Err(_) => return Ok(target),
        }
    }
    Err(io::Error::other("too many links"))
}

fn replace_ordinary(target: &Path, old: Option<&Metadata>, bytes: &[u8]) -> io::Result<()> {
    let folder = folder_of(target);
    let mut new = temporary_in(&folder)?;
    new.write_all(bytes)?;
    if let Some(old) = old {
        take_over_owner(&new, old);
        new.as_file().set_permissions(old.permissions())?;
    }
    new.as_file().sync_all()?;
    new.persist(target).map_err(|error| error.error)?;
    sync_folder(&folder)
}

/// The folder that holds a path, never empty.
fn folder_of(path: &Path) -> PathBuf {
    match path.parent() {
        Some(folder) if folder != Path::new("") => folder.to_owned(),
        _ => PathBuf::from("."),
    }
}

/// A temporary file that, once renamed, has the permissions of any newly made file.
fn temporary_in(folder: &Path) -> io::Result<NamedTempFile> {
    let mut builder = Builder::new();
    builder.prefix(".crestline-").suffix(".tmp");
    #[cfg(unix)]
    let open_to_all: fs::Permissions = std::os::unix::fs::PermissionsExt::from_mode(0o666);
    #[cfg(unix)]
    builder.permissions(open_to_all);
    builder.tempfile_in(folder)
}

/// Gives the new file the old one's owner where the user may do that; where not, the writer owns it, as with
/// any file that is made anew.
fn take_over_owner(new: &NamedTempFile, old: &Metadata) {
    #[cfg(unix)]
    {
        use std::os::unix::fs::{MetadataExt, fchown};
        let _ = fchown(new.as_file(), Some(old.uid()), Some(old.gid()));
    }
    #[cfg(not(unix))]
    let _ = (new, old);
}

/// Makes the new name itself reach the disk.
fn sync_folder(folder: &Path) -> io::Result<()> {
    #[cfg(unix)]
    File::open(folder)?.sync_all()?;
    #[cfg(not(unix))]
    let _ = folder;
    Ok(())
}

#[cfg(test)]
mod tests {
    #![allow(clippy::unwrap_used)]
    use super::*;

    #[test]
    fn a_new_file_appears_and_an_old_one_is_replaced() {
        let folder = tempfile::tempdir().unwrap();
        let path = folder.path().join("a.svg");
        replace(&path, b"first and longer").unwrap();
        replace(&path, b"second").unwrap();
        assert_eq!(fs::read(&path).unwrap(), b"second");
        assert_eq!(fs::read_dir(folder.path()).unwrap().count(), 1, "nothing temporary is left");
    }

    #[test]
    fn a_missing_folder_or_a_folder_as_target_is_refused() {
        let folder = tempfile::tempdir().unwrap();
        let failure = replace(&folder.path().join("none/a.svg"), b"x").unwrap_err();
        assert_eq!(failure.status(), crate::STATUS_FAILED);
        assert!(replace(folder.path(), b"x").is_err());
        assert_eq!(fs::read_dir(folder.path()).unwrap().count(), 0);
    }

    #[cfg(unix)]
    #[test]
    fn permissions_stay_and_a_read_only_file_is_left_alone() {
        use std::os::unix::fs::PermissionsExt;
        let folder = tempfile::tempdir().unwrap();
        let path = folder.path().join("a");
        replace(&path, b"old").unwrap();
        fs::set_permissions(&path, fs::Permissions::from_mode(0o640)).unwrap();
        replace(&path, b"new").unwrap();
        assert_eq!(fs::metadata(&path).unwrap().permissions().mode() & 0o777, 0o640);
        fs::set_permissions(&path, fs::Permissions::from_mode(0o440)).unwrap();
        assert!(replace(&path, b"newer").unwrap_err().to_string().contains("may only be read"));
        assert_eq!(fs::read(&path).unwrap(), b"new");
    }

    #[cfg(unix)]
    #[test]
    fn links_are_followed_and_stay_links() {
        let folder = tempfile::tempdir().unwrap();
        let (real, link) = (folder.path().join("real"), folder.path().join("link"));
        std::os::unix::fs::symlink("real", &link).unwrap();
        replace(&link, b"through the link").unwrap();
        assert_eq!(fs::read(&real).unwrap(), b"through the link");
        assert!(fs::symlink_metadata(&link).unwrap().is_symlink());
        assert!(is_same_file(&real, &link));
        let circle = folder.path().join("circle");
        std::os::unix::fs::symlink("circle", &circle).unwrap();
        assert!(replace(&circle, b"x").is_err());
    }
}
