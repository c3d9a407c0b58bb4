//! The index of a catalogue: made when the file is first met, kept if it is a large one, and made anew when the file has
//! changed since.

use std::fs::{self, File};
use std::io::{self, Write as _};
use std::path::{Path, PathBuf};
use std::time::UNIX_EPOCH;

use crate::catalog::index::{Builder, Bytes, Facts, Index, Stamp};
use crate::catalog::{Catalogue, Constellation, Target, kept_direction};
use crate::site::fault::Faults;
use crate::site::folders::stem;
use crate::site::own::format::{Format, Read};
use crate::site::own::{cannot_be_read, pieces};

/// The index of a file smaller than this is made in less time than is worth keeping it for.
const KEPT_FROM_BYTES: u64 = 256 * 1024;

/// Rows between two reports of how far it has come.
const ROWS_A_REPORT: u64 = 20_000;

/// Told how much of a large file has been read, from 0 to 1.
pub type Progress<'p> = dyn FnMut(&Path, f64) + 'p;

/// The index of a catalogue.
pub(super) fn index(
    path: &Path,
    file: &File,
    format: &dyn Format,
    kept: &Path,
    progress: &mut Progress<'_>,
) -> Result<Index, Faults> {
    let stamp = stamp(file).map_err(|error| cannot_be_read(path, &error))?;
    let is_large = stamp.length >= KEPT_FROM_BYTES;
    let place = place(path, kept);
    if is_large && let Some(index) = opened(&place, &stamp) {
        return Ok(index);
    }
    let bytes = made(path, file, format, stamp, progress)?;
    if is_large
        && write(&place, &bytes).is_ok()
        && let Some(index) = opened(&place, &stamp)
    {
        return Ok(index);
    }
    // where nothing can be kept, it is made again at every run
    Index::open(Bytes::Memory(bytes)).map_err(|damaged| {
        Faults::of_the_file(&path.display().to_string(), damaged.to_string(), None)
    })
}

/// What tells one state of a file from another.
fn stamp(file: &File) -> io::Result<Stamp> {
    let details = file.metadata()?;
    let since = details.modified()?.duration_since(UNIX_EPOCH);
    let written = since.map_or(0, |since| since.as_nanos());
    Ok(Stamp {
        length: details.len(),
        written: u64::try_from(written).unwrap_or(0),
        unread: 0,
    })
}

/// Where the index of a file is kept: by the name a reader knows, and by the whole path.
fn place(path: &Path, kept: &Path) -> PathBuf {
    let whole = fs::canonicalize(path).unwrap_or_else(|_| path.to_owned());
    let sum = crc32fast::hash(whole.as_os_str().as_encoded_bytes());
    kept.join(format!("{}-{sum:08x}.index", stem(path)))
}

/// The index kept, if it is of this state of the file.
fn opened(place: &Path, stamp: &Stamp) -> Option<Index> {
    let index = Index::open(Bytes::of_file(File::open(place).ok()?)).ok()?;
    let unread = index.stamp().unread;
    (index.stamp() == Stamp { unread, ..*stamp }).then_some(index)
}

fn write(place: &Path, bytes: &[u8]) -> io::Result<()> {
    fs::create_dir_all(place.parent().unwrap_or(place))?;
    // under a name of its own until it is whole; two runs at once do not meet
    let begun = place.with_extension(format!("{}.part", std::process::id()));
    let written = File::create(&begun)
        .and_then(|mut file| file.write_all(bytes))
        .and_then(|()| fs::rename(&begun, place));
    if written.is_err() {
        let _ = fs::remove_file(&begun);
    }
    written
}

fn made(
    path: &Path,
    file: &File,
    format: &dyn Format,
    stamp: Stamp,
    progress: &mut Progress<'_>,
) -> Result<Vec<u8>, Faults> {
    let mut builder = Builder::default();
    let (mut rows, mut unread) = (0_u64, 0);
    pieces::each(path, file, format, |piece, read| {
        match read {
            Read::Nothing | Read::End => {}
            Read::Target(target) => add(&mut builder, piece.at, &target),
            Read::Wrong(_) => unread += 1,
        }
        rows += 1;
        if rows.is_multiple_of(ROWS_A_REPORT) {
            progress(path, piece.at as f64 / stamp.length.max(1) as f64);
        }
    })?;
    progress(path, 1.0);
    Ok(builder.finish(&Stamp { unread, ..stamp }))
}

#[allow(clippy::cast_possible_truncation)] // a magnitude to a millionth
fn add(builder: &mut Builder, at: u64, target: &Target) {
    builder.row(Facts {
        reference: at,
        magnitude: target.magnitude.map(|magnitude| magnitude as f32),
        direction: Catalogue::fixed_place(target).map(|place| kept_direction(&place)),
        kinds: target.kind.bit(),
        constellation: target
            .constellation
            .and_then(Constellation::position_in_table),
    });
    for name in target.names() {
        builder.name(name);
    }
}
