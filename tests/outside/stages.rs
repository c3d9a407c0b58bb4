//! Single routines of the SOFA models, as `sofars` has them, against ERFA; and those of the FK4 as the project uses them.

use nonius::angle::{Angle, Declination, RightAscension};
use nonius::sky::{CataloguePlace, Equinox, Moment, Source};
use nonius::time::Utc;
use sofars::{astro, eph, erst, pnp, star, ts};

use crate::observing::geocentre;
use crate::table::{Row, rows};

/// The table's own: the same formulas in double precision agree to some 1e-12; absolute below one
/// (radians, au), relative above.
const STAGE: f64 = 1e-9;
/// The same as an angle, 0.0002", with as much again for `fk425`'s proper motion in the arithmetic of a century.
const FK4_ARCSEC: f64 = 0.0005;

fn numbers(row: &Row, column: &str) -> Vec<f64> {
    let text = row.text(column).split(' ');
    text.map(|number| number.parse().unwrap()).collect()
}

fn vectors(parts: &[[f64; 3]]) -> Vec<f64> {
    parts.concat()
}

/// What the port makes of a row's arguments; times of two parts as their sum.
fn ours(stage: &str, a: &[f64]) -> Vec<f64> {
    let sum = |parts: (f64, f64)| vec![parts.0 + parts.1];
    #[allow(clippy::cast_possible_truncation)] // whole numbers of the calendar and of planets
    let whole = |number: f64| number as i32;
    match stage {
        "dat" => vec![ts::dat(whole(a[0]), whole(a[1]), whole(a[2]), a[3]).unwrap()],
        "utctai" => sum(ts::utctai(a[0], a[1]).unwrap()),
        "taitt" => sum(ts::taitt(a[0], a[1]).unwrap()),
        "utcut1" => sum(ts::utcut1(a[0], a[1], a[2]).unwrap()),
        "gmst06" => vec![erst::gmst06(a[0], a[1], a[2], a[3])],
        "gst06a" => vec![erst::gst06a(a[0], a[1], a[2], a[3])],
        "nut06a" => {
            let (psi, eps) = pnp::nut06a(a[0], a[1]);
            vec![psi, eps]
        }
        "obl06" => vec![pnp::obl06(a[0], a[1])],
        "epv00" => {
            let (heliocentric, barycentric) = eph::epv00(a[0], a[1]).unwrap();
            [vectors(&heliocentric), vectors(&barycentric)].concat()
        }
        "fk425" => {
            let (ra, dec, pm_ra, pm_dec, parallax, rv) =
                star::fk425(a[0], a[1], a[2], a[3], a[4], a[5]);
            vec![ra, dec, pm_ra, pm_dec, parallax, rv]
        }
        "fk45z" => {
            let (ra, dec) = star::fk45z(a[0], a[1], a[2]);
            vec![ra, dec]
        }
        "pmsafe" => astro::pmsafe(a[0], a[1], a[2], a[3], a[4], a[5], a[6], a[7], a[8], a[9])
            .unwrap()
            .0
            .to_vec(),
        "moon98" => vectors(&eph::moon98(a[0], a[1])),
        "plan94" => vectors(&eph::plan94(a[0], a[1], whole(a[2])).unwrap().0),
        "refco" => {
            let (one, three) = astro::refco(a[0], a[1], a[2], a[3]);
            vec![one, three]
        }
        "apco13-eo" => {
            let (mut observer, mut origins) = (astro::IauAstrom::default(), 0.0);
            astro::apco13(
                a[0],
                a[1],
                a[2],
                a[3],
                a[4],
                a[5],
                a[6],
                a[7],
                a[8],
                a[9],
                a[10],
                a[11],
                &mut observer,
                &mut origins,
            )
            .unwrap();
            vec![origins]
        }
        other => panic!("no stage is called {other}"),
    }
}

#[test]
fn every_stage_is_erfas() {
    let table = rows("erfa_stages.csv");
    for row in &table {
        let stage = row.text("stage");
        let mut expected = numbers(row, "expected");
        if ["utctai", "taitt", "utcut1"].contains(&stage) {
            expected = vec![expected.iter().sum()];
        }
        let found = ours(stage, &numbers(row, "arguments"));
        assert_eq!(found.len(), expected.len(), "{stage}");
        for (found, expected) in found.iter().zip(&expected) {
            let most = STAGE * expected.abs().max(1.0);
            assert!(
                (found - expected).abs() < most,
                "{stage}: {found} for {expected}"
            );
        }
    }
    assert!(table.len() > 200);
}

/// The apparent place, on an evening of 2026, of a star given by radians, radians a year (of the
/// pole's angle), seconds of arc and km/s.
fn apparent(star: &[f64], equinox: Equinox, epoch: f64) -> nonius::sky::Apparent {
    let mas = |radians: f64| Angle::from_radians(radians).arcseconds() * 1000.0;
    let place = CataloguePlace {
        right_ascension: RightAscension::new(Angle::from_radians(star[0])),
        declination: Declination::new(Angle::from_radians(star[1])),
        equinox,
        epoch,
        pm_ra_mas: mas(star[2] * star[1].cos()),
        pm_dec_mas: mas(star[3]),
        parallax_mas: star[4] * 1000.0,
        radial_velocity_km_s: star[5],
    };
    Moment::new(&geocentre(), Utc::parse("2026-12-01T21:30:00Z").unwrap())
        .apparent(&Source::Catalogue(place))
}

#[test]
fn a_star_of_the_fk4_is_the_star_erfa_finds_in_the_fk5() {
    let mut read = 0;
    for row in rows("erfa_stages.csv") {
        let (given, found) = match row.text("stage") {
            "fk425" => {
                // B1950.0 as a Julian epoch
                let year = sofars::cal::epj(2_433_282.5, -0.076_540_2);
                (
                    apparent(&numbers(&row, "arguments"), Equinox::B1950, year),
                    apparent(&numbers(&row, "expected"), Equinox::J2000, 2000.0),
                )
            }
            "fk45z" => {
                let [arguments, expected] = ["arguments", "expected"].map(|at| numbers(&row, at));
                let (day, part) = sofars::cal::epb2jd(arguments[2]);
                let year = sofars::cal::epj(day, part);
                let still = |place: &[f64]| [place[0], place[1], 0.0, 0.0, 0.0, 0.0];
                (
                    apparent(&still(&arguments), Equinox::B1950, year),
                    apparent(&still(&expected), Equinox::J2000, 2000.0),
                )
            }
            _ => continue,
        };
        let off = given.separation(&found).arcseconds();
        assert!(off < FK4_ARCSEC, "{off}\": {row:?}");
        read += 1;
    }
    assert!(read > 20);
}
