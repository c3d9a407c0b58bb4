//! A run of bytes, in memory or in a file, of which a part is read when it is asked for.

use std::borrow::Cow;
use std::fs::File;
use std::io::{Read, Seek, SeekFrom};
use std::ops::Range;
use std::sync::{Mutex, PoisonError};

/// The bytes.
#[derive(Debug)]
pub enum Bytes {
    /// All of them in memory.
    Memory(Vec<u8>),
    /// In a file, read where they are wanted.
    File(Mutex<File>),
}

impl Bytes {
    /// Those of a file.
    #[must_use]
    pub const fn of_file(file: File) -> Self {
        Self::File(Mutex::new(file))
    }

    /// A part of them; nothing if there are not so many, or the file cannot be read.
    #[must_use]
    pub fn part(&self, range: Range<u64>) -> Option<Cow<'_, [u8]>> {
        let length = usize::try_from(range.end.checked_sub(range.start)?).ok()?;
        match self {
            Self::Memory(bytes) => {
                let start = usize::try_from(range.start).ok()?;
                Some(Cow::Borrowed(bytes.get(start..start.checked_add(length)?)?))
            }
            Self::File(file) => {
                // a search that panicked leaves nothing half done in a file that is only read
                let mut file = file.lock().unwrap_or_else(PoisonError::into_inner);
                file.seek(SeekFrom::Start(range.start)).ok()?;
                let mut bytes = Vec::with_capacity(length);
                let read = (&mut *file)
                    .take(u64::try_from(length).ok()?)
                    .read_to_end(&mut bytes)
                    .ok()?;
                (read == length).then_some(Cow::Owned(bytes))
            }
        }
    }
}

#[cfg(test)]
mod tests {
    use std::io::Write;

    use super::*;

    #[test]
    fn a_part_is_the_same_from_memory_and_from_a_file_and_nothing_beyond_the_end() {
        let written = b"one two three".to_vec();
        let mut file = tempfile::tempfile().unwrap();
        file.write_all(&written).unwrap();
        for bytes in [Bytes::Memory(written), Bytes::of_file(file)] {
            assert_eq!(bytes.part(4..7).unwrap().as_ref(), b"two");
            assert_eq!(bytes.part(13..13).unwrap().as_ref(), b"");
            assert!(bytes.part(10..14).is_none());
            #[allow(clippy::reversed_empty_ranges)]
            let backward = bytes.part(7..4);
            assert!(backward.is_none());
        }
    }
}
