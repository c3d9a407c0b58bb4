//! What is known of a star beside its place: its companions, and how its light varies.
//!
//! Two tables by Hipparcos number, read in place: `doubles.csv` and `variables.csv`; sources and licences stand at their heads.

use std::fmt;

use crate::catalog::rows::{Row, Table};
use crate::catalog::{Catalogue, Target};
use crate::time::Utc;

/// What is known of one star.
#[derive(Clone, Debug, Default, PartialEq)]
pub struct Facts {
    /// Its pairs, the usual one first.
    pub pairs: Vec<Pair>,
    /// How it varies, if it does.
    pub variable: Option<Variable>,
}

/// Two stars that stand together.
#[derive(Clone, Debug, PartialEq)]
pub struct Pair {
    /// Which components of the star, as "AB".
    pub components: String,
    /// How far apart, in seconds of arc.
    pub separation_arcsec: f64,
    /// Position angle of the second from the first, from north through east, in degrees.
    pub angle_deg: f64,
    /// Their magnitudes.
    pub magnitudes: (f64, f64),
    /// The year of the measure.
    pub year: f64,
}

/// A star whose light varies.
#[derive(Clone, Debug, PartialEq)]
pub struct Variable {
    /// After which star its type is named, or what it does: "Algol", "semiregular".
    pub kind: String,
    /// Its magnitudes, V, the brightest and the faintest.
    pub range: (f64, f64),
    /// Days; nothing for one without a lasting period.
    pub period_days: Option<f64>,
    /// A heliocentric Julian date of an extreme, where others can be told from it.
    pub epoch: Option<(f64, Extreme)>,
}

/// The extreme of a star's light that its elements are of.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Extreme {
    /// Faintest.
    Minimum,
    /// Brightest.
    Maximum,
}

/// The two tables.
#[derive(Clone, Copy, Debug)]
pub struct FactTables {
    doubles: Table<'static>,
    variables: Table<'static>,
}

impl FactTables {
    /// Those compiled into the program.
    #[must_use]
    pub fn builtin() -> Self {
        Self {
            doubles: Table::new(include_str!("../../catalogs/doubles.csv")),
            variables: Table::new(include_str!("../../catalogs/variables.csv")),
        }
    }

    /// What is known of the star of a Hipparcos number, as it is written.
    #[must_use]
    pub fn of(&self, hip: &str) -> Facts {
        let doubles = self.doubles.rows().filter(|row| row.first() == hip);
        let mut variables = self.variables.rows().filter(|row| row.first() == hip);
        Facts {
            pairs: doubles.filter_map(Pair::read).collect(),
            variable: variables.find_map(Variable::read),
        }
    }

    /// The Hipparcos numbers of the doubles, as they are written.
    pub fn doubles(&self) -> impl Iterator<Item = &'static str> + use<> {
        self.doubles.rows().map(Row::first)
    }

    /// The Hipparcos numbers of the variables, as they are written.
    pub fn variables(&self) -> impl Iterator<Item = &'static str> + use<> {
        self.variables.rows().map(Row::first)
    }
}

impl Catalogue {
    /// What is known of a target beside its place; nothing of what has no Hipparcos number.
    #[must_use]
    pub fn facts(target: &Target) -> Facts {
        let mut names = target.names();
        let hip = names.find_map(|name| name.strip_prefix("HIP "));
        hip.map_or_else(Facts::default, |hip| FactTables::builtin().of(hip))
    }
}

impl Pair {
    fn read(row: Row<'static>) -> Option<Self> {
        let [_, components, separation, angle, primary, secondary, year] = row.all();
        Some(Self {
            components: components.to_owned(),
            separation_arcsec: separation.parse().ok()?,
            angle_deg: angle.parse().ok()?,
            magnitudes: (primary.parse().ok()?, secondary.parse().ok()?),
            year: year.parse().ok()?,
        })
    }
}

impl fmt::Display for Pair {
    /// As in `double AB, 4.1" at 357° in 2015, magnitudes 5.0 and 6.1`.
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        let (first, second) = self.magnitudes;
        write!(
            f,
            "double {}, {:.1}\" at {:.0}° in {:.0}, magnitudes {first:.1} and {second:.1}",
            self.components, self.separation_arcsec, self.angle_deg, self.year
        )
    }
}

