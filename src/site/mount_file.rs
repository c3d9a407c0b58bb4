//! A mount file: how the mount is built, how its circles are engraved, where it can go, how large
//! its errors are expected to be, the dome around it, its tube and optics.

use crate::angle::{Altitude, Angle, HourAngle};
use crate::bounds::{
    AXES_ABOVE_FLOOR, AXES_IN_DOME, Bound, DOME_RADIUS, ECCENTRICITY, EXPECTED_ERROR, EYEPIECE,
    FIELD, LIMIT_HOUR_ANGLE, LOWEST_ALTITUDE, TUBE_OFFSET, TURNED,
};
use crate::metal::{
    Dome, ExpectedErrors, HourAngleSpan, HourCircle, Kind, Limits, Mount, Optic, Ring, Tube, View,
};
use crate::sexagesimal::Unit;
use crate::site::circle_file;
use crate::site::document::{self, Section};
use crate::site::fault::{Faults, FileText};
use crate::site::value::Value;
use crate::site::written_angle;

const KINDS: [(&str, Kind); 4] = [
    ("german", Kind::German),
    ("cross-axis", Kind::CrossAxis),
    ("fork", Kind::Fork),
    ("yoke", Kind::Yoke),
];

const VIEWS: [(&str, View); 4] = [
    (View::Upright.word(), View::Upright),
    (View::Inverted.word(), View::Inverted),
    (View::Mirrored.word(), View::Mirrored),
    (View::UpsideDown.word(), View::UpsideDown),
];

/// A mount and the file it came from.
#[derive(Clone, Debug, PartialEq)]
pub struct MountFile {
    /// The name of its file, without folder and ending.
    pub id: String,
    /// The mount.
    pub mount: Mount,
    /// The file, untouched.
    pub file: FileText,
}

impl MountFile {
    /// Reads a mount from the text of its file; `id` is the file's name without folder and ending.
    pub fn read(id: &str, file: FileText) -> Result<Self, Faults> {
        match document::read(&file, mount) {
            Ok(mount) => Ok(Self {
                id: id.to_owned(),
                mount,
                file,
            }),
            Err(faults) => Err(Faults::new(file, faults)),
        }
    }
}

fn mount(top: &mut Section<'_>) -> Option<Mount> {
    let name = top
        .required("name")
        .and_then(|v| v.text("the mount's name"));
    let kind = top.required("kind").and_then(|v| v.word(&KINDS));
    let clock_drive = top.optional("clock-drive").and_then(|v| v.flag());
    let hour_circle = top.required_table("hour-circle", |section| {
        let circle = circle_file::hour_circle(section);
        if let (Some(kind), Some(value)) = (kind, section.optional("second-fiducial"))
            && !kind.has_two_sides()
            && circle.is_some_and(|circle| circle.second_fiducial)
        {
            value.fault(
                "a mount with one side has no second fiducial for the tube east",
                "leave it out, or set kind to german or cross-axis",
            );
        }
        circle
    });
    let declination_circle =
        top.required_table("declination-circle", circle_file::declination_circle);
    let limits = top.table("limits", |section| Some(limits(section, kind)));
    let expected = top.table("expected-errors", |section| {
        Some(expected_errors(section, hour_circle.as_ref()))
    });
    let tube = top.table("tube", tube);
    let dome = top.table("dome", |section| dome(section, tube));
    let optics = optics(top);
    let hour_circle = hour_circle?;
    Some(Mount {
        name: name?.to_owned(),
        kind: kind?,
        // a ring that rides with the drive has one to ride with
        clock_drive: clock_drive.unwrap_or(hour_circle.ring == Ring::Driven),
        hour_circle,
        declination_circle: declination_circle?,
        limits: limits.unwrap_or_default(),
        expected: expected.unwrap_or_default(),
        dome,
        tube,
        optics,
    })
}

fn limits(section: &mut Section<'_>, kind: Option<Kind>) -> Limits {
    let lowest_altitude = section
        .optional("lowest-altitude-deg")
        .and_then(|v| v.number(&LOWEST_ALTITUDE))
        .map(Altitude::from_degrees);
    let tube_west = section
        .optional("tube-west-hour-angle")
        .and_then(|v| span(&v));
    let east = section.optional("tube-east-hour-angle");
    if let (Some(value), Some(kind)) = (east, kind)
        && !kind.has_two_sides()
    {
        value.fault(
            "a mount with one side has no limits for the tube east",
            "write them as tube-west-hour-angle, which has the geometry of the single side",
        );
    }
    Limits {
        lowest_altitude,
        tube_west,
        tube_east: east.and_then(|v| span(&v)),
    }
}

