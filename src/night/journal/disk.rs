//! The file under a journal: written at its end and synchronised, or cut back.

use std::fs::{self, File, OpenOptions};
use std::io::{self, Seek, SeekFrom, Write};
use std::path::{Path, PathBuf};

/// Something that keeps bytes; a file, or what stands in for one in a test of a failing disk.
pub(super) trait Disk: Send {
    /// Writes at this place and returns once the bytes are safe.
    fn write(&mut self, at: u64, bytes: &[u8]) -> io::Result<()>;
    /// Cuts the file to this length and returns once that is safe.
    fn cut(&mut self, length: u64) -> io::Result<()>;
}

impl Disk for File {
    fn write(&mut self, at: u64, bytes: &[u8]) -> io::Result<()> {
        self.seek(SeekFrom::Start(at))?;
        self.write_all(bytes)?;
        self.sync_data()
    }

    fn cut(&mut self, length: u64) -> io::Result<()> {
        self.set_len(length)?;
        self.sync_data()
    }
}

/// Opens a file to read and write, with the folders above it; new ones are made to last.
pub(super) fn open(path: &Path) -> io::Result<File> {
    let folder = folder_of(path);
    let missing: Vec<PathBuf> = folder
        .ancestors()
        .filter(|above| !above.as_os_str().is_empty())
        .take_while(|above| !above.exists())
        .map(Path::to_path_buf)
        .collect();
    fs::create_dir_all(&folder)?;
    let is_new = !path.exists();
    let file = OpenOptions::new()
        .read(true)
        .write(true)
        .create(true)
        .truncate(false)
        .open(path)?;
    if is_new {
        file.sync_all()?;
        sync_folder(&folder)?;
        for made in &missing {
            sync_folder(&folder_of(made))?;
        }
    }
    Ok(file)
}

fn folder_of(path: &Path) -> PathBuf {
    match path.parent() {
        Some(parent) if !parent.as_os_str().is_empty() => parent.to_path_buf(),
        _ => PathBuf::from("."),
    }
}

/// Makes the entries of a folder last.
#[cfg(unix)]
fn sync_folder(folder: &Path) -> io::Result<()> {
    File::open(folder)?.sync_all()
}

/// Elsewhere a folder cannot be opened as a file, and its entries last with the file's own.
#[cfg(not(unix))]
fn sync_folder(_: &Path) -> io::Result<()> {
    Ok(())
}
