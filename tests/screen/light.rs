//! The colours the screen is drawn in.

use nonius::screen::figures::Glyphs;
use nonius::screen::light::Light;
use ratatui::style::Color;

use crate::scene::{EVENING, NOON, Picture, Scene};

/// Scenes that draw every pane.
const SCENES: [&str; 13] = [
    "",
    "<space>",
    "<space> f",
    "s",
    "s cap <enter>",
    "s cap <enter> <enter> 20h49m40s <enter> 95",
    "/ owl",
    "n words",
    "c 2",
    "?",
    "x",
    "<space> v",
    "<space> v <space>",
];

fn reds(picture: &Picture) -> Vec<u8> {
    let mut reds = Vec::new();
    for cell in &picture.buffer.content {
        let Color::Rgb(red, 0, 0) = cell.fg else {
            panic!("{cell:?} is not red");
        };
        assert_eq!(cell.bg, Color::Rgb(0, 0, 0), "{cell:?} has no black ground");
        assert!(red > 0);
        reds.push(red);
    }
    reds.sort_unstable();
    reds.dedup();
    reds
}

#[test]
fn at_night_every_cell_is_one_of_three_reds_on_black() {
    for (width, height) in [(80, 24), (60, 20), (50, 10)] {
        for keys in SCENES {
            let reds = reds(&Scene::at(EVENING, width, height).play(keys));
            assert!(reds.len() <= 3, "{keys}: {reds:?}");
        }
    }
    let sun = Scene::at(NOON, 80, 24).with_list(&["Sun"]);
    for keys in ["<space>", "a", "sun <enter>"] {
        reds(&sun.play(keys));
    }
}

#[test]
fn in_the_dim_light_no_red_is_as_bright_as_at_night() {
    let mut scene = Scene::at(EVENING, 80, 24);
    let night = reds(&scene.play("<space>"));
    scene.light = Light::Dim;
    let dim = reds(&scene.play(""));
    for (dim, night) in dim.iter().zip(&night) {
        assert!(dim < night);
    }
}

#[test]
fn light_goes_round_by_one_key() {
    let scene = Scene::at(EVENING, 80, 24);
    assert!(scene.play("l").says("light: dim"));
    assert!(scene.play("l l").says("light: day"));
    reds(&scene.play("l l l"));
}

#[test]
fn where_only_ascii_can_be_shown_nothing_else_is_drawn() {
    let mut scene = Scene::at(EVENING, 80, 24);
    scene.glyphs = Glyphs::Ascii;
    for keys in SCENES {
        let text = scene.play(keys).text();
        assert!(text.is_ascii(), "{text}");
    }
}
