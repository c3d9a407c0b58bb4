//! The search through all catalogues: one engine for the command and for the screen.

use std::cmp::Ordering;

use crate::angle::Angle;
use crate::catalog::catalogue::distance_deg;
use crate::catalog::deep_sky::DeepSkyObject;
use crate::catalog::likeness::Typed;
use crate::catalog::scorer::Scorer;
use crate::catalog::stars::Star;
use crate::catalog::{Catalogue, Constellation, Kind, Target, solar_system};
use crate::sky::{Body, CataloguePlace};

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

/// A target found, and how well it fits what was typed.
#[derive(Clone, Debug, PartialEq)]
pub struct Found {
    /// The target.
    pub target: Target,
    /// 1 for what was typed whole, down to 0; 1 for all where nothing was typed.
    pub score: f64,
}

/// Something in the catalogues, not yet made into a target.
#[derive(Clone, Copy)]
enum Entry<'a> {
    Own(&'a Target),
    Body(Body),
    DeepSky(DeepSkyObject),
    Star(Star),
}

/// An entry that fits.
struct Hit<'a> {
    entry: Entry<'a>,
    score: f64,
    magnitude: f64,
}

impl Catalogue {
    /// What fits the words typed and the filter, the best first and among equals the brightest.
    ///
    /// Without words, everything that passes the filter, the brightest first.
    #[must_use]
    pub fn search(&self, typed: &str, filter: &Filter) -> Vec<Found> {
        let words = Typed::new(typed);
        let all = if words.is_empty() {
            self.everything()
        } else {
            self.alike(words)
        };
        let mut hits: Vec<Hit<'_>> = all
            .into_iter()
            .filter(|(entry, _)| filter.passes(entry))
            .map(|(entry, score)| Hit {
                entry,
                score,
                magnitude: entry.magnitude().unwrap_or(f64::INFINITY),
            })
            .collect();
        // of ten thousand galaxies only the first few need be in order
        if filter.limit < hits.len() {
            hits.select_nth_unstable_by(filter.limit, Hit::order);
            hits.truncate(filter.limit);
        }
        hits.sort_by(Hit::order);
        hits.into_iter()
            .filter_map(|Hit { entry, score, .. }| {
                let target = self.target(entry)?;
                Some(Found { target, score })
            })
            .collect()
    }

    fn everything(&self) -> Vec<(Entry<'_>, f64)> {
        let own = self.own.iter().map(Entry::Own);
        let bodies = Body::ALL.into_iter().map(Entry::Body);
        let deep_sky = self.messier.all().chain(self.ngc.all()).map(Entry::DeepSky);
        let stars = self.stars.all().map(Entry::Star);
        own.chain(bodies)
            .chain(deep_sky)
            .chain(stars)
            .map(|entry| (entry, 1.0))
            .collect()
    }

    /// Everything with a likeness to the words above nothing.
    fn alike(&self, typed: Typed) -> Vec<(Entry<'_>, f64)> {
        let mut scorer = Scorer::new(typed);
        let mut alike = Vec::new();
        for own in &self.own {
            alike.push((Entry::Own(own), scorer.own(own)));
        }
        for body in Body::ALL {
            alike.push((Entry::Body(body), scorer.body(body)));
        }
        for object in self.messier.all().chain(self.ngc.all()) {
            let score = scorer.deep_sky(object);
            if score > 0.0 {
                alike.push((Entry::DeepSky(object), score));
            }
        }
        for names in self.stars.named() {
            let score = scorer.star(&names);
            if score > 0.0 {
                alike.extend(self.star(&names).map(|star| (Entry::Star(star), score)));
            }
        }
        if let Some(number) = scorer.typed().hip_digits() {
            let begins = |star: &Star| star.hip_text().starts_with(number);
            for star in self.stars.all().filter(begins) {
                alike.push((Entry::Star(star), scorer.hip(star)));
            }
        }
        alike.retain(|(_, score)| *score > 0.0);
        alike
    }

