//! The program as a user starts it, in a folder of its own.

use assert_cmd::Command;
use std::fs;
use std::path::PathBuf;
use std::process::Output;

/// A short fire in a small house of Kestrova.
pub const SCENARIO: &str = r#"
title = "Reed Lane 2: door opened on a small fire"
duration = "40 s"

[room.kitchen]
width = "3.0 m"
length = "3.0 m"
height = "2.4 m"
walls = "gypsum plasterboard 13 mm"
ceiling = "gypsum plasterboard 13 mm"
floor = "timber floor"

[opening.door]
kind = "door"
between = ["kitchen", "open air"]
width = "0.8 m"
head = "2.0 m"
position = "shut"

[leakage.house]
rooms = ["kitchen"]
to = "open air"
area = "0.02 m2"

[item.sofa]
room = "kitchen"
fuel = "polyurethane mattress with bedding"
mass = "10 kg"
growth = "fast"
peak = "800 kW"
surface_height = "0.4 m"

[station.crew]
room = "kitchen"
posture = "kneeling"

[[action]]
name = "entry"
at = "20 s"
open = "door"
over = "2 s"

[[tactic.hold.action]]
name = "hold"
at = "30 s"
shut = "door"
"#;

/// A folder with the scenario in it, thrown away at the end.
pub struct Place {
    dir: tempfile::TempDir,
}

impl Place {
    /// With `reed.toml` in it.
    pub fn new() -> Self {
        let dir = tempfile::tempdir().unwrap();
        fs::write(dir.path().join("reed.toml"), SCENARIO).unwrap();
        Self { dir }
    }

    /// A path in it.
    pub fn path(&self, name: &str) -> PathBuf {
        self.dir.path().join(name)
    }

    /// Writes a file in it.
    pub fn write(&self, name: &str, text: &str) {
        fs::write(self.path(name), text).unwrap();
    }

    /// Names in a folder of it, sorted.
    pub fn names(&self, folder: &str) -> Vec<String> {
        let mut names: Vec<String> = fs::read_dir(self.path(folder))
            .unwrap()
            .map(|entry| entry.unwrap().file_name().into_string().unwrap())
            .collect();
        names.sort();
        names
    }

    /// The program, in this folder.
    pub fn command(&self, arguments: &[&str]) -> Command {
        let mut command = Command::cargo_bin("doorglow").unwrap();
        command.current_dir(self.dir.path()).args(arguments);
        for name in ["NO_COLOR", "CLICOLOR", "CLICOLOR_FORCE", "COLUMNS"] {
            command.env_remove(name);
        }
        command
    }

    /// Runs the program and gives what came of it.
    pub fn run(&self, arguments: &[&str]) -> Output {
        self.command(arguments).output().unwrap()
    }
}

/// Standard output as text.
pub fn out(output: &Output) -> String {
    String::from_utf8(output.stdout.clone()).unwrap()
}

/// Standard error as text.
pub fn side(output: &Output) -> String {
    String::from_utf8(output.stderr.clone()).unwrap()
}
