//! Whole flows of a night, as pictures.

use std::time::Duration;

use crossterm::event::KeyCode;
use nonius::night::{Event, Outcome};

use crate::scene::{EVENING, NOON, Picture, Scene};

/// What the circles of the pretended mount show, as the demonstration line of a star says.
pub fn circles_shown(picture: &Picture) -> (String, String) {
    let text = picture.text();
    let line = text.lines().find(|line| line.contains("circles show "));
    let shown = line
        .unwrap_or_else(|| panic!("no demonstration:\n{text}"))
        .split("circles show ")
        .nth(1)
        .unwrap();
    let (hour, dec) = shown.split_once(" and ").unwrap();
    (hour.trim().to_owned(), dec.trim().to_owned())
}

/// To how many minutes of arc the object shown is said to be known.
pub fn known_arcmin(picture: &Picture) -> f64 {
    let text = picture.text();
    let known = text.split("known to ").nth(1);
    let known = known.unwrap_or_else(|| panic!("not known:\n{text}"));
    known.split('\'').next().unwrap().parse().unwrap()
}

/// The keys that read a star, chosen by what is typed of its name, as the pretended mount shows it.
pub fn reading_of(scene: &Scene, star: &str) -> String {
    let centring = format!("s {star} <enter>");
    let (hour, dec) = circles_shown(&scene.play(&centring));
    format!("s {star} <enter> <enter> {hour} <enter> {dec} <enter>")
}

/// Reads three stars on either side of the pier.
pub fn three_stars(scene: &Scene) -> Picture {
    for star in ["capella", "deneb"] {
        scene.play(&reading_of(scene, star));
    }
    scene.play(&reading_of(scene, "aldebaran"))
}

#[test]
fn stepping_at_80_by_24_shows_all_there_is_to_know() {
    let scene = Scene::at(EVENING, 80, 24);
    insta::assert_snapshot!(scene.play("<space>").text());
}

#[test]
fn stepping_at_60_by_20_still_shows_it() {
    let scene = Scene::at(EVENING, 60, 20);
    insta::assert_snapshot!(scene.play("<space>").text());
}

#[test]
fn a_wide_terminal_gets_larger_figures() {
    let scene = Scene::at(EVENING, 120, 36);
    insta::assert_snapshot!(scene.play("<space>").text());
}

#[test]
fn a_terminal_too_small_is_told_how_large_it_must_be() {
    let scene = Scene::at(EVENING, 59, 20);
    assert!(
        scene
            .play("")
            .says("too small: 60 x 20 at least, this is 59 x 20")
    );
    let scene = Scene::at(EVENING, 3, 2);
    assert!(scene.play("").says("too"));
}

#[test]
fn a_star_is_chosen_centred_and_read() {
    let scene = Scene::at(EVENING, 80, 24);
    insta::assert_snapshot!("stars_to_choose_from", scene.play("s").text());
    insta::assert_snapshot!("a_star_to_centre", scene.play("s cap <enter>").text());
    let keys = reading_of(&scene, "capella");
    let typed = keys.strip_suffix(" <enter>").unwrap();
    insta::assert_snapshot!("a_reading_understood", scene.play(typed).text());
    insta::assert_snapshot!(
        "the_star_read",
        scene.play(&format!("{keys} <space>")).text()
    );
    let (session, begun) = scene.session();
    assert!(begun.resumed);
    let readings = &session.night().state().readings;
    assert_eq!(readings.len(), 1);
    assert_eq!(readings[0].reading.star, "Capella");
}

#[test]
fn a_star_at_60_by_20_keeps_what_is_needed() {
    let scene = Scene::at(EVENING, 60, 20);
    insta::assert_snapshot!("narrow_stars", scene.play("s").text());
    insta::assert_snapshot!("narrow_centring", scene.play("s cap <enter>").text());
    insta::assert_snapshot!(
        "narrow_reading",
        scene
            .play("s cap <enter> <enter> 20h49m40s <enter> 95")
            .text()
    );
}

#[test]
fn after_three_stars_the_objects_are_known_to_minutes() {
    let scene = Scene::at(EVENING, 80, 24);
    assert!(three_stars(&scene).says("read: Aldebaran"));
    // three stars read to half a vernier's count leave some minutes of arc
    assert!(known_arcmin(&scene.play("<space>")) < 30.0);
}

