//! What is believed of a mount's errors before any star is read: a Gaussian of its errors, in radians.
//!
//! The indexes are free: one sigma of 60° about nothing only keeps an unread index from being of any size at all.
//! The rest is what the mount file expects, or what the last night left, widened.

use nalgebra::{SMatrix, SVector};

use crate::angle::Angle;
use crate::estimate::Estimate;
use crate::metal::errors::COUNT;
use crate::metal::{ExpectedErrors, MountErrors};

/// A covariance of the errors in the order of [`MountErrors::to_array`], in square radians.
pub type Covariance = SMatrix<f64, COUNT, COUNT>;

/// One sigma of an index error that nothing is known of.
pub(super) const FREE_INDEX: Angle = Angle::from_degrees(60.0);

/// A direction of the correlations with less than this share of the variance is known as well as exactly: below it
/// lies only the rounding of the matrix.
const NO_VARIANCE: f64 = 1e-13;

/// Sweeps of the eigenvalue routine; a matrix of so many errors takes some ten.
const MOST_SWEEPS: usize = 1000;

/// The belief before any reading.
///
/// Held beside the covariance is a root of it, which turns the errors into independent numbers of unit
/// variance: in them the fit is well scaled, and an error that is known exactly (sigma nothing) simply does not move.
#[derive(Clone, Debug, PartialEq)]
pub struct Prior {
    mean: SVector<f64, COUNT>,
    covariance: Covariance,
    root: Covariance,
    inverse_root: Covariance,
}

impl Prior {
    /// From what the mount file expects, about no errors at all; the indexes are free.
    #[must_use]
    pub fn from_expected(expected: &ExpectedErrors) -> Self {
        let ExpectedErrors {
            polar_high,
            polar_east,
            cone,
            skew,
            sag,
            hour_eccentric,
            dec_eccentric,
        } = *expected;
        let sigmas = MountErrors {
            hour_index: FREE_INDEX,
            dec_index: FREE_INDEX,
            polar_high,
            polar_east,
            cone,
            skew,
            sag,
            hour_eccentric_sine: hour_eccentric,
            hour_eccentric_cosine: hour_eccentric,
            dec_eccentric_sine: dec_eccentric,
            dec_eccentric_cosine: dec_eccentric,
        }
        .to_array();
        Self::new(
            SVector::zeros(),
            &Covariance::from_diagonal(&variances(sigmas)),
        )
    }

    /// From an earlier night's estimate, each error made less certain by an independent change of that sigma
    /// (order of [`MountErrors::to_array`]).
    #[must_use]
    pub fn from_estimate(estimate: &Estimate, widened_by: [Angle; COUNT]) -> Self {
        Self::new(
            vector(&estimate.errors()),
            &(estimate.covariance() + Covariance::from_diagonal(&variances(widened_by))),
        )
    }

    fn new(mean: SVector<f64, COUNT>, covariance: &Covariance) -> Self {
        let sigmas = covariance.diagonal().map(f64::sqrt);
        let per_sigma = sigmas.map(|sigma| if sigma > 0.0 { 1.0 / sigma } else { 0.0 });
        let (scale, unscale) = (
            Covariance::from_diagonal(&sigmas),
            Covariance::from_diagonal(&per_sigma),
        );
        let correlations = unscale * covariance * unscale;
        // Without the eigenvectors the correlations are let go: the belief is then wider, never narrower in any one error.
        let (vectors, shares) = correlations
            .try_symmetric_eigen(f64::EPSILON, MOST_SWEEPS)
            .map_or_else(
                || (Covariance::identity(), correlations.diagonal()),
                |eigen| (eigen.eigenvectors, eigen.eigenvalues),
            );
        let lengths = shares.map(|share| {
            if share > NO_VARIANCE {
                share.sqrt()
            } else {
                0.0
            }
        });
        let per_length = lengths.map(|length| if length > 0.0 { 1.0 / length } else { 0.0 });
        Self {
            mean,
            covariance: *covariance,
            root: scale * vectors * Covariance::from_diagonal(&lengths),
            inverse_root: Covariance::from_diagonal(&per_length) * vectors.transpose() * unscale,
        }
    }

