//! Directions along the horizon as people say them.

use crate::angle::Azimuth;

/// The nearest of the sixteen points of the compass.
#[must_use]
pub fn compass_point(azimuth: Azimuth) -> &'static str {
    const POINTS: [&str; 16] = [
        "north",
        "north-north-east",
        "north-east",
        "east-north-east",
        "east",
        "east-south-east",
        "south-east",
        "south-south-east",
        "south",
        "south-south-west",
        "south-west",
        "west-south-west",
        "west",
        "west-north-west",
        "north-west",
        "north-north-west",
    ];
    #[allow(clippy::cast_possible_truncation, clippy::cast_sign_loss)] // 0 to 16
    let point = (azimuth.degrees() / 22.5).round() as usize % POINTS.len();
    POINTS.get(point).copied().unwrap_or("north")
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn the_points_run_through_east_and_north_is_on_both_sides_of_itself() {
        let point = |degrees| compass_point(Azimuth::from_degrees(degrees));
        assert_eq!([point(350.0), point(10.0)], ["north", "north"]);
        assert_eq!(
            [point(90.0), point(135.0), point(202.5), point(270.0)],
            ["east", "south-east", "south-south-west", "west"]
        );
    }
}
