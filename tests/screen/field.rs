//! The field as the optics show it.

use nonius::screen::figures::Glyphs;

use crate::scene::{EVENING, NOON, Scene};

#[test]
fn the_pleiades_in_the_finder_are_a_small_dipper_turned_by_half_a_turn() {
    let scene = Scene::at(EVENING, 80, 24).with_list(&["M 45"]);
    insta::assert_snapshot!("the_pleiades_in_the_finder", scene.play("<space> v").text());
    insta::assert_snapshot!(
        "the_pleiades_in_the_eyepiece",
        scene.play("v <space>").text()
    );
}

#[test]
fn a_small_terminal_shows_the_field_as_well() {
    let scene = Scene::at(EVENING, 60, 20).with_list(&["M 45"]);
    insta::assert_snapshot!("narrow_field", scene.play("<space> v").text());
}

#[test]
fn in_ascii_the_larger_the_letter_the_brighter_the_star() {
    let mut scene = Scene::at(EVENING, 80, 24).with_list(&["M 45"]);
    scene.glyphs = Glyphs::Ascii;
    let picture = scene.play("<space> v <space>");
    insta::assert_snapshot!("the_pleiades_in_ascii", picture.text());
}

#[test]
fn the_optics_go_round_and_the_same_key_goes_back() {
    let scene = Scene::at(EVENING, 80, 24).with_list(&["M 37"]);
    assert!(scene.play("<space> v").says("M 37 in the finder"));
    assert!(scene.play("v <space>").says("M 37 in the 40 mm"));
    assert!(scene.play("v <right> <space>").says("M 37 in the finder"));
    assert!(scene.play("v <left>").says("M 37 in the 40 mm"));
    assert!(scene.play("v v").says("hour circle"));
    assert!(scene.play("v <esc>").says("hour circle"));
    assert!(scene.play("v x").says("M 37 in the finder"));
}

#[test]
fn no_field_is_shown_of_what_is_withheld_or_not_up() {
    let sun = Scene::at(NOON, 80, 24).with_list(&["Sun"]);
    let picture = sun.play("<space> v");
    assert!(picture.says("nothing is dialled here") && picture.says("THE SUN"));
    let set = Scene::at(EVENING, 80, 24).with_list(&["M 7"]);
    assert!(set.play("<space> v").says("nothing is dialled here"));
}

#[test]
fn a_field_near_the_sun_that_was_answered_for_carries_the_caution() {
    let scene = Scene::at("2026-06-21T12:00:00Z", 80, 24).with_list(&["M 35"]);
    assert!(!scene.play("<space> v").says("in the finder"));
    let picture = scene.play("a sun <enter> v");
    assert!(picture.says("M 35 in the finder"), "{}", picture.text());
    assert!(picture.says("! "), "{}", picture.text());
}
