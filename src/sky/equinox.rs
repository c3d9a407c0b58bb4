//! How an observer writes an equinox: `ICRS`, `J2000`, `B1950`, `J2026.9`, `B1875`, `date`.

use std::fmt;
use std::str::FromStr;

use crate::bounds::{EQUINOX_YEAR, OutOfBounds};
use crate::sky::Equinox;

/// Why a text is no equinox.
#[derive(Clone, Debug, PartialEq, thiserror::Error)]
pub enum EquinoxFault {
    /// None of the known ways to write one.
    #[error("\"{0}\" is not an equinox")]
    Unknown(String),
    /// A year without the letter that says of which kind it is.
    #[error("the year {0} needs its letter: J for Julian, B for Besselian")]
    NoLetter(String),
    /// A year out of range.
    #[error(transparent)]
    Year(#[from] OutOfBounds),
}

impl EquinoxFault {
    /// What to write instead.
    pub const HINT: &'static str =
        "write ICRS, J2000, B1950, a year as in J2026.9 or B1875, or date";
}

impl FromStr for Equinox {
    type Err = EquinoxFault;

    fn from_str(text: &str) -> Result<Self, EquinoxFault> {
        let written = text.trim();
        let unknown = || EquinoxFault::Unknown(written.to_owned());
        if written.eq_ignore_ascii_case("icrs") {
            return Ok(Self::Icrs);
        }
        if written.eq_ignore_ascii_case("date") || written.eq_ignore_ascii_case("of date") {
            return Ok(Self::OfDate);
        }
        let letter = written.chars().next().ok_or_else(unknown)?;
        if !matches!(letter, 'J' | 'j' | 'B' | 'b' | '0'..='9') {
            return Err(unknown());
        }
        if letter.is_ascii_digit() {
            return Err(EquinoxFault::NoLetter(written.to_owned()));
        }
        let digits = written.get(letter.len_utf8()..).unwrap_or("");
        let plain = digits.bytes().all(|b| b.is_ascii_digit() || b == b'.');
        let year: f64 = digits.parse().ok().filter(|_| plain).ok_or_else(unknown)?;
        let year = EQUINOX_YEAR.check(year)?;
        // these two are systems of their own, asked for by exactly these years
        #[allow(clippy::float_cmp)]
        match letter {
            'J' | 'j' if year == 2000.0 => Ok(Self::J2000),
            'J' | 'j' => Ok(Self::Julian(year)),
            _ if year == 1950.0 => Ok(Self::B1950),
            _ => Ok(Self::Besselian(year)),
        }
    }
}

impl Equinox {
    /// The epoch of a place given at this equinox without one, as a Julian year; for the ICRS and
    /// for a place of date, to which it means nothing, 2000.
    #[must_use]
    pub fn epoch(self) -> f64 {
        let besselian = |year: f64| {
            let (day, part) = sofars::cal::epb2jd(year);
            sofars::cal::epj(day, part)
        };
        match self {
            Self::Icrs | Self::J2000 | Self::OfDate => 2000.0,
            Self::Julian(year) => year,
            Self::B1950 => besselian(1950.0),
            Self::Besselian(year) => besselian(year),
        }
    }
}

impl fmt::Display for Equinox {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        match self {
            Self::Icrs => f.write_str("ICRS"),
            Self::J2000 => f.write_str("J2000"),
            Self::B1950 => f.write_str("B1950"),
            Self::Julian(year) => write!(f, "J{year}"),
            Self::Besselian(year) => write!(f, "B{year}"),
            Self::OfDate => f.write_str("date"),
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn every_equinox_is_read_as_it_is_written() {
        for equinox in [
            Equinox::Icrs,
            Equinox::J2000,
            Equinox::B1950,
            Equinox::Julian(2026.9),
            Equinox::Besselian(1875.0),
            Equinox::OfDate,
        ] {
            assert_eq!(equinox.to_string().parse(), Ok(equinox));
            assert_eq!(equinox.to_string().to_lowercase().parse(), Ok(equinox));
        }
        assert_eq!("J2000.0".parse(), Ok(Equinox::J2000));
    }

    #[test]
    fn a_year_alone_is_not_guessed_at_and_a_far_one_refused() {
        let fault = |text: &str| text.parse::<Equinox>().unwrap_err();
        assert_eq!(fault("1950"), EquinoxFault::NoLetter("1950".to_owned()));
        assert!(matches!(fault("J20000"), EquinoxFault::Year(_)));
        for text in ["", "J", "K2000", "J2000x", "Jinf", "α"] {
            assert!(matches!(fault(text), EquinoxFault::Unknown(_)), "{text}");
        }
    }

    #[test]
    fn b1950_began_a_fraction_of_a_day_before_1950() {
        // B1950.0 = JD 2433282.42345905 (Lieske 1979): 0.077 day before J1950.0
        assert!((Equinox::B1950.epoch() - (1950.0 - 0.076_54 / 365.25)).abs() < 1e-6);
    }
}
