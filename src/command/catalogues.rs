//! The catalogues of a run: those compiled into the program, and the user's own.

use std::io::{self, IsTerminal as _, Write as _};
use std::path::Path;
use std::time::{Duration, Instant};

use crate::catalog::Catalogue;
use crate::site::{Faults, Folders};

/// Reading a catalogue for the first time is spoken of when it takes longer than this.
const SPOKEN_OF_AFTER: Duration = Duration::from_millis(500);

/// All catalogues. What is wrong with one of the user's is said on standard error; the others are used.
pub fn open(folders: &Folders) -> Result<Catalogue, Faults> {
    let (catalogue, warnings) = opened(folders)?;
    for warning in warnings {
        // with standard error gone there is nobody left to tell
        let _ = writeln!(io::stderr(), "warning: {warning}");
    }
    Ok(catalogue)
}

/// The same, with what is wrong given back.
pub fn opened(folders: &Folders) -> Result<(Catalogue, Vec<String>), Faults> {
    let mut slow = Slow::new();
    let mut own = Vec::new();
    let mut warnings = Vec::new();
    for (path, opened) in folders.catalogues(&mut |path, done| slow.report(path, done))? {
        let name = path.display();
        match opened {
            Ok(opened) => {
                if opened.unread > 0 {
                    let rows = if opened.unread == 1 { "row" } else { "rows" };
                    let unread = opened.unread;
                    warnings.push(format!(
                        "{unread} {rows} of {name} cannot be read: see nonius check {name}"
                    ));
                }
                own.push(opened.catalogue);
            }
            Err(faults) => warnings.push(format!(
                "the catalogue {name} is left out\n{}",
                faults.to_string().trim_end()
            )),
        }
    }
    Ok((Catalogue::builtin().with_catalogues(own), warnings))
}

/// How far a large catalogue has been read, told on a terminal.
struct Slow {
    since: Instant,
    shown: bool,
    percent: u32,
}

impl Slow {
    fn new() -> Self {
        Self {
            since: Instant::now(),
            shown: false,
            percent: 0,
        }
    }

    #[allow(clippy::cast_possible_truncation, clippy::cast_sign_loss)] // from 0 to 100
    fn report(&mut self, path: &Path, done: f64) {
        if self.since.elapsed() < SPOKEN_OF_AFTER || !io::stderr().is_terminal() {
            return;
        }
        let percent = (done * 100.0) as u32;
        let mut err = io::stderr().lock();
        if self.shown && done >= 1.0 {
            let _ = write!(err, "\r\x1b[K");
        } else if !self.shown || percent != self.percent {
            let name = path.file_name().unwrap_or_default().display();
            let _ = write!(err, "\rreading {name}, this once: {percent} %");
        }
        let _ = err.flush();
        self.shown = done < 1.0;
        self.percent = percent;
    }
}
