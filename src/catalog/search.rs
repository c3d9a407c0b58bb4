//! The search through all catalogues: one engine for the command and for the screen.

use crate::catalog::best::Best;
use crate::catalog::builtin_index::Entry;
use crate::catalog::index::{Candidates, Index};
use crate::catalog::likeness::Typed;
use crate::catalog::scorer::Scorer;
use crate::catalog::sieve::Sieve;
use crate::catalog::stars::Star;
use crate::catalog::{Catalogue, Filter, Target, solar_system};
use crate::sky::Body;

/// A target found, and how well it fits what was typed.
#[derive(Clone, Debug, PartialEq)]
pub struct Found {
    /// The target.
    pub target: Target,
    /// 1 for what was typed whole, down to 0; 1 for all where nothing was typed.
    pub score: f64,
}

/// Rows of a large catalogue read and found less like what was typed than their words promised, after which a search gives
/// up looking for better: it only happens where the words typed belong to different names of one thing.
const MOST_DISAPPOINTMENTS: usize = 20_000;

impl Catalogue {
    /// What fits the words typed and the filter, the best first and among equals the brightest.
    ///
    /// Without words, everything that passes the filter, the brightest first.
    #[must_use]
    pub fn search(&self, typed: &str, filter: &Filter) -> Vec<Found> {
        self.search_among(typed, filter, &|_| true)
    }

    /// The same among those of which something is true that only the target itself can tell.
    #[must_use]
    pub fn search_among(
        &self,
        typed: &str,
        filter: &Filter,
        passes: &dyn Fn(&Target) -> bool,
    ) -> Vec<Found> {
        let mut scorer = Scorer::new(Typed::new(typed));
        let mut best = Best::of(filter.limit);
        let bodies: Vec<Target> = Body::ALL.into_iter().map(solar_system::target).collect();
        for target in self.own.iter().chain(&bodies) {
            if filter.passes(target) && passes(target) {
                let score = scorer.target(target);
                best.offer(score, target.magnitude, || Some(target.clone()));
            }
        }
        for own in &self.catalogues {
            let read = |scorer: &mut Scorer, row| {
                let target = own.row(row)?;
                let score = scorer.target(&target);
                passes(&target).then_some((score, target))
            };
            let sieve = Sieve::new(own.index(), filter);
            best.join(looked_through(
                own.index(),
                &sieve,
                &mut scorer,
                filter.limit,
                read,
            ));
        }
        let built_in = self.built_in();
        if let Some(index) = &built_in.index {
            let read = |scorer: &mut Scorer, row| {
                let entry = built_in.entry(row)?;
                if !filter.is_near(|| entry.place()) {
                    return None;
                }
                let score = self.score(scorer, entry, index.kinds_of(row));
                if score <= 0.0 {
                    return None;
                }
                let target = self.target(entry)?;
                passes(&target).then_some((score, target))
            };
            let sieve = Sieve::without_places(index, filter);
            best.join(looked_through(
                index,
                &sieve,
                &mut scorer,
                filter.limit,
                read,
            ));
        }
        if let Some(number) = scorer.typed().hip_digits() {
            let begins = |star: &Star| star.hip_text().starts_with(number);
            for star in self.stars.all().filter(begins) {
                let passing = |target: &Target| filter.passes(target) && passes(target);
                best.offer(scorer.hip(star), star.magnitude(), || {
                    self.stars.target(star).filter(passing)
                });
            }
        }
        best.found()
    }

    fn score(&self, scorer: &mut Scorer, entry: Entry, kinds: u32) -> f64 {
        if scorer.typed().is_empty() {
            return 1.0;
        }
        match entry {
            Entry::DeepSky(object) => scorer.deep_sky(object),
            Entry::Star(star) => {
                let names = self.stars.names_of(star);
                names.map_or(0.0, |names| scorer.star(&names, kinds))
            }
        }
    }

    fn target(&self, entry: Entry) -> Option<Target> {
        match entry {
            Entry::DeepSky(object) => object.target(),
            Entry::Star(star) => self.stars.target(star),
        }
    }
}

/// The best of the rows of an index; `read` gives a row's score and target, or nothing if it does not pass.
fn looked_through(
    index: &Index,
    sieve: &Sieve,
    scorer: &mut Scorer,
    limit: usize,
    mut read: impl FnMut(&mut Scorer, usize) -> Option<(f64, Target)>,
) -> Best {
    let candidates = if scorer.typed().is_empty() {
        index.everything()
    } else {
        index.candidates(scorer.typed(), scorer.around())
    };
    let mut best = Best::of(limit);
    let mut disappointments = 0;
    for (row, most) in candidates.iter() {
        // what is still to come is no better, and among equals no brighter
        if best.is_full_of(most - Candidates::step()) || disappointments > MOST_DISAPPOINTMENTS {
            break;
        }
        if !sieve.passes(row) {
            continue;
        }
        let Some((score, target)) = read(scorer, row) else {
            continue;
        };
        disappointments += usize::from(score < most - Candidates::step());
        best.offer(score, target.magnitude, || Some(target));
    }
    best
}

#[cfg(test)]
mod tests {
    use proptest::prelude::*;

    use super::*;
    use crate::angle::Angle;
    use crate::catalog::facts::FactTables;
    use crate::catalog::{Constellation, Kind, Near};

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

    /// The best scores of everything built in, each row held against the words without an index.
    fn read_through(typed: &str, limit: usize) -> Vec<f64> {
        let catalogue = Catalogue::builtin();
        let mut scorer = Scorer::new(Typed::new(typed));
        let mut scores: Vec<f64> = Body::ALL
            .into_iter()
            .map(|body| scorer.target(&solar_system::target(body)))
            .collect();
        let facts = FactTables::builtin();
        let kinds = |hip: &str| {
            let double = facts.doubles().any(|double| double == hip);
            let variable = facts.variables().any(|variable| variable == hip);
            Kind::Star.bit()
                | (u32::from(double) * Kind::DoubleStar.bit())
                | (u32::from(variable) * Kind::VariableStar.bit())
        };
        let objects = catalogue.messier.all().chain(catalogue.ngc.all());
        scores.extend(objects.map(|object| scorer.deep_sky(object)));
        scores.extend(catalogue.stars.named().map(|names| {
            let star = catalogue.star(&names).unwrap();
            scorer.star(&names, kinds(star.hip_text()))
        }));
        scores.retain(|score| *score > 0.0);
        scores.sort_by(|a, b| b.total_cmp(a));
        scores.truncate(limit);
        scores
    }

    #[test]
    fn the_index_finds_what_reading_through_finds() {
        let catalogue = Catalogue::builtin();
        for typed in [
            "m",
            "ngc 1",
            "owl",
            "galaxy virgo",
            "alpha",
            "alp cen",
            "betelguese",
            "cluster double",
            "planetary",
            "ic 4 nebula",
            "tau",
            "1",
            "gam 2",
            "great neb",
            "the ring",
            "and",
            "z",
            "dra galxy",
        ] {
            let expected = read_through(typed, 20);
            let found = catalogue.search(typed, &Filter::default());
            let scores: Vec<f64> = found.iter().map(|found| found.score).collect();
            assert_eq!(scores.len(), expected.len(), "{typed}");
            for (score, expected) in scores.iter().zip(&expected) {
                // no nearer are they told apart
                assert!(
                    (score - expected).abs() <= Candidates::step(),
                    "{typed}: {scores:?} {expected:?}"
                );
            }
        }
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
