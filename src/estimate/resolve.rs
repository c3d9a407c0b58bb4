//! What ambiguous readings were meant, and where a fit may start.
//!
//! The index of a circle can be of any size, so a start takes it from one sight: shown less predicted, for each angle
//! the reading can mean. Every other sight then means the angle nearest to its prediction. Hour and declination
//! circles are weighed apart, each by what the starts leave unexplained under all that is uncertain but the index.

use nalgebra::Vector2;

use crate::angle::{Angle, AxisAngle, Latitude};
use crate::estimate::descent::{Gross, Settled, sigma_rad};
use crate::estimate::prior::Prior;
use crate::estimate::sight::{Sight, nearest, off};
use crate::metal::errors::COUNT;
use crate::metal::{Axes, MountErrors};

/// The best determined sights give the index; the others could only repeat them.
const MOST_ANCHORS: usize = 8;

/// Of each circle, how many indexes that give its readings different meanings are followed further.
const MOST_INDEXES: usize = 3;

/// How many starts are fitted in full.
const MOST_STARTS: usize = 4;

/// One sight's reading of one circle, beside what the prior foretells of it.
struct Foretold<'a> {
    candidates: &'a [AxisAngle],
    predicted: AxisAngle,
    /// Of the reading and of every error but the index, radians.
    sigma: f64,
}

/// An index, in radians on top of the prior's, with what it would cost.
struct Index {
    offset: f64,
    cost: f64,
    meant: Vec<Option<AxisAngle>>,
}

/// The likeliest errors to start from, at least one, the best first.
pub(super) fn starts(latitude: Latitude, prior: &Prior, sights: &[Sight]) -> Vec<MountErrors> {
    let mean = prior.mean();
    let mut but_index = *prior.covariance();
    for index in 0..2 {
        but_index.row_mut(index).fill(0.0);
        but_index.column_mut(index).fill(0.0);
    }
    let mut hour_circle = Vec::with_capacity(sights.len());
    let mut dec_circle = Vec::with_capacity(sights.len());
    for sight in sights {
        let Ok((predicted, slopes)) = sight.place().foretold(latitude, &mean) else {
            continue;
        };
        let variances: Vector2<f64> =
            (slopes.by_errors * but_index * slopes.by_errors.transpose()).diagonal();
        hour_circle.push(Foretold {
            candidates: &sight.hour,
            predicted: predicted.hour,
            sigma: sigma_rad(sight.sigma_hour).hypot(variances.x.sqrt()),
        });
        dec_circle.push(Foretold {
            candidates: &sight.dec,
            predicted: predicted.dec,
            sigma: sigma_rad(sight.sigma_dec).hypot(variances.y.sqrt()),
        });
    }
    let [hour_sigma, dec_sigma, ..]: [f64; COUNT] =
        prior.covariance().diagonal().map(f64::sqrt).into();
    let hour_indexes = indexes(&hour_circle, hour_sigma);
    let dec_indexes = indexes(&dec_circle, dec_sigma);
    let mut pairs: Vec<(f64, MountErrors)> = hour_indexes
        .iter()
        .flat_map(|hour| dec_indexes.iter().map(move |dec| (hour, dec)))
        .map(|(hour, dec)| {
            let errors = MountErrors {
                hour_index: mean.hour_index + Angle::from_radians(hour.offset),
                dec_index: mean.dec_index + Angle::from_radians(dec.offset),
                ..mean
            };
            (hour.cost + dec.cost, errors)
        })
        .collect();
    pairs.sort_by(|(a, _), (b, _)| a.total_cmp(b));
    pairs.truncate(MOST_STARTS);
    pairs.into_iter().map(|(_, errors)| errors).collect()
}

/// The cheapest indexes of one circle that give its readings different meanings, the best first; the prior's own is
/// always weighed too.
fn indexes(circle: &[Foretold], index_sigma: f64) -> Vec<Index> {
    let mut anchors: Vec<&Foretold> = circle.iter().collect();
    anchors.sort_by(|a, b| a.sigma.total_cmp(&b.sigma));
    let mut found: Vec<Index> = anchors
        .iter()
        .take(MOST_ANCHORS)
        .flat_map(|anchor| {
            anchor
                .candidates
                .iter()
                .map(|&candidate| off(candidate, anchor.predicted))
        })
        .chain([0.0])
        .map(|offset| weighed(offset, circle, index_sigma))
        .collect();
    found.sort_by(|a, b| a.cost.total_cmp(&b.cost));
    let mut distinct: Vec<Index> = Vec::with_capacity(MOST_INDEXES);
    for index in found {
        if distinct.len() < MOST_INDEXES && distinct.iter().all(|kept| kept.meant != index.meant) {
            distinct.push(index);
        }
    }
    distinct
}

fn weighed(offset: f64, circle: &[Foretold], index_sigma: f64) -> Index {
    let from_prior = if offset == 0.0 {
        0.0
    } else {
        offset / sigma_rad(Angle::from_radians(index_sigma))
    };
    let mut total = from_prior * from_prior / 2.0;
    let meant = circle
        .iter()
        .map(|reading| {
            let predicted = AxisAngle::new(reading.predicted.angle() + Angle::from_radians(offset));
            let meant = nearest(reading.candidates, predicted)?;
            total += Gross::LetGo.cost(off(meant, predicted) / reading.sigma);
            Some(meant)
        })
        .collect();
    Index {
        offset,
        cost: total,
        meant,
    }
}

/// What each sight means to a mount of such errors. Nothing for a place out of its reach, or a circle not read.
pub(super) fn settle(
    latitude: Latitude,
    errors: &MountErrors,
    sights: &[Sight],
) -> Vec<Option<Settled>> {
    sights
        .iter()
        .map(|sight| {
            let (predicted, slopes) = sight.place().foretold(latitude, errors).ok()?;
            // at the very edge of reach the slopes are infinite
            if !slopes.by_errors.iter().all(|slope| slope.is_finite()) {
                return None;
            }
            Some(Settled {
                place: sight.place(),
                shown: Axes {
                    hour: nearest(&sight.hour, predicted.hour)?,
                    dec: nearest(&sight.dec, predicted.dec)?,
                },
                sigma_hour: sight.sigma_hour,
                sigma_dec: sight.sigma_dec,
            })
        })
        .collect()
}
