//! Where the slit of a dome must stand, and where the eyepiece is.
//!
//! The line of sight starts at the foot of the tube, `offset` from the crossing of the axes toward the tube
//! end of the declination axis. The slit must lie where the line leaves the dome's sphere; the eyepiece lies on
//! the line, away from the sky. Lengths in metres in the horizon frame: east, north, up. The tube end is taken
//! from the exact geometry, mount errors included: it is where a line of sight with a cone of 90° would look.

use crate::angle::{Altitude, Angle, Azimuth, Declination, HourAngle, Latitude};
use crate::metal::errors::MountErrors;
use crate::metal::frames::{direction, dot, northward, scaled, sum, to_horizon};
use crate::metal::geometry::{Axes, to_sky};
use crate::metal::mount::{Dome, Tube};

/// The line of sight and the declination axis, as directions in the horizon frame.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct TubeDirections {
    /// Toward the sky.
    sky: [f64; 3],
    /// From the crossing of the axes toward the tube.
    tube_end: [f64; 3],
    /// Across the line of sight, toward the north celestial pole.
    north: [f64; 3],
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
            north: to_horizon(northward(hour_angle, declination), latitude),
        }
    }

    /// Toward the sky; east, north and up.
    pub(super) const fn sky(&self) -> [f64; 3] {
        self.sky
    }

    /// From the crossing of the axes toward the tube; east, north and up.
    pub(super) const fn tube_end(&self) -> [f64; 3] {
        self.tube_end
    }

    /// Across the line of sight, toward the north celestial pole; east, north and up.
    pub(super) const fn north(&self) -> [f64; 3] {
        self.north
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

#[cfg(test)]
mod tests {
    use proptest::prelude::*;

    use super::*;
    use crate::metal::geometry::to_axes;
    use crate::metal::side::Side;

    /// Rounding, in degrees and in metres.
    const ROUNDING: f64 = 1e-9;
    const RADIUS_M: f64 = 3.0;
    const OFFSET_M: f64 = 0.6;
    const EYEPIECE_M: f64 = 1.4;
    const AXES_ABOVE_FLOOR_M: f64 = 2.1;

    const TUBE: Tube = Tube {
        offset_m: OFFSET_M,
        eyepiece_m: EYEPIECE_M,
        axes_above_floor_m: AXES_ABOVE_FLOOR_M,
    };

    /// With the crossing of the axes at the centre.
    const DOME: Dome = Dome {
        radius_m: RADIUS_M,
        axes_east_m: 0.0,
        axes_north_m: 0.0,
        axes_up_m: 0.0,
    };

    fn on_perfect_mount(h: f64, d: f64, latitude: f64, side: Side) -> TubeDirections {
        let (h, d) = (HourAngle::from_degrees(h), Declination::from_degrees(d));
        let (latitude, errors) = (Latitude::from_degrees(latitude), MountErrors::default());
        let axes = to_axes(h, d, latitude, &errors, side).unwrap();
        TubeDirections::new(h, d, axes, latitude, &errors)
    }

    fn assert_slit(slit: Option<Slit>, azimuth: f64, altitude: f64) {
        let slit = slit.unwrap();
        let turned = Angle::from_degrees(slit.azimuth.degrees() - azimuth).wrapped_signed();
        assert!(turned.degrees().abs() < ROUNDING, "{slit:?}, not {azimuth}");
        assert!(
            (slit.altitude.degrees() - altitude).abs() < ROUNDING,
            "{slit:?}, not {altitude}"
        );
    }

    fn assert_at(place: EyepiecePlace, height: f64, east: f64, north: f64) {
        assert!(
            (place.height_m - height).abs() < ROUNDING,
            "{place:?}, not {height} high"
        );
        assert!(
            (place.east_m - east).abs() < ROUNDING,
            "{place:?}, not {east} east"
        );
        assert!(
            (place.north_m - north).abs() < ROUNDING,
            "{place:?}, not {north} north"
        );
    }

    #[test]
    fn from_the_centre_the_slit_stands_where_the_object_is() {
        for (latitude, d, azimuth) in [(54.5, 89.999_999_999, 0.0), (-31.4, -89.999_999_999, 180.0)]
        {
            let at_pole = on_perfect_mount(0.0, d, latitude, Side::Single);
            let slit = DOME.slit(None, &at_pole).unwrap();
            assert!((slit.altitude.degrees() - f64::abs(latitude)).abs() < 1e-8);
            assert!((slit.azimuth.degrees() - azimuth).abs() < 1e-8);
            let due_west = on_perfect_mount(90.0, 0.0, latitude, Side::Single);
            assert_slit(DOME.slit(None, &due_west), 270.0, 0.0);
        }
    }

    #[test]
    fn toward_the_zenith_the_slit_leans_to_the_side_of_the_tube() {
        // the line rises plumb, the offset west or east of the centre
        let altitude = (OFFSET_M / RADIUS_M).acos().to_degrees();
        for latitude in [54.5, -31.4] {
            for (side, azimuth, east) in [
                (Side::TubeWest, 270.0, -OFFSET_M),
                (Side::Single, 270.0, -OFFSET_M),
                (Side::TubeEast, 90.0, OFFSET_M),
            ] {
                let zenith = on_perfect_mount(0.0, latitude, latitude, side);
                assert_slit(DOME.slit(Some(&TUBE), &zenith), azimuth, altitude);
                assert_at(
                    TUBE.eyepiece(&zenith),
                    AXES_ABOVE_FLOOR_M - EYEPIECE_M,
                    east,
                    0.0,
                );
            }
        }
    }

    #[test]
    fn toward_the_east_point_the_declination_axis_lies_in_the_meridian() {
        for latitude in [54.5_f64, -31.4] {
            let (sin, cos) = latitude.to_radians().sin_cos();
            // tube west: its end points to where the equator culminates; tube east: to the opposite
            for (side, sign) in [(Side::TubeWest, 1.0), (Side::TubeEast, -1.0)] {
                let east_point = on_perfect_mount(-90.0, 0.0, latitude, side);
                let [north, up] = [-sign * OFFSET_M * sin, sign * OFFSET_M * cos];
                let east = (RADIUS_M * RADIUS_M - OFFSET_M * OFFSET_M).sqrt();
                let azimuth = 90.0 - (north / east).atan().to_degrees();
                let altitude = (up / RADIUS_M).asin().to_degrees();
                assert_slit(DOME.slit(Some(&TUBE), &east_point), azimuth, altitude);
                let height = AXES_ABOVE_FLOOR_M + up;
                assert_at(TUBE.eyepiece(&east_point), height, -EYEPIECE_M, north);
            }
        }
    }

    #[test]
    fn axes_off_the_centre_shift_the_slit() {
        let dome = Dome {
            axes_up_m: 0.4,
            ..DOME
        };
        let east_point = on_perfect_mount(-90.0, 0.0, 54.5, Side::Single);
        assert_slit(
            dome.slit(None, &east_point),
            90.0,
            (0.4 / RADIUS_M).asin().to_degrees(),
        );
        let dome = Dome {
            axes_north_m: -0.4,
            ..DOME
        };
        let azimuth = 90.0 + (0.4 / RADIUS_M).asin().to_degrees();
        assert_slit(dome.slit(None, &east_point), azimuth, 0.0);
    }

    #[test]
    fn a_tube_outside_the_dome_has_no_slit() {
        let outside = Tube {
            offset_m: RADIUS_M + 1.0,
            ..TUBE
        };
        let zenith = on_perfect_mount(0.0, 54.5, 54.5, Side::TubeWest);
        assert_eq!(DOME.slit(Some(&outside), &zenith), None);
    }

    #[test]
    fn an_eyepiece_toward_the_sky_lies_above_the_foot() {
        let newtonian = Tube {
            eyepiece_m: -0.9,
            ..TUBE
        };
        let zenith = on_perfect_mount(0.0, 54.5, 54.5, Side::TubeWest);
        assert_at(
            newtonian.eyepiece(&zenith),
            AXES_ABOVE_FLOOR_M + 0.9,
            -OFFSET_M,
            0.0,
        );
    }

    #[test]
    fn index_errors_do_not_move_the_tube_and_a_leaning_polar_axis_does() {
        let place = (
            HourAngle::from_degrees(-40.0),
            Declination::from_degrees(20.0),
        );
        let latitude = Latitude::from_degrees(54.5);
        let eyepiece = |errors: &MountErrors| {
            let axes = to_axes(place.0, place.1, latitude, errors, Side::TubeWest).unwrap();
            TUBE.eyepiece(&TubeDirections::new(
                place.0, place.1, axes, latitude, errors,
            ))
        };
        let perfect = eyepiece(&MountErrors::default());
        let index = Angle::from_degrees(17.0);
        let turned = eyepiece(&MountErrors {
            hour_index: index,
            dec_index: index,
            ..MountErrors::default()
        });
        assert_at(turned, perfect.height_m, perfect.east_m, perfect.north_m);
        let high = Angle::from_degrees(5.0);
        let leaning = eyepiece(&MountErrors {
            polar_high: high,
            ..MountErrors::default()
        });
        assert!((leaning.height_m - perfect.height_m).abs() > 0.01);
    }

    /// East, north and up by altitude and azimuth.
    /// Source: J. Meeus, Astronomical Algorithms, 2nd ed., formulas 13.5 and 13.6 (numbers from memory).
    fn horizon(h: f64, d: f64, latitude: f64) -> [f64; 3] {
        let [h, d, latitude] = [h, d, latitude].map(f64::to_radians);
        let westward_from_south = (h.sin() * d.cos())
            .atan2(h.cos() * latitude.sin() * d.cos() - d.sin() * latitude.cos());
        let altitude = (latitude.sin() * d.sin() + latitude.cos() * d.cos() * h.cos()).asin();
        let level = altitude.cos();
        [
            -level * westward_from_south.sin(),
            -level * westward_from_south.cos(),
            altitude.sin(),
        ]
    }

    proptest! {
        #[test]
        fn walking_along_the_line_of_sight_one_comes_out_at_the_slit(
            h in -180.0..180.0f64,
            d in -80.0..80.0f64,
            latitude in -80.0..80.0f64,
            shift in [-0.5..0.5f64, -0.5..0.5f64, -0.5..0.5f64],
            east in any::<bool>(),
        ) {
            /// The walk's last step is shorter than this.
            const STEP_M: f64 = 1e-9;
            let [axes_east_m, axes_north_m, axes_up_m] = shift;
            let dome = Dome { radius_m: RADIUS_M, axes_east_m, axes_north_m, axes_up_m };
            let side = if east { Side::TubeEast } else { Side::TubeWest };
            let tube_end = horizon(if east { h - 90.0 } else { h + 90.0 }, 0.0, latitude);
            let sky = horizon(h, d, latitude);
            let at = |t: f64| {
                [0, 1, 2].map(|i| shift[i] + OFFSET_M * tube_end[i] + t * sky[i])
            };
            let inside = |t: f64| at(t).iter().map(|x| x * x).sum::<f64>() < RADIUS_M * RADIUS_M;
            let (mut t, mut step) = (0.0, 1.0);
            while step > STEP_M {
                if inside(t + step) { t += step } else { step /= 2.0 }
            }
            let slit = dome.slit(Some(&TUBE), &on_perfect_mount(h, d, latitude, side)).unwrap();
            let (sin_az, cos_az) = slit.azimuth.angle().radians().sin_cos();
            let (sin_alt, cos_alt) = slit.altitude.angle().radians().sin_cos();
            let slit_at = [sin_az * cos_alt, cos_az * cos_alt, sin_alt].map(|x| x * RADIUS_M);
            let walked = at(t);
            for i in 0..3 {
                prop_assert!((slit_at[i] - walked[i]).abs() < 1e-6, "{slit_at:?} {walked:?}");
            }
        }
    }
}
