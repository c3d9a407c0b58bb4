//! The likeliest errors for readings whose meaning is settled: a damped Gauss-Newton descent.
//!
//! Minimised is half the squared length of the errors in the prior's independent numbers, plus for each circle of each
//! sight Huber's function of its residual in sigmas. Slopes are those of the exact geometry. Each circle is weighed by
//! itself, since one may be misread and the other not: exactly 1 within [`TRUSTED_SIGMAS`], beyond that falling with the
//! distance (P. J. Huber, *Annals of Mathematical Statistics* 35, 1964, p. 73; the reference is from memory).
//!
//! With few stars and many errors a gross mistake has leverage: held at a constant pull, it would rather bend the polar
//! axis by degrees than be let go. So from [`GROSS_SIGMAS`] the pull falls away with the cube of the distance, and the cost
//! levels out, once a first descent with Huber's pull has come near.

use nalgebra::{RowSVector, SMatrix, SVector};

use crate::angle::{Angle, Latitude};
use crate::estimate::prior::{Covariance, Prior};
use crate::estimate::sight::{Place, off};
use crate::metal::errors::COUNT;
use crate::metal::{Axes, MountErrors};

/// A reading this near its prediction, in sigmas, is trusted in full.
pub const TRUSTED_SIGMAS: f64 = 3.0;

/// A reading this far from its prediction, in sigmas, is a mistake rather than an error. The cost then levels out at 18.
/// If one reading in a hundred is wrong by anything up to half a turn (common practice, no source) and a sigma is 3', a
/// mistake costs ln(2 pi / (0.01 sqrt(2 pi) sigma)) = 12.6; the rest is reluctance, since observers state their sigma
/// too small more often than too large.
pub const GROSS_SIGMAS: f64 = 5.0;

/// No reading is better than this: a hundredth of an arcsecond, far below any circle.
const LEAST_SIGMA_RAD: f64 = 5e-8;

/// A step shorter than this in sigmas of the estimate ends the descent.
const STEP_SIGMAS: f64 = 1e-6;

/// The same while gross mistakes are still held: that descent only has to come near.
const NEAR_STEP_SIGMAS: f64 = 0.01;

/// Where no step downhill is found, one shorter than this would have been lost in rounding anyway.
const LOST_STEP_SIGMAS: f64 = 1e-4;

/// Clean readings take four to eight steps, wild ones some forty.
const MOST_STEPS: usize = 200;

/// The same while gross mistakes are still held: where that takes long, it need not be finished.
const MOST_NEAR_STEPS: usize = 30;

/// Change of the cost that is rounding alone, relative to one and to the cost.
const COST_ROUNDING: f64 = 1e-12;

/// The first damping after a step that led uphill, relative to the diagonal; each further one is ten times it.
const FIRST_DAMPING: f64 = 1e-3;

/// Damping so strong that the step is nothing.
const MOST_DAMPING: f64 = 1e9;

type Vector = SVector<f64, COUNT>;

/// A sight whose circles are taken to mean one pair of axis angles.
#[derive(Clone, Copy, Debug, PartialEq)]
pub(super) struct Settled {
    pub place: Place,
    pub shown: Axes,
    pub sigma_hour: Angle,
    pub sigma_dec: Angle,
}

/// Where the descent stands.
#[derive(Clone, Debug)]
pub(super) struct Standing {
    independent: Vector,
    pub errors: MountErrors,
    pub cost: f64,
    information: Covariance,
    downhill: Vector,
}

/// Where the descent came to.
#[derive(Clone, Debug)]
pub(super) struct Descent {
    pub standing: Standing,
    pub steps: usize,
    pub converged: bool,
}

impl Standing {
    /// Covariance of the errors: the inverse of what prior and weighted readings together say of them.
    pub fn covariance(&self, prior: &Prior) -> Option<Covariance> {
        let inverse = self.information.cholesky()?.inverse();
        let covariance = prior.root() * inverse * prior.root().transpose();
        covariance
            .iter()
            .all(|element| element.is_finite())
            .then(|| (covariance + covariance.transpose()) * 0.5)
    }
}

/// How a reading beyond [`GROSS_SIGMAS`] pulls.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(super) enum Gross {
    /// As one at [`TRUSTED_SIGMAS`] does.
    Held,
    /// Less and less.
    LetGo,
}

impl Gross {
    /// How far a residual of so many sigmas is trusted.
    pub fn weight(self, sigmas: f64) -> f64 {
        let sigmas = sigmas.abs();
        let huber = TRUSTED_SIGMAS / sigmas.max(TRUSTED_SIGMAS);
        if self == Self::Held || sigmas <= GROSS_SIGMAS {
            huber
        } else {
            huber * (GROSS_SIGMAS / sigmas).powi(3)
        }
    }

    /// What a residual of so many sigmas costs: the integral of weight times residual.
    pub fn cost(self, sigmas: f64) -> f64 {
        let sigmas = sigmas.abs();
        if sigmas <= TRUSTED_SIGMAS {
            return sigmas * sigmas / 2.0;
        }
        let huber = |sigmas: f64| TRUSTED_SIGMAS * (sigmas - TRUSTED_SIGMAS / 2.0);
        if self == Self::Held || sigmas <= GROSS_SIGMAS {
            huber(sigmas)
        } else {
            let nearness = GROSS_SIGMAS / sigmas;
            huber(GROSS_SIGMAS) + TRUSTED_SIGMAS * GROSS_SIGMAS / 2.0 * (1.0 - nearness * nearness)
        }
    }
}

