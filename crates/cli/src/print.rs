//! Writing to the streams.

use std::io::Write;
use std::path::Path;

use crestline_plan::{Notice, Severity};
use serde::Serialize;

use crate::arguments::is_standard;
use crate::text::safe;
use crate::{Failure, Streams, files};

/// Writes the result of a command to standard output.
pub(crate) fn result(streams: &mut Streams<'_>, bytes: &[u8]) -> Result<(), Failure> {
    streams.output.write_all(bytes).and_then(|()| streams.output.flush()).map_err(Failure::of_output)
}

/// Writes the result of a command to a file, or to standard output for `-`.
pub(crate) fn result_to(streams: &mut Streams<'_>, path: &Path, bytes: &[u8]) -> Result<(), Failure> {
    if is_standard(path) { result(streams, bytes) } else { files::replace(path, bytes) }
}

/// Writes a result as indented JSON with a line end.
pub(crate) fn json(streams: &mut Streams<'_>, value: &impl Serialize) -> Result<(), Failure> {
    let mut text = serde_json::to_string_pretty(value).map_err(|error| Failure::Output(error.to_string()))?;
    text.push('\n');
    result(streams, text.as_bytes())
}

/// Writes a line to standard error. Where even that fails there is nobody left to tell.
pub(crate) fn message(messages: &mut dyn Write, line: &str) {
    let _ = writeln!(messages, "{line}");
}

/// Writes a solution's notices to standard error.
pub(crate) fn notices(streams: &mut Streams<'_>, notices: &[Notice]) {
    for notice in notices {
        message(streams.messages, &format!("crestline: {}", notice_line(notice)));
    }
}

/// A notice in words: how much it matters, the field, the text.
pub(crate) fn notice_line(notice: &Notice) -> String {
    let severity = match notice.severity {
        Severity::Note => "note",
        Severity::Warning => "warning",
    };
    if notice.path.is_empty() {
        format!("{severity}: {}", safe(&notice.text))
    } else {
        format!("{severity}: {}: {}", safe(&notice.path), safe(&notice.text))
    }
}
