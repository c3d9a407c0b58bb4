//! Events of every kind, by hand and by chance. The site and its readings are invented.

use nonius::metal::{OppositeVerniers, Side};
use nonius::night::{
    Circle, EarlierNight, Event, ListedPlace, ListedTarget, Opening, Setting, ShownAxes,
    StarReading, StartedFrom,
};
use nonius::time::Utc;
use proptest::prelude::*;

pub fn utc(seconds: u32) -> Utc {
    let start = Utc::parse("2026-12-01T19:00:00Z").unwrap();
    start.plus_seconds(f64::from(seconds) + 0.125)
}

pub fn target(name: &str) -> ListedTarget {
    ListedTarget {
        name: name.to_owned(),
        place: ListedPlace::Fixed {
            ra_deg: 88.076_25,
            dec_deg: 32.553_1,
            equinox: "ICRS".to_owned(),
            epoch: 2000.0,
            pm_ra_mas: 0.0,
            pm_dec_mas: -1.5,
            parallax_mas: 0.7,
            radial_velocity_km_s: 8.5,
        },
        also: vec!["NGC 2099".to_owned()],
        catalogue: Some("messier".to_owned()),
        kind: Some("open cluster".to_owned()),
        constellation: Some("Aur".to_owned()),
        magnitude: Some(5.6),
        size_arcmin: Some([24.0, 24.0]),
        note: "the \"jewel\" {rich} — a line: {\"n\":1}".to_owned(),
    }
}

pub fn opening() -> Opening {
    let moon = ListedTarget {
        place: ListedPlace::Body {
            body: "Moon".to_owned(),
        },
        ..target("Moon")
    };
    let unknown = ListedTarget {
        place: ListedPlace::Unknown,
        ..target("M 370")
    };
    Opening {
        program: "0.1.0".to_owned(),
        site: "tarn-hollow".to_owned(),
        site_name: "Tarn Hollow Field Station".to_owned(),
        latitude_deg: 54.52,
        longitude_deg: -2.21,
        elevation_m: 352.0,
        time_zone: "Europe/London".to_owned(),
        mount: "six-inch".to_owned(),
        list: Some("winter".to_owned()),
        side: None,
        clock_correction_s: 0.0,
        targets: vec![target("M 37"), moon, unknown, target("Düb ζ")],
    }
}

pub fn reading(star: &str, hour_angle_deg: f64, driven: bool) -> StarReading {
    StarReading {
        star: star.to_owned(),
        hour_angle_deg,
        declination_deg: 38.8,
        sidereal_deg: 301.25,
        side: Side::TubeWest,
        hour: "20h 56m 40s".to_owned(),
        dec: "32° 35' N".to_owned(),
        hour_candidates_deg: vec![hour_angle_deg + 0.75],
        dec_candidates_deg: vec![39.5, -39.5],
        taken_as: Some(ShownAxes {
            hour_deg: hour_angle_deg + 0.75,
            dec_deg: 39.5,
        }),
        hour_sigma_deg: 0.25,
        dec_sigma_deg: 0.15,
        driven,
        timed: false,
        opposite: OppositeVerniers::default(),
        doubted: String::new(),
        off_arcmin: Some(7.0),
        used: true,
    }
}

pub fn setting() -> Setting {
    Setting {
        hour: "20h 48m 40s".to_owned(),
        dec: "32° 35' N".to_owned(),
        side: Side::TubeEast,
        axes: ShownAxes {
            hour_deg: -47.8,
            dec_deg: 147.25,
        },
    }
}

