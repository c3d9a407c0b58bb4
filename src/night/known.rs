//! What is known of the mount as a night stands: the estimate from every star in use.
//!
//! A ring set anew, or knocked, makes its index free again (and its eccentricity unsure, where that is looked for); an axis turned by its adjusters makes the
//! axis unsure again. What the stars before told of all the other errors is kept each time.

use crate::angle::Latitude;
use crate::estimate::{Estimate, Fit, Prior, Sight, Touched, fit};
use crate::metal::ExpectedErrors;
use crate::night::state::{State, Zeros};
use crate::time::Utc;

/// What was believed before any star of the night.
#[derive(Clone, Copy, Debug)]
pub struct Grounds<'g> {
    /// The site's latitude.
    pub latitude: Latitude,
    /// What the mount file expects.
    pub expected: &'g ExpectedErrors,
    /// What was believed of the mount's errors.
    pub prior: &'g Prior,
    /// Stars read before the night, from a file of readings.
    pub sights: &'g [Sight],
    /// When the last of them was read.
    pub read_at: Option<Utc>,
}

/// What is known of the mount.
#[derive(Clone, Debug, PartialEq)]
pub struct Known {
    /// Its errors.
    pub estimate: Estimate,
    /// The fit they came of: of the sights since a ring was last set or the axis adjusted.
    pub fit: Fit,
    /// What was believed before those sights.
    pub prior: Prior,
    /// Those sights, those read before the night first.
    pub sights: Vec<Sight>,
    /// When the last star was read.
    pub read_at: Option<Utc>,
}

