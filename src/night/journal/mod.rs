//! The journal: one file per night and site, JSON lines, only ever added to.
//!
//! A line counts once it is safe on the disk, and not before. On opening, a last line cut short is
//! taken off, whatever else is amiss is reported and left as it is. One process at a time writes a
//! journal; the lock is the operating system's and goes with the process.

mod disk;
mod line;
mod notice;
mod scan;

use std::fs::{self, TryLockError};
use std::io::{self, Read};
use std::path::{Path, PathBuf};

use crate::night::event::{Event, Stamped};
use crate::time::{Night, Utc};
use disk::Disk;
pub use line::Unwritable;
pub use notice::Notice;

/// What the files end in.
pub const EXTENSION: &str = "jsonl";

/// A journal open for writing, and locked.
pub struct Journal {
    path: PathBuf,
    disk: Box<dyn Disk>,
    /// Where the next line goes.
    end: u64,
    next_number: u64,
}

/// What stands in a journal.
#[derive(Clone, Debug, Default, PartialEq)]
pub struct Contents {
    /// The events, in their order.
    pub events: Vec<Stamped>,
    /// What was found amiss.
    pub notices: Vec<Notice>,
}

/// Why a journal cannot be used.
#[derive(Debug, thiserror::Error)]
pub enum JournalFault {
    /// The file cannot be opened, made or read.
    #[error("cannot open the night's journal {}: {source}", path.display())]
    Open {
        /// The file.
        path: PathBuf,
        /// What the system said.
        source: io::Error,
    },
    /// Another process writes this night.
    #[error(
        "this night is already open in another nonius ({}): leave that one first, or name another journal with --night",
        path.display()
    )]
    Locked {
        /// The file.
        path: PathBuf,
    },
    /// The file is something else.
    #[error("{} is not a night's journal", path.display())]
    NotAJournal {
        /// The file.
        path: PathBuf,
    },
    /// The act could not be made safe on the disk: it is not done.
    #[error("not recorded: cannot write to {}: {source}", path.display())]
    Write {
        /// The file.
        path: PathBuf,
        /// What the system said.
        source: io::Error,
    },
    /// The act cannot be put into words.
    #[error("not recorded: {0}")]
    Unwritable(#[from] Unwritable),
}

/// The file's name for a night at a site: `2026-12-01-tarn-hollow.jsonl`.
#[must_use]
pub fn file_name(night: Night, site: &str) -> String {
    let plain: String = site
        .chars()
        .map(|c| {
            if c.is_alphanumeric() || c == '-' || c == '_' {
                c
            } else {
                '-'
            }
        })
        .collect();
    format!("{night}-{plain}.{EXTENSION}")
}

/// Reads a journal and leaves it as it is, locked or not.
pub fn read(path: &Path) -> Result<Contents, JournalFault> {
    let bytes = fs::read(path).map_err(|source| JournalFault::Open {
        path: path.to_owned(),
        source,
    })?;
    understand(&bytes).ok_or_else(|| JournalFault::NotAJournal {
        path: path.to_owned(),
    })
}

/// What stands in a journal of these bytes; nothing if they are something else.
#[must_use]
pub fn understand(bytes: &[u8]) -> Option<Contents> {
    scan::is_a_journal(bytes).then(|| {
        let scan::Scan {
            events, notices, ..
        } = scan::scan(bytes);
        Contents { events, notices }
    })
}

