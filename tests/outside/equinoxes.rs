//! Places at old and new equinoxes against PAL and ERFA: the same star given in two ways stands in one place.

use nonius::angle::{Declination, RightAscension};
use nonius::sky::{CataloguePlace, Equinox, Moment, Source};
use nonius::time::Utc;

use crate::observing::geocentre;
use crate::table::{Row, rows};

/// The table's own tolerance: how E-terms are taken out and put in may differ by their square, 0.000001".
const EQUINOX_ARCSEC: f64 = 0.0001;

fn equinox(row: &Row) -> Equinox {
    let text = row.text("equinox");
    let year = text[1..].parse().unwrap();
    match (text, &text[..1]) {
        ("B1950", _) => Equinox::B1950,
        ("J2000", _) => Equinox::J2000,
        (_, "B") => Equinox::Besselian(year),
        (_, "J") => Equinox::Julian(year),
        _ => panic!("no equinox is written {text}"),
    }
}

#[test]
fn a_place_at_any_equinox_is_its_place_in_the_icrs() {
    let moment = Moment::new(&geocentre(), Utc::parse("2026-12-01T21:30:00Z").unwrap());
    let table = rows("equinoxes.csv");
    for row in &table {
        let at = |equinox, ra, dec| {
            moment.apparent(&Source::Catalogue(CataloguePlace {
                equinox,
                epoch: row.number("epoch"),
                ..CataloguePlace::icrs(
                    RightAscension::from_degrees(row.number(ra)),
                    Declination::from_degrees(row.number(dec)),
                )
            }))
        };
        let given = at(equinox(row), "ra_deg", "dec_deg");
        let icrs = at(Equinox::Icrs, "icrs_ra_deg", "icrs_dec_deg");
        let off = given.separation(&icrs).arcseconds();
        assert!(off < EQUINOX_ARCSEC, "{off}\": {row:?}");
    }
    assert!(table.len() > 60);
}

#[test]
fn b1950_named_and_as_a_year_are_one_equinox() {
    let moment = Moment::new(&geocentre(), Utc::parse("2026-12-01T21:30:00Z").unwrap());
    for row in rows("equinoxes.csv") {
        let at = |equinox| {
            moment.apparent(&Source::Catalogue(CataloguePlace {
                equinox,
                pm_ra_mas: 35.0,
                pm_dec_mas: -120.0,
                ..CataloguePlace::icrs(
                    RightAscension::from_degrees(row.number("ra_deg")),
                    Declination::from_degrees(row.number("dec_deg")),
                )
            }))
        };
        let off = at(Equinox::B1950).separation(&at(Equinox::Besselian(1950.0)));
        assert!(off.arcseconds() < 1e-6);
    }
}
