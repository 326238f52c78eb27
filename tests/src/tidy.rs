//! The walls between the crates, and the habits that a machine can hold.

use std::collections::BTreeSet;
use std::fs;
use std::path::{Path, PathBuf};
use std::process::Command;

use crate::places::{files_under, text_of, top};

/// The longest file of Rust: beyond it nobody keeps the whole in mind.
const MOST_LINES: usize = 600;

/// Everything of this workspace.
const OURS: [&str; 6] = [
    "crestline-physics",
    "crestline-drawing",
    "crestline-plan",
    "crestline-sheets",
    "crestline-cli",
    "crestline",
];

/// A crate, those of ours that it may stand on, and what else it must not pull in.
struct Wall {
    package: &'static str,
    may_use: &'static [&'static str],
    never: &'static [&'static str],
}

const WINDOW: &[&str] = &["egui", "eframe", "egui_plot", "winit", "rfd"];

const WALLS: [Wall; 5] = [
    Wall {
        package: "crestline-physics",
        may_use: &[],
        never: &["serde", "serde_json", "clap", "tempfile", "egui", "eframe", "egui_plot", "winit", "rfd"],
    },
    Wall { package: "crestline-drawing", may_use: &[], never: WINDOW },
    Wall { package: "crestline-plan", may_use: &["crestline-physics"], never: WINDOW },
    Wall {
        package: "crestline-sheets",
        may_use: &["crestline-plan", "crestline-drawing", "crestline-physics"],
        never: WINDOW,
    },
    Wall {
        package: "crestline-cli",
        may_use: &["crestline-plan", "crestline-drawing", "crestline-sheets", "crestline-physics"],
        never: WINDOW,
    },
];

/// The names of all packages that a package is built from, itself left out.
fn built_from(package: &str, more: &[&str]) -> BTreeSet<String> {
    let cargo = std::env::var_os("CARGO").unwrap_or_else(|| "cargo".into());
    let output = Command::new(cargo)
        .current_dir(top())
        .args(["tree", "--locked", "--offline", "-e", "normal", "--prefix", "none", "-p", package])
        .args(more)
        .output()
        .expect("cargo can be started");
    assert!(output.status.success(), "cargo tree: {}", String::from_utf8_lossy(&output.stderr));
    let text = String::from_utf8(output.stdout).expect("cargo prints UTF-8");
    let names = text.lines().filter_map(|line| line.split_whitespace().next());
    names.filter(|&name| name != package).map(str::to_owned).collect()
}

#[test]
fn each_crate_stands_only_on_what_its_wall_allows() {
    for wall in &WALLS {
        let used = built_from(wall.package, &[]);
        assert!(!used.is_empty(), "{} is built from nothing at all, so nothing was looked at", wall.package);
        for ours in OURS {
            let allowed = ours == wall.package || wall.may_use.contains(&ours);
            assert!(allowed || !used.contains(ours), "{} must not use {ours}", wall.package);
        }
        for &never in wall.never {
            assert!(!used.contains(never), "{} must not use {never}", wall.package);
        }
    }
}

#[test]
fn the_sheets_and_the_window_ask_the_plan_and_not_the_physics() {
    for package in ["crestline-sheets", "crestline-cli", "crestline"] {
        let used = built_from(package, &["--depth", "1"]);
        assert!(used.contains("crestline-plan"), "{package} asks the plan");
        assert!(!used.contains("crestline-physics"), "{package} must not call the physics itself");
    }
}

/// The code of a file without its tests, which stand last.
fn without_tests(text: &str) -> &str {
    text.split("#[cfg(test)]").next().unwrap_or(text)
}

#[test]
fn the_core_reads_no_file_clock_or_environment_and_prints_nothing() {
    let outside = [
        "std::fs",
        "std::env",
        "std::time",
        "std::thread",
        "std::process",
        "std::net",
        "print!(",
        "println!(",
    ];
    let mut seen = 0;
    for name in ["physics", "drawing", "plan", "sheets"] {
        let mut paths = files_under(&top().join("crates").join(name).join("src"), "rs");
        // Files of tests alone may print what they measured.
        paths.retain(|path| !path.ends_with("tests.rs"));
        for path in paths {
            let text = text_of(&path);
            for word in outside {
                assert!(!without_tests(&text).contains(word), "{} must not use {word}", path.display());
            }
            seen += 1;
        }
    }
    assert!(seen > 4, "the core's files were found");
}

