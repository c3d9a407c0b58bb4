//! Which star to read next, and what it would gain: among those well placed, the one that helps the rest of the night's
//! list most.

use crate::angle::{Altitude, Angle, Declination, HourAngle};
use crate::catalog::Target;
use crate::dial::bright::{self, Placed};
use crate::dial::setup::Setup;
use crate::estimate::{Covariance, Offered, Sight, Station, Wanted};
use crate::metal::{Mount, Side};
use crate::sky::Moment;

/// An object takes so long from one to the next, with people waiting to look (common practice, no source).
const PACE_S: f64 = 300.0;

/// Where no list says what is wanted, the sky above this altitude is.
const WANTED_ALTITUDE_DEG: f64 = 20.0;

/// A star that gains less than this is not worth the time: half a point.
const WORTH_READING: f64 = 0.005;

/// Stars whose gains differ by less than this help alike: three points.
pub(super) const AS_GOOD: f64 = 0.03;

/// Nor may they differ by more than this part of the best gain: once little is left to gain, three points are all of it.
const OF_THE_BEST: f64 = 0.25;

/// A star to read, and what it would gain.
#[derive(Clone, Debug, PartialEq)]
pub struct NextStar {
    /// The star, where it stands, and from which side of the pier.
    pub placed: Placed,
    /// The mean chance of a first look over the places wanted, as the mount is known now.
    pub first_look: f64,
    /// The same once the star has been read.
    pub first_look_after: f64,
}

impl NextStar {
    /// How much the mean chance of a first look grows.
    #[must_use]
    pub fn gain(&self) -> f64 {
        self.first_look_after - self.first_look
    }
}

/// What timing stars on a mark and waiting on the mark would make of the readings taken so far.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Timing {
    /// The mean chance of a first look as it is.
    pub first_look: f64,
    /// The same, had the stars been timed, and were the objects awaited on the mark.
    pub timed: f64,
}

/// The stars worth reading next, the most helpful first. `stars` are the bright ones to
/// [`bright::FAINTEST_RIVAL_HP`], `rest` the objects still to be dialled, in order; without any that comes up, the whole
/// visible sky is wanted.
#[must_use]
pub fn next_stars(
    setup: &Setup<'_>,
    moment: &Moment,
    stars: &[Target],
    rest: &[Target],
) -> Vec<NextStar> {
    let latitude = moment.observer().latitude;
    let (hour, dec) = looks(setup.mount);
    let wanted = wanted(setup, moment, rest, hour);
    let placed = bright::well_placed(setup, moment, stars);
    let placed: Vec<(Placed, Offered)> = bright::unmistakable(setup, moment, placed, stars)
        .into_iter()
        .filter_map(|placed| {
            let at = &placed.observed;
            let star = station((at.hour_angle, at.declination), placed.side, hour, dec);
            let offered = Offered::new(setup.estimate, latitude, &star)?;
            Some((placed, offered))
        })
        .collect();
    let field = setup.mount.field_looked_into();
    let first_look = wanted.first_look(wanted.covariance(), field);
    let offered: Vec<Offered> = placed.iter().map(|(_, offered)| *offered).collect();
    let ranked = wanted.ranked(&offered);
    let worth: Vec<NextStar> = ranked
        .into_iter()
        .filter_map(|(place, _)| {
            let (placed, offered) = placed.get(place)?;
            let after = offered.after_reading(wanted.covariance());
            Some(NextStar {
                placed: placed.clone(),
                first_look,
                first_look_after: wanted.first_look(&after, field),
            })
        })
        .filter(|next| next.gain() > WORTH_READING)
        .collect();
    brightest_first(worth)
}

