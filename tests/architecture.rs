//! The floors of the house: a folder uses only floors below its own, C libraries stay behind one wall each,
//! only the program prints, and no file outgrows one idea.

use std::collections::BTreeMap;
use std::fs;
use std::path::{Path, PathBuf};

/// Floor of each module of the crate, as DEVELOPERS.md draws them.
const FLOORS: [(&str, u8); 14] = [
    ("notice", 0),
    ("orientation", 0),
    ("table", 1),
    ("station", 2),
    ("crs", 3),
    ("fabric", 3),
    ("domain", 4),
    ("format", 4),
    ("input", 5),
    ("symbol", 5),
    ("layer", 6),
    ("style", 6),
    ("job", 7),
    ("cli", 8),
];

/// Crates that may be named in one place only.
const WALLS: [(&str, &str); 7] = [
    ("gdal", "src/format/ogr"),
    ("rusqlite", "src/format/gpkg"),
    ("proj_sys", "src/crs"),
    ("world_magnetic_model", "src/crs"),
    ("igrf", "src/crs"),
    ("clap", "src/cli"),
    ("indicatif", "src/cli"),
];

fn files_below(folder: &Path, into: &mut Vec<PathBuf>) {
    for entry in fs::read_dir(folder).unwrap() {
        let path = entry.unwrap().path();
        if path.is_dir() {
            files_below(&path, into);
        } else if path.extension().is_some_and(|e| e == "rs") {
            into.push(path);
        }
    }
}

fn sources() -> BTreeMap<String, String> {
    let root = Path::new(env!("CARGO_MANIFEST_DIR"));
    let mut files = Vec::new();
    files_below(&root.join("src"), &mut files);
    files_below(&root.join("tests"), &mut files);
    assert!(files.len() > 40, "found only {} files", files.len());
    files
        .into_iter()
        .map(|p| (p.strip_prefix(root).unwrap().display().to_string(), fs::read_to_string(&p).unwrap()))
        .collect()
}

fn module_of(path: &str) -> Option<&str> {
    path.strip_prefix("src/")?.split(['/', '.']).next()
}

/// Names that follow `prefix` anywhere in the code, comments left out.
fn names_after<'a>(text: &'a str, prefix: &'a str) -> impl Iterator<Item = &'a str> {
    text.lines().filter(|l| !l.trim_start().starts_with("//")).flat_map(move |line| {
        line.match_indices(prefix).filter_map(move |(at, _)| {
            let alone = at == 0 || !line[..at].ends_with(|c: char| c.is_alphanumeric() || c == '_');
            let rest = &line[at + prefix.len()..];
            let end = rest.find(|c: char| !c.is_alphanumeric() && c != '_').unwrap_or(rest.len());
            alone.then_some(&rest[..end])
        })
    })
}

#[test]
fn imports_run_downwards() {
    let floor = |module: &str| FLOORS.iter().find(|(name, _)| *name == module).map(|&(_, floor)| floor);
    let mut uses = 0;
    for (path, text) in sources() {
        let Some(module) = module_of(&path).filter(|m| !matches!(*m, "lib" | "main")) else { continue };
        let own = floor(module).unwrap_or_else(|| panic!("{path}: module {module} has no floor"));
        for used in names_after(&text, "crate::") {
            let Some(below) = floor(used) else { continue };
            uses += usize::from(used != module);
            assert!(used == module || below < own, "{path} (floor {own}) uses {used} (floor {below})");
        }
        assert!(
            !text.contains("use crate::{"),
            "{path}: one `use crate::…` per module, so that this test can read them"
        );
    }
    assert!(uses > 30, "found only {uses} uses between modules");
}

#[test]
fn foreign_crates_stay_behind_their_walls() {
    for (path, text) in sources() {
        if !path.starts_with("src/") {
            continue;
        }
        for (name, wall) in WALLS {
            let prefix = format!("{name}::");
            let named = names_after(&text, &prefix).next().is_some();
            assert!(!named || path.starts_with(wall), "{path} names {name}, which belongs behind {wall}");
        }
    }
}

#[test]
fn only_the_program_prints() {
    for (path, text) in sources() {
        if path.starts_with("src/") && !path.starts_with("src/cli/") {
            for print in ["println!", "eprintln!", "print!", "dbg!"] {
                assert!(!text.contains(print), "{path} prints ({print})");
            }
        }
    }
}

#[test]
fn a_file_is_one_idea() {
    for (path, text) in sources() {
        let lines = text.lines().count();
        assert!(lines <= 500, "{path} has {lines} lines");
    }
}

#[test]
fn nothing_is_left_unfinished() {
    // Spelled in halves, so that this file does not find itself.
    let marks = [
        concat!("to", "do!("),
        concat!("unimple", "mented!("),
        concat!("TO", "DO"),
        concat!("FIX", "ME"),
        concat!("#[ig", "nore"),
    ];
    for (path, text) in sources() {
        for mark in marks {
            assert!(!text.contains(mark), "{path} holds {mark}");
        }
    }
}
