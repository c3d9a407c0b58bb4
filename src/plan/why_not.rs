//! Why an object cannot be had tonight, in plain words.

use std::fmt;

use crate::angle::{Altitude, Angle, Azimuth};
use crate::sky::{Twilight, compass_point};

/// Why an object cannot be had.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum WhyNot {
    /// Its name is in no catalogue.
    Unknown,
    /// It is the Sun.
    TheSun,
    /// The Sun never goes so far down.
    NeverDark(Twilight),
    /// It is not so dark in the hours asked for.
    NotDarkThen(Twilight),
    /// It never comes up above the mask or the mount's lowest altitude. Where it comes nearest:
    NeverUp {
        /// Its altitude.
        altitude: Altitude,
        /// Its azimuth.
        azimuth: Azimuth,
        /// What it would have to be above.
        floor: Floor,
    },
    /// It is up, but not while it is so dark.
    UpInLight(Twilight),
    /// It can be seen, but not in the hours asked for.
    OtherHours,
    /// It is beyond the hour angles the mount reaches while it can be seen.
    Limits,
    /// The Moon is too near all the time.
    NearMoon {
        /// How near, at the farthest.
        apart: Angle,
        /// The lit share of its disc.
        illuminated: f64,
    },
    /// It comes into reach for some minutes only, between two looks.
    Minutes,
    /// It can be had from the side of the pier that is not asked for.
    OtherSide,
    /// Others take the time it can be had in.
    NoTime,
}

/// Whole degrees of an altitude and of one above it; with a decimal where they would look the same.
fn apart(altitude: Altitude, above: Altitude) -> (String, String) {
    let [low, high] = [altitude, above].map(Altitude::degrees);
    let digits = usize::from(low.round() >= high.round());
    (format!("{low:.digits$}°"), format!("{high:.digits$}°"))
}

/// What an object must be above.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Floor {
    /// The level horizon.
    Level,
    /// The horizon mask.
    Mask(Altitude),
    /// The lowest altitude the mount may go to.
    Mount(Altitude),
}

const fn named(twilight: Twilight) -> &'static str {
    match twilight {
        Twilight::Civil => "civil",
        Twilight::Nautical => "nautical",
        Twilight::Astronomical => "astronomical",
    }
}

impl fmt::Display for WhyNot {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        match *self {
            Self::Unknown => f.write_str("no catalogue knows this name"),
            Self::TheSun => f.write_str("the Sun is not for the night"),
            Self::NeverDark(twilight) => write!(
                f,
                "not dark enough: the Sun stays less than {:.0}° below the horizon all night",
                -twilight.altitude().degrees()
            ),
            Self::NotDarkThen(twilight) => write!(
                f,
                "not dark enough in the hours asked for: {} twilight or brighter",
                named(twilight)
            ),
            Self::NeverUp {
                altitude,
                azimuth,
                floor,
            } => {
                let toward = compass_point(azimuth);
                match floor {
                    Floor::Level => write!(
                        f,
                        "never rises: at its highest {:.0}° below the horizon in the {toward}",
                        -altitude.degrees()
                    ),
                    Floor::Mask(mask) => {
                        let (at, mask) = apart(altitude, mask);
                        write!(
                            f,
                            "never above the mask: at best at {at} in the {toward}, where it stands to {mask}"
                        )
                    }
                    Floor::Mount(lowest) => {
                        let (at, lowest) = apart(altitude, lowest);
                        write!(
                            f,
                            "never high enough for the mount: at best at {at} in the {toward}, and it goes no lower than {lowest}"
                        )
                    }
                }
            }
            Self::UpInLight(twilight) => write!(
                f,
                "not dark enough: up only by day or before {} twilight has ended",
                named(twilight)
            ),
            Self::OtherHours => f.write_str("not to be had in the hours asked for"),
            Self::Limits => {
                f.write_str("beyond the mount's limits in hour angle while it is up in the dark")
            }
            Self::NearMoon { apart, illuminated } => write!(
                f,
                "within {:.0}° of a {}Moon, lit to {:.0} %",
                apart.degrees().ceil(),
                if illuminated < 0.5 { "" } else { "bright " },
                illuminated * 100.0
            ),
            Self::Minutes => f.write_str("in reach for some minutes only"),
            Self::OtherSide => f.write_str("to be had from the other side of the pier only"),
            Self::NoTime => {
                f.write_str("no time left: other objects take the time it can be had in")
            }
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn two_altitudes_never_look_the_same() {
        let said = |at, lowest| {
            let why = WhyNot::NeverUp {
                altitude: Altitude::from_degrees(at),
                azimuth: Azimuth::from_degrees(180.0),
                floor: Floor::Mount(Altitude::from_degrees(lowest)),
            };
            why.to_string()
        };
        assert!(
            said(9.4, 12.0).contains("at best at 9° in the south, and it goes no lower than 12°")
        );
        assert!(
            said(11.6, 12.0)
                .contains("at best at 11.6° in the south, and it goes no lower than 12.0°")
        );
    }
}
