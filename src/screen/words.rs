//! Amounts as an observer says them.

use crate::angle::{Angle, Azimuth};
use crate::sexagesimal::{Notation, Unit};

/// An angle as roughly as it is worth saying: `9'`, `2.3°`, `14°`.
#[must_use]
pub fn rough(angle: Angle) -> String {
    let size = angle.abs();
    if size.arcminutes() < 99.5 {
        format!("{:.0}'", size.arcminutes())
    } else if size.degrees() < 9.95 {
        format!("{:.1}°", size.degrees())
    } else {
        format!("{:.0}°", size.degrees())
    }
}

/// A turn of an axis: `2h 12m` or `14°`, to a minute of time or to a degree; small ones in minutes.
#[must_use]
pub fn turn(angle: Angle, unit: Unit) -> String {
    match unit {
        Unit::Hours => {
            let minute = Notation::new(Unit::Hours, Angle::from_time_seconds(60.0));
            if minute.round(angle.abs()) < Angle::from_hours(1.0) {
                format!("{:.0} min", angle.abs().hours() * 60.0)
            } else {
                minute.write(angle.abs())
            }
        }
        Unit::Degrees => rough(angle),
    }
}

/// The eight points of the compass.
#[must_use]
pub fn compass(azimuth: Azimuth) -> &'static str {
    const POINTS: [&str; 8] = ["N", "NE", "E", "SE", "S", "SW", "W", "NW"];
    #[allow(clippy::cast_possible_truncation, clippy::cast_sign_loss)] // 0 to 8
    let point = (azimuth.degrees() / 45.0).round() as usize;
    POINTS.get(point % 8).copied().unwrap_or("N")
}

/// A span of time: `0:20`, `12:05`, `1:02:05`.
#[must_use]
pub fn span(seconds: f64) -> String {
    #[allow(clippy::cast_possible_truncation, clippy::cast_sign_loss)]
    // not negative, below a day or so
    let seconds = seconds.max(0.0).round() as u64;
    let (hours, minutes, seconds) = (seconds / 3600, seconds / 60 % 60, seconds % 60);
    if hours > 0 {
        format!("{hours}:{minutes:02}:{seconds:02}")
    } else {
        format!("{minutes}:{seconds:02}")
    }
}

/// A probability in whole per cent, never rounded to certainty.
#[must_use]
pub fn chance(probability: f64) -> String {
    let percent = (probability * 100.0).round();
    if percent >= 100.0 {
        "99 %".to_owned()
    } else if percent < 1.0 {
        "under 1 %".to_owned()
    } else {
        format!("{percent:.0} %")
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn angles_are_said_as_roughly_as_they_are_worth() {
        for (arcminutes, said) in [
            (0.4, "0'"),
            (9.2, "9'"),
            (-14.0, "14'"),
            (99.4, "99'"),
            (138.0, "2.3°"),
            (840.0, "14°"),
        ] {
            assert_eq!(rough(Angle::from_arcminutes(arcminutes)), said);
        }
    }

    #[test]
    fn turns_are_said_in_the_circle_s_own_unit() {
        assert_eq!(turn(Angle::from_hours(-2.2), Unit::Hours), "2h 12m");
        assert_eq!(turn(Angle::from_hours(0.1), Unit::Hours), "6 min");
        assert_eq!(turn(Angle::ZERO, Unit::Hours), "0 min");
        assert_eq!(turn(Angle::from_degrees(33.0), Unit::Degrees), "33°");
    }

    #[test]
    fn nothing_is_certain() {
        assert_eq!(chance(0.9999), "99 %");
        assert_eq!(chance(0.001), "under 1 %");
        assert_eq!(chance(0.914), "91 %");
    }

    #[test]
    fn the_compass_goes_round() {
        assert_eq!(compass(Azimuth::from_degrees(359.0)), "N");
        assert_eq!(compass(Azimuth::from_degrees(143.0)), "SE");
    }
}