/// Two hour angles, the eastern end first.
fn span(value: &Value<'_>) -> Option<HourAngleSpan> {
    const WANTED: &str = "two hour angles, the eastern one first, as [\"-7h\", \"+0h40m\"]";
    let ends = value.items(WANTED)?;
    let [from, to] = ends.as_slice() else {
        value.fault(
            format!("{} has {} hour angles, not two", value.key(), ends.len()),
            format!("write {WANTED}"),
        );
        return None;
    };
    let from = written_angle::hour_angle(from, &LIMIT_HOUR_ANGLE);
    let to = written_angle::hour_angle(to, &LIMIT_HOUR_ANGLE);
    let (from, to) = (from?, to?);
    if from >= to {
        value.fault(
            format!(
                "the first hour angle of {} is not east of the second",
                value.key()
            ),
            format!("write {WANTED}; west is positive"),
        );
        return None;
    }
    Some(HourAngleSpan {
        from: HourAngle::new(from),
        to: HourAngle::new(to),
    })
}

fn expected_errors(section: &mut Section<'_>, hour_circle: Option<&HourCircle>) -> ExpectedErrors {
    let usual = ExpectedErrors::default();
    let size = |value: Value<'_>| {
        written_angle::size(&value, Some(Unit::Degrees), &EXPECTED_ERROR, Angle::degrees)
    };
    let both = section.optional("polar-axis");
    let [high, east] = ["polar-axis-high", "polar-axis-east"].map(|key| {
        let one = section.optional(key);
        if let (Some(value), Some(_)) = (one, both) {
            value.fault(
                format!("{key} and polar-axis say the same thing twice"),
                "give polar-axis for both directions, or polar-axis-high and polar-axis-east",
            );
        }
        one.and_then(size)
    });
    let both = both.and_then(size);
    let [cone, skew, sag] = ["cone", "skew", "sag"].map(|key| section.optional(key).and_then(size));
    let hour_eccentric = hour_eccentricity(section, hour_circle);
    let dec_eccentric = section
        .optional("declination-circle-eccentricity")
        .and_then(eccentricity);
    ExpectedErrors {
        polar_high: high.or(both).unwrap_or(usual.polar_high),
        polar_east: east.or(both).unwrap_or(usual.polar_east),
        cone: cone.unwrap_or(usual.cone),
        skew: skew.unwrap_or(usual.skew),
        sag: sag.unwrap_or(usual.sag),
        hour_eccentric: hour_eccentric.unwrap_or(usual.hour_eccentric),
        dec_eccentric: dec_eccentric.unwrap_or(usual.dec_eccentric),
    }
}

fn eccentricity(value: Value<'_>) -> Option<Angle> {
    written_angle::size(&value, Some(Unit::Degrees), &ECCENTRICITY, Angle::degrees)
}

/// The hour circle's eccentricity, where its readings can tell of one.
fn hour_eccentricity(section: &mut Section<'_>, hour_circle: Option<&HourCircle>) -> Option<Angle> {
    const TWO_MARKS: &str = "leave it out, and read the circle at two opposite marks, as hour and hour-b: their mean is free of it";
    let value = section.optional("hour-circle-eccentricity")?;
    let expected = eccentricity(value)?;
    let circle = hour_circle.filter(|_| expected > Angle::ZERO);
    if circle.is_some_and(|circle| circle.ring == Ring::Driven) {
        value.fault(
            "a ring that rides with the drive turns under its index: no eccentricity can be found from its readings",
            TWO_MARKS,
        );
    } else if circle.is_some_and(|circle| circle.second_fiducial) {
        value.fault(
            "an hour circle read at one mark or the other shows its eccentricity now one way, now the other",
            TWO_MARKS,
        );
    }
    Some(expected)
}

fn metres(section: &mut Section<'_>, key: &'static str, bound: &Bound) -> Option<f64> {
    section.required(key).and_then(|v| v.number(bound))
}

fn dome(section: &mut Section<'_>, tube: Option<Tube>) -> Option<Dome> {
    let radius_m = metres(section, "radius-m", &DOME_RADIUS);
    let axes_east_m = metres(section, "axes-east-m", &AXES_IN_DOME);
    let axes_north_m = metres(section, "axes-north-m", &AXES_IN_DOME);
    let axes_up_m = metres(section, "axes-up-m", &AXES_IN_DOME);
    let dome = Dome {
        radius_m: radius_m?,
        axes_east_m: axes_east_m?,
        axes_north_m: axes_north_m?,
        axes_up_m: axes_up_m?,
    };
    let axes_m = dome
        .axes_east_m
        .hypot(dome.axes_north_m)
        .hypot(dome.axes_up_m);
    if axes_m + tube.map_or(0.0, |tube| tube.offset_m) >= dome.radius_m {
        section.fault(
            "the tube does not fit into the dome",
            "lengths are in metres; the crossing of the axes is measured from the sphere's centre",
        );
    }
    Some(dome)
}

fn tube(section: &mut Section<'_>) -> Option<Tube> {
    let offset_m = metres(section, "offset-m", &TUBE_OFFSET);
    let eyepiece_m = metres(section, "eyepiece-m", &EYEPIECE);
    let axes_above_floor_m = metres(section, "axes-above-floor-m", &AXES_ABOVE_FLOOR);
    Some(Tube {
        offset_m: offset_m?,
        eyepiece_m: eyepiece_m?,
        axes_above_floor_m: axes_above_floor_m?,
    })
}

