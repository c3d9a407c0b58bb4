//! The units of the columns of a `VOTable`, as *Units in the VO* 1.0 and the tables of the data centres write them.

use crate::angle::Angle;

/// How an angle is written in a column.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Angular {
    /// A number of so large a unit.
    Number(Angle),
    /// Sexagesimal hours.
    Hours,
    /// Sexagesimal degrees.
    Degrees,
}

impl Angular {
    /// By the unit stated and whether the column holds text; nothing where it is not known or not stated.
    pub fn of(unit: Option<&str>, is_text: bool, hours: bool) -> Option<Self> {
        let sexagesimal = if hours { Self::Hours } else { Self::Degrees };
        let Some(unit) = unit else {
            // only text can be told from a number of unknown unit
            return is_text.then_some(sexagesimal);
        };
        let plain = unit.trim_matches(['"', '\'']).to_lowercase();
        let size = match plain.as_str() {
            "deg" | "degree" | "degrees" => Angle::from_degrees(1.0),
            "rad" | "radian" => Angle::from_radians(1.0),
            "h" | "hourangle" | "hr" if hours => Angle::from_hours(1.0),
            "arcmin" => Angle::from_arcminutes(1.0),
            "arcsec" => Angle::from_arcseconds(1.0),
            "mas" => Angle::from_arcseconds(0.001),
            "h:m:s" | "hms" | "hh:mm:ss" if hours => return Some(Self::Hours),
            "d:m:s" | "dms" | "dd:mm:ss" if !hours => return Some(Self::Degrees),
            _ => return None,
        };
        Some(Self::Number(size))
    }
}

/// How a proper motion is written: so many milliseconds of arc a year for each unit.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct PerYear(pub f64);

impl PerYear {
    /// By the unit stated.
    pub fn of(unit: Option<&str>) -> Option<Self> {
        let plain: String = unit?.chars().filter(|c| !c.is_whitespace()).collect();
        let angle = [
            "/yr", "/a", "/year", ".yr-1", ".yr**-1", ".yr^-1", "yr-1", "yr**-1", ".a-1",
        ]
        .iter()
        .find_map(|per| plain.strip_suffix(per))?;
        let mas = match angle {
            "mas" => 1.0,
            "arcsec" => 1e3,
            "deg" => 3.6e6,
            "rad" => Angle::from_radians(1.0).arcseconds() * 1e3,
            _ => return None,
        };
        Some(Self(mas))
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn a_unit_is_known_by_its_usual_spellings_and_never_guessed_at() {
        let deg = Some(Angular::Number(Angle::from_degrees(1.0)));
        assert_eq!(Angular::of(Some("deg"), false, true), deg);
        assert_eq!(
            Angular::of(Some("\"h:m:s\""), true, true),
            Some(Angular::Hours)
        );
        assert_eq!(
            Angular::of(Some("\"d:m:s\""), true, false),
            Some(Angular::Degrees)
        );
        assert_eq!(Angular::of(None, true, false), Some(Angular::Degrees));
        for unknown in [
            Angular::of(None, false, true),
            Angular::of(Some("pixel"), false, true),
            Angular::of(Some("h"), false, false),
        ] {
            assert_eq!(unknown, None);
        }
        for mas in ["mas/yr", "mas.yr-1", "mas yr-1", "mas.yr**-1"] {
            assert_eq!(PerYear::of(Some(mas)), Some(PerYear(1.0)), "{mas}");
        }
        assert_eq!(PerYear::of(Some("arcsec/yr")), Some(PerYear(1000.0)));
        assert_eq!(PerYear::of(Some("s/yr")), None);
        assert_eq!(PerYear::of(None), None);
    }
}