/// Of the stars that help as good as the best, the brightest are put first: they are known by sight.
fn brightest_first(stars: Vec<NextStar>) -> Vec<NextStar> {
    let best = stars.iter().map(NextStar::gain).fold(0.0, f64::max);
    let (mut good, others): (Vec<NextStar>, Vec<NextStar>) = stars
        .into_iter()
        .partition(|next| next.gain() > best - AS_GOOD.min(best * OF_THE_BEST));
    good.sort_by(|a, b| bright::by_brightness(&a.placed.star, &b.placed.star));
    good.extend(others);
    good
}

/// What timing would gain, from what was believed before the readings and the readings themselves; nothing where the ring
/// rides with the drive, or a star was not read yet.
#[must_use]
pub fn timing(
    setup: &Setup<'_>,
    moment: &Moment,
    before: &Covariance,
    sights: &[Sight],
    rest: &[Target],
) -> Option<Timing> {
    let circle = &setup.mount.hour_circle;
    if sights.is_empty() || !circle.stands_still() {
        return None;
    }
    let latitude = moment.observer().latitude;
    let field = setup.mount.field_looked_into();
    let (_, dec) = looks(setup.mount);
    let timed = sights.iter().fold(*before, |known, sight| {
        let place = (sight.hour_angle, sight.declination);
        let star = station(place, sight.side, circle.timed_error(), dec);
        let offered = Offered::new(setup.estimate, latitude, &star);
        offered.map_or(known, |offered| offered.after_reading(&known))
    });
    let looked = wanted(setup, moment, rest, circle.look_error());
    let awaited = wanted(setup, moment, rest, circle.timed_error());
    Some(Timing {
        first_look: looked.first_look(looked.covariance(), field),
        timed: awaited.first_look(&timed, field),
    })
}

pub(super) fn looks(mount: &Mount) -> (Angle, Angle) {
    (
        mount.hour_circle.look_error(),
        mount.declination_circle.look_error(),
    )
}

/// The places wanted: those of the objects at the time each will be dialled, as far as they are up then.
fn wanted(setup: &Setup<'_>, moment: &Moment, rest: &[Target], hour: Angle) -> Wanted {
    let latitude = moment.observer().latitude;
    let (_, dec) = looks(setup.mount);
    let mut pace = 0.0;
    let mut places: Vec<Station> = Vec::new();
    for target in rest {
        let then = moment.later(pace);
        let observed = then.observed(&then.apparent(&target.source));
        let Some(side) = bright::side_for(setup, &observed) else {
            continue;
        };
        if observed.altitude > setup.horizon.altitude_at(observed.azimuth) {
            places.push(station(
                (observed.hour_angle, observed.declination),
                side,
                hour,
                dec,
            ));
            pace += PACE_S;
        }
    }
    let wanted = Wanted::new(setup.estimate, latitude, &places);
    if wanted.is_empty() {
        let places = whole_sky(setup, moment, hour, dec);
        return Wanted::new(setup.estimate, latitude, &places);
    }
    wanted
}

/// Places all over the visible sky, some ten degrees apart.
fn whole_sky(setup: &Setup<'_>, moment: &Moment, hour: Angle, dec: Angle) -> Vec<Station> {
    const STEP_DEG: f64 = 10.0;
    let mut places = Vec::new();
    for row in -8..=8 {
        let declination = f64::from(row) * STEP_DEG;
        // as many in a row as its circle of declination is long
        let count = (360.0 / STEP_DEG * declination.to_radians().cos())
            .round()
            .max(1.0);
        #[allow(clippy::cast_possible_truncation, clippy::cast_sign_loss)] // 1 to 36
        for column in 0..count as u32 {
            let hour_angle = HourAngle::from_degrees(f64::from(column) / count * 360.0);
            let declination = Declination::from_degrees(declination);
            let observed = moment.observed_at(hour_angle, declination);
            let high = observed.altitude >= Altitude::from_degrees(WANTED_ALTITUDE_DEG);
            if let Some(side) = bright::side_for(setup, &observed).filter(|_| high) {
                places.push(station((hour_angle, declination), side, hour, dec));
            }
        }
    }
    places
}