    fn target(&self, entry: Entry<'_>) -> Option<Target> {
        match entry {
            Entry::Own(target) => Some(target.clone()),
            Entry::Body(body) => Some(solar_system::target(body)),
            Entry::DeepSky(object) => object.target(),
            Entry::Star(star) => self.stars.target(star),
        }
    }
}

impl Hit<'_> {
    /// The best first, among equals the brightest.
    fn order(a: &Self, b: &Self) -> Ordering {
        b.score
            .total_cmp(&a.score)
            .then(a.magnitude.total_cmp(&b.magnitude))
    }
}

impl Entry<'_> {
    fn magnitude(&self) -> Option<f64> {
        match self {
            Self::Own(target) => target.magnitude,
            Self::Body(_) => None,
            Self::DeepSky(object) => object.magnitude(),
            Self::Star(star) => star.magnitude(),
        }
    }

    fn kind(&self) -> Kind {
        match self {
            Self::Own(target) => target.kind,
            Self::Body(body) => solar_system::kind(*body),
            Self::DeepSky(object) => object.kind(),
            Self::Star(_) => Kind::Star,
        }
    }

    fn constellation(&self) -> Option<&'static Constellation> {
        match self {
            Self::Own(target) => target.constellation,
            Self::Body(_) => None,
            Self::DeepSky(object) => object.constellation(),
            Self::Star(star) => star.constellation(),
        }
    }

    /// In the ICRS at J2000.0.
    fn place(&self) -> Option<CataloguePlace> {
        match self {
            Self::Own(target) => Catalogue::fixed_place(target),
            Self::Body(_) => None,
            Self::DeepSky(object) => object.place(),
            Self::Star(star) => star.place(),
        }
    }
}

impl Filter {
    fn passes(&self, entry: &Entry<'_>) -> bool {
        self.kind.is_none_or(|kind| entry.kind().is_a(kind))
            && self
                .constellation
                .is_none_or(|wanted| entry.constellation() == Some(wanted))
            && self
                .brighter_than
                .is_none_or(|limit| entry.magnitude().is_some_and(|magnitude| magnitude < limit))
            && self.near.is_none_or(|near| {
                entry
                    .place()
                    .is_some_and(|place| distance_deg(&near.place, &place) <= near.within.degrees())
            })
    }
}

#[cfg(test)]
mod tests {
    use proptest::prelude::*;

    use super::*;

    const STARS: &str = "hip,ra_deg,dec_deg,pm_ra_mas,pm_dec_mas,parallax_mas,hp,b_v,constellation\n\
        4427,14.17712600,60.71674000,25.17,-3.92,5.94,2.17,-0.05,Cas\n\
        91262,279.23473479,38.78368896,200.94,286.23,130.23,0.09,0.00,Lyr\n\
        91919,281.08486,39.67040,11.03,60.90,20.10,4.66,0.17,Lyr\n\
        91926,281.09534,39.61305,6.00,52.10,20.80,4.59,0.19,Lyr\n\
        92420,282.51998,33.36267,1.90,-3.53,3.39,3.55,0.00,Lyr\n";
    const NAMES: &str = "hip,constellation,bayer,flamsteed,names\n\
        4427,Cas,gamma,27,\n\
        91262,Lyr,alpha,3,Vega\n\
        91919,Lyr,epsilon 1,4,\n\
        91926,Lyr,epsilon 2,5,\n\
        92420,Lyr,beta,10,Sheliak\n";
    const MESSIER: &str = "name,kind,ra_deg,dec_deg,magnitude,major_arcmin,minor_arcmin,constellation,also\n\
        M 37,open cluster,88.0765,32.5530,5.6,11.4,,Aur,NGC 2099\n\
        M 57,planetary nebula,283.3963,33.0292,8.8,1.4,1.0,Lyr,NGC 6720;Ring Nebula\n\
        M 97,planetary nebula,168.6988,55.0190,9.9,3.4,3.3,UMa,NGC 3587;Owl Nebula\n";

