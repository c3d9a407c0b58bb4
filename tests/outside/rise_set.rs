//! Rising, transit, setting and twilight against Skyfield at random sites, polar day and night included, and against
//! printed tables of the U.S. Naval Observatory.

use nonius::angle::{Angle, Declination, Latitude, Longitude, RightAscension};
use nonius::sky::{Air, Body, CataloguePlace, Moment, Observer, Source, Twilight};
use nonius::time::{Dut1, Utc};

use crate::table::{Row, rows};

/// The Moon's place is that much further off than DE421's (`places_bodies.csv`), the rest much less.
const ELEMENTS_ARCMIN: f64 = 0.1;
/// Of Skyfield's own, by the table's head: `1 s + 0.1' * seconds_per_arcmin`.
const TABLE_S: f64 = 1.0;
const TABLE_ARCMIN: f64 = 0.1;
/// Printed to the minute, and half as much again between two programs, by the table's head.
const PRINTED_S: f64 = 60.0;
const DAY_S: f64 = 86_400.0;

fn observer(row: &Row) -> Observer {
    Observer {
        latitude: Latitude::from_degrees(row.number("latitude_deg")),
        longitude: Longitude::from_degrees(row.number("longitude_deg")),
        elevation_m: row.number("elevation_m"),
        dut1: Dut1::default(),
        air: Air::NONE,
    }
}

fn source(row: &Row) -> Source {
    match Body::named(row.text("body")) {
        Some(body) => Source::Body(body),
        None => Source::Catalogue(star(row)),
    }
}

/// A row's star, of Hipparcos, the New Reduction.
fn star(row: &Row) -> CataloguePlace {
    CataloguePlace {
        epoch: 1991.25,
        pm_ra_mas: row.number("pm_ra_cosdec_mas"),
        pm_dec_mas: row.number("pm_dec_mas"),
        parallax_mas: row.number("parallax_mas"),
        ..CataloguePlace::icrs(
            RightAscension::from_degrees(row.number("ra_deg")),
            Declination::from_degrees(row.number("dec_deg")),
        )
    }
}

/// The first such event in a window.
fn first(from: &Moment, span_s: f64, source: &Source, event: &str) -> Option<Utc> {
    let of_rim = |rising| {
        let all = from.rises_and_sets(source, span_s).into_iter();
        all.filter(move |found| found.rising == rising)
            .map(|found| found.utc)
            .next()
    };
    let of_light = |twilight, rising| {
        let all = from.twilights(twilight, span_s).into_iter();
        all.filter(move |found| found.rising == rising)
            .map(|found| found.utc)
            .next()
    };
    let on_meridian = |upper| {
        let all = from.transits(source, span_s).into_iter();
        all.filter(move |found| found.upper == upper)
            .map(|found| found.utc)
            .next()
    };
    match event {
        "rise" => of_rim(true),
        "set" => of_rim(false),
        "transit" => on_meridian(true),
        "lower-transit" => on_meridian(false),
        "civil-dusk" => of_light(Twilight::Civil, false),
        "nautical-dusk" => of_light(Twilight::Nautical, false),
        "astronomical-dusk" => of_light(Twilight::Astronomical, false),
        "civil-dawn" => of_light(Twilight::Civil, true),
        "nautical-dawn" => of_light(Twilight::Nautical, true),
        "astronomical-dawn" => of_light(Twilight::Astronomical, true),
        other => panic!("no event is called {other}"),
    }
}

#[test]
fn every_event_of_random_days_is_skyfields() {
    let (mut timed, mut none, mut worst_s) = (0, 0, 0.0_f64);
    for row in rows("rise_set_skyfield.csv") {
        let start = Utc::parse(row.text("window_from")).unwrap();
        let end = Utc::parse(row.text("window_to")).unwrap();
        let from = Moment::new(&observer(&row), start);
        let found = first(
            &from,
            end.seconds_since(start),
            &source(&row),
            row.text("event"),
        );
        match (found, row.text("utc")) {
            (None, "null") => none += 1,
            (Some(found), text) if text != "null" => {
                let off = found.seconds_since(Utc::parse(text).unwrap()).abs();
                let steep = row.number("seconds_per_arcmin");
                let most = TABLE_S + (TABLE_ARCMIN + ELEMENTS_ARCMIN) * steep;
                assert!(off < most, "{off} s of {most} s: {row:?}");
                if steep < 30.0 {
                    worst_s = worst_s.max(off);
                }
                timed += 1;
            }
            (found, _) => panic!("{found:?}: {row:?}"),
        }
    }
    assert!(timed > 300 && none > 40, "{timed} {none}");
    // away from grazing
    assert!(worst_s < 10.0, "{worst_s} s");
    println!("{timed} events, {none} that do not happen, worst away from grazing {worst_s:.2} s");
}

#[test]
fn the_naval_observatorys_tables_are_met_to_the_minute() {
    let mut read = 0;
    for row in rows("published_rise_set.csv") {
        if row.text("latitude_deg").is_empty() || row.text("utc") == "null" {
            continue;
        }
        let source = match Body::named(row.text("body")) {
            Some(body) => Source::Body(body),
            None => continue,
        };
        let printed = Utc::parse(row.text("utc")).unwrap();
        let from = Moment::new(&observer(&row), printed.plus_seconds(-DAY_S / 4.0));
        let found = first(&from, DAY_S / 2.0, &source, row.text("event"));
        let off = found
            .unwrap_or_else(|| panic!("{row:?}"))
            .seconds_since(printed);
        assert!(off.abs() < PRINTED_S, "{off} s: {row:?}");
        read += 1;
    }
    assert!(read > 20, "{read}");
}

#[test]
fn the_sun_stands_where_a_twilight_says() {
    let sites = rows("rise_set_skyfield.csv");
    for row in sites.iter().step_by(14).take(8) {
        let start = Utc::parse(row.text("window_from")).unwrap();
        let from = Moment::new(&observer(row), start);
        for found in from.twilights(Twilight::Nautical, DAY_S) {
            let then = from.later(found.utc.seconds_since(start));
            let altitude = then.airless_altitude(&then.apparent_body(Body::Sun));
            let off = altitude.angle() - Angle::from_degrees(-12.0);
            assert!(off.abs().arcseconds() < 0.1, "{off:?}");
        }
    }
}
