//! Where the slit of a dome must stand, and where the eyepiece is.
//!
//! The line of sight starts at the foot of the tube, `offset` from the crossing of the axes toward the tube
//! end of the declination axis. The slit must lie where the line leaves the dome's sphere; the eyepiece lies on
//! the line, away from the sky. Lengths in metres in the horizon frame: east, north, up. The tube end is taken
//! from the exact geometry, mount errors included: it is where a line of sight with a cone of 90° would look.

use crate::angle::{Altitude, Angle, Azimuth, Declination, HourAngle, Latitude};
use crate::metal::errors::MountErrors;
use crate::metal::geometry::{Axes, direction, to_horizon, to_sky};
use crate::metal::mount::{Dome, Tube};

/// The line of sight and the declination axis, as directions in the horizon frame.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct TubeDirections {
    /// Toward the sky.
    sky: [f64; 3],
    /// From the crossing of the axes toward the tube.
    tube_end: [f64; 3],
}

/// Where the slit must stand, from the centre of the dome's sphere.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Slit {
    /// From north through east.
    pub azimuth: Azimuth,
    /// Above the level of the centre; negative below it.
    pub altitude: Altitude,
}

/// Where the eyepiece is, in metres.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct EyepiecePlace {
    /// Above the floor.
    pub height_m: f64,
    /// East of the crossing of the axes.
    pub east_m: f64,
    /// North of the crossing of the axes.
    pub north_m: f64,
}

impl TubeDirections {
    /// For an observed place (refraction included) with the axes showing these angles; the axis angles
    /// themselves tell on which side of the pier the tube is.
    #[must_use]
    pub fn new(
        hour_angle: HourAngle,
        declination: Declination,
        axes: Axes,
        latitude: Latitude,
        errors: &MountErrors,
    ) -> Self {
        // the sag bends the tube, not the axis it hangs from
        let along_axis = MountErrors {
            cone: Angle::from_degrees(90.0),
            sag: Angle::ZERO,
            ..*errors
        };
        let (end_hour_angle, end_declination) = to_sky(axes, latitude, &along_axis);
        Self {
            sky: to_horizon(direction(hour_angle, declination), latitude),
            tube_end: to_horizon(direction(end_hour_angle, end_declination), latitude),
        }
    }

    /// The point of the line of sight so far toward the sky from the foot of the tube, from the crossing of
    /// the axes.
    fn point(&self, offset_m: f64, toward_sky_m: f64) -> [f64; 3] {
        sum(
            scaled(self.tube_end, offset_m),
            scaled(self.sky, toward_sky_m),
        )
    }
}

impl Dome {
    /// Where the slit must stand. The line of sight starts at the crossing of the axes where the tube is not
    /// known. None if the line never leaves the sphere, its foot being outside.
    #[must_use]
    pub fn slit(&self, tube: Option<&Tube>, directions: &TubeDirections) -> Option<Slit> {
        let crossing = [self.axes_east_m, self.axes_north_m, self.axes_up_m];
        let offset_m = tube.map_or(0.0, |tube| tube.offset_m);
        let foot = sum(crossing, directions.point(offset_m, 0.0));
        // |foot + t sky| = radius, the farther of the two roots
        let along = dot(foot, directions.sky);
        let outside = dot(foot, foot) - self.radius_m * self.radius_m;
        let root = along * along - outside;
        let t = root.sqrt() - along;
        // also none for what is not a number
        if !(root >= 0.0 && t >= 0.0 && self.radius_m > 0.0) {
            return None;
        }
        let [east, north, up] = sum(foot, scaled(directions.sky, t));
        Some(Slit {
            azimuth: Azimuth::new(Angle::from_radians(east.atan2(north))),
            altitude: Altitude::new(Angle::from_radians(up.atan2(east.hypot(north)))),
        })
    }
}

impl Tube {
    /// Where the eyepiece is.
    #[must_use]
    pub fn eyepiece(&self, directions: &TubeDirections) -> EyepiecePlace {
        let [east_m, north_m, up_m] = directions.point(self.offset_m, -self.eyepiece_m);
        EyepiecePlace {
            height_m: self.axes_above_floor_m + up_m,
            east_m,
            north_m,
        }
    }
}

fn sum([a, b, c]: [f64; 3], [x, y, z]: [f64; 3]) -> [f64; 3] {
    [a + x, b + y, c + z]
}

fn scaled([a, b, c]: [f64; 3], factor: f64) -> [f64; 3] {
    [a * factor, b * factor, c * factor]
}

fn dot([a, b, c]: [f64; 3], [x, y, z]: [f64; 3]) -> f64 {
    a * x + b * y + c * z
}