    const NGC: &str = "name,kind,ra_deg,dec_deg,magnitude,major_arcmin,minor_arcmin,constellation,also\n\
        NGC 457,open cluster,19.8875,58.2908,6.4,20.0,,Cas,Owl Cluster\n\
        NGC 2098,galaxy,80.0,-70.0,14.0,1.0,0.5,Dor,\n";

    fn catalogue() -> Catalogue {
        Catalogue::new(STARS, NAMES, MESSIER, NGC)
    }

    fn names(typed: &str, filter: &Filter) -> Vec<String> {
        let found = catalogue().search(typed, filter);
        found.into_iter().map(|found| found.target.name).collect()
    }

    fn first(typed: &str) -> Option<String> {
        names(typed, &Filter::default()).into_iter().next()
    }

    #[test]
    fn the_best_comes_first_whatever_way_it_is_typed() {
        for (typed, name) in [
            ("owl neb", "M 97"),
            ("owl clus", "NGC 457"),
            ("galaxy dor", "NGC 2098"),
            ("ngc 2098", "NGC 2098"),
            ("nebula ring", "M 57"),
            ("m57", "M 57"),
            ("messier 57", "M 57"),
            ("ngc 20", "M 37"),
            ("wega", "Vega"),
            ("α lyr", "Vega"),
            ("alf Lyrae", "Vega"),
            ("lyrae beta", "Sheliak"),
            ("hip 9126", "Vega"),
            ("4 Lyr", "epsilon 1 Lyr"),
            ("the moon", "Moon"),
            ("satrun", "Saturn"),
            ("planetary uma", "M 97"),
        ] {
            assert_eq!(first(typed).as_deref(), Some(name), "{typed}");
        }
        assert_eq!(first("xyzzy"), None);
    }

    #[test]
    fn among_equals_the_brightest_comes_first() {
        let found = names("epsilon lyr", &Filter::default());
        assert_eq!(found, ["epsilon 2 Lyr", "epsilon 1 Lyr"]);
        let kind = Some(Kind::PlanetaryNebula);
        let filter = Filter {
            kind,
            ..Filter::default()
        };
        assert_eq!(names("", &filter), ["M 57", "M 97"]);
    }

    #[test]
    fn scores_fall_from_one() {
        let found = catalogue().search("m 57", &Filter::default());
        assert!((found[0].score - 1.0).abs() < f64::EPSILON);
        let found = catalogue().search("ring", &Filter::default());
        assert!(found[0].score > 0.9 && found[0].score < 1.0);
    }

    #[test]
    fn the_filter_leaves_out_what_does_not_pass() {
        let lyra = Constellation::abbreviated("Lyr");
        let filter = |change: fn(&mut Filter)| {
            let mut filter = Filter::default();
            change(&mut filter);
            filter
        };
        let mut of_lyra = filter(|f| f.brighter_than = Some(4.0));
        of_lyra.constellation = lyra;
        assert_eq!(names("", &of_lyra), ["Vega", "Sheliak"]);
        assert_eq!(names("", &filter(|f| f.limit = 1)), ["Vega"]);
        let sheliak = catalogue().resolve("Sheliak").unwrap();
        let near = Near {
            place: Catalogue::fixed_place(&sheliak).unwrap(),
            within: Angle::from_degrees(1.0),
        };
        let near = Filter {
            near: Some(near),
            ..Filter::default()
        };
        assert_eq!(names("", &near), ["Sheliak", "M 57"]);
    }

    proptest! {
        #[test]
        fn no_text_brings_the_search_down(typed in "\\PC{0,24}|(m|ngc|alpha|the|hip|α| |[0-9]){0,6}") {
            for found in catalogue().search(&typed, &Filter::default()) {
                prop_assert!(found.score > 0.0 && found.score <= 1.0);
            }
            let _ = catalogue().resolve(&typed);
        }
    }
}
