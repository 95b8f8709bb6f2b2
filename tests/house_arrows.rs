//! The house is one-directional: no room of `src/` knows one it must not.
//! The arrows are those of DEVELOPERS.md; a new room or arrow is added here
//! on purpose.

#![allow(clippy::unwrap_used)]

use std::collections::BTreeSet;
use std::fs;
use std::path::{Path, PathBuf};

/// Every room and what it may know beside itself.
const ARROWS: &[(&str, &[&str])] = &[
    ("units", &[]),
    ("plan", &[]),
    ("physics", &[]),
    ("record", &[]),
    ("catalogue", &["units", "plan"]),
    // Wind pressures and air-tightness figures become numbers of the plan.
    ("scenario", &["units", "catalogue", "plan", "physics"]),
    ("solve", &["plan", "physics", "record"]),
    ("reading", &["plan", "physics", "record"]),
    ("exposure", &["plan", "physics", "record"]),
    ("show", &["units", "plan", "record", "reading", "exposure"]),
    (
        "cli",
        &[
            "units",
            "catalogue",
            "scenario",
            "plan",
            "solve",
            "record",
            "reading",
            "exposure",
            "show",
        ],
    ),
];

fn source() -> PathBuf {
    Path::new(env!("CARGO_MANIFEST_DIR")).join("src")
}

fn files_below(path: &Path, found: &mut Vec<PathBuf>) {
    if path.is_dir() {
        for entry in fs::read_dir(path).unwrap() {
            files_below(&entry.unwrap().path(), found);
        }
    } else if path.extension().is_some_and(|end| end == "rs") {
        found.push(path.to_owned());
    }
}

/// Files of a room: its folder, its file, or both.
fn files_of(room: &str) -> Vec<PathBuf> {
    let mut found = Vec::new();
    for path in [source().join(room), source().join(format!("{room}.rs"))] {
        if path.exists() {
            files_below(&path, &mut found);
        }
    }
    found.sort();
    found
}

/// Rooms named by `crate::NAME` or `crate::{NAME, ...}` outside comments.
fn rooms_known(text: &str) -> BTreeSet<String> {
    let code: String = text
        .lines()
        .map(|line| line.split("//").next().unwrap_or_default())
        .collect::<Vec<_>>()
        .join("\n");
    let mut known = BTreeSet::new();
    for after in code.split("crate::").skip(1) {
        match after.strip_prefix('{') {
            Some(group) => known.extend(heads(group)),
            None => known.extend(word(after)),
        }
    }
    known
}

/// First words of a `{...}` group, one level deep.
fn heads(group: &str) -> Vec<String> {
    let (mut depth, mut at_head, mut found) = (0, true, Vec::new());
    for (index, character) in group.char_indices() {
        match character {
            '{' => depth += 1,
            '}' if depth == 0 => break,
            '}' => depth -= 1,
            ',' if depth == 0 => at_head = true,
            c if at_head && !c.is_whitespace() => {
                found.extend(word(&group[index..]));
                at_head = false;
            }
            _ => {}
        }
    }
    found
}

fn word(text: &str) -> Option<String> {
    let word: String = text
        .chars()
        .take_while(|c| c.is_alphanumeric() || *c == '_')
        .collect();
    (!word.is_empty()).then_some(word)
}

#[test]
fn verify_arrows_point_one_way() {
    let mut wrong = Vec::new();
    for (room, may_know) in ARROWS {
        let files = files_of(room);
        assert!(!files.is_empty(), "the room {room} is gone");
        for file in files {
            for known in rooms_known(&fs::read_to_string(&file).unwrap()) {
                if known != *room && !may_know.contains(&known.as_str()) {
                    let file = file.strip_prefix(source()).unwrap().display().to_string();
                    wrong.push(format!("{file} knows {known}"));
                }
            }
        }
    }
    assert!(wrong.is_empty(), "{}", wrong.join("\n"));
}

#[test]
fn verify_every_room_is_in_the_list() {
    for entry in fs::read_dir(source()).unwrap() {
        let path = entry.unwrap().path();
        let name = path.file_stem().unwrap().to_str().unwrap().to_owned();
        let is_root = ["lib", "main"].contains(&name.as_str());
        let is_listed = ARROWS.iter().any(|(room, _)| *room == name);
        assert!(is_root || is_listed, "{name} is not in the list of rooms");
    }
}

#[test]
fn verify_the_list_has_no_circle() {
    // Whoever is known by no remaining room is taken off, until none is left.
    let mut left: Vec<_> = ARROWS.to_vec();
    while !left.is_empty() {
        let before = left.len();
        let names: BTreeSet<&str> = left.iter().map(|(room, _)| *room).collect();
        left.retain(|(_, knows)| knows.iter().any(|known| names.contains(known)));
        assert!(left.len() < before, "a circle among {names:?}");
    }
}

#[test]
fn verify_only_the_command_line_prints_or_exits() {
    let mut wrong = Vec::new();
    for (room, _) in ARROWS.iter().filter(|(room, _)| *room != "cli") {
        for file in files_of(room) {
            let text = fs::read_to_string(&file).unwrap();
            for word in ["println!", "print!", "eprint", "process::exit", "dbg!"] {
                if text.contains(word) {
                    wrong.push(format!("{} has {word}", file.display()));
                }
            }
        }
    }
    assert!(wrong.is_empty(), "{}", wrong.join("\n"));
}

#[test]
fn verify_the_scanner_sees_groups_and_skips_comments() {
    let text = "use crate::{a::{b, c}, d};\n// crate::e\nlet x = crate::f::g();";
    let known: Vec<String> = rooms_known(text).into_iter().collect();
    assert_eq!(known, ["a", "d", "f"]);
}