fn rust_files() -> Vec<PathBuf> {
    let found: Vec<_> =
        ["crates", "tests"].iter().flat_map(|name| files_under(&top().join(name), "rs")).collect();
    assert!(found.len() > 10, "the Rust files were found");
    found
}

#[test]
fn no_file_of_rust_is_too_long_to_keep_in_mind() {
    for path in rust_files() {
        let lines = text_of(&path).lines().count();
        assert!(lines <= MOST_LINES, "{} has {lines} lines, more than {MOST_LINES}", path.display());
    }
}

#[test]
fn nothing_is_left_open_in_the_code() {
    // Put together here, so that this file does not find itself.
    let marks =
        [concat!("to", "do!("), concat!("unimpl", "emented!("), concat!("FIX", "ME"), concat!("XX", "X")];
    for path in rust_files() {
        let text = text_of(&path);
        for mark in marks {
            assert!(!text.contains(mark), "{} holds the mark {mark}", path.display());
        }
    }
}

#[test]
fn every_crate_takes_the_lints_of_the_workspace_and_forbids_unsafe_code() {
    assert!(text_of(&top().join("Cargo.toml")).contains("unsafe_code = \"forbid\""));
    let crates = files_under(&top().join("crates"), "toml");
    let manifests: Vec<_> = crates.iter().filter(|path| path.ends_with("Cargo.toml")).collect();
    assert!(manifests.len() >= OURS.len(), "the manifests were found");
    for path in manifests {
        assert!(text_of(path).contains("[lints]\nworkspace = true"), "{}", path.display());
    }
}

#[test]
fn the_readme_opens_with_the_job_and_gives_the_two_commands() {
    let text = text_of(&top().join("README.md"));
    let mut paragraphs = text.split("\n\n").map(str::trim).filter(|part| !part.is_empty());
    assert_eq!(paragraphs.next(), Some("# Crestline"));
    let job = paragraphs.next().unwrap_or_default();
    for word in ["saddle", "crest", "fretted", "drawing"] {
        assert!(job.contains(word), "the first paragraph says the job, with the word {word}: {job}");
    }
    for command in ["cargo run --release --locked", "bash tests/run"] {
        assert!(text.contains(command), "the README gives the command {command}");
    }
}

#[test]
fn pictures_and_files_that_the_documents_name_exist() {
    let mut pages = vec![top().join("README.md"), top().join("DEVELOPERS.md")];
    pages.extend(files_under(&top().join("crates/physics/doc"), "md"));
    assert!(pages.len() > 4, "the pages of the model's documentation were found");
    for page in pages {
        let text = text_of(&page);
        let folder = page.parent().expect("a page lies in a folder");
        for link in text.split("](").skip(1).filter_map(|rest| rest.split(')').next()) {
            let is_local = !link.contains("://") && !link.starts_with('#');
            let path = link.split('#').next().unwrap_or(link);
            let is_there = !is_local || folder.join(path).exists();
            assert!(is_there, "{} points to {link}, which is not there", page.display());
        }
    }
}

#[test]
fn the_top_of_the_repository_holds_the_fixed_names_only() {
    let fixed =
        ["Cargo.toml", "Cargo.lock", "README.md", "DEVELOPERS.md", "LICENSE", "assets", "crates", "tests"];
    let entries = fs::read_dir(top()).expect("the top folder can be read");
    for entry in entries {
        let name = entry.expect("an entry can be read").file_name().into_string().expect("names are UTF-8");
        let is_free = name.starts_with('.') || name == "target";
        assert!(is_free || fixed.contains(&name.as_str()), "{name} has no place at the top");
    }
    for name in fixed {
        assert!(top().join(name).exists(), "{name} is missing at the top");
    }
}

#[test]
fn each_folder_of_assets_says_where_its_files_come_from() {
    let assets = top().join("assets");
    let mut seen = 0;
    for entry in fs::read_dir(&assets).expect("assets can be read") {
        let path = entry.expect("an entry can be read").path();
        if path.is_dir() {
            assert!(says_origin(&path), "{} says nothing of origin and licence", path.display());
            seen += 1;
        }
    }
    assert!(seen > 0, "there are assets");
}

fn says_origin(folder: &Path) -> bool {
    let text = fs::read_to_string(folder.join("README.md")).unwrap_or_default().to_lowercase();
    text.contains("licen") && (text.contains("origin") || text.contains("source") || text.contains("from"))
}