#[test]
fn what_cannot_be_on_the_circle_is_not_taken() {
    let scene = Scene::at(EVENING, 80, 24);
    let picture = scene.play("s cap <enter> <enter> 25h <enter> 45N <enter> <enter>");
    assert!(
        picture.says("not understood: the circle goes from 0h to 24h"),
        "{}",
        picture.text()
    );
    let (session, _) = scene.session();
    assert!(session.night().state().readings.is_empty());
}

#[test]
fn a_found_object_can_be_read_like_a_star() {
    let scene = Scene::at(EVENING, 80, 24);
    scene.play(&reading_of(&scene, "capella"));
    let (hour, dec) = circles_shown(&scene.play("<space> r"));
    let picture = scene.play(&format!("r {hour} <enter> {dec} <enter>"));
    assert!(
        picture.says("read: M 37") && picture.says("found · 1 of 4"),
        "{}",
        picture.text()
    );
    let (session, _) = scene.session();
    assert_eq!(session.night().state().readings.len(), 2);
}

#[test]
fn found_missed_and_noted_stand_in_the_record_and_can_be_taken_back() {
    let scene = Scene::at(EVENING, 80, 24);
    let picture = scene.play("<space> f <space> m n faint <enter>");
    assert!(
        picture.says("missed · 2 of 4") && picture.says("noted"),
        "{}",
        picture.text()
    );
    let (session, _) = scene.session();
    let targets = &session.night().state().targets;
    assert!(matches!(targets[0].outcome, Some(Outcome::Found(_))));
    assert!(matches!(targets[1].outcome, Some(Outcome::Missed(_))));
    assert_eq!(targets[1].notes, ["faint"]);
    drop(session);
    let picture = scene.play("u u u");
    assert!(picture.says("1 of 4"), "{}", picture.text());
    let (session, _) = scene.session();
    let targets = &session.night().state().targets;
    assert!(matches!(targets[0].outcome, Some(Outcome::Found(_))));
    assert_eq!(targets[1].outcome, None);
    assert!(targets[1].notes.is_empty());
}

#[test]
fn a_second_key_within_80_ms_of_one_that_changed_the_record_is_ignored() {
    let scene = Scene::at(EVENING, 80, 24);
    let key = |c, ms| (KeyCode::Char(c), Duration::from_millis(ms));
    let strokes = [key(' ', 1000), key('f', 2000), key('m', 2079)];
    assert!(scene.play_strokes(&strokes).says("found · 1 of 4"));
    let strokes = [key('f', 2000), key('m', 2080)];
    assert!(scene.play_strokes(&strokes).says("missed · 1 of 4"));
}

#[test]
fn while_typing_every_key_counts() {
    let scene = Scene::at(EVENING, 80, 24);
    let strokes: Vec<_> = "nfmnfm"
        .chars()
        .zip(0..)
        .map(|(c, count)| (KeyCode::Char(c), Duration::from_millis(1000 + 10 * count)))
        .collect();
    assert!(scene.play_strokes(&strokes).says("note fmnfm"));
}

#[test]
fn an_object_is_looked_up_and_stands_at_the_end_of_the_list() {
    let scene = Scene::at(EVENING, 80, 24);
    insta::assert_snapshot!("objects_that_match", scene.play("/ owl").text());
    let picture = scene.play("/ m97 <enter>");
    assert!(
        picture.says("M 97 stands at the end of the list"),
        "{}",
        picture.text()
    );
    let (session, _) = scene.session();
    assert_eq!(session.night().state().targets.len(), 5);
}

#[test]
fn coordinates_can_be_added_as_they_are() {
    let scene = Scene::at(EVENING, 80, 24).with_list(&[]);
    let mut keys = vec![KeyCode::Char('/')];
    keys.extend("05:52:18.3 +32:33:11 @J2000".chars().map(KeyCode::Char));
    keys.extend([KeyCode::Enter, KeyCode::Char(' ')]);
    let strokes: Vec<_> = keys
        .into_iter()
        .zip(1..)
        .map(|(key, s)| (key, Duration::from_secs(s)))
        .collect();
    let picture = scene.play_strokes(&strokes);
    assert!(
        picture.says("05:52:18.3 +32:33:11") && picture.says("1 of 1"),
        "{}",
        picture.text()
    );
}