pub(super) const fn station(
    (hour_angle, declination): (HourAngle, Declination),
    side: Side,
    sigma_hour: Angle,
    sigma_dec: Angle,
) -> Station {
    Station {
        hour_angle,
        declination,
        side,
        sigma_hour,
        sigma_dec,
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::catalog::Catalogue;
    use crate::dial::trial::{Trial, moment, target};
    use crate::estimate::{Estimate, Prior, fit};
    use crate::metal::SideRequest;

    fn stars() -> Vec<Target> {
        Catalogue::builtin().bright_stars(bright::FAINTEST_RIVAL_HP)
    }

    const EVENING: &str = "2026-12-01T21:30:00Z";

    fn read(trial: &mut Trial, placed: &Placed) {
        let setup = Setup {
            side: SideRequest::Only(placed.side),
            ..trial.setup()
        };
        let now = moment(EVENING);
        let circles = crate::dial::dial(&setup, &now, &placed.star).unwrap();
        let sighting = crate::dial::Sighting {
            side: circles.side,
            hour: circles.hour.reading,
            dec: circles.dec.reading,
            hour_opposite: None,
            dec_opposite: None,
            timed: false,
        };
        let sight = sighting.sight(&trial.mount, &now, &placed.star.source);
        let prior = Prior::from_expected(&trial.mount.expected);
        trial.estimate = Estimate::from(&fit(now.observer().latitude, &prior, &[sight]));
    }

    #[test]
    fn the_first_star_gains_much_and_stands_where_it_can_be_read() {
        let trial = Trial::new();
        let now = moment(EVENING);
        let rest = ["M 37", "M 31", "M 42"].map(target);
        let next = next_stars(&trial.setup(), &now, &stars(), &rest);
        let best = &next[0];
        assert!(best.first_look < 0.01, "{best:?}");
        assert!(best.gain() > 0.1, "{best:?}");
        for next in &next {
            let at = &next.placed.observed;
            assert!(at.altitude.degrees() >= 20.0);
            assert!(at.declination.degrees() < 80.0);
        }
    }

    #[test]
    fn the_next_star_gains_what_the_fit_then_says() {
        let mut trial = Trial::new();
        let now = moment(EVENING);
        let rest = ["M 37", "M 31", "M 42"].map(target);
        let first = next_stars(&trial.setup(), &now, &stars(), &rest).remove(0);
        read(&mut trial, &first.placed);
        let after = next_stars(&trial.setup(), &now, &stars(), &rest);
        assert!((after[0].first_look - first.first_look_after).abs() < 0.02);
        assert!(after[0].placed.star.name != first.placed.star.name);
    }

    #[test]
    fn castor_and_pollux_are_not_offered_before_the_mount_is_known() {
        let mut trial = Trial::new();
        let now = moment("2026-12-02T02:30:00Z");
        let names = |trial: &Trial| -> Vec<String> {
            let setup = trial.setup();
            let placed = bright::well_placed(&setup, &now, &stars());
            let offered = bright::unmistakable(&setup, &now, placed, &stars());
            offered.into_iter().map(|placed| placed.star.name).collect()
        };
        let offered = names(&trial);
        assert!(!offered.iter().any(|name| name == "Castor"), "{offered:?}");
        assert!(offered.iter().any(|name| name == "Capella"), "{offered:?}");
        let known = trial.estimate.errors();
        trial.estimate = Estimate::new(known, Covariance::zeros());
        let offered = names(&trial);
        assert!(offered.iter().any(|name| name == "Castor"), "{offered:?}");
    }

    #[test]
    fn a_side_that_is_wanted_is_kept_to() {
        let trial = Trial::new();
        let setup = Setup {
            side: SideRequest::Only(Side::TubeEast),
            ..trial.setup()
        };
        let next = next_stars(&setup, &moment(EVENING), &stars(), &[]);
        assert!(!next.is_empty());
        assert!(next.iter().all(|next| next.placed.side == Side::TubeEast));
    }
}
