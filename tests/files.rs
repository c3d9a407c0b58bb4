//! Files as users write them: the good ones are read without fault, each bad one is answered with
//! exactly the message beside it, and no text of any kind makes a reader stumble.
#![allow(clippy::unwrap_used, clippy::expect_used, clippy::panic)]

use std::fs;
use std::path::{Path, PathBuf};

use nonius::catalog::Catalogue;
use nonius::site::{
    Checker, FileText, Folders, Ink, ListFile, MountFile, ReadingsFile, Shelf, SiteFile, builtin,
    own,
};
use proptest::prelude::*;

const GOOD: &str = "tests/files/good";
const BAD: &str = "tests/files/bad";

/// The files of a folder and of its folder of catalogues that are not expectations, by name; paths stay relative, as
/// messages quote them.
fn files(folder: &str) -> Vec<PathBuf> {
    let catalogues = format!("{folder}/catalogs");
    let of = |folder: &str| -> Vec<PathBuf> {
        let entries = fs::read_dir(folder).unwrap();
        entries
            .map(|entry| Path::new(folder).join(entry.unwrap().file_name()))
            .collect()
    };
    let mut files: Vec<PathBuf> = [of(folder), of(&catalogues)].concat();
    files.retain(|path| {
        path.is_file() && path.extension().is_none_or(|ending| ending != "expected")
    });
    files.sort();
    files
}

fn expectation(bad: &Path) -> PathBuf {
    let mut name = bad.as_os_str().to_owned();
    name.push(".expected");
    PathBuf::from(name)
}

/// All that is said of a file held against what is built in, the readings against the six-inch mount.
fn said(path: &Path, ink: Ink) -> Option<String> {
    let nowhere = Path::new("tests/files/no-such-folder");
    let folders = Folders::at(nowhere, nowhere, nowhere);
    let mount = folders.mount("six-inch").unwrap().mount;
    let checker = Checker {
        folders: &folders,
        catalogue: &Catalogue::builtin(),
        mount: Some(&mount),
    };
    checker.file(path).faults.map(|faults| faults.render(ink))
}

#[test]
fn good_files_are_read_without_fault() {
    let good = files(GOOD);
    assert!(good.len() >= 10, "only {} files", good.len());
    for path in good {
        let said = said(&path, Ink::Plain);
        assert!(said.is_none(), "{}", said.unwrap());
    }
}

#[test]
fn each_bad_file_is_answered_with_the_message_beside_it() {
    let bad = files(BAD);
    assert!(bad.len() >= 40, "only {} files", bad.len());
    let mut wrong = Vec::new();
    for path in bad {
        let expected = fs::read_to_string(expectation(&path)).unwrap_or_default();
        let found = said(&path, Ink::Plain).unwrap_or_else(|| "no fault at all".to_owned());
        // a caret past the end of a line stands under a space
        let same = found
            .lines()
            .map(str::trim_end)
            .eq(expected.lines().map(str::trim_end));
        if !same {
            wrong.push(format!("{}\n{found}\n", path.display()));
        }
    }
    assert!(wrong.is_empty(), "{}", wrong.join("\n"));
}

#[test]
fn every_message_has_its_place_and_a_hint() {
    for path in files(BAD) {
        let said = said(&path, Ink::Plain).unwrap();
        let faults = said.matches("error: ").count();
        assert!(faults > 0);
        assert_eq!(said.matches("= hint: ").count(), faults, "{said}");
        // the name, the line and the column
        let place = format!("--> {}:", path.display());
        assert_eq!(said.matches(&place).count(), faults, "{said}");
    }
}

#[test]
fn every_expectation_belongs_to_a_file() {
    let folders = [BAD.to_owned(), format!("{BAD}/catalogs")];
    let expected = folders
        .iter()
        .flat_map(|folder| fs::read_dir(folder).unwrap())
        .map(|entry| entry.unwrap().path())
        .filter(|path| path.extension().is_some_and(|ending| ending == "expected"));
    let mut count = 0;
    for path in expected {
        assert!(path.with_extension("").exists(), "{}", path.display());
        count += 1;
    }
    assert_eq!(count, files(BAD).len());
}

