//! Reading a plan's text, with plain words for what is not one.

use std::fs::File;
use std::io::Read;
use std::path::Path;

use crate::Failure;

/// The largest plan that is read, 16 MiB. A plan of sixteen strings takes a few tens of kilobytes, so
/// anything near this size is another file given by mistake.
pub const LARGEST_PLAN_BYTES: u64 = 16 * 1024 * 1024;

/// Reads the text of a plan file.
///
/// # Errors
/// [`Failure::Read`] where the file cannot be read, [`Failure::NotAPlan`] as [`plan_text`] says.
pub fn read_plan_text(path: &Path) -> Result<String, Failure> {
    let name = path.display().to_string();
    let mut file = File::open(path).map_err(|source| Failure::Read { name: name.clone(), source })?;
    plan_text(&name, &mut file)
}

/// Reads the text of a plan from an open source; `name` stands in messages. A byte order mark of UTF-8 is
/// taken off.
///
/// # Errors
/// [`Failure::Read`] where the source fails, [`Failure::NotAPlan`] where it is larger than
/// [`LARGEST_PLAN_BYTES`] or not UTF-8.
pub fn plan_text(name: &str, source: &mut dyn Read) -> Result<String, Failure> {
    let mut bytes = Vec::new();
    let mut limited = source.take(LARGEST_PLAN_BYTES + 1);
    limited.read_to_end(&mut bytes).map_err(|source| Failure::Read { name: name.to_owned(), source })?;
    decoded(bytes).map_err(|reason| Failure::NotAPlan { name: name.to_owned(), reason })
}

/// The bytes as text, or what they are instead.
fn decoded(bytes: Vec<u8>) -> Result<String, String> {
    if bytes.len() as u64 > LARGEST_PLAN_BYTES {
        return Err(format!("larger than {} MiB; that is no plan file", LARGEST_PLAN_BYTES / (1024 * 1024)));
    }
    if bytes.starts_with(&[0xff, 0xfe]) || bytes.starts_with(&[0xfe, 0xff]) {
        return Err("text in UTF-16; save it as UTF-8".to_owned());
    }
    let text = String::from_utf8(bytes).map_err(|error| {
        let place = error.utf8_error().valid_up_to();
        format!("not UTF-8 text, from byte {} on; save it as UTF-8", place + 1)
    })?;
    Ok(text.strip_prefix('\u{feff}').map(str::to_owned).unwrap_or(text))
}

#[cfg(test)]
mod tests {
    #![allow(clippy::unwrap_used)]
    use super::*;

    fn read(bytes: &[u8]) -> Result<String, String> {
        plan_text("p", &mut &bytes[..]).map_err(|failure| failure.to_string())
    }

    #[test]
    fn a_byte_order_mark_is_taken_off() {
        assert_eq!(read("\u{feff}{}".as_bytes()).unwrap(), "{}");
        assert_eq!(read("{\"a\": \"♯\"}".as_bytes()).unwrap(), "{\"a\": \"♯\"}");
    }

    #[test]
    fn other_encodings_are_named() {
        assert!(read(b"\xff\xfe{\0}\0").unwrap_err().contains("UTF-16"));
        assert!(read(b"{\"title\": \"R\xe9\"}").unwrap_err().contains("from byte 13 on"));
    }

    #[test]
    fn a_file_without_end_is_not_read_to_its_end() {
        let failure = plan_text("endless", &mut std::io::repeat(b' ')).unwrap_err();
        assert!(failure.to_string().contains("larger than 16 MiB"));
        assert_eq!(failure.status(), crate::STATUS_REFUSED);
    }

    #[test]
    fn the_largest_plan_is_still_read() {
        let mut spaces = std::io::repeat(b' ').take(LARGEST_PLAN_BYTES);
        assert_eq!(plan_text("p", &mut spaces).unwrap().len() as u64, LARGEST_PLAN_BYTES);
    }
}
