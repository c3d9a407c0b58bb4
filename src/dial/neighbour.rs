//! Start from a neighbour: a bright star near the target is centred, and the circles are moved by the difference between the
//! two. What is unknown of the mount is much the same for both, and drops out.

use crate::angle::Angle;
use crate::catalog::Target;
use crate::dial::bright::{self, Placed};
use crate::dial::next_star::{AS_GOOD, looks, station};
use crate::dial::setting::{Chance, Dial};
use crate::dial::setup::Setup;
use crate::estimate::{Covariance, Offered, Wanted};
use crate::metal::Side;
use crate::sexagesimal::Notation;
use crate::sky::{Moment, Source, separation};

/// A star farther from the target than this is no neighbour.
const FARTHEST: Angle = Angle::from_degrees(15.0);

/// The way by a neighbour is worth the detour where it adds so much to the chance (common practice, no source).
const WORTH_THE_DETOUR: f64 = 0.1;

/// A bright star to start from.
#[derive(Clone, Debug, PartialEq)]
pub struct Neighbour {
    /// The star, where it stands; on the same side of the pier as the target.
    pub placed: Placed,
    /// How far to turn the hour axis from the star to the target, positive west.
    pub hour: Angle,
    /// How far to turn the declination axis, as its axis angle grows.
    pub dec: Angle,
    /// The same in words: "0h 26m east, 3° 55' north".
    pub words: String,
    /// The chance in each optic by that way.
    pub chances: Vec<Chance>,
    /// The chance in the eyepiece looked into first, by that way.
    pub by_neighbour: f64,
    /// The same by setting the circles at once.
    pub direct: f64,
}

impl Neighbour {
    /// True if the way by the neighbour is worth the detour, as it is while the mount is barely known.
    #[must_use]
    pub fn is_worth_it(&self) -> bool {
        self.by_neighbour - self.direct > WORTH_THE_DETOUR
    }
}

/// The best neighbour of a target as it was dialled; `stars` are the bright ones to [`bright::FAINTEST_RIVAL_HP`]. Nothing
/// where no star is near enough, high enough, on that side of the pier, and not to be mistaken.
#[must_use]
pub fn neighbour(
    setup: &Setup<'_>,
    moment: &Moment,
    dial: &Dial,
    stars: &[Target],
) -> Option<Neighbour> {
    if moment.sun_is_up() {
        // no star is seen to start from
        return None;
    }
    let latitude = moment.observer().latitude;
    let (hour, dec) = looks(setup.mount);
    let at = &dial.observed;
    let target = station((at.hour_angle, at.declination), dial.side, hour, dec);
    let wanted = Wanted::new(setup.estimate, latitude, &[target]);
    let field = setup.mount.field_looked_into();
    let stars = &about(dial, stars);
    let near: Vec<Placed> = bright::well_placed(setup, moment, stars)
        .into_iter()
        .filter(|placed| placed.side == dial.side && placed.star.name != dial.target)
        .filter(|placed| {
            let star = &placed.observed;
            let star = (star.hour_angle.angle(), star.declination);
            separation(star, (at.hour_angle.angle(), at.declination)) < FARTHEST
        })
        .collect();
    let ways: Vec<(f64, Placed, Covariance)> = bright::unmistakable(setup, moment, near, stars)
        .into_iter()
        .filter_map(|placed| {
            let star = &placed.observed;
            let star = station((star.hour_angle, star.declination), placed.side, hour, dec);
            let offered = Offered::new(setup.estimate, latitude, &star)?;
            let known = offered.after_reading(wanted.covariance());
            Some((wanted.first_look(&known, field), placed, known))
        })
        .collect();
    let best = ways.iter().map(|(chance, ..)| *chance).fold(0.0, f64::max);
    // of those that are as good, the brightest is found soonest
    let (by_neighbour, placed, known) = ways
        .into_iter()
        .filter(|(chance, ..)| *chance > best - AS_GOOD)
        .min_by(|(_, a, _), (_, b, _)| bright::by_brightness(&a.star, &b.star))?;
    let star = &placed.observed;
    let predicted = setup
        .estimate
        .predict(star.hour_angle, star.declination, latitude, placed.side)
        .ok()?;
    let by_hour = (dial.axes.hour.angle() - predicted.axes.hour.angle()).wrapped_signed();
    let by_dec = (dial.axes.dec.angle() - predicted.axes.dec.angle()).wrapped_signed();
    let chances = setup.mount.optics.iter().map(|optic| Chance {
        optic: optic.name.clone(),
        field: optic.field,
        probability: wanted.first_look(&known, optic.field),
    });
    Some(Neighbour {
        words: in_words(setup, dial.side, by_hour, by_dec),
        chances: chances.collect(),
        direct: wanted.first_look(wanted.covariance(), field),
        placed,
        hour: by_hour,
        dec: by_dec,
        by_neighbour,
    })
}

/// The stars in that region, with room for their rivals, by their catalogue places: what a few decades of precession make
/// of them is far less than the room.
fn about(dial: &Dial, stars: &[Target]) -> Vec<Target> {
    const ROOM: Angle = Angle::from_degrees(8.0);
    let target = (
        dial.of_date.right_ascension.angle(),
        dial.of_date.declination,
    );
    let is_near = |star: &&Target| match &star.source {
        Source::Catalogue(place) => {
            let star = (place.right_ascension.angle(), place.declination);
            separation(star, target) < FARTHEST + ROOM
        }
        Source::Body(_) | Source::Orbit(_) => false,
    };
    stars.iter().filter(is_near).cloned().collect()
}

