//! Hands in the dark: any keys in any order, on every kind of mount and sky, neither make the program stumble nor leave a
//! record that does not come back as it was.

use std::time::Duration;

use crossterm::event::KeyCode;
use nonius::metal::{Kind, Ring};
use nonius::night::{Night, journal};
use proptest::prelude::*;

use crate::scene::{EVENING, NOON, Scene};

fn a_key() -> impl Strategy<Value = KeyCode> {
    prop_oneof![
        6 => prop::sample::select(" bfmsrdwcozeaxptnukl/?1234567890".chars().collect::<Vec<_>>())
            .prop_map(KeyCode::Char),
        4 => prop::sample::select(vec![
            KeyCode::Enter, KeyCode::Esc, KeyCode::Up, KeyCode::Down, KeyCode::Tab, KeyCode::Left, KeyCode::Right,
            KeyCode::Backspace,
        ]),
    ]
}

/// What an observer does rather than what a cat does: stars chosen and read, rightly and wrongly.
fn a_habit() -> impl Strategy<Value = Vec<KeyCode>> {
    let typed = |text: &str| text.chars().map(KeyCode::Char).collect::<Vec<_>>();
    let reading = move |hour: u32, dec: i32| {
        let mut keys = vec![KeyCode::Char('s'), KeyCode::Enter, KeyCode::Enter];
        keys.extend(typed(&format!("{hour}h12m")));
        keys.push(KeyCode::Enter);
        keys.extend(typed(&format!("{}", dec.abs())));
        keys.extend([KeyCode::Enter, KeyCode::Enter]);
        keys
    };
    prop_oneof![
        2 => (0..24_u32, -89..89_i32).prop_map(move |(hour, dec)| reading(hour, dec)),
        5 => a_key().prop_map(|key| vec![key]),
    ]
}

fn a_scene() -> impl Strategy<Value = Scene> {
    let mounts = (
        prop::sample::select(vec![Kind::German, Kind::Fork]),
        prop::sample::select(vec![Ring::Fixed, Ring::Slips, Ring::Driven]),
        any::<bool>(),
        prop::sample::select(vec![54.5, 0.0, -31.4, 90.0, -90.0]),
        prop::sample::select(vec![EVENING, NOON]),
        prop::sample::select(vec![
            vec!["M 37", "M 31", "M 7", "Sun", "Venus", "Polaris"],
            vec!["no such thing"],
            vec![],
        ]),
    );
    mounts.prop_map(|(kind, ring, slips, latitude, at, list)| {
        let mut scene = Scene::at(at, 80, 24).with_list(&list);
        scene.observatory.mount.kind = kind;
        scene.observatory.mount.hour_circle.ring = ring;
        scene.observatory.mount.declination_circle.slips = slips;
        scene.observatory.observer.latitude = nonius::angle::Latitude::from_degrees(latitude);
        scene
    })
}

proptest! {
    #![proptest_config(ProptestConfig { cases: 24, ..ProptestConfig::default() })]

    #[test]
    fn no_keys_make_it_stumble_and_the_record_comes_back(
        scene in a_scene(), habits in prop::collection::vec(a_habit(), 1..25),
    ) {
        let strokes: Vec<(KeyCode, Duration)> = habits
            .concat()
            .into_iter()
            .zip(1..)
            .map(|(key, second)| (key, Duration::from_secs(second)))
            .collect();
        let picture = scene.play_strokes(&strokes);
        prop_assert!(!picture.text().is_empty());
        let contents = journal::read(&scene.journal()).unwrap();
        prop_assert!(contents.notices.is_empty(), "{:?}", contents.notices);
        let (session, _) = scene.session();
        let again = Night::replay(contents.events);
        prop_assert_eq!(&again.state().readings, &session.night().state().readings);
        prop_assert_eq!(&again.state().targets, &session.night().state().targets);
    }
}
