//! The errors of a mount, in plain words: reading minus true.

use crate::angle::Angle;

/// How many errors the model knows.
pub const COUNT: usize = 11;

/// The first so many are always in question; the eccentricities after them only where the mount file asks for them.
pub const ALWAYS: usize = 7;

/// Their names, in the order of [`MountErrors::to_array`].
pub const NAMES: [&str; COUNT] = [
    "hour-circle index",
    "declination-circle index",
    "polar axis high",
    "polar axis east",
    "cone",
    "skew",
    "sag",
    "hour-circle eccentricity, sine",
    "hour-circle eccentricity, cosine",
    "declination-circle eccentricity, sine",
    "declination-circle eccentricity, cosine",
];

/// The errors of a mount.
#[derive(Clone, Copy, Debug, Default, PartialEq)]
pub struct MountErrors {
    /// The hour axis angle shown is too far west by this.
    pub hour_index: Angle,
    /// The declination axis angle shown is too far north by this (in axis angle, see [`crate::metal::Side`]).
    pub dec_index: Angle,
    /// The raised end of the polar axis (north end in the north, south end in the south) is above its pole by this.
    pub polar_high: Angle,
    /// The base is turned about the vertical so that the raised end lies east of its pole, by this angle
    /// **in azimuth**; on the sky it is smaller by the cosine of the latitude.
    pub polar_east: Angle,
    /// The line of sight leans toward the tube end of the declination axis, away from the pier.
    pub cone: Angle,
    /// The tube end of the declination axis leans toward the north celestial pole.
    pub skew: Angle,
    /// The tube droops: the axes must point higher by this times the cosine of the altitude.
    pub sag: Angle,
    /// The hour axis angle shown is too far west by this times the sine of itself (`metal/eccentricity.rs`).
    pub hour_eccentric_sine: Angle,
    /// The same by the cosine.
    pub hour_eccentric_cosine: Angle,
    /// The declination axis angle shown is too far north by this times the sine of itself.
    pub dec_eccentric_sine: Angle,
    /// The same by the cosine.
    pub dec_eccentric_cosine: Angle,
}

impl MountErrors {
    /// The errors in the order of [`NAMES`].
    #[must_use]
    pub const fn to_array(self) -> [Angle; COUNT] {
        [
            self.hour_index,
            self.dec_index,
            self.polar_high,
            self.polar_east,
            self.cone,
            self.skew,
            self.sag,
            self.hour_eccentric_sine,
            self.hour_eccentric_cosine,
            self.dec_eccentric_sine,
            self.dec_eccentric_cosine,
        ]
    }

    /// From the order of [`NAMES`].
    #[must_use]
    pub const fn from_array(errors: [Angle; COUNT]) -> Self {
        let [
            hour_index,
            dec_index,
            polar_high,
            polar_east,
            cone,
            skew,
            sag,
            hour_eccentric_sine,
            hour_eccentric_cosine,
            dec_eccentric_sine,
            dec_eccentric_cosine,
        ] = errors;
        Self {
            hour_index,
            dec_index,
            polar_high,
            polar_east,
            cone,
            skew,
            sag,
            hour_eccentric_sine,
            hour_eccentric_cosine,
            dec_eccentric_sine,
            dec_eccentric_cosine,
        }
    }

    /// Those always in question, in the order of [`NAMES`], of a mount whose circles are centred.
    #[must_use]
    pub const fn with_centred_circles(errors: [Angle; ALWAYS]) -> Self {
        let [
            hour_index,
            dec_index,
            polar_high,
            polar_east,
            cone,
            skew,
            sag,
        ] = errors;
        Self {
            hour_index,
            dec_index,
            polar_high,
            polar_east,
            cone,
            skew,
            sag,
            hour_eccentric_sine: Angle::ZERO,
            hour_eccentric_cosine: Angle::ZERO,
            dec_eccentric_sine: Angle::ZERO,
            dec_eccentric_cosine: Angle::ZERO,
        }
    }
}
