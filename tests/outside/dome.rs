//! Where slit and eyepiece are, against a mount put together from vectors apart from the program.

use nonius::metal::{Dome, Tube, TubeDirections, to_axes};

use crate::mount::{errors, place, side};
use crate::table::rows;

/// By the table's head, and far within the tenth of a degree a slit is turned to.
const SLIT_DEG: f64 = 0.02;
/// By the table's head, and far within the centimetre a stool is set to.
const EYEPIECE_M: f64 = 0.002;

#[test]
fn slit_and_eyepiece_are_where_vectors_put_them_on_both_sides_and_in_both_hemispheres() {
    let table = rows("dome.csv");
    for row in &table {
        let (hour_angle, declination, latitude) = place(row);
        let errors = errors(row);
        let axes = to_axes(hour_angle, declination, latitude, &errors, side(row)).unwrap();
        let directions = TubeDirections::new(hour_angle, declination, axes, latitude, &errors);
        let tube = Tube {
            offset_m: row.number("offset_m"),
            eyepiece_m: row.number("eyepiece_m"),
            axes_above_floor_m: row.number("floor_m"),
        };
        let dome = Dome {
            radius_m: row.number("radius_m"),
            axes_east_m: row.number("axes_east_m"),
            axes_north_m: row.number("axes_north_m"),
            axes_up_m: row.number("axes_up_m"),
        };
        let slit = dome.slit(Some(&tube), &directions).unwrap();
        let azimuth = slit.azimuth.degrees() - row.number("slit_azimuth_deg");
        let azimuth = (azimuth + 180.0).rem_euclid(360.0) - 180.0;
        let altitude = slit.altitude.degrees() - row.number("slit_altitude_deg");
        // toward the zenith an azimuth is of less account
        let azimuth = azimuth * row.number("slit_altitude_deg").to_radians().cos();
        assert!(
            azimuth.hypot(altitude) < SLIT_DEG,
            "{azimuth} {altitude} {row:?}"
        );
        let eyepiece = tube.eyepiece(&directions);
        for (found, column) in [
            (eyepiece.height_m, "eyepiece_height_m"),
            (eyepiece.east_m, "eyepiece_east_m"),
            (eyepiece.north_m, "eyepiece_north_m"),
        ] {
            let off = found - row.number(column);
            assert!(off.abs() < EYEPIECE_M, "{column}: {off} m {row:?}");
        }
    }
    let on = |wanted: &str| {
        table
            .iter()
            .filter(|row| row.text("side") == wanted)
            .count()
    };
    assert!(on("tube-west") > 40 && on("tube-east") > 40);
    let southern = table.iter().filter(|row| row.number("latitude_deg") < 0.0);
    assert!(southern.count() > 40);
}
