//! The lines of truth: where the object is and where it is going, how well the mount is known, the
//! chances at the first look; and under them the cautions.

use ratatui::buffer::Buffer;
use ratatui::layout::Rect;

use crate::angle::{Angle, Azimuth};
use crate::dial::Dial;
use crate::screen::light::Strength;
use crate::screen::look::{Look, fitting, wrapped};
use crate::screen::outlook::Outlook;
use crate::screen::words::{chance, compass, rough};
use crate::time::CivilZone;

/// Waiting on the mark is worth naming from so much more chance on.
const WORTH_WAITING: f64 = 0.03;

/// Draws the two lines of truth.
pub fn draw(
    look: Look,
    buffer: &mut Buffer,
    area: Rect,
    dial: &Dial,
    outlook: Option<Outlook>,
    zone: CivilZone,
    calibrated: bool,
) {
    let rows: Vec<Rect> = area.rows().collect();
    let [first, second, ..] = rows.as_slice() else {
        return;
    };
    let known = if calibrated {
        format!("known to {}", rough(on_the_sky(dial)))
    } else {
        "no star read: press s".to_owned()
    };
    let room = look.right(buffer, *first, &known, Strength::Plain);
    let observed = &dial.observed;
    let altitude = format!("altitude {:.0}°", observed.altitude.degrees());
    let going = outlook.map_or_else(String::new, |outlook| going(outlook, zone));
    let azimuth = format!(
        "azimuth {:.0}° {}",
        observed.azimuth.degrees().round() % 360.0,
        compass(observed.azimuth)
    );
    let wordings = [
        format!("{altitude}{going}, {azimuth}"),
        format!("{altitude}{going}"),
    ];
    let line = fitting(&wordings, usize::from(room.width));
    look.left(buffer, room, line, Strength::Plain);
    let on_the_mark = dial.chances_on_the_mark.iter().map(|each| each.probability);
    let chances: Vec<String> = dial
        .chances
        .iter()
        .zip(on_the_mark.map(Some).chain(std::iter::repeat(None)))
        .map(|(each, on_the_mark)| {
            let gained = on_the_mark.filter(|better| better - each.probability > WORTH_WAITING);
            let mark = gained.map_or_else(String::new, |better| {
                format!(", {} on the mark", chance(better))
            });
            format!("{} {}{mark}", each.optic, chance(each.probability))
        })
        .collect();
    if has_chances(dial, calibrated) {
        let line = format!("at the first look: {}", chances.join("   "));
        look.left(buffer, *second, &line, Strength::Plain);
    }
}

/// True if there are chances to tell: before a star is read, none is worth telling.
#[must_use]
pub fn has_chances(dial: &Dial, calibrated: bool) -> bool {
    calibrated && !dial.chances.is_empty()
}

/// How far off on the sky the settings may be, 1 sigma of both axes together.
fn on_the_sky(dial: &Dial) -> Angle {
    let west = dial.uncertainty.hour.radians() * dial.observed.declination.angle().cos();
    Angle::from_radians(west.hypot(dial.uncertainty.dec.radians()))
}

fn going(outlook: Outlook, zone: CivilZone) -> String {
    let way = if outlook.rising { "rising" } else { "setting" };
    let time = outlook
        .changes
        .map(|at| zone.civil(at).format("%H:%M").to_string());
    match (outlook.clear, time) {
        (true, Some(time)) => format!(" {way}, clear until {time}"),
        (true, None) => format!(" {way}, clear all day"),
        (false, Some(time)) => format!(" {way}, clear from {time}"),
        (false, None) => format!(" {way}, never clear"),
    }
}

/// Draws the cautions, the gravest first; and if there is room, the star to start from, where slit and eyepiece stand, and
/// the observer's note.
pub fn draw_cautions(
    look: Look,
    buffer: &mut Buffer,
    area: Rect,
    dial: &Dial,
    [neighbour, note]: [&str; 2],
) {
    let width = usize::from(area.width).saturating_sub(2);
    let mut lines: Vec<(String, Strength)> = Vec::new();
    for caution in &dial.cautions {
        for (place, line) in wrapped(&caution.text, width).into_iter().enumerate() {
            let mark = if place == 0 { "!" } else { " " };
            lines.push((format!("{mark} {line}"), Strength::Strong));
        }
    }
    if !neighbour.is_empty() {
        lines.push((neighbour.to_owned(), Strength::Plain));
    }
    if let Some(line) = places(dial, usize::from(area.width)) {
        let around = wrapped(&line, usize::from(area.width));
        lines.extend(around.into_iter().map(|line| (line, Strength::Plain)));
    }
    let noted = wrapped(note, usize::from(area.width));
    lines.extend(noted.into_iter().map(|line| (line, Strength::Plain)));
    for ((line, strength), row) in lines.iter().zip(area.rows()) {
        look.left(buffer, row, line, *strength);
    }
}

/// Where the slit must stand and where the eyepiece will be: which way from the pier, so that ladder,
/// stool and people are in the right place before the swing.
fn places(dial: &Dial, width: usize) -> Option<String> {
    let slit = dial.slit.map(|slit| {
        format!(
            "slit toward {:.0}° {}, {:.0}° up",
            slit.azimuth.degrees().round() % 360.0,
            compass(slit.azimuth),
            slit.altitude.degrees()
        )
    });
    let height = dial
        .eyepiece
        .map(|place| format!("eyepiece {:.1} m above the floor", place.height_m));
    let aside = dial.eyepiece.map(|place| {
        let way = Azimuth::new(Angle::from_radians(place.east_m.atan2(place.north_m)));
        let far = place.east_m.hypot(place.north_m);
        format!("{far:.1} m {} of the pier", compass(way))
    });
    let said: Vec<String> = slit.into_iter().chain(height).chain(aside).collect();
    let wordings = [
        said.join(", "),
        said.join(", ").replace(" above the floor", " up"),
    ];
    (!said.is_empty()).then(|| fitting(&wordings, width).to_owned())
}
