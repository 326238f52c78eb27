//! Examples written to files and streams.

use std::fs;

use super::{crestline, example, example_names};

#[test]
fn the_list_names_every_example_on_a_line_of_its_own() {
    let ran = crestline(&["example"], "");
    assert_eq!(ran.status, 0);
    let listed: Vec<_> = ran.out.lines().filter_map(|line| line.split_whitespace().next()).collect();
    assert_eq!(listed, example_names());
    assert!(ran.out.lines().all(|line| line.chars().count() <= 100), "{}", ran.out);
}

#[test]
fn an_example_is_written_as_it_is() {
    let folder = tempfile::tempdir().unwrap();
    for name in example_names() {
        assert_eq!(crestline(&["example", name], "").out, example(name));
        assert_eq!(crestline(&["example", name, "-o", "-"], "").out, example(name));
        let path = folder.path().join("plan.json");
        let ran = crestline(&["example", name, "-o", path.to_str().unwrap()], "");
        assert_eq!((ran.status, ran.out.as_str(), ran.err.as_str()), (0, "", ""));
        assert_eq!(fs::read_to_string(&path).unwrap(), example(name));
    }
    assert_eq!(fs::read_dir(folder.path()).unwrap().count(), 1, "nothing else is left in the folder");
}

#[test]
fn a_file_that_cannot_be_replaced_stays_as_it_was() {
    let folder = tempfile::tempdir().unwrap();
    let inside = folder.path().join("no/such/folder/plan.json");
    let ran = crestline(&["example", "mandolin", "-o", inside.to_str().unwrap()], "");
    assert_eq!(ran.status, 1);
    assert!(ran.err.contains("plan.json"), "{}", ran.err);
    let path = folder.path().join("kept.json");
    fs::write(&path, "kept").unwrap();
    let mut permissions = fs::metadata(&path).unwrap().permissions();
    permissions.set_readonly(true);
    fs::set_permissions(&path, permissions).unwrap();
    assert_eq!(crestline(&["example", "mandolin", "-o", path.to_str().unwrap()], "").status, 1);
    assert_eq!(fs::read_to_string(&path).unwrap(), "kept");
}

#[test]
fn an_unknown_example_is_answered_with_the_known_ones() {
    let ran = crestline(&["example", "steel_sx"], "");
    assert_eq!((ran.status, ran.out.as_str()), (2, ""));
    for name in example_names() {
        assert!(ran.err.contains(name), "{name} is offered");
    }
}
