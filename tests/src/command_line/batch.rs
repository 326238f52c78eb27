//! Many plans solved by one command.

use std::io::ErrorKind;
use std::path::Path;

use serde_json::Value;

use super::{Failing, crestline, example, example_names, finished};

/// Writes plans into a folder and gives their paths.
fn plans_in(folder: &Path, plans: &[&str]) -> Vec<String> {
    let named = plans.iter().enumerate().map(|(index, text)| {
        let path = folder.join(format!("{index:03}.json"));
        std::fs::write(&path, text).unwrap();
        path.to_str().unwrap().to_owned()
    });
    named.collect()
}

fn solve<'a>(options: &[&'a str], paths: &'a [String]) -> Vec<&'a str> {
    let options = std::iter::once("solve").chain(options.iter().copied());
    options.chain(paths.iter().map(String::as_str)).collect()
}

fn lines(text: &str) -> Vec<Value> {
    text.lines().map(|line| serde_json::from_str(line).expect("every line is JSON")).collect()
}

#[test]
fn every_plan_gives_the_report_that_it_gives_alone_in_the_order_of_the_arguments() {
    let folder = tempfile::tempdir().unwrap();
    let examples: Vec<&str> = example_names().into_iter().map(example).collect();
    // More plans than are worked on at once, so that the order holds across batches too.
    let plans: Vec<&str> = examples.iter().copied().cycle().take(300).collect();
    let paths = plans_in(folder.path(), &plans);
    let ran = crestline(&solve(&["--json"], &paths), "");
    assert_eq!((ran.status, ran.err.as_str()), (0, ""));
    let printed = lines(&ran.out);
    assert_eq!(printed.len(), plans.len());
    let alone: Vec<Value> = examples
        .iter()
        .map(|plan| serde_json::from_str(&crestline(&["solve", "--json", "-"], plan).out).unwrap())
        .collect();
    for (index, line) in printed.iter().enumerate() {
        assert_eq!(line["plan"], paths[index].as_str());
        assert_eq!(line["report"], alone[index % examples.len()], "plan {index}");
    }
}

#[test]
fn a_faulty_plan_is_reported_in_its_place_and_does_not_stop_the_rest() {
    let folder = tempfile::tempdir().unwrap();
    let good = example("bass_four");
    let mut wrong: Value = serde_json::from_str(good).unwrap();
    wrong["strings"][1]["core"]["diameter_mm"] = (-1.0).into();
    let paths = plans_in(folder.path(), &[good, &wrong.to_string(), "no plan", good]);
    let ran = crestline(&solve(&["--json"], &paths), "");
    assert_eq!(ran.status, 2);
    let printed = lines(&ran.out);
    assert_eq!(printed.len(), 4);
    assert!(printed[0]["report"].is_object() && printed[3]["report"].is_object());
    assert_eq!(printed[1]["faults"][0]["path"], "strings[1].core.diameter_mm");
    assert!(printed[2]["faults"][0]["found"].is_string());
    assert!(ran.err.contains(&paths[1]) && ran.err.contains(&paths[2]) && !ran.err.contains(&paths[3]));
    assert!(ran.err.contains("2 of 4 plans"), "{}", ran.err);
}

#[test]
fn a_plan_that_cannot_be_read_makes_the_status_one_whatever_else_is_refused() {
    let folder = tempfile::tempdir().unwrap();
    let mut paths = plans_in(folder.path(), &["no plan", example("mandolin"), "no plan either"]);
    paths.insert(1, folder.path().join("missing.json").to_str().unwrap().to_owned());
    let ran = crestline(&solve(&["--lines"], &paths), "");
    assert_eq!(ran.status, 1);
    let printed = lines(&ran.out);
    assert!(printed[1]["error"].as_str().is_some_and(|error| error.contains("missing.json")));
    assert!(printed[2]["report"].is_object());
}

#[test]
fn standard_input_may_be_one_of_the_plans_and_one_plan_may_be_a_line() {
    let folder = tempfile::tempdir().unwrap();
    let mut paths = plans_in(folder.path(), &[example("bass_four")]);
    paths.push("-".to_owned());
    let ran = crestline(&solve(&["--json"], &paths), example("mandolin"));
    assert_eq!(ran.status, 0);
    assert_eq!(lines(&ran.out)[1]["report"]["strings"].as_array().map(Vec::len), Some(8));
    let one = crestline(&["solve", "--lines", "-"], example("mandolin"));
    assert_eq!(lines(&one.out)[0]["report"], lines(&ran.out)[1]["report"]);
    assert_eq!(lines(&one.out)[0]["plan"], "standard input");
}

#[test]
fn tables_of_several_plans_stand_under_their_names() {
    let folder = tempfile::tempdir().unwrap();
    let paths = plans_in(folder.path(), &[example("bass_four"), "{}", example("mandolin")]);
    let ran = crestline(&solve(&["--frets"], &paths), "");
    assert_eq!(ran.status, 2);
    let alone = crestline(&["solve", "--frets", &paths[2]], "").out;
    assert!(ran.out.contains(&format!("{}\n\n{alone}", paths[2])));
    assert!(!ran.out.contains(&paths[1]) && ran.err.contains(&paths[1]));
}

#[test]
fn a_reader_that_has_gone_ends_the_whole_list() {
    let folder = tempfile::tempdir().unwrap();
    let paths = plans_in(folder.path(), &["no plan", example("mandolin")]);
    let mut err = Vec::new();
    let status = finished(&solve(&["--lines"], &paths), "", &mut Failing(ErrorKind::BrokenPipe), &mut err);
    assert_eq!((status, err.len()), (1, 0), "nobody reads, so nothing is said");
}