#[test]
fn the_sun_is_withheld_until_the_observer_answers_for_it() {
    let scene = Scene::at(NOON, 80, 24).with_list(&["Sun", "Venus"]);
    let picture = scene.play("<space>");
    insta::assert_snapshot!("the_sun_withheld", picture.text());
    assert!(
        scene
            .play("a sum <enter>")
            .says("type sun to answer for it")
    );
    assert!(scene.play("").says("THE SUN"));
    let picture = scene.play("a sun <enter>");
    insta::assert_snapshot!("the_sun_answered_for", picture.text());
    let (session, _) = scene.session();
    let acknowledged = |stamped: &&nonius::night::Stamped| {
        matches!(stamped.event, Event::SunRiskAcknowledged { .. })
    };
    assert_eq!(
        session
            .night()
            .history()
            .iter()
            .filter(acknowledged)
            .count(),
        1
    );
    drop(session);
    assert!(scene.play("u").says("THE SUN"));
}

#[test]
fn what_is_not_up_has_no_settings_to_follow() {
    let scene = Scene::at(EVENING, 80, 24).with_list(&["M 7"]);
    let picture = scene.play("<space>");
    assert!(
        picture.says("not up") && !picture.says("hour circle"),
        "{}",
        picture.text()
    );
}

#[test]
fn the_other_side_of_the_pier_and_back() {
    let scene = Scene::at(EVENING, 80, 24);
    assert!(scene.play("<space>").says("tube west"));
    let picture = scene.play("t");
    assert!(
        picture.says("Six-inch refractor · tube east"),
        "{}",
        picture.text()
    );
    assert!(scene.play("t").says("Six-inch refractor · tube west"));
}

#[test]
fn the_clock_is_corrected_by_what_is_typed_and_said_ever_after() {
    let scene = Scene::at(EVENING, 80, 24);
    assert!(scene.play("k 2.5 <enter>").says("(+2.5 s)"));
    // what is typed is how far the corrected clock is off
    assert!(scene.play("k -1 <enter>").says("(+1.5 s)"));
    assert!(scene.play("k now <enter>").says("type seconds"));
}

#[test]
fn the_keys_are_listed_and_the_list_is_left_by_any_key() {
    let scene = Scene::at(EVENING, 60, 20);
    insta::assert_snapshot!("the_keys", scene.play("?").text());
    insta::assert_snapshot!("more_of_the_keys", scene.play("? <space>").text());
    assert!(scene.play("? x").says("press s to read a star"));
}

#[test]
fn leaving_asks_nothing_and_the_night_goes_on_where_it_stopped() {
    let scene = Scene::at(EVENING, 80, 24);
    assert!(scene.play("<space> f q").left);
    assert!(
        scene
            .play("")
            .says("the night goes on: 1 found, 0 missed so far")
    );
}

#[test]
fn the_end_of_the_list_is_said() {
    let scene = Scene::at(EVENING, 80, 24).with_list(&["M 37"]);
    assert!(
        scene
            .play("<space> <space>")
            .says("this is the end of the list")
    );
    assert!(scene.play("b").says("this is the head of the list"));
}

#[test]
fn the_list_shows_what_became_of_it_and_is_gone_through_by_hand() {
    let scene = Scene::at(EVENING, 80, 24).with_list(&["M 37", "M 31", "M 7", "M 42"]);
    scene.play("<space> f");
    insta::assert_snapshot!("the_list", scene.play("o <down>").text());
    let picture = scene.play("o <down> <enter>");
    assert!(picture.says("2 of 4"), "{}", picture.text());
}

#[test]
fn what_is_looked_up_is_dialled_at_once() {
    let scene = Scene::at(EVENING, 80, 24);
    let picture = scene.play("<space> / m45 <enter>");
    assert!(
        picture.says("M 45") && picture.says("5 of 5"),
        "{}",
        picture.text()
    );
}
