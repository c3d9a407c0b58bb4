//! The field as finder and eyepiece show it: the stars about the target, turned the way the optic turns them.
//!
//! ```text
//!          N
//!      . : : : .         M 45 in the finder
//!    :     o     :       field 6°
//! E :   . >  < O  :      inverted: turned by half a turn
//!    :    .   o  :       faintest drawn 8.9
//!      ' : : : '         ...
//! ```
//!
//! Two columns are as wide as a row is high, so that the ring is round. With all glyphs, dots of braille draw the stars,
//! the brighter ones as larger discs; in ASCII `*`, `O`, `o` and `.` do.

use ratatui::buffer::Buffer;
use ratatui::layout::Rect;

use crate::angle::Angle;
use crate::dial::Field;
use crate::screen::dots::{Canvas, Size};
use crate::screen::light::Strength;
use crate::screen::look::{Look, wrapped};

/// More stars than this are a crowd, not a picture.
pub const MOST_STARS: usize = 120;

/// From this magnitude on some stars are in no table.
const COMPLETE_TO: f64 = 7.5;

/// The ring and the letters about it take this many rows and columns on either side of the field.
const RIM_ROWS: u16 = 1;

/// A target smaller than this many rows is its mark alone.
const LARGE_ROWS: f64 = 2.0;

/// Draws the field, its words beside it.
pub fn draw(look: Look, buffer: &mut Buffer, area: Rect, target: &str, field: &Field) {
    let rows = area.height.min(area.width / 4);
    let picture = Rect {
        width: rows * 2,
        height: rows,
        ..area
    };
    let words = Rect {
        x: picture.right() + 2,
        width: area.width.saturating_sub(picture.width + 2),
        ..area
    };
    draw_picture(look, buffer, picture, field);
    let mut free = words.rows();
    let caution = field.near_sun.as_ref().map(|words| format!("! {words}"));
    for line in wrapped(
        caution.as_deref().unwrap_or_default(),
        usize::from(words.width),
    ) {
        if let Some(row) = free.next() {
            look.reversed(buffer, row, &line);
        }
    }
    for (sentence, strength) in sentences(target, field) {
        for line in wrapped(&sentence, usize::from(words.width)) {
            if let Some(row) = free.next() {
                look.left(buffer, row, &line, strength);
            }
        }
    }
}

fn draw_picture(look: Look, buffer: &mut Buffer, area: Rect, field: &Field) {
    let radius_rows = f64::from(area.height.saturating_sub(2 * RIM_ROWS)) / 2.0;
    let rows = |angle: Angle| angle / (field.diameter / 2.0) * radius_rows;
    let mut canvas = Canvas::new(area, look.glyphs);
    canvas.ring(radius_rows);
    let half = field.target_across.map(|across| rows(across / 2.0));
    let outline = half.filter(|half| half * 2.0 >= LARGE_ROWS && *half < radius_rows);
    match outline {
        Some(half) => canvas.dotted_ring(half),
        None => canvas.mark_the_middle(),
    }
    // the faintest first, so that no bright star is lost under one
    for star in field.stars.iter().rev() {
        let size = Size::of(
            star.magnitude,
            field.stars.first().map(|star| star.magnitude),
        );
        canvas.star((rows(star.right), rows(star.up)), size);
    }
    canvas.put(look, buffer);
    let rim = (radius_rows + 0.5) / radius_rows.max(1.0);
    for (letter, (right, up)) in [
        ("N", field.north()),
        ("E", field.east()),
        ("W", field.west()),
    ] {
        let (right, up) = (rows(right) * rim, rows(up) * rim);
        let (column, row) = canvas.cell((right, up));
        buffer.set_string(column, row, letter, look.style(Strength::Strong));
    }
}

/// What there is to say of it, the most telling first.
fn sentences(target: &str, field: &Field) -> Vec<(String, Strength)> {
    let mut said = vec![
        (format!("{target} in the {}", field.optic), Strength::Strong),
        (format!("field {}", across(field.diameter)), Strength::Plain),
        (field.view.in_words().to_owned(), Strength::Plain),
    ];
    said.push((
        match field.faintest() {
            Some(faintest) if field.stars.len() < MOST_STARS || faintest > COMPLETE_TO => {
                format!("faintest drawn {faintest:.1}; beyond {COMPLETE_TO} some are missing")
            }
            Some(faintest) => format!("faintest drawn {faintest:.1}"),
            None => "no star of the tables is in it".to_owned(),
        },
        Strength::Plain,
    ));
    said.push((
        format!("drive off, all drifts {}, to W", way(field.west())),
        Strength::Plain,
    ));
    if let Some(size) = field.target_across {
        said.push((
            format!("{target} is {} across", across(size)),
            Strength::Plain,
        ));
    }
    said.push((
        if field.overhead && !field.at_the_side {
            "overhead: it turns with where you stand"
        } else if field.at_the_side {
            "at the side of the tube, your head upright"
        } else {
            "your head upright"
        }
        .to_owned(),
        Strength::Faint,
    ));
    said
}

/// A size on the sky as people say it.
fn across(angle: Angle) -> String {
    if angle.degrees() >= 1.0 {
        let degrees = format!("{:.1}", angle.degrees());
        format!("{}°", degrees.trim_end_matches(".0"))
    } else if angle.arcminutes() >= 1.0 {
        format!("{:.0}'", angle.arcminutes())
    } else {
        format!("{:.0}\"", angle.arcseconds())
    }
}

/// The nearest of eight ways in the picture.
fn way((right, up): (Angle, Angle)) -> &'static str {
    const WAYS: [&str; 8] = [
        "up",
        "up and right",
        "to the right",
        "down and right",
        "down",
        "down and left",
        "to the left",
        "up and left",
    ];
    let clockwise = right.radians().atan2(up.radians()).to_degrees();
    #[allow(clippy::cast_possible_truncation, clippy::cast_sign_loss)] // 0 to 8
    let eighth = (clockwise.rem_euclid(360.0) / 45.0).round() as usize % WAYS.len();
    WAYS.get(eighth).copied().unwrap_or_default()
}
