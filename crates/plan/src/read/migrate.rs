//! Versions of the plan file: newer ones are refused by name, older ones brought up to date step by step.

use super::node::Node;
use crate::{Fault, VERSION};

type Entries = Vec<(String, Node)>;

/// `STEPS[k]` rewrites a file of version k + 1 as one of version k + 2.
const STEPS: &[fn(&mut Entries)] = &[];

const _: () = assert!(STEPS.len() as u64 + 1 == VERSION, "every older version needs its step");

/// Rewrites the entries of an older file in place. A version that is missing or no version is left for the reader
/// to name.
///
/// # Errors
/// A version newer than this program reads.
pub(super) fn bring_up_to_date(entries: &mut Entries) -> Result<(), Fault> {
    run_steps(entries, STEPS)
}

/// What a version may be, for messages.
pub(super) fn version_words() -> String {
    if VERSION == 1 { "1".to_owned() } else { format!("a whole number, 1 to {VERSION}") }
}

fn run_steps(entries: &mut Entries, steps: &[fn(&mut Entries)]) -> Result<(), Fault> {
    let newest = steps.len() + 1;
    let Some(Node::Number(version)) =
        entries.iter().find(|(key, _)| key == "version").map(|(_, value)| value)
    else {
        return Ok(());
    };
    let version = *version;
    if version > newest as f64 {
        let found = format!("version {version}, which is newer than this program reads ({newest})");
        return Err(Fault::new("version", found, version_words()));
    }
    if version < 1.0 || version.fract() != 0.0 {
        return Ok(());
    }
    // Whole and from 1 to the number of steps + 1 by now, so the cast is exact.
    for step in steps.iter().skip(version as usize - 1) {
        step(entries);
    }
    if let Some((_, version)) = entries.iter_mut().find(|(key, _)| key == "version") {
        *version = Node::Number(newest as f64);
    }
    Ok(())
}

#[cfg(test)]
mod tests {
    #![allow(clippy::unwrap_used)]
    use super::*;

    fn file(version: f64) -> Entries {
        vec![("version".to_owned(), Node::Number(version))]
    }

    #[test]
    fn an_older_file_goes_through_the_steps_that_it_lacks() {
        let steps: &[fn(&mut Entries)] = &[
            |entries| entries.push(("two".to_owned(), Node::Null)),
            |entries| entries.push(("three".to_owned(), Node::Null)),
        ];
        for (version, keys) in
            [(1.0, vec!["version", "two", "three"]), (2.0, vec!["version", "three"]), (3.0, vec!["version"])]
        {
            let mut entries = file(version);
            run_steps(&mut entries, steps).unwrap();
            assert_eq!(entries.iter().map(|(key, _)| key.as_str()).collect::<Vec<_>>(), keys);
            assert_eq!(entries[0].1, Node::Number(3.0));
        }
    }

    #[test]
    fn a_newer_file_is_refused_by_name_and_no_version_is_left_alone() {
        let fault = run_steps(&mut file(3.0), &[]).unwrap_err();
        assert_eq!(fault.path, "version");
        assert_eq!(fault.found, "version 3, which is newer than this program reads (1)");
        for odd in [0.0, -1.0, 0.5] {
            let mut entries = file(odd);
            run_steps(&mut entries, &[]).unwrap();
            assert_eq!(entries, file(odd));
        }
    }
}
