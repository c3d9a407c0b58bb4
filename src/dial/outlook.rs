//! The cautions that go with a setting.

use crate::angle::{Angle, HourAngle};
use crate::dial::caution::{Caution, CautionCode};
use crate::dial::setup::Setup;
use crate::dial::sun;
use crate::metal::{Axes, HourAngleSpan, MountErrors, Side};
use crate::sky::{Body, Moment, Observed, Source};

/// Below this the air spoils the view and refraction grows uncertain (common practice, no source).
const LOW: Angle = Angle::from_degrees(10.0);

/// Nearer a Moon that is up than this, faint objects drown in its light (common practice, no source).
const NEAR_MOON: Angle = Angle::from_degrees(10.0);

/// Nearer a celestial pole than this, a degree of the hour circle is a few minutes of arc on the
/// sky, and a star cannot calibrate it.
const NEAR_POLE: Angle = Angle::from_degrees(3.0);

/// A turn over the pier within this time is worth knowing before the tube is swung.
const SOON_MIN: f64 = 15.0;

/// Older than this, a night's readings no longer speak for the mount as it stands.
const STALE_HOURS: f64 = 12.0;

/// Farther from their epoch than this, elements no longer give a place to the few minutes of arc that a circle
/// shows: what the planets do to the orbit is not in them (common practice, no source).
const OLD_ELEMENTS_DAYS: f64 = 100.0;

/// The way to the target, for the Sun's sake.
pub(super) struct Way {
    pub(super) from: Option<Axes>,
    pub(super) to: Axes,
}

/// All cautions for a place, the gravest first.
pub(super) fn cautions(
    setup: &Setup<'_>,
    moment: &Moment,
    source: &Source,
    observed: &Observed,
    side: Side,
    way: &Way,
) -> Vec<Caution> {
    let mut found = Vec::new();
    found.extend(sun_cautions(setup, moment, source, observed, way));
    found.extend(horizon_caution(setup, observed));
    found.extend(limit_cautions(setup, observed, side));
    found.extend(moon_caution(moment, source, observed));
    found.extend(pole_caution(observed));
    found.extend(elements_caution(moment, source));
    found.extend(calibration_caution(setup, moment));
    found
}

fn sun_cautions(
    setup: &Setup<'_>,
    moment: &Moment,
    source: &Source,
    observed: &Observed,
    way: &Way,
) -> Option<Caution> {
    if let Some(apart) = sun::near_while_set(moment, source, observed, setup.lead_s) {
        let text = format!(
            "the Sun is {:.0}° away: sunlight in the tube blinds at once and burns; only with a full-aperture filter, finder capped, under the rules of the house",
            apart.degrees()
        );
        return Some(Caution::new(CautionCode::NearSun, text));
    }
    let errors = setup.estimate.errors();
    let passed = way.from.and_then(|from| {
        sun::while_set(moment, setup.lead_s)
            .filter_map(|then| sun::near_on_the_way(&then, from, way.to, &errors))
            .reduce(|a, b| if b < a { b } else { a })
    });
    if let Some(apart) = passed {
        let text = format!(
            "the way there can pass {:.0}° from the Sun: cap tube and finder before swinging",
            apart.degrees()
        );
        return Some(Caution::new(CautionCode::NearSun, text));
    }
    let is_up = sun::while_set(moment, setup.lead_s).any(|then| then.sun_is_up());
    is_up.then(|| {
        Caution::new(
            CautionCode::SunUp,
            "the Sun is up: keep tube and finder capped while swinging",
        )
    })
}

fn horizon_caution(setup: &Setup<'_>, observed: &Observed) -> Option<Caution> {
    let altitude = observed.altitude;
    let mask = setup.horizon.altitude_at(observed.azimuth);
    if altitude.degrees() < 0.0 {
        Some(Caution::new(
            CautionCode::BelowHorizon,
            format!("{:.0}° below the horizon", -altitude.degrees()),
        ))
    } else if altitude < mask {
        Some(Caution::new(
            CautionCode::BehindHorizonMask,
            format!(
                "behind the horizon mask, which stands at {:.0}° there",
                mask.degrees()
            ),
        ))
    } else if altitude.angle() < LOW {
        Some(Caution::new(
            CautionCode::Low,
            format!("low, at {:.0}°", altitude.degrees()),
        ))
    } else {
        None
    }
}

