//! A home of its own for each test, and the program run in it.

use std::fs;
use std::path::{Path, PathBuf};

use serde_json::Value;
use tempfile::TempDir;

/// A home: nothing in it but what the test writes.
pub struct Home {
    folder: TempDir,
}

/// What a run came to.
#[derive(Debug)]
pub struct Ran {
    /// The exit status.
    pub status: i32,
    /// Standard output.
    pub out: String,
    /// Standard error.
    pub err: String,
}

impl Home {
    pub fn new() -> Self {
        let folder = tempfile::tempdir().unwrap();
        Self { folder }
    }

    /// A path in the home.
    pub fn path(&self, name: &str) -> PathBuf {
        self.folder.path().join(name)
    }

    /// Writes a file into the home and gives its path as a word of the command line.
    pub fn write(&self, name: &str, text: &str) -> String {
        let path = self.path(name);
        fs::create_dir_all(path.parent().unwrap()).unwrap();
        fs::write(&path, text).unwrap();
        path.to_str().unwrap().to_owned()
    }

    /// The program, not yet started, as a newcomer has it.
    pub fn program(&self, words: &[&str]) -> std::process::Command {
        let mut command = std::process::Command::new(assert_cmd::cargo::cargo_bin!("nonius"));
        command
            .current_dir(self.folder.path())
            .env_clear()
            .env("HOME", self.folder.path())
            .env("XDG_CONFIG_HOME", self.path("config"))
            .env("XDG_STATE_HOME", self.path("state"))
            .env("XDG_CACHE_HOME", self.path("cache"))
            .args(words);
        command
    }

    /// Runs the program to its end.
    pub fn run(&self, words: &[&str]) -> Ran {
        let output = assert_cmd::Command::from_std(self.program(words))
            .output()
            .unwrap();
        Ran {
            status: output.status.code().expect("ended by a signal"),
            out: String::from_utf8(output.stdout).unwrap(),
            err: String::from_utf8(output.stderr).unwrap(),
        }
    }

    /// Runs the program, which must do what is asked without a word on standard error.
    pub fn out(&self, words: &[&str]) -> String {
        let ran = self.run(words);
        assert_eq!((ran.status, ran.err.as_str()), (0, ""), "{words:?}");
        ran.out
    }

    /// Runs the program with `--json`; it must print one value on one line.
    pub fn json(&self, words: &[&str]) -> Value {
        let out = self.out(&[words, &["--json"]].concat());
        assert_eq!(out.lines().count(), 1, "{out}");
        serde_json::from_str(&out).unwrap()
    }
}

/// A file of the repository as a word of the command line.
pub fn repository(name: &str) -> String {
    let path = Path::new(env!("CARGO_MANIFEST_DIR")).join(name);
    assert!(path.exists(), "{}", path.display());
    path.to_str().unwrap().to_owned()
}

/// The number at a place in a JSON value.
pub fn number(value: &Value, pointer: &str) -> f64 {
    let there = value.pointer(pointer).and_then(Value::as_f64);
    there.unwrap_or_else(|| panic!("no number at {pointer} of {value}"))
}

/// The text at a place in a JSON value.
pub fn text<'a>(value: &'a Value, pointer: &str) -> &'a str {
    let there = value.pointer(pointer).and_then(Value::as_str);
    there.unwrap_or_else(|| panic!("no text at {pointer} of {value}"))
}

/// Degrees wrapped to (-180, 180].
pub fn wrapped(degrees: f64) -> f64 {
    let positive = degrees.rem_euclid(360.0);
    if positive > 180.0 {
        positive - 360.0
    } else {
        positive
    }
}

/// The codes of a setting's cautions.
pub fn cautions(dial: &Value) -> Vec<&str> {
    let list = dial["cautions"].as_array().unwrap();
    list.iter().map(|caution| text(caution, "/code")).collect()
}
