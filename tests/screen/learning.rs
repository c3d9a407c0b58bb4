//! The mount learns: stars timed, doubted and set aside, rings slipped and set, sweeps, the night before.

use nonius::night::Outcome;

use crate::flows::{circles_shown, known_arcmin, reading_of, three_stars};
use crate::scene::{EVENING, Scene};

/// An hour more on the hour circle than it shows.
fn an_hour_more(shown: &str) -> String {
    let (hours, rest) = shown.split_once('h').unwrap();
    let hours: u32 = hours.trim().parse().unwrap();
    format!("{:02}h{rest}", (hours + 1) % 24)
}

#[test]
fn a_slipped_ring_is_told_anew_by_one_star_and_nothing_else_is_lost() {
    let after_one = Scene::at(EVENING, 80, 24);
    after_one.play(&reading_of(&after_one, "capella"));
    let one = known_arcmin(&after_one.play("<space>"));

    let scene = Scene::at(EVENING, 80, 24);
    three_stars(&scene);
    let picture = scene.play("<space> z h <enter>");
    assert!(picture.says("no star read"), "{}", picture.text());
    scene.play(&reading_of(&scene, "capella"));
    let again = known_arcmin(&scene.play(""));
    assert!(
        again < 0.7 * one,
        "{again}' after a slip, {one}' with one star"
    );
}

#[test]
fn a_misread_circle_is_doubted_and_put_right_by_one_key() {
    let scene = Scene::at(EVENING, 80, 24);
    three_stars(&scene);
    let (hour, dec) = circles_shown(&scene.play("s alpheratz <enter>"));
    let misread = an_hour_more(&hour);
    let typed = format!("s alpheratz <enter> <enter> {misread} <enter> {dec} <enter>");
    let picture = scene.play(&typed);
    insta::assert_snapshot!("a_doubted_reading", picture.text());
    // nothing is recorded before the observer has chosen
    let count = |scene: &Scene| scene.session().0.night().state().readings.len();
    assert_eq!(count(&scene), 3);
    let picture = scene.play(&format!("{typed} <enter>"));
    assert!(picture.says("misread"), "{}", picture.text());
    let (session, _) = scene.session();
    let read = &session.night().state().readings[3].reading;
    assert_eq!(read.hour, hour);
    assert!(read.doubted.contains(&misread), "{}", read.doubted);
    assert!(read.off_arcmin.unwrap() < 60.0, "{read:?}");
}

#[test]
fn a_doubted_reading_can_be_kept_discarded_or_typed_again() {
    let scene = Scene::at(EVENING, 80, 24);
    three_stars(&scene);
    let (hour, dec) = circles_shown(&scene.play("s alpheratz <enter>"));
    let misread = an_hour_more(&hour);
    let typed = format!("s alpheratz <enter> <enter> {misread} <enter> {dec} <enter>");
    let to_the_end = "<down> <down> <down> <down> <down> <down>";
    let picture = scene.play(&format!("{typed} {to_the_end} <enter>"));
    assert!(picture.says("discarded"), "{}", picture.text());
    let picture = scene.play(&format!("{typed} <esc>"));
    assert!(
        picture.says("what do the circles show"),
        "{}",
        picture.text()
    );
    let picture = scene.play(&format!("{typed} {to_the_end} <up> <enter>"));
    assert!(
        picture.says("kept as read: Alpheratz"),
        "{}",
        picture.text()
    );
    let (session, _) = scene.session();
    assert_eq!(session.night().state().readings.len(), 4);
}

#[test]
fn a_ring_that_was_knocked_is_known_from_one_star() {
    let mut scene = Scene::at(EVENING, 80, 24);
    three_stars(&scene);
    let before = known_arcmin(&scene.play("<space>"));
    let mut errors = scene.observatory.demonstration.unwrap();
    errors.hour_index += nonius::angle::Angle::from_degrees(3.2);
    scene.observatory.demonstration = Some(errors);
    let picture = scene.play(&reading_of(&scene, "alpheratz"));
    insta::assert_snapshot!("a_knocked_ring", picture.text());
    let (hour, dec) = circles_shown(&scene.play("s alpheratz <enter>"));
    let keys = format!("s alpheratz <enter> <enter> {hour} <enter> {dec} <enter> <enter>");
    let picture = scene.play(&keys);
    assert!(picture.says("slipped"), "{}", picture.text());
    // the index moves, and the rest of what was learnt stays
    let after = known_arcmin(&scene.play("<space>"));
    assert!(after < 2.0 * before + 10.0, "{before}' {after}'");
}

#[test]
fn a_star_timed_on_a_mark_is_known_better_than_one_looked_at() {
    let mut scene = Scene::at(EVENING, 80, 24);
    scene.observatory.mount.hour_circle.vernier = None;
    // no mark of the circle: they are 4 minutes apart
    let picture = scene.play("s capella <enter> d 17h58m20s <enter>");
    assert!(picture.says("read on a mark"), "{}", picture.text());
    scene.play("s capella <enter> d 17h56m <enter> 44d15N <enter>");
    let (session, _) = scene.session();
    let readings = &session.night().state().readings;
    assert!(readings[0].reading.timed, "{readings:?}");
    // 2 s of time and a twentieth of four minutes, not 0.15 of four minutes
    let sigma_s = readings[0].reading.hour_sigma_deg * 240.0;
    assert!((sigma_s - 12.2).abs() < 0.1, "{sigma_s} s");
}