/// The turns in the circles' own units, as finely as they can be set. With the tube east a growing declination axis angle
/// carries the tube southward, past the pole.
fn in_words(setup: &Setup<'_>, side: Side, hour: Angle, dec: Angle) -> String {
    let (hours, degrees) = (
        setup.mount.hour_circle.scale(),
        setup.mount.declination_circle.scale(),
    );
    let hour_way = if hour < Angle::ZERO { "east" } else { "west" };
    let northward = (dec >= Angle::ZERO) != (side == Side::TubeEast);
    let dec_way = if northward { "north" } else { "south" };
    let write = |scale: &crate::metal::Scale, angle: Angle| {
        Notation::new(scale.unit(), scale.settable_step()).write(angle.abs())
    };
    format!(
        "{} {hour_way}, {} {dec_way}",
        write(&hours, hour),
        write(&degrees, dec)
    )
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::catalog::Catalogue;
    use crate::dial::dial;
    use crate::dial::trial::{Trial, moment, target};
    use crate::metal::{MountErrors, Optic, View, to_axes, to_sky};

    fn stars() -> Vec<Target> {
        Catalogue::builtin().bright_stars(bright::FAINTEST_RIVAL_HP)
    }

    fn of(trial: &Trial, utc: &str, name: &str) -> Option<Neighbour> {
        let now = moment(utc);
        let dialled = dial(&trial.setup(), &now, &target(name)).unwrap();
        neighbour(&trial.setup(), &now, &dialled, &stars())
    }

    #[test]
    fn before_any_star_is_read_the_neighbour_is_the_way() {
        let trial = Trial::new();
        let found = of(&trial, "2026-12-01T21:30:00Z", "M 37").unwrap();
        assert!(found.is_worth_it() && found.by_neighbour > 0.3, "{found:?}");
        // Auriga and the horns of the Bull are the stars about it
        let apart = {
            let now = moment("2026-12-01T21:30:00Z");
            let m37 = now.observed(&now.apparent(&target("M 37").source));
            found.placed.observed.separation(&m37)
        };
        assert!(
            apart < Angle::from_degrees(15.0),
            "{}",
            found.placed.star.name
        );
    }

    #[test]
    fn a_mount_with_errors_comes_to_the_target_by_the_turns_told() {
        // the errors nobody knows of; the turns are told for a perfect mount
        let errors = MountErrors {
            hour_index: Angle::from_degrees(70.0),
            dec_index: Angle::from_degrees(-31.0),
            polar_high: Angle::from_arcminutes(40.0),
            polar_east: Angle::from_arcminutes(-50.0),
            cone: Angle::from_arcminutes(20.0),
            skew: Angle::from_arcminutes(-10.0),
            ..MountErrors::default()
        };
        let trial = Trial::new();
        for (utc, name) in [
            ("2026-12-01T21:30:00Z", "M 37"),
            ("2026-12-01T20:30:00Z", "M 31"),
            ("2026-12-01T19:30:00Z", "M 57"),
        ] {
            let now = moment(utc);
            let latitude = now.observer().latitude;
            let found = of(&trial, utc, name).unwrap();
            let star = &found.placed.observed;
            let side = found.placed.side;
            let mut axes =
                to_axes(star.hour_angle, star.declination, latitude, &errors, side).unwrap();
            axes.hour = crate::angle::AxisAngle::new(axes.hour.angle() + found.hour);
            axes.dec = crate::angle::AxisAngle::new(axes.dec.angle() + found.dec);
            let (hour_angle, declination) = to_sky(axes, latitude, &errors);
            let place = now.observed(&now.apparent(&target(name).source));
            let off = separation(
                (hour_angle.angle(), declination),
                (place.hour_angle.angle(), place.declination),
            );
            // of 70° of index error, some minutes of the rest are left over a way of some degrees
            assert!(off < Angle::from_arcminutes(20.0), "{name}: {off:?}");
        }
    }

    #[test]
    fn the_chance_by_a_neighbour_is_that_of_reading_it_and_dialling() {
        use crate::dial::{Setup, Sighting};
        use crate::estimate::{Estimate, Prior, fit};
        use crate::metal::SideRequest;
        let mut trial = Trial::new();
        trial.mount.optics = vec![Optic {
            name: "40 mm".to_owned(),
            field: Angle::from_degrees(1.0),
            view: View::default(),
            turned: None,
        }];
        let now = moment("2026-12-01T21:30:00Z");
        let found = of(&trial, "2026-12-01T21:30:00Z", "M 37").unwrap();
        let setup = Setup {
            side: SideRequest::Only(found.placed.side),
            ..trial.setup()
        };
        let star = dial(&setup, &now, &found.placed.star).unwrap();
        let sighting = Sighting {
            side: star.side,
            hour: star.hour.reading,
            dec: star.dec.reading,
            hour_opposite: None,
            dec_opposite: None,
            timed: false,
        };
        let sight = sighting.sight(&trial.mount, &now, &found.placed.star.source);
        let prior = Prior::from_expected(&trial.mount.expected);
        trial.estimate = Estimate::from(&fit(now.observer().latitude, &prior, &[sight]));
        let dialled = dial(&trial.setup(), &now, &target("M 37")).unwrap();
        let read = dialled.chances[0].probability;
        assert!(
            (read - found.chances[0].probability).abs() < 0.01,
            "{read} {found:?}"
        );
    }

    #[test]
    fn the_turns_are_said_in_the_circles_own_units_and_the_observers_directions() {
        let trial = Trial::new();
        let setup = trial.setup();
        let (hour, dec) = (Angle::from_degrees(-6.5), Angle::from_degrees(3.92));
        assert_eq!(
            in_words(&setup, Side::TubeWest, hour, dec),
            "0h 26m 00s east, 3° 55' north"
        );
        assert_eq!(
            in_words(&setup, Side::TubeEast, -hour, dec),
            "0h 26m 00s west, 3° 55' south"
        );
    }
}
