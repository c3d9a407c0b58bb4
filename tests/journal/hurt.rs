//! A journal cut short, damaged, doubled: never a panic, never a lost whole line.

use std::fs;
use std::path::{Path, PathBuf};

use nonius::night::{Event, Journal, JournalFault, Night, Notice, Stamped, journal};
use proptest::prelude::*;
use tempfile::TempDir;

use crate::sample::{every_kind, utc};

fn file(folder: &TempDir) -> PathBuf {
    folder.path().join("2026-12-01-tarn-hollow.jsonl")
}

/// Writes a real journal and gives its bytes, and its events as they are read back.
fn written(events: &[Event]) -> (Vec<u8>, Vec<Stamped>) {
    let folder = TempDir::new().unwrap();
    let path = file(&folder);
    let (mut journal, before) = Journal::open(&path).unwrap();
    assert_eq!(before, journal::Contents::default());
    let stamped = (0..)
        .zip(events)
        .map(|(index, event)| journal.append(utc(index * 60), event).unwrap())
        .collect();
    (fs::read(&path).unwrap(), stamped)
}

fn opened(path: &Path, bytes: &[u8]) -> (Journal, journal::Contents) {
    fs::write(path, bytes).unwrap();
    Journal::open(path).unwrap()
}

/// Where each line ends, its newline not counted.
fn ends(bytes: &[u8]) -> Vec<usize> {
    (0..bytes.len()).filter(|at| bytes[*at] == b'\n').collect()
}

fn lines(bytes: &[u8]) -> Vec<Vec<u8>> {
    let lines = bytes.split_inclusive(|byte| *byte == b'\n');
    lines.map(<[u8]>::to_vec).collect()
}

#[test]
fn what_was_written_is_read_back() {
    let (bytes, stamped) = written(&every_kind());
    let folder = TempDir::new().unwrap();
    let (_, contents) = opened(&file(&folder), &bytes);
    assert_eq!(contents.events, stamped);
    assert_eq!(contents.notices, []);
    // a control character is gone, all else is as it was given
    let differing: Vec<_> = every_kind()
        .into_iter()
        .zip(&stamped)
        .filter(|(given, read)| *given != read.event)
        .map(|(given, _)| given.word())
        .collect();
    assert_eq!(differing, ["note"]);
}

/// How many lines are whole in the first `cut` bytes, and how many notices that is worth.
fn whole_and_said(ends: &[usize], cut: usize) -> (usize, usize) {
    let whole = ends.iter().filter(|end| **end <= cut).count();
    let between_lines = cut == 0 || ends.iter().any(|end| cut == end + 1);
    (whole, usize::from(!between_lines))
}

#[test]
fn cut_at_every_byte_it_keeps_every_whole_line() {
    let (bytes, stamped) = written(&every_kind());
    let ends = ends(&bytes);
    for cut in 0..=bytes.len() {
        let contents = journal::understand(&bytes[..cut]).unwrap();
        let (whole, said) = whole_and_said(&ends, cut);
        assert_eq!(contents.events, stamped[..whole], "cut at {cut}");
        assert_eq!(contents.notices.len(), said, "cut at {cut}");
        let _ = Night::replay(contents.events);
    }
}

#[test]
fn cut_anywhere_in_its_last_lines_it_is_repaired_and_goes_on() {
    let (bytes, stamped) = written(&every_kind());
    let ends = ends(&bytes);
    let folder = TempDir::new().unwrap();
    let path = file(&folder);
    // each cut waits for the disk three times, so not at every byte of the file
    for cut in (0..12).chain(ends[ends.len() - 4]..=bytes.len()) {
        let (mut journal, contents) = opened(&path, &bytes[..cut]);
        let (whole, said) = whole_and_said(&ends, cut);
        assert_eq!(contents.events, stamped[..whole], "cut at {cut}");
        assert_eq!(contents.notices.len(), said, "cut at {cut}");
        let next = journal.append(utc(9000), &Event::SessionClosed).unwrap();
        assert_eq!(next.number, whole as u64 + 1, "cut at {cut}");
        drop(journal);
        let again = journal::read(&path).unwrap();
        assert_eq!(again.events.len(), whole + 1, "cut at {cut}");
        assert_eq!(again.notices, [], "cut at {cut}");
    }
}

#[test]
fn a_byte_damaged_anywhere_costs_the_line_it_is_in_at_most() {
    let (bytes, stamped) = written(&every_kind());
    let ends = ends(&bytes);
    for at in 0..bytes.len() {
        // one bit, an end of line, a byte of nothing
        for damage in [bytes[at] ^ 1, b'\n', 0] {
            if damage == bytes[at] {
                continue;
            }
            let mut hurt = bytes.clone();
            hurt[at] = damage;
            let contents = journal::understand(&hurt).unwrap();
            let line = ends.iter().filter(|end| **end < at).count();
            let hit_a_newline = bytes[at] == b'\n';
            let kept: Vec<_> = (0..)
                .zip(&stamped)
                .filter(|(index, _)| *index != line || hit_a_newline)
                .map(|(_, stamped)| stamped.clone())
                .collect();
            assert_eq!(contents.events, kept, "byte {at} made {damage}");
            assert!(!contents.notices.is_empty(), "byte {at} made {damage}");
            let _ = Night::replay(contents.events);
        }
    }
}