fn optics(top: &mut Section<'_>) -> Vec<Optic> {
    let mut names: Vec<String> = Vec::new();
    top.tables("optic", |section| {
        let name = section.required("name").and_then(|value| {
            let name = value.text("what the optic is called, as \"finder\"")?;
            if names.iter().any(|known| known == name) {
                value.fault(
                    format!("two optics are named \"{name}\""),
                    "give each a name of its own",
                );
            }
            names.push(name.to_owned());
            Some(name)
        });
        let field = section
            .required("field")
            .and_then(|v| written_angle::size(&v, Some(Unit::Degrees), &FIELD, Angle::degrees));
        let view = section.optional("view").and_then(|v| v.word(&VIEWS));
        let turned = section
            .optional("turned")
            .and_then(|v| written_angle::size(&v, Some(Unit::Degrees), &TURNED, Angle::degrees));
        Some(Optic {
            name: name?.to_owned(),
            field: field?,
            view: view.unwrap_or_default(),
            turned,
        })
    })
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::metal::{DeclinationNumbering, HourNumbering, Increases};

    const LEAST: &str = "name = \"Bare\"\nkind = \"german\"\n[hour-circle]\nring = \"driven\"\n\
        unit = \"hours\"\nnumbering = \"0-24\"\nincreases = \"east\"\ndivision = \"10m\"\n\
        [declination-circle]\nnumbering = \"signed\"\ndivision = \"2d\"\n";

    fn read(text: &str) -> Result<Mount, String> {
        let file = FileText {
            name: "m.toml".to_owned(),
            text: text.to_owned(),
        };
        MountFile::read("m", file)
            .map(|read| read.mount)
            .map_err(|faults| faults.to_string())
    }

    #[test]
    fn a_bare_mount_has_the_usual_expectations() {
        let mount = read(LEAST).unwrap();
        assert_eq!(mount.expected, ExpectedErrors::default());
        assert_eq!(mount.limits, Limits::default());
        assert!(mount.clock_drive && mount.dome.is_none() && mount.tube.is_none());
        assert_eq!(
            (mount.hour_circle.numbering, mount.hour_circle.increases),
            (HourNumbering::Full, Increases::East)
        );
        assert_eq!(
            mount.declination_circle.numbering,
            DeclinationNumbering::Signed
        );
    }

    #[test]
    fn one_polar_axis_stands_for_both_directions_and_a_single_one_for_its_own() {
        let both = read(&format!("{LEAST}[expected-errors]\npolar-axis = \"10'\"\n")).unwrap();
        assert_eq!(both.expected.polar_high, both.expected.polar_east);
        let east = read(&format!(
            "{LEAST}[expected-errors]\npolar-axis-east = \"10'\"\n"
        ))
        .unwrap();
        assert_eq!(
            east.expected.polar_high,
            ExpectedErrors::default().polar_high
        );
        assert!((east.expected.polar_east.arcminutes() - 10.0).abs() < 1e-12);
    }

    #[test]
    fn an_optic_is_looked_through_straight_and_inverts_if_nothing_is_said() {
        let text = format!(
            "{LEAST}[[optic]]\nname = \"a\"\nfield = \"1d\"\n\
             [[optic]]\nname = \"b\"\nfield = \"1d\"\nview = \"mirrored\"\nturned = \"270d\"\n"
        );
        let optics = read(&text).unwrap().optics;
        assert_eq!((optics[0].view, optics[0].turned), (View::Inverted, None));
        assert_eq!(
            (optics[1].view, optics[1].turned),
            (View::Mirrored, Some(Angle::from_degrees(270.0)))
        );
    }

    #[test]
    fn hour_angles_are_negative_in_the_east() {
        let limits = "[limits]\ntube-west-hour-angle = [\"7h E\", \"+0h40m\"]\n\
            tube-east-hour-angle = [\"-10d\", \"105d\"]\n";
        let mount = read(&format!("{LEAST}{limits}")).unwrap();
        let west = mount.limits.tube_west.unwrap();
        assert!((west.from.degrees() + 105.0).abs() < 1e-12);
        assert!((west.to.degrees() - 10.0).abs() < 1e-12);
        assert!((mount.limits.tube_east.unwrap().from.degrees() + 10.0).abs() < 1e-12);
    }

    #[test]
    fn a_mount_with_one_side_has_nothing_for_the_tube_east() {
        let text = LEAST
            .replace("german", "fork")
            .replace("[decl", "second-fiducial = true\n[decl");
        let message = read(&format!(
            "{text}[limits]\ntube-east-hour-angle = [\"-1h\", \"1h\"]\n"
        ));
        let message = message.unwrap_err();
        assert!(message.contains("no second fiducial"), "{message}");
        assert!(message.contains("no limits for the tube east"), "{message}");
        assert!(message.contains("m.toml:9:19"), "{message}");
    }
}
