//! A night worked through its session: recorded first, then done, and gone on with where it stopped.

use nonius::night::{
    Circle, Effect, Event, Outcome, Refusal, Said, Session, SessionFault, journal,
};
use nonius::time::sidereal::DEGREES_PER_SECOND;
use tempfile::TempDir;

use crate::sample::{opening, reading, setting, target, utc};

/// Rounding of a turn or two through radians, in degrees.
const ROUNDING_DEG: f64 = 1e-9;

fn begun(folder: &TempDir) -> Session {
    let path = folder.path().join("n.jsonl");
    Session::begin(&path, utc(0), opening()).unwrap().0
}

/// Of each reading the hour angle, and the hour axis angle as a candidate and as taken.
fn hour_angles(session: &Session) -> Vec<[f64; 3]> {
    let readings = session.night().state().readings.iter();
    readings
        .map(|read| {
            let reading = &read.reading;
            let candidate = reading.hour_candidates_deg[0];
            let taken = reading.shown().unwrap().hour_deg;
            [reading.hour_angle_deg, candidate, taken]
        })
        .collect()
}

#[test]
fn a_night_goes_on_where_it_stopped() {
    let folder = TempDir::new().unwrap();
    let mut session = begun(&folder);
    let next = session.night().next().unwrap();
    session.act(utc(60), &next).unwrap();
    let found = session.night().found(Some(setting()), None).unwrap();
    session.act(utc(120), &found).unwrap();
    session
        .act(utc(130), &Event::ClockCorrected { seconds: 42.0 })
        .unwrap();
    let path = session.path().to_owned();
    // the battery dies: nothing is closed
    drop(session);

    let mut longer = opening();
    longer.targets.push(target("M 38"));
    let (session, begun) = Session::begin(&path, utc(300), longer).unwrap();
    assert!(begun.resumed);
    assert_eq!(begun.notices, []);
    assert_eq!(
        begun.effects,
        [
            Effect::CorrectClock(42.0),
            Effect::Say(Said::ClockStillCorrected { seconds: 42.0 })
        ]
    );
    let state = session.night().state();
    assert_eq!(state.current_target().unwrap().target.name, "M 37");
    assert_eq!(state.targets[0].outcome, Some(Outcome::Found(utc(120))));
    assert_eq!(state.tally(), (1, 0));
    assert_eq!(state.targets[4].target.name, "M 38");
}

#[test]
fn the_journal_of_another_site_or_mount_is_not_gone_on_with() {
    let folder = TempDir::new().unwrap();
    let path = begun(&folder).path().to_owned();
    for (site, mount, said) in [
        (
            "fell-top",
            "six-inch",
            "the site \"tarn-hollow\", not \"fell-top\"",
        ),
        (
            "tarn-hollow",
            "fork",
            "the mount \"six-inch\", not \"fork\"",
        ),
    ] {
        let mut other = opening();
        (other.site, other.mount) = (site.to_owned(), mount.to_owned());
        let Err(fault) = Session::begin(&path, utc(10), other) else {
            panic!("{site} {mount} was opened");
        };
        assert!(matches!(fault, SessionFault::OtherNight { .. }));
        assert!(fault.to_string().contains(said), "{fault}");
    }
    assert_eq!(journal::read(&path).unwrap().events.len(), 1);
}

#[test]
fn what_cannot_be_done_is_refused_and_not_recorded() {
    let folder = TempDir::new().unwrap();
    let mut session = begun(&folder);
    let take = |place, name: &str| Event::TargetTaken {
        place,
        target: Box::new(target(name)),
    };
    for (event, refusal) in [
        (Event::Undone { line: 1 }, Refusal::NothingToTakeBack),
        (take(0, "M 37"), Refusal::NotInTheList("M 37".to_owned())),
        (take(2, "M 37"), Refusal::NotInTheList("M 37".to_owned())),
        (
            Event::ReadingUsed {
                line: 1,
                used: true,
            },
            Refusal::NoSuchReading,
        ),
        (
            Event::NightOpened(Box::new(opening())),
            Refusal::AlreadyOpen,
        ),
    ] {
        match session.act(utc(10), &event) {
            Err(SessionFault::Refused(why)) => assert_eq!(why, refusal),
            other => panic!("{event:?} gave {other:?}"),
        }
    }
    assert_eq!(journal::read(session.path()).unwrap().events.len(), 1);
}

#[test]
fn a_ring_set_leaves_the_readings_before_it_behind() {
    let folder = TempDir::new().unwrap();
    let mut session = begun(&folder);
    let read = |star: &str| Box::new(reading(star, 20.0, false));
    session
        .act(utc(10), &Event::StarRead(read("Vega")))
        .unwrap();
    session
        .act(utc(20), &Event::StarRead(read("Deneb")))
        .unwrap();
    let set = Event::RingSet {
        circle: Circle::Hour,
        reading: Some(read("Altair")),
    };
    assert_eq!(
        session.act(utc(30), &set).unwrap(),
        [
            Effect::Refit,
            Effect::Say(Said::ReadingsLeftBehind { count: 2 })
        ]
    );
    let used = |session: &Session| -> Vec<String> {
        let readings = session.night().state().readings_in_use();
        readings.map(|read| read.reading.star.clone()).collect()
    };
    assert_eq!(used(&session), ["Altair"]);
    let undo = session.night().undo().unwrap();
    assert_eq!(
        session.act(utc(40), &undo).unwrap(),
        [
            Effect::Refit,
            Effect::Say(Said::TakenBack {
                act: "ring set",
                about: Some("Altair".to_owned())
            })
        ]
    );
    assert_eq!(used(&session), ["Vega", "Deneb"]);
    session
        .act(
            utc(50),
            &Event::ReadingUsed {
                line: 2,
                used: false,
            },
        )
        .unwrap();
    assert_eq!(used(&session), ["Deneb"]);
}

#[test]
fn a_corrected_clock_moves_what_the_wrong_clock_timed() {
    let folder = TempDir::new().unwrap();
    let mut session = begun(&folder);
    let read = |driven| Event::StarRead(Box::new(reading("Vega", 20.0, driven)));
    session.act(utc(10), &read(false)).unwrap();
    session
        .act(utc(20), &Event::ClockJumped { seconds: -5.0 })
        .unwrap();
    session.act(utc(30), &read(false)).unwrap();
    session.act(utc(40), &read(true)).unwrap();
    // the clock is a minute slow: the stars were a quarter of a degree further west
    let effects = session
        .act(utc(50), &Event::ClockCorrected { seconds: 60.0 })
        .unwrap();
    assert_eq!(effects, [Effect::Refit, Effect::CorrectClock(60.0)]);
    let moved = 60.0 * DEGREES_PER_SECOND;
    let expected = [
        [20.0, 20.75, 20.75],
        [20.0 + moved, 20.75, 20.75],
        [20.0 + moved, 20.75 + moved, 20.75 + moved],
    ];
    for (found, expected) in hour_angles(&session).iter().zip(expected) {
        for (found, expected) in found.iter().zip(expected) {
            assert!((found - expected).abs() < ROUNDING_DEG);
        }
    }
    let undo = session.night().undo().unwrap();
    let effects = session.act(utc(60), &undo).unwrap();
    assert!(effects.contains(&Effect::CorrectClock(0.0)));
    let back = hour_angles(&session);
    assert!(
        back.iter()
            .all(|[hour, ..]| (hour - 20.0).abs() < ROUNDING_DEG),
        "{back:?}"
    );
}
