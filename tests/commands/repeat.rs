//! `--every`: plain lines until an interrupt comes, or until nobody reads them.

use std::io::{BufRead as _, BufReader, Read as _};
use std::process::{Child, ChildStdout, Command, ExitStatus, Stdio};
use std::sync::mpsc;
use std::thread;
use std::time::Duration;

use serde_json::Value;

use crate::program::{Home, number};

/// Far longer than a run takes on a machine busy with other work.
const LONGEST: Duration = Duration::from_secs(90);

const AT: &str = "2026-12-01T21:30:00Z";

/// The end of a pipe that is read.
type Pipe = BufReader<ChildStdout>;

/// The program started with its output in a pipe, that pipe, and the first lines from it.
fn started(home: &Home, words: &[&str], lines: usize) -> (Child, Pipe, Vec<String>) {
    let mut child = home
        .program(&[&["dial", "M 37", "--at", AT, "--every", "1s"], words].concat())
        .stdout(Stdio::piped())
        .stderr(Stdio::piped())
        .spawn()
        .unwrap();
    let mut pipe = BufReader::new(child.stdout.take().unwrap());
    let (say, said) = mpsc::channel();
    thread::spawn(move || {
        let read = pipe.by_ref().lines().take(lines);
        let first: Vec<String> = read.map(Result::unwrap).collect();
        say.send((pipe, first))
    });
    let Ok((pipe, first)) = said.recv_timeout(LONGEST) else {
        child.kill().unwrap();
        panic!("no lines came");
    };
    (child, pipe, first)
}

/// Waits for the end, with a bound.
fn end(child: Child) -> (ExitStatus, String) {
    let id = child.id().to_string();
    let (say, said) = mpsc::channel();
    thread::spawn(move || say.send(child.wait_with_output().unwrap()));
    let Ok(output) = said.recv_timeout(LONGEST) else {
        let _ = Command::new("kill").args(["-s", "KILL", &id]).status();
        panic!("it did not end");
    };
    (output.status, String::from_utf8(output.stderr).unwrap())
}

fn interrupt(child: &Child) {
    let sent = Command::new("kill")
        .args(["-s", "INT", &child.id().to_string()])
        .status();
    assert!(sent.unwrap().success());
}

#[test]
fn lines_come_as_time_goes_on_and_an_interrupt_ends_them_with_130() {
    let home = Home::new();
    // a line for the caution, and one for each time
    let (child, pipe, lines) = started(&home, &[], 4);
    interrupt(&child);
    let (status, err) = end(child);
    drop(pipe);
    assert_eq!((status.code(), err.as_str()), (Some(130), ""), "{lines:?}");
    let settings: Vec<&String> = lines
        .iter()
        .filter(|line| line.contains("hour circle "))
        .collect();
    assert_eq!(settings.len(), 3, "{lines:?}");
    assert!(lines[1].starts_with("caution for M 37: "), "{lines:?}");
    assert!(settings[0].starts_with("21:30:00 sidereal "), "{lines:?}");
    assert!(
        settings
            .iter()
            .all(|line| line.contains("M 37, tube west, ")),
        "{lines:?}"
    );
    assert!(
        settings.windows(2).all(|two| two[0][..8] < two[1][..8]),
        "{lines:?}"
    );
    assert!(
        lines.iter().all(|line| !line.contains('\u{1b}')),
        "{lines:?}"
    );
}

#[test]
fn for_programs_each_line_is_a_value_of_its_own() {
    let home = Home::new();
    let (child, pipe, lines) = started(&home, &["--json"], 2);
    interrupt(&child);
    assert_eq!(end(child).0.code(), Some(130));
    drop(pipe);
    let sheets: Vec<Value> = lines
        .iter()
        .map(|line| serde_json::from_str(line).unwrap())
        .collect();
    let sidereal = |sheet| number(sheet, "/sidereal/apparent_deg");
    let passed = (sidereal(&sheets[1]) - sidereal(&sheets[0])) * 240.0;
    // at least the second asked for, and no more than the machine may take
    assert!(passed > 1.0 && passed < LONGEST.as_secs_f64(), "{passed}");
    assert_eq!(sheets[0]["dials"][0]["target"], "M 37");
}

#[test]
fn a_pipe_nobody_reads_any_more_ends_it_quietly() {
    let home = Home::new();
    let (child, pipe, lines) = started(&home, &[], 1);
    assert_eq!(lines.len(), 1);
    drop(pipe);
    let (status, err) = end(child);
    assert_eq!((status.code(), err.as_str()), (Some(0), ""));
}

#[test]
fn a_pipe_closed_from_the_start_is_no_failure_either() {
    let home = Home::new();
    for words in [
        &["find", "--kind", "galaxy"][..],
        &["manual"],
        &["dial", "M 37", "--json"],
    ] {
        let mut child = home
            .program(words)
            .stdout(Stdio::piped())
            .stderr(Stdio::piped())
            .spawn()
            .unwrap();
        drop(child.stdout.take());
        let (status, err) = end(child);
        assert_eq!((status.code(), err.as_str()), (Some(0), ""), "{words:?}");
    }
}
