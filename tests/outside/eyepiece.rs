//! How the picture in an eyepiece is turned, against rays traced through mirrors and lenses, and the parallactic angle of
//! another library.

use nonius::angle::Angle;
use nonius::metal::{MountErrors, Optic, Orientation, TubeDirections, View, to_axes};

use crate::mount::{place, side};
use crate::table::{Row, rows};

/// By the table's head.
const DIRECTION: f64 = 0.001;
/// The table's six decimals of a degree.
const PARALLACTIC_DEG: f64 = 2e-6;

fn tube(row: &Row) -> TubeDirections {
    let (hour_angle, declination, latitude) = place(row);
    let errors = MountErrors::default();
    let axes = to_axes(hour_angle, declination, latitude, &errors, side(row)).unwrap();
    TubeDirections::new(hour_angle, declination, axes, latitude, &errors)
}

fn optic(view: View, turned: Option<Angle>) -> Optic {
    Optic {
        name: "any".to_owned(),
        field: Angle::from_degrees(1.0),
        view,
        turned,
    }
}

/// North and east in the picture, each right and up.
fn north_and_east(optic: &Optic, tube: &TubeDirections) -> [(f64, f64); 2] {
    let orientation = Orientation::of(optic, tube);
    [0.0, 90.0].map(|position_angle| {
        let far = Angle::from_radians(1.0);
        let (right, up) = orientation.place(far, Angle::from_degrees(position_angle));
        (right.radians(), up.radians())
    })
}

#[test]
fn north_and_east_lie_where_the_rays_arrive() {
    let table = rows("eyepiece.csv");
    for row in &table {
        let turned = || Some(Angle::from_degrees(row.number("turned_deg")));
        let optic = match row.text("optic") {
            "straight" => optic(View::Inverted, None),
            "newtonian" => optic(View::Inverted, turned()),
            "diagonal" => optic(View::Mirrored, turned()),
            other => panic!("no optic is called {other}"),
        };
        let found = north_and_east(&optic, &tube(row));
        for ((right, up), name) in found.into_iter().zip(["north", "east"]) {
            let off_right = right - row.number(&format!("{name}_right"));
            let off_up = up - row.number(&format!("{name}_up"));
            assert!(
                off_right.hypot(off_up) < DIRECTION,
                "{name} {right} {up} {row:?}"
            );
        }
    }
    for optic in ["straight", "newtonian", "diagonal"] {
        for side in ["tube-west", "tube-east"] {
            let with = table
                .iter()
                .filter(|row| row.text("optic") == optic && row.text("side") == side);
            assert!(with.count() >= 10, "{optic} {side}");
        }
    }
}

#[test]
fn the_zenith_is_at_the_parallactic_angle() {
    for row in &rows("eyepiece.csv") {
        let [(right, up), _] = north_and_east(&optic(View::Upright, None), &tube(row));
        // the naked eye: north lies as far clockwise of the zenith as the zenith lies east of north
        let found = Angle::from_radians(right.atan2(up)).degrees();
        let off = Angle::from_degrees(found - row.number("parallactic_deg")).wrapped_signed();
        assert!(off.abs().degrees() < PARALLACTIC_DEG, "{found} {row:?}");
    }
}