impl Known {
    /// From every star in use.
    ///
    /// Where the observer starts from an earlier night, that stands in place of what the mount file
    /// expects.
    #[must_use]
    pub fn of(grounds: &Grounds<'_>, state: &State) -> Self {
        let latitude = grounds.latitude;
        let earlier = state.started_from.as_ref();
        let earlier = earlier.and_then(|started| started.prior(grounds.expected));
        let mut prior = earlier.unwrap_or_else(|| grounds.prior.clone());
        let mut sights = grounds.sights.to_vec();
        let mut read_at = grounds.read_at;
        let mut zeros = Zeros::default();
        let mut turn_over = |to: Zeros, sights: &mut Vec<Sight>, read_at: &mut Option<Utc>| {
            if to != zeros {
                let before = Estimate::from(&fit(latitude, &prior, sights));
                let touched = Touched {
                    hour_ring: zeros.hour != to.hour,
                    dec_ring: zeros.dec != to.dec,
                    axis: zeros.axis != to.axis,
                };
                prior = Prior::from_estimate(&before, touched.widening(grounds.expected));
                sights.clear();
                if touched.hour_ring || touched.dec_ring {
                    *read_at = None;
                }
                zeros = to;
            }
        };
        for read in state.readings.iter().filter(|read| read.reading.used) {
            turn_over(read.zeros, &mut sights, &mut read_at);
            sights.push(read.reading.sight());
            read_at = Some(read.utc);
        }
        turn_over(state.zeros, &mut sights, &mut read_at);
        let fit = fit(latitude, &prior, &sights);
        Self {
            estimate: Estimate::from(&fit),
            fit,
            prior,
            sights,
            read_at,
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::angle::{Angle, Declination, HourAngle};
    use crate::metal::{Axes, MountErrors, Side, to_axes};
    use crate::night::event::{Circle, Event, Stamped};
    use crate::night::reading::StarReading;

    const LATITUDE_DEG: f64 = 52.0;
    const SIGMA_DEG: f64 = 0.05;

    fn mount(hour_index: f64, high: f64) -> MountErrors {
        MountErrors {
            hour_index: Angle::from_arcminutes(hour_index),
            dec_index: Angle::from_arcminutes(-47.0),
            polar_high: Angle::from_arcminutes(high),
            polar_east: Angle::from_arcminutes(-22.0),
            cone: Angle::from_arcminutes(9.0),
            ..MountErrors::default()
        }
    }

    /// Stars all over the sky, hour angle and declination in degrees.
    const STARS: [(f64, f64); 6] = [
        (-50.0, 20.0),
        (40.0, -5.0),
        (-20.0, 55.0),
        (25.0, 35.0),
        (-35.0, -10.0),
        (60.0, 45.0),
    ];

    /// A star read without error.
    fn star((hour_angle, declination): (f64, f64), errors: &MountErrors) -> Event {
        let side = if hour_angle < 0.0 {
            Side::TubeWest
        } else {
            Side::TubeEast
        };
        let axes: Axes = to_axes(
            HourAngle::from_degrees(hour_angle),
            Declination::from_degrees(declination),
            Latitude::from_degrees(LATITUDE_DEG),
            errors,
            side,
        )
        .unwrap();
        Event::StarRead(Box::new(StarReading {
            star: "star".to_owned(),
            hour_angle_deg: hour_angle,
            declination_deg: declination,
            sidereal_deg: 0.0,
            side,
            hour: String::new(),
            dec: String::new(),
            hour_candidates_deg: vec![axes.hour.degrees()],
            dec_candidates_deg: vec![axes.dec.degrees()],
            taken_as: Some(axes.into()),
            hour_sigma_deg: SIGMA_DEG,
            dec_sigma_deg: SIGMA_DEG,
            driven: false,
            timed: false,
            opposite: crate::metal::OppositeVerniers::default(),
            doubted: String::new(),
            off_arcmin: None,
            used: true,
        }))
    }

    fn known(events: Vec<Event>) -> Known {
        let expected = ExpectedErrors::default();
        let prior = Prior::from_expected(&expected);
        let grounds = Grounds {
            latitude: Latitude::from_degrees(LATITUDE_DEG),
            expected: &expected,
            prior: &prior,
            sights: &[],
            read_at: None,
        };
        let mut state = State::default();
        for (number, event) in (1..).zip(events) {
            let utc = Utc::parse("2026-12-01T20:00:00Z").unwrap();
            state.apply(&Stamped { number, utc, event });
        }
        Known::of(&grounds, &state)
    }

    fn sigma_arcmin(known: &Known, place: usize) -> f64 {
        Angle::from_radians(known.estimate.covariance()[(place, place)].sqrt()).arcminutes()
    }

    #[test]
    fn after_a_slip_one_star_gives_the_index_and_the_rest_stays() {
        let all = |errors: &MountErrors| STARS.map(|place| star(place, errors));
        let slipped = Event::RingSet {
            circle: Circle::Hour,
            reading: None,
        };
        let mut events = all(&mount(83.0, 18.0)).to_vec();
        events.push(slipped);
        let free = known(events.clone());
        assert!(!free.estimate.is_calibrated() && free.read_at.is_none());
        events.push(star(STARS[1], &mount(400.0, 18.0)));
        let again = known(events);
        let index = again.estimate.errors().hour_index.arcminutes();
        assert!((index - 400.0).abs() < 2.0, "{index}");
        let before = known(all(&mount(83.0, 18.0)).to_vec());
        for place in 1..6 {
            let (was, is) = (sigma_arcmin(&before, place), sigma_arcmin(&again, place));
            assert!(is <= was + 1e-6, "{place}: {was} {is}");
        }
    }

    #[test]
    fn an_axis_adjusted_is_unsure_and_the_rest_stays() {
        let mut events = STARS.map(|place| star(place, &mount(83.0, 18.0))).to_vec();
        let before = known(events.clone());
        events.push(Event::AxisAdjusted);
        let adjusted = known(events.clone());
        let unsure = sigma_arcmin(&adjusted, 2);
        assert!((60.0..61.0).contains(&unsure), "{unsure}");
        assert!((sigma_arcmin(&adjusted, 4) - sigma_arcmin(&before, 4)).abs() < 1e-6);
        // lowered by 15': two stars on one side tell
        events.extend([STARS[0], STARS[4]].map(|place| star(place, &mount(83.0, 3.0))));
        let high = known(events).estimate.errors().polar_high.arcminutes();
        assert!((high - 3.0).abs() < 2.0, "{high}");
    }
}
