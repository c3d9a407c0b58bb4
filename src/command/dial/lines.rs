//! Settings again and again, one plain line a target: for a dumb terminal, a screen reader, a pipe.

use std::collections::HashMap;
use std::io::{self, Write};

use crate::command::dial::words;
use crate::command::dial::{Answer, Outcome};
use crate::command::station::Station;
use crate::dial::Caution;
use crate::sky::Moment;

/// What the lines said last of each target, so that a caution is said when it comes, not every time.
#[derive(Debug, Default)]
pub(super) struct Lines {
    said: HashMap<String, Vec<Caution>>,
}

impl Lines {
    /// Prints a line for every answer, and a line for every new caution.
    pub(super) fn print(
        &mut self,
        station: &Station,
        moment: &Moment,
        answers: &[Answer<'_>],
        out: &mut dyn Write,
    ) -> io::Result<()> {
        let civil = station.site.zone.civil(moment.utc());
        let clocks = format!(
            "{} sidereal {}",
            civil.format("%H:%M:%S"),
            words::sidereal(moment.apparent_sidereal())
        );
        for answer in answers {
            match &answer.outcome {
                Outcome::Dialled(target, dial) => {
                    let (side, stand) = (dial.side.in_words(), words::stand(dial));
                    writeln!(
                        out,
                        "{clocks}: {}, {side}, hour circle {}, declination circle {}, {stand}",
                        target.name, dial.hour.text, dial.dec.text
                    )?;
                    self.cautions(&target.name, &dial.cautions, out)?;
                }
                Outcome::NotDialled(target, why) => {
                    writeln!(out, "{clocks}: {}: {why}", target.name)?;
                }
                Outcome::Unknown(why) => writeln!(out, "{clocks}: {}: {why}", answer.asked.text)?,
            }
        }
        Ok(())
    }

    fn cautions(
        &mut self,
        target: &str,
        cautions: &[Caution],
        out: &mut dyn Write,
    ) -> io::Result<()> {
        let before = self
            .said
            .insert(target.to_owned(), cautions.to_vec())
            .unwrap_or_default();
        for caution in cautions {
            if !before.iter().any(|said| said.code == caution.code) {
                writeln!(out, "caution for {target}: {}", caution.text)?;
            }
        }
        Ok(())
    }
}
