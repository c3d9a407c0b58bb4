//! A mount as its file describes it.

use crate::angle::{Altitude, Angle, HourAngle};
use crate::metal::circle::{DeclinationCircle, HourCircle};
use crate::metal::errors::COUNT;
use crate::metal::view::View;

/// How the mount carries its tube.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Kind {
    /// One pier, the tube at one end of the declination axis: two sides.
    German,
    /// A polar axis between two piers, the tube beside it: two sides.
    CrossAxis,
    /// The tube between the arms of a fork: one side.
    Fork,
    /// The tube inside a yoke: one side.
    Yoke,
}

impl Kind {
    /// True if the tube can be on either side of the pier.
    #[must_use]
    pub const fn has_two_sides(self) -> bool {
        matches!(self, Self::German | Self::CrossAxis)
    }
}

/// A span of hour angles from its eastern end westward to its western end.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct HourAngleSpan {
    /// The eastern end.
    pub from: HourAngle,
    /// The western end.
    pub to: HourAngle,
}

/// Where the mount can go.
#[derive(Clone, Copy, Debug, Default, PartialEq)]
pub struct Limits {
    /// Nothing lower than this.
    pub lowest_altitude: Option<Altitude>,
    /// Hour angles reachable with the tube west (or on the single side).
    pub tube_west: Option<HourAngleSpan>,
    /// Hour angles reachable with the tube east.
    pub tube_east: Option<HourAngleSpan>,
}

/// How large the mount's errors are expected to be, 1 sigma each; index errors are always free.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct ExpectedErrors {
    /// Of the polar axis, up and down.
    pub polar_high: Angle,
    /// Of the polar axis, east and west, in azimuth.
    pub polar_east: Angle,
    /// Of the cone error.
    pub cone: Angle,
    /// Of the skew.
    pub skew: Angle,
    /// Of the sag.
    pub sag: Angle,
    /// Of the hour circle's eccentricity, each of its two parts; nothing where it is not looked for.
    pub hour_eccentric: Angle,
    /// Of the declination circle's eccentricity, each of its two parts; nothing where it is not looked for.
    pub dec_eccentric: Angle,
}

impl Default for ExpectedErrors {
    /// A portable mount set up with a compass and a level (common practice, no source).
    fn default() -> Self {
        Self {
            polar_high: Angle::from_degrees(1.0),
            polar_east: Angle::from_degrees(1.0),
            cone: Angle::from_arcminutes(30.0),
            skew: Angle::from_arcminutes(12.0),
            sag: Angle::from_arcminutes(3.0),
            hour_eccentric: Angle::ZERO,
            dec_eccentric: Angle::ZERO,
        }
    }
}

impl ExpectedErrors {
    /// Which errors are in question on this mount, in the order of [`crate::metal::errors::NAMES`]: all but the
    /// eccentricities not looked for.
    #[must_use]
    pub fn in_question(&self) -> [bool; COUNT] {
        let hour = self.hour_eccentric > Angle::ZERO;
        let dec = self.dec_eccentric > Angle::ZERO;
        [
            true, true, true, true, true, true, true, hour, hour, dec, dec,
        ]
    }
}

/// A dome, and where the mount stands in it; lengths in metres from the centre of its sphere.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Dome {
    /// Of the sphere.
    pub radius_m: f64,
    /// The crossing of the axes, to the east.
    pub axes_east_m: f64,
    /// The crossing of the axes, to the north.
    pub axes_north_m: f64,
    /// The crossing of the axes, upward.
    pub axes_up_m: f64,
}

/// The tube's place on the mount, lengths in metres.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Tube {
    /// From the crossing of the axes along the declination axis to the tube's centre line.
    pub offset_m: f64,
    /// From the foot of that offset along the tube to the eyepiece, away from the sky.
    pub eyepiece_m: f64,
    /// The crossing of the axes above the floor.
    pub axes_above_floor_m: f64,
}

/// A finder or an eyepiece.
#[derive(Clone, Debug, PartialEq)]
pub struct Optic {
    /// What the observer calls it.
    pub name: String,
    /// The diameter of its field on the sky.
    pub field: Angle,
    /// How its picture stands against what the naked eye sees.
    pub view: View,
    /// Where an eyepiece that looks out at the side of the tube stands, about the tube; nothing for one looked through along
    /// the tube, and for one that is turned upward for every object.
    pub turned: Option<Angle>,
}

/// A mount.
#[derive(Clone, Debug, PartialEq)]
pub struct Mount {
    /// Its name for people.
    pub name: String,
    /// How it carries its tube.
    pub kind: Kind,
    /// The clamped tube follows the sky.
    pub clock_drive: bool,
    /// The hour circle.
    pub hour_circle: HourCircle,
    /// The declination circle.
    pub declination_circle: DeclinationCircle,
    /// Where it can go.
    pub limits: Limits,
    /// How large its errors are expected to be.
    pub expected: ExpectedErrors,
    /// The dome around it.
    pub dome: Option<Dome>,
    /// Its tube.
    pub tube: Option<Tube>,
    /// Its finder and eyepieces, in the order they are tried.
    pub optics: Vec<Optic>,
}

/// A field wider than this is a finder's (common practice, no source).
const WIDEST_EYEPIECE: Angle = Angle::from_degrees(2.0);

/// The field looked into where the mount file names none.
const USUAL_FIELD: Angle = Angle::from_degrees(1.0);

impl Mount {
    /// The field of the eyepiece that is looked into first: the widest that is no finder's.
    #[must_use]
    pub fn field_looked_into(&self) -> Angle {
        let fields = self.optics.iter().map(|optic| optic.field);
        let eyepieces = fields.filter(|field| *field <= WIDEST_EYEPIECE);
        eyepieces
            .reduce(|widest, field| if field > widest { field } else { widest })
            .unwrap_or(USUAL_FIELD)
    }

    /// True if an hour angle can be reached, from one side of the pier at least.
    #[must_use]
    pub fn reaches(&self, hour_angle: HourAngle) -> bool {
        let on = |span: Option<HourAngleSpan>| span.is_none_or(|span| span.contains(hour_angle));
        let limits = &self.limits;
        on(limits.tube_west) || (self.kind.has_two_sides() && on(limits.tube_east))
    }
}
