//! Which rows of an index pass a filter, told without reading them.

use crate::catalog::Filter;
use crate::catalog::index::Index;
use crate::sky::CataloguePlace;

/// A place within this of the edge of a circle is not told from one on it: an index knows directions to so many radians.
const FINENESS_RAD: f64 = 2e-7;

/// A filter made ready for one index.
#[derive(Debug)]
pub struct Sieve {
    /// The rows from this one on are too faint.
    too_faint: usize,
    /// The kinds of every row, and those wanted.
    kinds: Option<(Vec<u32>, u32)>,
    /// The constellation of every row, and the one wanted.
    constellation: Option<(Vec<u8>, u8)>,
    /// The direction of every row, that of the middle wanted, and the square of the longest chord.
    near: Option<(Vec<[f32; 3]>, [f64; 3], f64)>,
}

impl Sieve {
    /// For the rows of an index that knows where they are.
    #[must_use]
    pub fn new(index: &Index, filter: &Filter) -> Self {
        let near = filter.near.map(|near| {
            let half = (near.within.radians() + FINENESS_RAD).min(std::f64::consts::PI) / 2.0;
            let chord = 2.0 * half.sin();
            (index.directions(), direction(&near.place), chord * chord)
        });
        Self {
            near,
            ..Self::without_places(index, filter)
        }
    }

    /// For the rows of an index that does not.
    #[must_use]
    pub fn without_places(index: &Index, filter: &Filter) -> Self {
        Self {
            too_faint: filter
                .brighter_than
                .map_or(usize::MAX, |magnitude| index.brighter_than(magnitude)),
            kinds: filter.kind.map(|kind| (index.kinds(), kind.bits_asked())),
            constellation: filter.constellation.map(|wanted| {
                let position = wanted.position_in_table();
                (index.constellations(), position.unwrap_or(u8::MAX - 1))
            }),
            near: None,
        }
    }

    /// True if a row passes.
    #[must_use]
    pub fn passes(&self, row: usize) -> bool {
        row < self.too_faint
            && self.kinds.as_ref().is_none_or(|(kinds, wanted)| {
                kinds.get(row).is_some_and(|kinds| kinds & wanted != 0)
            })
            && self
                .constellation
                .as_ref()
                .is_none_or(|(of_rows, wanted)| of_rows.get(row) == Some(wanted))
            && self.near.as_ref().is_none_or(|(of_rows, middle, most)| {
                let chord = |there: &[f32; 3]| -> f64 {
                    let apart = there.iter().zip(middle).map(|(a, b)| f64::from(*a) - b);
                    apart.map(|part| part * part).sum()
                };
                // no direction is not a number, and no such number is below another
                of_rows.get(row).is_some_and(|there| chord(there) <= *most)
            })
    }
}

/// The unit vector to a place of the ICRS.
#[must_use]
pub fn direction(place: &CataloguePlace) -> [f64; 3] {
    let (ra, dec) = (
        place.right_ascension.angle().radians(),
        place.declination.angle().radians(),
    );
    [dec.cos() * ra.cos(), dec.cos() * ra.sin(), dec.sin()]
}

/// The same as an index keeps it.
#[must_use]
#[allow(clippy::cast_possible_truncation)] // a small part of a second of arc
pub fn kept_direction(place: &CataloguePlace) -> [f32; 3] {
    direction(place).map(|part| part as f32)
}