/// A reading's error in radians, kept from vanishing.
pub(super) fn sigma_rad(sigma: Angle) -> f64 {
    sigma.radians().abs().max(LEAST_SIGMA_RAD)
}

/// Descends from there to the likeliest errors. Nothing if a sight is out of reach from the start.
pub(super) fn descend(
    latitude: Latitude,
    prior: &Prior,
    start: &MountErrors,
    sights: &[Settled],
    gross: Gross,
) -> Option<Descent> {
    let mut here = stand(latitude, prior, prior.independent(start), sights, gross)?;
    let (most_steps, enough_sigmas) = match gross {
        Gross::Held => (MOST_NEAR_STEPS, NEAR_STEP_SIGMAS),
        Gross::LetGo => (MOST_STEPS, STEP_SIGMAS),
    };
    let mut damping = 0.0;
    for steps in 0..most_steps {
        let to_go = step(&here, 0.0)?;
        let sigmas = here.downhill.dot(&to_go).max(0.0).sqrt();
        if sigmas < enough_sigmas {
            return Some(Descent {
                standing: here,
                steps,
                converged: true,
            });
        }
        let enough = here.cost + COST_ROUNDING * (1.0 + here.cost);
        let lower = loop {
            let tried = step(&here, damping)
                .and_then(|step| stand(latitude, prior, here.independent + step, sights, gross))
                .filter(|there| there.cost <= enough);
            if tried.is_some() || damping > MOST_DAMPING {
                break tried;
            }
            damping = (damping * 10.0).max(FIRST_DAMPING);
        };
        let Some(there) = lower else {
            return Some(Descent {
                standing: here,
                steps,
                converged: sigmas < LOST_STEP_SIGMAS,
            });
        };
        here = there;
        damping = if damping > FIRST_DAMPING {
            damping / 10.0
        } else {
            0.0
        };
    }
    Some(Descent {
        standing: here,
        steps: most_steps,
        converged: false,
    })
}

/// The step downhill under that damping.
fn step(here: &Standing, damping: f64) -> Option<Vector> {
    let damped =
        here.information + Covariance::from_diagonal(&(here.information.diagonal() * damping));
    let step = damped.cholesky()?.solve(&here.downhill);
    step.iter().all(|part| part.is_finite()).then_some(step)
}

/// Cost and slopes at a point. Nothing if a sight is out of reach of such a mount.
fn stand(
    latitude: Latitude,
    prior: &Prior,
    independent: Vector,
    sights: &[Settled],
    gross: Gross,
) -> Option<Standing> {
    let errors = prior.errors_of(&independent);
    // a whole turn of an index is no error
    let independent = prior.independent(&errors);
    let mut total = independent.norm_squared() / 2.0;
    let mut normal = Covariance::zeros();
    let mut pull = Vector::zeros();
    let mut add = |slopes: RowSVector<f64, COUNT>, off: f64, sigma: Angle| {
        let sigma = sigma_rad(sigma);
        let sigmas = off / sigma;
        let weighted = slopes * (gross.weight(sigmas) / (sigma * sigma));
        normal += slopes.transpose() * weighted;
        pull += weighted.transpose() * off;
        total += gross.cost(sigmas);
    };
    for sight in sights {
        let (predicted, slopes) = sight.place.foretold(latitude, &errors).ok()?;
        let slopes: SMatrix<f64, 2, COUNT> = slopes.by_errors;
        add(
            slopes.row(0).into_owned(),
            off(sight.shown.hour, predicted.hour),
            sight.sigma_hour,
        );
        add(
            slopes.row(1).into_owned(),
            off(sight.shown.dec, predicted.dec),
            sight.sigma_dec,
        );
    }
    let root = prior.root();
    let information = Covariance::identity() + root.transpose() * normal * root;
    let downhill = root.transpose() * pull - independent;
    (total.is_finite() && information.iter().all(|element| element.is_finite())).then_some(
        Standing {
            independent,
            errors,
            cost: total,
            information,
            downhill,
        },
    )
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn a_reading_within_three_sigma_is_trusted_in_full() {
        for gross in [Gross::Held, Gross::LetGo] {
            assert!((gross.weight(3.0) - 1.0).abs() < f64::EPSILON);
            assert!((gross.weight(-4.5) - 2.0 / 3.0).abs() < f64::EPSILON);
        }
        assert!((Gross::Held.weight(30.0) - 0.1).abs() < f64::EPSILON);
    }

    #[test]
    fn the_slope_of_the_cost_is_the_weighted_residual() {
        /// Central differences of so small a step are good to the rounding of a cost of some tens.
        const STEP: f64 = 1e-4;
        for gross in [Gross::Held, Gross::LetGo] {
            for sigmas in [0.5, 2.999, 3.001, 4.9, 4.999, 5.001, 8.0, 300.0] {
                let slope = (gross.cost(sigmas + STEP) - gross.cost(sigmas - STEP)) / (2.0 * STEP);
                assert!(
                    (slope - gross.weight(sigmas) * sigmas).abs() < 1e-6,
                    "{sigmas}"
                );
            }
        }
    }

    #[test]
    fn a_gross_mistake_costs_no_more_than_a_constant() {
        assert!(Gross::LetGo.cost(1e9) <= 18.0);
        assert!(Gross::Held.cost(1e9) > 1e9);
    }
}
