//! The horizon as trees, walls and hills leave it: altitude by azimuth, joined by straight lines.

use crate::angle::{Altitude, Azimuth};

/// The lowest clear altitude in every direction. Without points it is the level horizon.
#[derive(Clone, Debug, Default, PartialEq)]
pub struct HorizonMask {
    points: Vec<(Azimuth, Altitude)>,
}

impl HorizonMask {
    /// From points in any order. Two at one azimuth make a step there.
    #[must_use]
    pub fn new(mut points: Vec<(Azimuth, Altitude)>) -> Self {
        points.sort_by(|a, b| a.0.degrees().total_cmp(&b.0.degrees()));
        Self { points }
    }

    /// The points, by azimuth.
    #[must_use]
    pub fn points(&self) -> &[(Azimuth, Altitude)] {
        &self.points
    }

    /// The lowest clear altitude in a direction.
    #[must_use]
    pub fn altitude_at(&self, azimuth: Azimuth) -> Altitude {
        let (Some(first), Some(last)) = (self.points.first(), self.points.last()) else {
            return Altitude::default();
        };
        let after = self.points.partition_point(|point| point.0 <= azimuth);
        // past either end the line runs on through north
        let from = after
            .checked_sub(1)
            .and_then(|before| self.points.get(before))
            .unwrap_or(last);
        let to = self.points.get(after).unwrap_or(first);
        let width = (to.0.angle() - from.0.angle()).wrapped_positive();
        let along = (azimuth.angle() - from.0.angle()).wrapped_positive();
        let rise = to.1.angle() - from.1.angle();
        if width.radians() > 0.0 {
            Altitude::new(from.1.angle() + rise * (along / width))
        } else {
            from.1
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    fn mask(points: &[(f64, f64)]) -> HorizonMask {
        HorizonMask::new(
            points
                .iter()
                .map(|(az, alt)| (Azimuth::from_degrees(*az), Altitude::from_degrees(*alt)))
                .collect(),
        )
    }

    fn at(mask: &HorizonMask, azimuth: f64) -> f64 {
        mask.altitude_at(Azimuth::from_degrees(azimuth)).degrees()
    }

    #[test]
    fn between_points_the_horizon_is_a_straight_line() {
        let hills = mask(&[(0.0, 8.0), (90.0, 12.0), (180.0, 5.0), (270.0, 10.0)]);
        for (azimuth, altitude) in [
            (0.0, 8.0),
            (45.0, 10.0),
            (90.0, 12.0),
            (135.0, 8.5),
            (315.0, 9.0),
            (359.999_999, 8.0),
        ] {
            assert!((at(&hills, azimuth) - altitude).abs() < 1e-6, "{azimuth}");
        }
    }

    #[test]
    fn the_line_runs_on_through_north() {
        let hills = mask(&[(350.0, 10.0), (30.0, 2.0)]);
        assert!((at(&hills, 10.0) - 6.0).abs() < 1e-9);
        assert!((at(&hills, 355.0) - 9.0).abs() < 1e-9);
    }

    #[test]
    fn without_points_it_is_level_and_with_one_the_same_all_round() {
        assert!(at(&HorizonMask::default(), 123.0).abs() < 1e-12);
        assert!((at(&mask(&[(77.0, 6.0)]), 300.0) - 6.0).abs() < 1e-9);
        assert!((at(&mask(&[(77.0, 6.0)]), 77.0) - 6.0).abs() < 1e-9);
    }

    #[test]
    fn two_points_at_one_azimuth_make_a_step() {
        let wall = mask(&[(0.0, 0.0), (100.0, 0.0), (100.0, 30.0), (200.0, 30.0)]);
        assert!(at(&wall, 99.999_999) < 1e-6);
        assert!((at(&wall, 100.000_001) - 30.0).abs() < 1e-6);
    }
}
