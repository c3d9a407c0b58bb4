//! By how much less certain the errors become where something on the mount was moved by hand.
//!
//! It is given as 1 sigma of an independent change of every error, in the order of [`MountErrors::to_array`], as
//! [`crate::estimate::Prior::from_estimate`] takes it.

use crate::angle::Angle;
use crate::estimate::prior::FREE_INDEX;
use crate::metal::errors::COUNT;
use crate::metal::{ExpectedErrors, MountErrors};

/// What was moved by hand since the stars were read.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq)]
pub struct Touched {
    /// The hour circle was set anew, or knocked.
    pub hour_ring: bool,
    /// The declination circle was set anew, or knocked.
    pub dec_ring: bool,
    /// The polar axis was turned by its adjusters.
    pub axis: bool,
}

impl Touched {
    /// By how much each error may have changed.
    ///
    /// A ring set anew: its index is free again. Turned on its seat it keeps what its graduation is off its own
    /// centre, since that belongs to the engraved numbers; what the seat is off the axis now lies at other numbers.
    /// Nobody knows the shares, so the eccentricity may have changed by as much as the mount file expects of it.
    ///
    /// An axis adjusted: nobody knows by how much, so both its errors may have changed by as much as the mount file
    /// expects of them. The next two or three stars tell.
    #[must_use]
    pub fn widening(self, expected: &ExpectedErrors) -> [Angle; COUNT] {
        let changed = |touched: bool, by: Angle| if touched { by } else { Angle::ZERO };
        let hour_eccentric = changed(self.hour_ring, expected.hour_eccentric);
        let dec_eccentric = changed(self.dec_ring, expected.dec_eccentric);
        MountErrors {
            hour_index: changed(self.hour_ring, FREE_INDEX),
            dec_index: changed(self.dec_ring, FREE_INDEX),
            polar_high: changed(self.axis, expected.polar_high),
            polar_east: changed(self.axis, expected.polar_east),
            hour_eccentric_sine: hour_eccentric,
            hour_eccentric_cosine: hour_eccentric,
            dec_eccentric_sine: dec_eccentric,
            dec_eccentric_cosine: dec_eccentric,
            ..MountErrors::default()
        }
        .to_array()
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::estimate::{Estimate, Prior};

    #[test]
    fn a_ring_set_by_hand_frees_its_own_index_and_eccentricity_and_nothing_else() {
        let expected = ExpectedErrors {
            hour_eccentric: Angle::from_arcminutes(5.0),
            dec_eccentric: Angle::from_arcminutes(7.0),
            ..ExpectedErrors::default()
        };
        let known = ExpectedErrors {
            hour_eccentric: Angle::from_arcminutes(0.1),
            dec_eccentric: Angle::from_arcminutes(0.1),
            ..expected
        };
        let before = Estimate::from_prior(&Prior::from_expected(&known));
        let touched = Touched {
            hour_ring: true,
            ..Touched::default()
        };
        let after = Prior::from_estimate(&before, touched.widening(&expected));
        let widened = after.covariance() - before.covariance();
        let sigmas: Vec<f64> = widened
            .diagonal()
            .iter()
            .map(|variance| Angle::from_radians(variance.sqrt()).arcminutes())
            .collect();
        let free = FREE_INDEX.arcminutes();
        for (found, expected) in sigmas
            .iter()
            .zip([free, 0.0, 0.0, 0.0, 0.0, 0.0, 0.0, 5.0, 5.0, 0.0, 0.0])
        {
            assert!((found - expected).abs() < 1e-9, "{sigmas:?}");
        }
    }
}