impl Variable {
    fn read(row: Row<'static>) -> Option<Self> {
        let [_, kind, brightest, faintest, period, epoch, event] = row.all();
        let extreme = match event {
            "minimum" => Some(Extreme::Minimum),
            "maximum" => Some(Extreme::Maximum),
            _ => None,
        };
        Some(Self {
            kind: kind.to_owned(),
            range: (brightest.parse().ok()?, faintest.parse().ok()?),
            period_days: period.parse().ok(),
            epoch: epoch.parse().ok().zip(extreme),
        })
    }

    /// The first extreme after an instant, as seen from the Earth, where the light arrives at the Sun so many seconds
    /// later than at the Earth (negative: earlier).
    ///
    /// Nothing where no extreme can be told. The date of the elements is taken for UTC: a minute, far within what the
    /// elements know.
    #[must_use]
    pub fn next(&self, after: Utc, sun_later_s: f64) -> Option<(Extreme, Utc)> {
        let (epoch, extreme) = self.epoch?;
        let period = self.period_days.filter(|period| *period > 0.0)?;
        let (day, fraction) = after.quasi_julian();
        let at_the_sun = (day - epoch) + fraction + sun_later_s / 86_400.0;
        let ahead_days = period - at_the_sun.rem_euclid(period);
        Some((extreme, after.plus_seconds(ahead_days * 86_400.0)))
    }
}

impl Extreme {
    /// In a word.
    #[must_use]
    pub const fn word(self) -> &'static str {
        match self {
            Self::Minimum => "minimum",
            Self::Maximum => "maximum",
        }
    }
}

impl fmt::Display for Variable {
    /// As in `varies from 2.1 to 3.4 every 2.87 days (Algol type)`.
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        let (brightest, faintest) = self.range;
        write!(f, "varies from {brightest:.1} to {faintest:.1}")?;
        match self.period_days {
            Some(days) if days < 30.0 => write!(f, " every {days:.2} days")?,
            Some(days) => write!(f, " in some {days:.0} days")?,
            None => {}
        }
        write!(f, " ({})", self.kind)
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn every_row_of_both_tables_is_read_and_its_star_is_known() {
        let tables = FactTables::builtin();
        let catalogue = Catalogue::builtin();
        let (mut doubles, mut variables) = (0, 0);
        for hip in tables.doubles() {
            let star = catalogue.resolve(&format!("HIP {hip}")).unwrap();
            let pairs = Catalogue::facts(&star).pairs;
            assert!(!pairs.is_empty(), "{hip}");
            for pair in pairs {
                assert!((0.3..600.0).contains(&pair.separation_arcsec), "{pair}");
                assert!((0.0..=360.0).contains(&pair.angle_deg), "{pair}");
                assert!((1950.0..2030.0).contains(&pair.year), "{pair}");
            }
            doubles += 1;
        }
        for hip in tables.variables() {
            let star = catalogue.resolve(&format!("HIP {hip}")).unwrap();
            let variable = Catalogue::facts(&star).variable.unwrap();
            assert!(variable.range.0 < variable.range.1, "{variable}");
            variables += 1;
        }
        assert!(doubles > 80 && variables > 40, "{doubles} {variables}");
    }

    #[test]
    fn nothing_is_known_of_what_is_no_star_of_the_tables() {
        let catalogue = Catalogue::builtin();
        for name in ["M 37", "Moon", "1h +3"] {
            let target = catalogue.resolve(name).unwrap();
            assert_eq!(Catalogue::facts(&target), Facts::default());
        }
    }

    #[test]
    fn the_next_extreme_is_within_a_period_and_a_whole_number_of_periods_from_the_epoch() {
        let variable = Variable {
            kind: "Algol".to_owned(),
            range: (2.1, 3.4),
            period_days: Some(2.867_328),
            epoch: Some((2_452_500.152, Extreme::Minimum)),
        };
        let now = Utc::parse("2026-12-01T21:30:00Z").unwrap();
        for sun_later_s in [-499.0, 0.0, 499.0] {
            let (extreme, next) = variable.next(now, sun_later_s).unwrap();
            assert_eq!(extreme, Extreme::Minimum);
            let ahead_s = next.seconds_since(now);
            assert!(ahead_s > 0.0 && ahead_s <= 2.867_328 * 86_400.0);
            let (day, fraction) = next.quasi_julian();
            let at_the_sun = (day - 2_452_500.152) + fraction + sun_later_s / 86_400.0;
            let cycles = at_the_sun / 2.867_328;
            assert!(
                (cycles - cycles.round()).abs() * 2.867_328 * 86_400.0 < 1.0,
                "{cycles}"
            );
        }
        let without = Variable {
            epoch: None,
            ..variable
        };
        assert_eq!(without.next(now, 0.0), None);
    }
}