#[test]
fn a_damaged_line_is_told_by_its_number_and_stays_in_the_file() {
    let (mut bytes, _) = written(&every_kind());
    let third = ends(&bytes)[1] + 20;
    bytes[third] = b'#';
    let folder = TempDir::new().unwrap();
    let path = file(&folder);
    let (_, contents) = opened(&path, &bytes);
    assert_eq!(contents.notices, [Notice::Damaged { line: 3 }]);
    assert_eq!(fs::read(&path).unwrap(), bytes);
}

#[test]
fn a_damaged_last_line_keeps_its_number_to_itself() {
    let (mut bytes, stamped) = written(&every_kind());
    let last = bytes.len() - 10;
    bytes[last] ^= 1;
    let folder = TempDir::new().unwrap();
    let (mut journal, contents) = opened(&file(&folder), &bytes);
    let line = stamped.len();
    assert_eq!(contents.notices, [Notice::Damaged { line }]);
    let next = journal.append(utc(9000), &Event::SessionClosed).unwrap();
    assert_eq!(next.number, line as u64 + 1);
}

#[test]
fn missing_and_repeated_lines_are_said() {
    let (bytes, stamped) = written(&every_kind());
    let lines = lines(&bytes);
    let folder = TempDir::new().unwrap();
    let path = file(&folder);
    let without = [&lines[..4], &lines[6..]].concat().concat();
    let (journal, contents) = opened(&path, &without);
    drop(journal);
    assert_eq!(contents.notices, [Notice::Gap { first: 5, last: 6 }]);
    assert_eq!(contents.events.len(), stamped.len() - 2);

    let doubled = [&lines[..4], &lines[3..]].concat().concat();
    let (_, contents) = opened(&path, &doubled);
    assert_eq!(contents.notices, [Notice::Repeated { line: 5, number: 4 }]);
    assert_eq!(contents.events, stamped);
}

#[test]
fn a_kind_only_a_newer_program_knows_stays_in_the_file() {
    let (bytes, stamped) = written(&every_kind());
    let number = stamped.len() + 1;
    let body = format!(
        "{{\"n\":{number},\"utc\":\"2026-12-01T23:00:00Z\",\"event\":{{\"kind\":\"slit-turned\"}}}}"
    );
    let crc = crc32fast::hash(body.as_bytes());
    let newer = format!("{},\"crc\":\"{crc:08x}\"}}\n", &body[..body.len() - 1]);
    let bytes = [bytes, newer.into_bytes()].concat();
    let folder = TempDir::new().unwrap();
    let path = file(&folder);
    let (mut journal, contents) = opened(&path, &bytes);
    let kind = "slit-turned".to_owned();
    assert_eq!(
        contents.notices,
        [Notice::UnknownKind { line: number, kind }]
    );
    assert_eq!(contents.events, stamped);
    let next = journal.append(utc(9000), &Event::SessionClosed).unwrap();
    assert_eq!(next.number, number as u64 + 1);
    assert!(fs::read(&path).unwrap().starts_with(&bytes));
}

#[test]
fn a_second_opener_is_told_and_a_reader_is_not_kept_out() {
    let folder = TempDir::new().unwrap();
    let path = file(&folder);
    let (mut first, _) = Journal::open(&path).unwrap();
    first.append(utc(0), &Event::SessionResumed).unwrap();
    let Err(fault) = Journal::open(&path) else {
        panic!("opened twice");
    };
    assert!(matches!(fault, JournalFault::Locked { .. }), "{fault}");
    assert!(fault.to_string().contains("already open in another"));
    assert_eq!(journal::read(&path).unwrap().events.len(), 1);
    drop(first);
    assert!(Journal::open(&path).is_ok());
}

#[test]
fn a_file_that_is_no_journal_is_not_touched() {
    let folder = TempDir::new().unwrap();
    let path = folder.path().join("shopping");
    let text = b"bread\nlamp oil, red glass";
    fs::write(&path, text).unwrap();
    let Err(fault) = Journal::open(&path) else {
        panic!("opened as a journal");
    };
    assert!(matches!(fault, JournalFault::NotAJournal { .. }), "{fault}");
    assert_eq!(fs::read(&path).unwrap(), text);
}

#[test]
fn a_new_journal_makes_the_folders_above_it() {
    let folder = TempDir::new().unwrap();
    let path = folder.path().join("state/nonius/nights/n.jsonl");
    let (mut journal, _) = Journal::open(&path).unwrap();
    journal.append(utc(0), &Event::SessionClosed).unwrap();
    assert_eq!(journal::read(&path).unwrap().events.len(), 1);
}

proptest! {
    #[test]
    fn bytes_by_chance_never_panic(
        pieces in prop::collection::vec(
            prop_oneof![
                prop::collection::vec(any::<u8>(), 0..40),
                prop::sample::select(lines(&written(&every_kind()).0)),
            ],
            0..6,
        )
    ) {
        let folder = TempDir::new().unwrap();
        let path = file(&folder);
        fs::write(&path, pieces.concat()).unwrap();
        match Journal::open(&path) {
            Ok((mut journal, contents)) => {
                let before = contents.events.len();
                let _ = Night::replay(contents.events);
                journal.append(utc(0), &Event::SessionClosed).unwrap();
                prop_assert_eq!(journal::read(&path).unwrap().events.len(), before + 1);
            }
            Err(fault) => {
                let is_no_journal = matches!(fault, JournalFault::NotAJournal { .. });
                prop_assert!(is_no_journal, "{}", fault);
            }
        }
    }
}