impl Journal {
    /// Opens a journal, new or not, locks it, and repairs its end.
    pub fn open(path: &Path) -> Result<(Self, Contents), JournalFault> {
        let fault = |source| JournalFault::Open {
            path: path.to_owned(),
            source,
        };
        let mut file = disk::open(path).map_err(fault)?;
        file.try_lock().map_err(|why| match why {
            TryLockError::WouldBlock => JournalFault::Locked {
                path: path.to_owned(),
            },
            TryLockError::Error(source) => fault(source),
        })?;
        let mut bytes = Vec::new();
        file.read_to_end(&mut bytes).map_err(fault)?;
        if !scan::is_a_journal(&bytes) {
            return Err(JournalFault::NotAJournal {
                path: path.to_owned(),
            });
        }
        let scan = scan::scan(&bytes);
        let mut end = scan.kept as u64;
        if scan.kept < bytes.len() {
            file.cut(end).map_err(fault)?;
        }
        if scan.lacks_newline {
            Disk::write(&mut file, end, b"\n").map_err(fault)?;
            end += 1;
        }
        let journal = Self {
            path: path.to_owned(),
            disk: Box::new(file),
            end,
            next_number: scan.number_to_write(),
        };
        Ok((
            journal,
            Contents {
                events: scan.events,
                notices: scan.notices,
            },
        ))
    }

    /// Writes an act down and returns it as it will be read back, once it is safe on the disk.
    ///
    /// On an error nothing is recorded, and the next act may be tried.
    pub fn append(&mut self, utc: Utc, event: &Event) -> Result<Stamped, JournalFault> {
        let (line, stamped) = line::write(self.next_number, utc, event)?;
        if let Err(source) = self.disk.write(self.end, line.as_bytes()) {
            // what part of the line did get there goes; failing that the next act writes over it,
            // and failing that too it is repaired on opening
            let _ = self.disk.cut(self.end);
            return Err(JournalFault::Write {
                path: self.path.clone(),
                source,
            });
        }
        self.end += line.len() as u64;
        self.next_number = self.next_number.saturating_add(1);
        Ok(stamped)
    }

    /// The file.
    #[must_use]
    pub fn path(&self) -> &Path {
        &self.path
    }
}

#[cfg(test)]
mod tests {
    use std::sync::{Arc, Mutex};

    use super::*;

    /// A disk in memory that holds so many bytes and no more.
    struct SmallDisk {
        bytes: Arc<Mutex<Vec<u8>>>,
        room: usize,
    }

    impl Disk for SmallDisk {
        fn write(&mut self, at: u64, bytes: &[u8]) -> io::Result<()> {
            let mut held = self.bytes.lock().unwrap();
            held.truncate(usize::try_from(at).unwrap());
            let fitting = bytes.len().min(self.room - held.len());
            held.extend_from_slice(&bytes[..fitting]);
            if fitting == bytes.len() {
                Ok(())
            } else {
                Err(io::ErrorKind::StorageFull.into())
            }
        }

        fn cut(&mut self, length: u64) -> io::Result<()> {
            let mut held = self.bytes.lock().unwrap();
            held.truncate(usize::try_from(length).unwrap());
            Ok(())
        }
    }

    #[test]
    fn a_full_disk_is_said_and_leaves_no_half_line() {
        let bytes = Arc::new(Mutex::new(Vec::new()));
        let mut journal = Journal {
            path: PathBuf::from("night.jsonl"),
            disk: Box::new(SmallDisk {
                bytes: Arc::clone(&bytes),
                room: 250,
            }),
            end: 0,
            next_number: 1,
        };
        let utc = Utc::parse("2026-12-01T21:30:00Z").unwrap();
        let note = |text: &str| Event::Note {
            target: None,
            text: text.to_owned(),
        };
        journal.append(utc, &note("first")).unwrap();
        let whole = bytes.lock().unwrap().clone();
        let fault = journal.append(utc, &note(&"long ".repeat(40))).unwrap_err();
        assert!(matches!(fault, JournalFault::Write { .. }));
        assert_eq!(*bytes.lock().unwrap(), whole);
        // what is short enough still goes in, with the next number
        let stamped = journal.append(utc, &note("short")).unwrap();
        assert_eq!(stamped.number, 2);
        let contents = understand(&bytes.lock().unwrap()).unwrap();
        assert_eq!(contents.events.len(), 2);
        assert_eq!(contents.notices, []);
    }
}
