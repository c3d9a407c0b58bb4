//! Orbital elements in the Minor Planet Center's published one-line formats, as targets.
//!
//! Two formats, each with its columns: the export format for minor-planet orbits (MPCORB, 202 columns) and the
//! one-line format of the comets' ephemerides and orbital elements. [`read`] takes one line, so that a file of
//! a million can be read where it lies; [`read_all`] a whole text. The format is told by the line itself. The
//! layout of the columns and the packed forms are from memory of the published descriptions, and agree with the
//! lines and the columns that skyfield 1.55 carries (`skyfield/data/mpc.py`, `skyfield/tests/test_keplerlib.py`).

mod columns;
mod comet;
mod minor_planet;
mod packed;

use crate::catalog::Target;
use crate::sexagesimal::TextFault;

/// Which of the formats.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Format {
    /// Orbits of minor planets.
    MinorPlanets,
    /// Orbits of comets.
    Comets,
}

impl Format {
    /// The format of a line: minor planets have their packed epoch in columns 21 to 25, comets the year and the
    /// month of perihelion in columns 15 to 21. Nothing for a line that is neither.
    #[must_use]
    pub fn of_line(line: &str) -> Option<Self> {
        let part = |range: std::ops::Range<usize>| line.get(range).unwrap_or("");
        let digits = |text: &str| !text.is_empty() && text.bytes().all(|b| b.is_ascii_digit());
        if digits(part(14..18)) && part(18..19) == " " && digits(part(19..21)) {
            return Some(Self::Comets);
        }
        let epoch = part(20..25);
        let is_epoch = epoch.starts_with(|c: char| c.is_ascii_uppercase())
            && digits(part(21..23))
            && epoch.bytes().all(|b| b.is_ascii_alphanumeric());
        (is_epoch && part(19..20) == " " && part(25..26) == " ").then_some(Self::MinorPlanets)
    }

    /// The format of a text of such lines, by the first of its lines that shows one; nothing for any other text.
    #[must_use]
    pub fn of_text(text: &str) -> Option<Self> {
        /// Lines looked at: a heading without dashes under it is a few lines.
        const LOOKED_AT: usize = 60;
        let body = text.get(heading(text)..).unwrap_or("");
        let said = body.lines().filter(|line| !line.trim().is_empty());
        said.take(LOOKED_AT).find_map(Self::of_line)
    }
}

/// Bytes of the heading: all up to the end of the line of dashes that closes it; none without such a line.
#[must_use]
pub fn heading(text: &str) -> usize {
    /// Fewer dashes than this may be anything.
    const LEAST: usize = 20;
    let mut at = 0;
    for line in text.split_inclusive('\n') {
        at += line.len();
        let said = line.trim();
        if said.len() >= LEAST && said.bytes().all(|b| b == b'-') {
            return at;
        }
    }
    0
}

/// The target of one line, without its end; a fault is where in the line it stands.
pub fn read(line: &str) -> Result<Target, TextFault> {
    match Format::of_line(line) {
        Some(format) => read_as(format, line),
        None => Err(TextFault {
            at: 0..line.len(),
            message: "this is no line of orbital elements".to_owned(),
            hint: "a minor planet has its packed epoch in columns 21 to 25, a comet the year of perihelion in columns 15 to 18",
        }),
    }
}

/// The same for a line of a known format, which may be too damaged to show it.
pub fn read_as(format: Format, line: &str) -> Result<Target, TextFault> {
    match format {
        Format::MinorPlanets => minor_planet::read(line),
        Format::Comets => comet::read(line),
    }
}

/// The same for a line among others of a format: it is one of them unless it shows the other format, or is too short
/// for either.
pub fn read_among(usual: Option<Format>, line: &str) -> Result<Target, TextFault> {
    /// A line of fewer columns holds no elements in either format, and is something else.
    const SHORTEST: usize = 60;
    let damaged = usual.filter(|_| line.len() > SHORTEST);
    match Format::of_line(line).or(damaged) {
        Some(format) => read_as(format, line),
        None => read(line),
    }
}

/// All targets of a text, and what is wrong with the lines that are none, each at its place in the text.
///
/// The heading of the file and empty lines are passed over. A discoverer's name alone that several comets of the
/// text share ("PANSTARRS") is none of theirs.
#[must_use]
pub fn read_all(text: &str) -> (Vec<Target>, Vec<TextFault>) {
    let (mut targets, mut faults) = (Vec::new(), Vec::new());
    let usual = Format::of_text(text);
    let mut at = heading(text);
    for line in text.get(at..).unwrap_or("").split_inclusive('\n') {
        let said = line.trim_end();
        if !said.is_empty() {
            let read = read_among(usual, said);
            match read {
                Ok(target) => targets.push(target),
                Err(fault) => faults.push(TextFault {
                    at: fault.at.start + at..fault.at.end + at,
                    ..fault
                }),
            }
        }
        at += line.len();
    }
    drop_shared_names(&mut targets);
    (targets, faults)
}