    /// The likeliest errors.
    #[must_use]
    pub fn mean(&self) -> MountErrors {
        errors(&self.mean)
    }

    /// Their covariance.
    #[must_use]
    pub const fn covariance(&self) -> &Covariance {
        &self.covariance
    }

    /// The matrix that makes errors, less the mean, of independent numbers of unit variance.
    pub(super) const fn root(&self) -> &Covariance {
        &self.root
    }

    /// The errors that independent numbers of unit variance stand for.
    pub(super) fn errors_of(&self, independent: &SVector<f64, COUNT>) -> MountErrors {
        errors(&(self.mean + self.root * independent))
    }

    /// The independent numbers of unit variance that errors stand for; an index is the same a whole turn on, and
    /// counts from the mean the shorter way round.
    pub(super) fn independent(&self, errors: &MountErrors) -> SVector<f64, COUNT> {
        let mut off = vector(errors) - self.mean;
        for index in off.iter_mut().take(2) {
            *index = Angle::from_radians(*index).wrapped_signed().radians();
        }
        self.inverse_root * off
    }
}

/// Errors as a column of radians, in the order of [`MountErrors::to_array`].
fn vector(errors: &MountErrors) -> SVector<f64, COUNT> {
    SVector::from(errors.to_array().map(Angle::radians))
}

fn errors(radians: &SVector<f64, COUNT>) -> MountErrors {
    let radians: [f64; COUNT] = (*radians).into();
    MountErrors::from_array(radians.map(Angle::from_radians))
}

/// Squares of sigmas; half a turn is as uncertain as an angle can be.
fn variances(sigmas: [Angle; COUNT]) -> SVector<f64, COUNT> {
    SVector::from(sigmas.map(|sigma| {
        let sigma = sigma.radians().abs().min(Angle::HALF_TURN.radians());
        sigma * sigma
    }))
}

#[cfg(test)]
mod tests {
    use super::*;

    /// Rounding of a few matrix products of numbers near one.
    const ROUNDING: f64 = 1e-13;

    #[test]
    fn the_root_gives_back_the_covariance() {
        let expected = Prior::from_expected(&ExpectedErrors {
            hour_eccentric: Angle::from_arcminutes(5.0),
            dec_eccentric: Angle::from_arcminutes(5.0),
            ..ExpectedErrors::default()
        });
        let mut covariance = *expected.covariance();
        covariance[(0, 4)] = 0.99 * (covariance[(0, 0)] * covariance[(4, 4)]).sqrt();
        covariance[(4, 0)] = covariance[(0, 4)];
        for prior in [expected, Prior::new(SVector::zeros(), &covariance)] {
            let again = prior.root * prior.root.transpose();
            assert!((again - prior.covariance).abs().max() < ROUNDING);
            assert!(
                (prior.root * prior.inverse_root - Covariance::identity())
                    .abs()
                    .max()
                    < 1e-12
            );
        }
    }

    #[test]
    fn an_error_known_exactly_does_not_move() {
        let prior = Prior::from_expected(&ExpectedErrors {
            cone: Angle::ZERO,
            ..ExpectedErrors::default()
        });
        let errors = prior.errors_of(&SVector::repeat(1.0));
        assert!(errors.cone.radians().abs() < ROUNDING);
        assert!((errors.skew.arcminutes() - 12.0).abs() < 1e-9);
    }

    #[test]
    fn an_index_counts_the_shorter_way_round() {
        let prior = Prior::from_expected(&ExpectedErrors::default());
        let errors = MountErrors {
            hour_index: Angle::from_degrees(330.0),
            ..MountErrors::default()
        };
        assert!((prior.independent(&errors)[0] + 0.5).abs() < 1e-12);
    }
}