#[test]
fn a_message_in_colour_says_the_same_as_one_without() {
    for path in files(BAD) {
        let coloured = said(&path, Ink::Coloured).unwrap();
        assert!(coloured.contains("\u{1b}["), "{}", path.display());
        let mut plain = String::new();
        for (at, part) in coloured.split('\u{1b}').enumerate() {
            // a colour is ESC [ figures m
            plain += if at == 0 {
                part
            } else {
                part.split_once('m').unwrap().1
            };
        }
        assert_eq!(plain, said(&path, Ink::Plain).unwrap());
    }
}

#[test]
fn no_message_carries_a_control_character_to_the_terminal() {
    for path in files(BAD) {
        let said = said(&path, Ink::Plain).unwrap();
        assert!(
            said.chars().all(|c| c == '\n' || !c.is_control()),
            "{said:?}"
        );
    }
}

/// Reads bytes as a catalogue, and writes out whatever is wrong with it.
fn read_as_a_catalogue(bytes: &[u8]) {
    let folder = tempfile::tempdir().unwrap();
    let path = folder.path().join("any.csv");
    fs::write(&path, bytes).unwrap();
    let faults = own::check(&path).err();
    let opened = own::open(&path, folder.path(), &mut |_, _| {});
    // what is opened is checked without fault, but for the rows left out of it
    match (&faults, opened) {
        (None, opened) => assert_eq!(opened.unwrap().unread, 0),
        (Some(faults), opened) => {
            assert!(!faults.list().is_empty());
            assert!(opened.is_err() || faults.to_string().contains("any.csv:"));
        }
    }
}

/// Reads a text as every kind of file, and writes out whatever is wrong with it.
fn read_as_everything(bytes: &[u8]) {
    read_as_a_catalogue(bytes);
    let file = match FileText::from_bytes("any".to_owned(), bytes.to_vec()) {
        Ok(file) => file,
        Err(faults) => {
            assert!(faults.to_string().contains("any:"));
            return;
        }
    };
    let faults = [
        SiteFile::read("any", file.clone()).err(),
        MountFile::read("any", file.clone()).err(),
        ListFile::read("any", file.clone()).err(),
        ReadingsFile::read(file).err(),
    ];
    for faults in faults.into_iter().flatten() {
        assert!(!faults.list().is_empty());
        let said = faults.to_string();
        assert!(
            said.chars().all(|c| c == '\n' || !c.is_control()),
            "{said:?}"
        );
    }
}

/// The texts that are mutated: all good files and all built-in ones.
fn sound_texts() -> Vec<Vec<u8>> {
    let built_in = Shelf::ALL.into_iter().flat_map(|shelf| {
        builtin::files(shelf)
            .iter()
            .map(|file| file.text.as_bytes().to_vec())
    });
    let good = files(GOOD).into_iter().map(|path| fs::read(path).unwrap());
    built_in.chain(good).collect()
}

/// One change of a text: where (as a share of its length), how much goes, and what comes.
fn change() -> impl Strategy<Value = (f64, usize, Vec<u8>)> {
    let comes = prop_oneof![
        proptest::collection::vec(any::<u8>(), 0..4),
        "[\\[\\]\"'=,.#\\n\\r\\t +0-9a-zé-]{0,6}".prop_map(String::into_bytes),
    ];
    (0.0..1.0, 0_usize..12, comes)
}

proptest! {
    #[test]
    fn no_bytes_make_a_reader_stumble(bytes in proptest::collection::vec(any::<u8>(), 0..400)) {
        read_as_everything(&bytes);
    }

    #[test]
    fn no_text_makes_a_reader_stumble(
        head in "(utc,star,hour,dec,side|name,ra,dec|\\[hour-circle\\]|)\n?",
        text in "[ -~\n\r\t\"'é\u{1b}\u{feff}]{0,200}",
    ) {
        read_as_everything(format!("{head}{text}").as_bytes());
    }

    #[test]
    fn no_change_of_a_sound_file_makes_a_reader_stumble(
        which in any::<prop::sample::Index>(),
        changes in proptest::collection::vec(change(), 1..4),
    ) {
        let texts = sound_texts();
        let mut bytes = which.get(&texts).clone();
        for (share, goes, comes) in changes {
            #[allow(clippy::cast_possible_truncation, clippy::cast_sign_loss)] // a share of a length
            let at = (share * bytes.len() as f64) as usize;
            let end = (at + goes).min(bytes.len());
            bytes.splice(at..end, comes);
        }
        read_as_everything(&bytes);
    }
}
