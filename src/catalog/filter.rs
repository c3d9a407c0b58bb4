//! What a search is narrowed to besides the words typed.

use crate::angle::Angle;
use crate::catalog::catalogue::distance_deg;
use crate::catalog::{Catalogue, Constellation, Kind, Target};
use crate::sky::CataloguePlace;

/// What is wanted besides the words typed.
#[derive(Clone, Debug)]
pub struct Filter {
    /// Only this kind.
    pub kind: Option<Kind>,
    /// Only in this constellation.
    pub constellation: Option<&'static Constellation>,
    /// Only what is brighter than this magnitude; what has none is left out.
    pub brighter_than: Option<f64>,
    /// Only what stands near a place; Sun, Moon and planets, which wander, are left out.
    pub near: Option<Near>,
    /// No more than so many.
    pub limit: usize,
}

/// Within a distance of a place.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Near {
    /// In the ICRS at J2000.0, as [`Catalogue::fixed_place`] gives it.
    pub place: CataloguePlace,
    /// The greatest distance on the sky.
    pub within: Angle,
}

impl Default for Filter {
    /// Everything, twenty at most.
    fn default() -> Self {
        Self {
            kind: None,
            constellation: None,
            brighter_than: None,
            near: None,
            limit: 20,
        }
    }
}

impl Filter {
    /// True of a target that passes.
    pub(super) fn passes(&self, target: &Target) -> bool {
        self.kind.is_none_or(|kind| target.kind.is_a(kind))
            && self
                .constellation
                .is_none_or(|wanted| target.constellation == Some(wanted))
            && self
                .brighter_than
                .is_none_or(|limit| target.magnitude.is_some_and(|magnitude| magnitude < limit))
            && self.is_near(|| Catalogue::fixed_place(target))
    }

    /// True if a place is within the distance wanted, or none is.
    pub(super) fn is_near(&self, place: impl FnOnce() -> Option<CataloguePlace>) -> bool {
        self.near.is_none_or(|near| {
            place().is_some_and(|place| distance_deg(&near.place, &place) <= near.within.degrees())
        })
    }
}
