//! Every star of a field, the bright ones of the table and the faint ones beside it.

use crate::angle::{Angle, Declination, RightAscension};
use crate::catalog::Catalogue;
use crate::catalog::faint_stars::FaintStars;
use crate::catalog::stars::Star;
use crate::sky::{CataloguePlace, separation};

/// A star without a name.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct StarPlace {
    /// Its place in the ICRS at J2000.0, with its motion.
    pub place: CataloguePlace,
    /// Hp.
    pub magnitude: f64,
}

impl Catalogue {
    /// Every star to Hp 9 no farther than `radius` from a place of the ICRS, by their places at J2000.0, the brightest
    /// first. Beyond about magnitude 7.5 some stars are missing.
    #[must_use]
    pub fn stars_within(
        &self,
        ra: RightAscension,
        dec: Declination,
        radius: Angle,
    ) -> Vec<StarPlace> {
        let in_zone = |star: &Star| {
            let north = star.declination();
            north.is_some_and(|north| (north.degrees() - dec.degrees()).abs() <= radius.degrees())
        };
        let bright = self.stars.all().filter(in_zone).filter_map(|star| {
            let (place, magnitude) = (star.place()?, star.magnitude()?);
            let other = (place.right_ascension.angle(), place.declination);
            (separation((ra.angle(), dec), other) <= radius)
                .then_some(StarPlace { place, magnitude })
        });
        let faint = FaintStars::builtin().within(ra, dec, radius);
        let mut stars: Vec<StarPlace> = bright.chain(faint).collect();
        stars.sort_by(|a, b| a.magnitude.total_cmp(&b.magnitude));
        stars
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn the_pleiades_have_their_bright_stars_and_many_faint_ones_and_none_twice() {
        let catalogue = Catalogue::builtin();
        let alcyone = catalogue.resolve("Alcyone").unwrap();
        let place = Catalogue::fixed_place(&alcyone).unwrap();
        let radius = Angle::from_degrees(1.0);
        let stars = catalogue.stars_within(place.right_ascension, place.declination, radius);
        assert_eq!(Some(stars[0].magnitude), alcyone.magnitude);
        // nine have names (common knowledge): the fainter of Sterope's pair and Celaeno are about 5.5 to 6.5
        let brighter = |than: f64| stars.iter().filter(|star| star.magnitude < than).count();
        assert!(
            brighter(6.5) >= 9 && brighter(9.0) > 20,
            "{}",
            brighter(9.0)
        );
        let apart = |a: &StarPlace, b: &StarPlace| {
            separation(
                (a.place.right_ascension.angle(), a.place.declination),
                (b.place.right_ascension.angle(), b.place.declination),
            )
            .arcseconds()
        };
        for (at, star) in stars.iter().enumerate() {
            assert!(stars[at + 1..].iter().all(|other| apart(star, other) > 0.5));
        }
    }

    #[test]
    fn at_the_pole_the_pole_star_is_in_the_field() {
        let catalogue = Catalogue::builtin();
        let pole = Declination::from_degrees(90.0);
        let stars =
            catalogue.stars_within(RightAscension::default(), pole, Angle::from_degrees(1.0));
        assert!(stars[0].magnitude < 2.3, "{:?}", stars[0]);
    }
}