fn drop_shared_names(targets: &mut [Target]) {
    let mut seen = std::collections::HashMap::new();
    for name in targets.iter().flat_map(|target| target.also.iter()) {
        *seen.entry(name.clone()).or_insert(0_usize) += 1;
    }
    for target in targets {
        target
            .also
            .retain(|name| seen.get(name).is_none_or(|times| *times < 2));
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::catalog::Kind;
    use crate::sky::{Brightness, Orbit, Source};
    use crate::time::Tt;

    /// Source: `PyPI` skyfield 1.55, `skyfield/tests/test_keplerlib.py`, lines of the orbits of 2020 and 2022.
    const CERES: &str = "00001    3.4   0.15 K205V 162.68631   73.73161   80.28698   10.58862  0.0775571  0.21406009   2.7676569  0 MPO492748  6751 115 1801-2019 0.60 M-v 30h Williams   0000      (1) Ceres              20190915";
    const PALLAS: &str = "00002    4.11  0.15 K221L 272.47992  310.69724  172.91658   34.92531  0.2299930  0.21366046   2.7711069  0 MPO681823  8875 119 1804-2022 0.58 M-c 28k Pan        0000      (2) Pallas             20220105";
    /// Source: the same file, lines of the comets' elements.
    const HALE_BOPP: &str = "    CJ95O010  1997 03 29.6333  0.916241  0.994928  130.6448  283.3593   88.9908  20200224  -2.0  4.0  C/1995 O1 (Hale-Bopp)                                    MPC106342";
    const PANSTARRS: &str = "    CK15A020  2015 08  1.8353  5.341055  1.000000  208.8369  258.5042  109.1696            10.5  4.0  C/2015 A2 (PANSTARRS)                                    MPC 93587";

    fn orbit(target: &Target) -> Orbit {
        match target.source {
            Source::Orbit(orbit) => orbit,
            ref other => panic!("{other:?}"),
        }
    }

    #[test]
    fn a_minor_planets_line_is_read_column_by_column() {
        let ceres = read(CERES).unwrap();
        assert_eq!(
            (ceres.name.as_str(), ceres.kind),
            ("(1) Ceres", Kind::MinorPlanet)
        );
        assert_eq!(ceres.also, ["Ceres"]);
        let orbit = orbit(&ceres);
        assert!((orbit.perihelion_distance_au - 2.767_656_9 * (1.0 - 0.077_557_1)).abs() < 1e-12);
        assert!((orbit.inclination.degrees() - 10.588_62).abs() < 1e-12);
        assert!((orbit.node.degrees() - 80.286_98).abs() < 1e-12);
        assert!((orbit.argument_of_perihelion.degrees() - 73.731_61).abs() < 1e-12);
        // 2020 May 31.0 TT
        assert_eq!(orbit.epoch.map(Tt::julian_day), Some(2_459_000.5));
        // the stated daily motion leads to the same perihelion
        let since = 162.686_31 / 0.214_060_09;
        let perihelion = 2_459_000.5 - orbit.perihelion.julian_day();
        assert!((perihelion - since).abs() < 1e-3, "{perihelion} {since}");
        let (absolute, slope) = (3.4, 0.15);
        assert_eq!(
            orbit.brightness,
            Brightness::MinorPlanet { absolute, slope }
        );
    }

    #[test]
    fn a_comets_line_is_read_column_by_column() {
        let comet = read(HALE_BOPP).unwrap();
        assert_eq!(comet.name, "C/1995 O1 (Hale-Bopp)");
        assert_eq!(comet.also, ["C/1995 O1", "Hale-Bopp"]);
        assert_eq!(comet.kind, Kind::Comet);
        let orbit = orbit(&comet);
        assert!((orbit.perihelion_distance_au - 0.916_241).abs() < 1e-12);
        assert!((orbit.eccentricity - 0.994_928).abs() < 1e-12);
        // 1997 March 29.6333, and 2020 February 24.0 TT
        assert!((orbit.perihelion.julian_day() - 2_450_537.133_3).abs() < 1e-9);
        assert_eq!(orbit.epoch.map(Tt::julian_day), Some(2_458_903.5));
        let (absolute, power) = (-2.0, 4.0);
        assert_eq!(orbit.brightness, Brightness::Comet { absolute, power });
    }

    #[test]
    fn elements_without_an_epoch_have_none() {
        assert_eq!(orbit(&read(PANSTARRS).unwrap()).epoch, None);
    }

    #[test]
    fn a_heading_is_passed_over_and_a_bad_line_leaves_the_others() {
        let damaged = PALLAS.replace("0.2299930", "0.22999x0");
        let text = format!(
            "MINOR PLANET ORBITS\n\n{}\n{CERES}\r\n\n{damaged}\n",
            "-".repeat(160)
        );
        assert_eq!(Format::of_text(&text), Some(Format::MinorPlanets));
        let (targets, faults) = read_all(&text);
        assert_eq!(targets.len(), 1);
        assert_eq!(faults.len(), 1);
        assert_eq!(text.get(faults[0].at.clone()), Some("0.22999x0"));
    }

    #[test]
    fn a_name_that_several_comets_share_is_none_of_theirs() {
        let other = PANSTARRS.replace("C/2015 A2", "C/2015 A3");
        let (targets, faults) = read_all(&format!("{PANSTARRS}\n{other}\n{HALE_BOPP}\n"));
        assert_eq!(faults, []);
        assert_eq!(targets[0].also, ["C/2015 A2"]);
        assert_eq!(targets[2].also, ["C/1995 O1", "Hale-Bopp"]);
    }

    #[test]
    fn columns_that_have_slipped_are_seen() {
        let slipped = CERES.replacen("162.68631", "162.686310", 1);
        let fault = read(&slipped).unwrap_err();
        assert!(fault.message.contains("column"), "{fault:?}");
        assert!(read("M 37").is_err());
        assert_eq!(Format::of_text("M 37\nVega\n"), None);
    }

    #[test]
    fn every_cut_and_every_changed_byte_is_answered() {
        for line in [CERES, HALE_BOPP] {
            for at in 0..line.len() {
                let _ = read(&line[..at]);
                for other in [" ", "x", "9", "-", "é"] {
                    let changed = format!("{}{other}{}", &line[..at], &line[at + 1..]);
                    if let Err(fault) = read(&changed) {
                        assert!(changed.get(fault.at.clone()).is_some(), "{fault:?}");
                        assert!(!fault.hint.is_empty());
                    }
                }
            }
        }
    }
}