#[test]
fn the_calibration_view_shows_what_is_known_and_which_star_next() {
    let scene = Scene::at(EVENING, 80, 24);
    three_stars(&scene);
    insta::assert_snapshot!("the_mount_as_known", scene.play("<space> c").text());
    insta::assert_snapshot!("what_is_left_of_the_stars", scene.play("c p").text());
    let picture = scene.play("c <down> x");
    assert!(picture.says("Deneb is set aside"), "{}", picture.text());
    let picture = scene.play("c <down> x");
    assert!(picture.says("Deneb is used again"), "{}", picture.text());
    let narrow = Scene::at(EVENING, 60, 20);
    narrow.play(&reading_of(&narrow, "capella"));
    insta::assert_snapshot!("narrow_mount_as_known", narrow.play("c").text());
}

#[test]
fn what_is_not_in_the_field_is_swept_for_and_found_there() {
    let scene = Scene::at(EVENING, 80, 24);
    let picture = scene.play("<space> w");
    assert!(picture.says("read a star first"), "{}", picture.text());
    scene.play(&reading_of(&scene, "capella"));
    let before = known_arcmin(&scene.play(""));
    insta::assert_snapshot!("a_sweep", scene.play("w <space> <space>").text());
    let picture = scene.play("w <space> <space> f");
    assert!(picture.says("found there: M 37"), "{}", picture.text());
    let (session, _) = scene.session();
    let state = session.night().state();
    assert_eq!(state.readings.len(), 2);
    assert!(matches!(state.targets[0].outcome, Some(Outcome::Found(_))));
    drop(session);
    assert!(known_arcmin(&scene.play("")) < before);
}

#[test]
fn two_opposite_verniers_are_typed_with_a_stroke_between_them() {
    let scene = Scene::at(EVENING, 80, 24);
    let (hour, dec) = circles_shown(&scene.play("s capella <enter>"));
    let (hours, rest) = hour.split_once('h').unwrap();
    let across = (hours.trim().parse::<u32>().unwrap() + 12) % 24;
    let keys = format!("s capella <enter> <enter> {hour}/{across}h{rest} <enter> {dec} <enter>");
    let picture = scene.play(&keys);
    assert!(picture.says("read: Capella"), "{}", picture.text());
    let (session, _) = scene.session();
    let read = &session.night().state().readings[0].reading;
    assert!(read.opposite.hour && !read.opposite.dec);
    // two looks of 10 s
    assert!((read.hour_sigma_deg * 240.0 - 10.0 / 2.0_f64.sqrt()).abs() < 1e-6);
}

#[test]
fn rings_that_slip_are_set_on_a_star_by_one_key() {
    let mut scene = Scene::at(EVENING, 80, 24);
    scene.observatory.mount.hour_circle.ring = nonius::metal::Ring::Slips;
    scene.observatory.mount.declination_circle.slips = true;
    let picture = scene.play("s capella <enter>");
    assert!(picture.says("or turn the rings to"), "{}", picture.text());
    let picture = scene.play("s capella <enter> z <enter>");
    assert!(picture.says("rings set on Capella"), "{}", picture.text());
    let (session, _) = scene.session();
    let state = session.night().state();
    assert_eq!((state.zeros.hour, state.zeros.dec), (1, 1));
    assert_eq!(state.readings_in_use().count(), 1);
    drop(session);
    let picture = scene.play("<space>");
    assert!(picture.says("known to"), "{}", picture.text());
    // the pretended mount's rings stand as they were set: the next star agrees with them
    let picture = scene.play(&reading_of(&scene, "aldebaran"));
    assert!(picture.says("read: Aldebaran"), "{}", picture.text());
    let state = scene.session().0.night().state().clone();
    assert_eq!(state.readings_in_use().count(), 2);
}

#[test]
fn what_the_night_before_taught_is_taken_as_it_stood_or_moved_and_dropped_again() {
    let before = Scene::at(EVENING, 80, 24);
    three_stars(&before);
    let (session, _) = before.session();
    let known = nonius::night::Known::of(&before.observatory.grounds(), session.night().state());
    drop(session);
    let mut scene = Scene::at(EVENING, 80, 24);
    let taught = nonius::night::EarlierNight::of("2026-11-30", &known.estimate);
    scene.observatory.earlier_night = Some(taught);
    assert!(scene.play("c").says("e starts from there"));
    let picture = scene.play("c e");
    assert!(picture.says("as it stood"), "{}", picture.text());
    // no star of tonight, and known by that night but for the allowance
    let picture = scene.play("<space>");
    assert!(known_arcmin(&picture) < 60.0);
    assert!(
        picture.says("rest on an earlier night"),
        "{}",
        picture.text()
    );
    let picture = scene.play("c e <esc>");
    assert!(picture.says("no star read"), "{}", picture.text());
    let picture = scene.play("c e");
    assert!(picture.says("the mount file alone"), "{}", picture.text());
    let picture = scene.play("u u u u c");
    assert!(picture.says("e starts from there"), "{}", picture.text());
}

#[test]
fn an_axis_that_was_turned_is_unsure_again() {
    let scene = Scene::at(EVENING, 80, 24);
    three_stars(&scene);
    let before = known_arcmin(&scene.play("<space>"));
    let picture = scene.play("c a");
    assert!(picture.says("60."), "{}", picture.text());
    let after = known_arcmin(&scene.play("<esc>"));
    assert!(after > 2.0 * before, "{before}' {after}'");
    assert!((known_arcmin(&scene.play("u")) - before).abs() < 1.0);
}