/// A night with every kind of event in it; the numbers taken back are those of the journal.
pub fn every_kind() -> Vec<Event> {
    let take = |place: usize, name: &str| Event::TargetTaken {
        place,
        target: Box::new(target(name)),
    };
    vec![
        Event::NightOpened(Box::new(opening())),
        Event::StarRead(Box::new(reading("Vega", 61.5, false))),
        take(1, "M 37"),
        Event::Found {
            target: "M 37".to_owned(),
            setting: Some(setting()),
            reading: Some(Box::new(reading("M 37", -45.0, false))),
        },
        Event::Note {
            target: Some("M 37".to_owned()),
            text: "three bright ones\nin a row".to_owned(),
        },
        take(2, "Moon"),
        Event::Missed {
            target: "Moon".to_owned(),
            setting: Some(setting()),
        },
        Event::SideChanged {
            side: Some(Side::TubeEast),
        },
        Event::ClockCorrected { seconds: -12.25 },
        Event::ClockJumped { seconds: 3600.0 },
        Event::SunRiskAcknowledged {
            target: "Venus".to_owned(),
        },
        Event::TargetAdded {
            target: Box::new(target("M 38")),
        },
        Event::RingSet {
            circle: Circle::Hour,
            reading: Some(Box::new(reading("Capella", -20.0, true))),
        },
        Event::ReadingUsed {
            line: 2,
            used: false,
        },
        Event::Note {
            target: None,
            text: "cloud from the west".to_owned(),
        },
        Event::Undone { line: 15 },
        Event::SessionClosed,
        Event::SessionResumed,
        Event::AxisAdjusted,
        Event::StartedFrom {
            earlier: Some(Box::new(started_from(true))),
        },
    ]
}

/// What a night before taught of the mount.
pub fn started_from(moved: bool) -> StartedFrom {
    let errors_arcmin = vec![206.9, -94.8, 13.1, -19.1, 8.2, -5.8, 0.3];
    let square = |row, column| if row == column { 4.0 } else { -0.5 };
    let row = |row| (0..7).map(|column| square(row, column)).collect();
    StartedFrom {
        earlier: EarlierNight {
            night: "2026-11-30".to_owned(),
            stars: 6,
            errors_arcmin,
            covariance_arcmin2: (0..7).map(row).collect(),
        },
        moved,
        hour_index_free: false,
        dec_index_free: true,
    }
}

fn name() -> impl Strategy<Value = String> {
    prop::sample::select(vec!["M 37", "Moon", "M 370", "Düb ζ", "M 38"]).prop_map(str::to_owned)
}

fn a_setting() -> impl Strategy<Value = Option<Setting>> {
    prop::option::of(Just(setting()))
}

fn a_reading() -> impl Strategy<Value = Box<StarReading>> {
    (name(), -180.0..180.0, any::<bool>())
        .prop_map(|(star, hour, driven)| Box::new(reading(&star, hour, driven)))
}

fn a_circle() -> impl Strategy<Value = Circle> {
    prop::sample::select(vec![Circle::Hour, Circle::Declination])
}

fn a_side() -> impl Strategy<Value = Option<Side>> {
    prop::option::of(prop::sample::select(vec![Side::TubeWest, Side::TubeEast]))
}

/// Any act that can be taken back.
pub fn an_act() -> impl Strategy<Value = Event> {
    let boxed = |name: String| Box::new(target(&name));
    prop_oneof![
        (0..8_usize, name()).prop_map(move |(place, name)| Event::TargetTaken {
            place,
            target: boxed(name)
        }),
        name().prop_map(move |name| Event::TargetAdded {
            target: boxed(name)
        }),
        a_reading().prop_map(Event::StarRead),
        (0..40_u64, any::<bool>()).prop_map(|(line, used)| Event::ReadingUsed { line, used }),
        (name(), a_setting(), prop::option::of(a_reading())).prop_map(
            |(target, setting, reading)| Event::Found {
                target,
                setting,
                reading
            }
        ),
        (name(), a_setting()).prop_map(|(target, setting)| Event::Missed { target, setting }),
        (prop::option::of(name()), "\\PC{0,12}")
            .prop_map(|(target, text)| Event::Note { target, text }),
        (a_circle(), prop::option::of(a_reading()))
            .prop_map(|(circle, reading)| Event::RingSet { circle, reading }),
        (-3600.0..3600.0).prop_map(|seconds| Event::ClockCorrected { seconds }),
        Just(Event::AxisAdjusted),
        prop::option::of(any::<bool>()).prop_map(|moved| Event::StartedFrom {
            earlier: moved.map(|moved| Box::new(started_from(moved))),
        }),
        a_side().prop_map(|side| Event::SideChanged { side }),
        name().prop_map(|target| Event::SunRiskAcknowledged { target }),
    ]
}

/// Any event but a taking back.
pub fn an_event() -> impl Strategy<Value = Event> {
    prop_oneof![
        1 => Just(Event::NightOpened(Box::new(opening()))),
        1 => Just(Event::SessionClosed),
        1 => Just(Event::SessionResumed),
        1 => (-100.0..100.0).prop_map(|seconds| Event::ClockJumped { seconds }),
        12 => an_act(),
    ]
}