fn limit_cautions(setup: &Setup<'_>, observed: &Observed, side: Side) -> Option<Caution> {
    let limits = &setup.mount.limits;
    if let Some(lowest) = limits
        .lowest_altitude
        .filter(|lowest| observed.altitude < *lowest)
    {
        let text = format!("lower than the mount may go, {:.0}°", lowest.degrees());
        return Some(Caution::new(CautionCode::BeyondLimit, text));
    }
    let span = limits.span(side);
    if let Some(span) = span.filter(|span| !span.contains(observed.hour_angle)) {
        let (east, west) = (signed_hours(span.from), signed_hours(span.to));
        let text = format!(
            "out of reach with {}: hour angles {east} to {west} only",
            side.in_words()
        );
        return Some(Caution::new(CautionCode::BeyondLimit, text));
    }
    let minutes = minutes_until_turn(setup, observed.hour_angle, side, span)?;
    (minutes <= SOON_MIN).then(|| {
        let text = format!("in {minutes:.0} min the tube must go to the other side of the pier");
        Caution::new(CautionCode::TurnOverSoon, text)
    })
}

/// Minutes until the sky has carried the target to the western end of the side's reach, or, where
/// no limit is stated, to the meridian with the tube west.
fn minutes_until_turn(
    setup: &Setup<'_>,
    hour_angle: HourAngle,
    side: Side,
    span: Option<HourAngleSpan>,
) -> Option<f64> {
    if !setup.mount.kind.has_two_sides() {
        return None;
    }
    let left = match (span, side) {
        (Some(span), _) => span.left(hour_angle)?,
        (None, Side::TubeWest) => -hour_angle.angle(),
        (None, _) => return None,
    };
    (left >= Angle::ZERO).then(|| left.hours() * 60.0)
}

fn moon_caution(moment: &Moment, source: &Source, observed: &Observed) -> Option<Caution> {
    if *source == Source::Body(Body::Moon) {
        return None;
    }
    let moon = moment.moon();
    let apart = moon.separation(observed);
    (moon.altitude.degrees() > 0.0 && apart < NEAR_MOON).then(|| {
        Caution::new(
            CautionCode::NearMoon,
            format!("the Moon is {:.0}° away", apart.degrees()),
        )
    })
}

fn pole_caution(observed: &Observed) -> Option<Caution> {
    let apart = Angle::from_degrees(90.0) - observed.declination.angle().abs();
    (apart < NEAR_POLE).then(|| {
        let text = format!(
            "{:.1}° from the pole: trust the declination circle, and sweep along the hour circle",
            apart.degrees()
        );
        Caution::new(CautionCode::NearPole, text)
    })
}

fn elements_caution(moment: &Moment, source: &Source) -> Option<Caution> {
    const ADVICE: &str = "two-body places drift; get new ones from the Minor Planet Center";
    let Source::Orbit(orbit) = source else {
        return None;
    };
    let text = match orbit.age_days(moment.tt()) {
        None => format!("the elements state no epoch: {ADVICE}"),
        Some(days) if days > OLD_ELEMENTS_DAYS => {
            format!("elements are {days:.0} days old: {ADVICE}")
        }
        Some(days) if days < -OLD_ELEMENTS_DAYS => {
            format!("elements are for {:.0} days from now: {ADVICE}", -days)
        }
        Some(_) => return None,
    };
    Some(Caution::new(CautionCode::OldElements, text))
}

fn calibration_caution(setup: &Setup<'_>, moment: &Moment) -> Option<Caution> {
    let estimate = setup.estimate;
    if !estimate.is_calibrated() {
        let text = match (estimate.knows_hour_zero(), estimate.knows_dec_zero()) {
            (false, true) => "the zero of the hour circle is not known: read a star",
            (true, false) => "the zero of the declination circle is not known: read a star",
            _ if estimate.errors() != MountErrors::default() => {
                "the zeros of the circles are not known: read a star"
            }
            _ => "no star has been read yet: these are the settings of a perfect mount",
        };
        return Some(Caution::new(CautionCode::Uncalibrated, text));
    }
    let Some(read_at) = setup.calibrated_at else {
        let text = "no star has been read tonight: these settings rest on an earlier night";
        return Some(Caution::new(CautionCode::StaleCalibration, text));
    };
    let hours = moment.utc().seconds_since(read_at) / 3600.0;
    (hours.abs() > STALE_HOURS).then(|| {
        let text = format!(
            "the last star was read {:.0} h ago: read one again",
            hours.abs()
        );
        Caution::new(CautionCode::StaleCalibration, text)
    })
}

fn signed_hours(hour_angle: HourAngle) -> String {
    let minutes = (hour_angle.angle().hours() * 60.0).round();
    let sign = if minutes < 0.0 { '-' } else { '+' };
    format!(
        "{sign}{}h {:02}m",
        (minutes.abs() / 60.0).floor(),
        minutes.abs() % 60.0
    )
}
