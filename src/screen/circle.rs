//! One circle: what to set on it, large; where that lies among the marks; how it will look; the next
//! mark; which way to swing.

use ratatui::buffer::Buffer;
use ratatui::layout::Rect;
use ratatui::widgets::Widget as _;

use crate::angle::Angle;
use crate::dial::Dial;
use crate::metal::{Graduation, Mount, Ring, Side};
use crate::screen::figures::{Drawn, Figures};
use crate::screen::layout::Circle;
use crate::screen::light::Strength;
use crate::screen::look::{Look, fitting};
use crate::screen::picture::{self, Strip};
use crate::screen::words;
use crate::time::{CivilZone, SiderealTime};

/// What a circle's pane says.
struct Pane<'p> {
    label: &'static str,
    figures: &'p Figures,
    lies: Vec<String>,
    mark: Vec<String>,
    swing: Vec<String>,
}

/// What the two circles are drawn from.
pub struct Circles<'c> {
    /// The mount.
    pub mount: &'c Mount,
    /// The settings.
    pub dial: &'c Dial,
    /// Sidereal time for which they hold.
    pub sidereal: SiderealTime,
    /// Where civil time is taken from.
    pub zone: CivilZone,
    /// The side the tube is known to be on.
    pub tube: Option<Side>,
    /// What it was last known to look at.
    pub tube_at: &'c str,
}

/// Draws both circles.
pub fn draw(look: Look, buffer: &mut Buffer, hour: &Circle, dec: &Circle, circles: &Circles<'_>) {
    let width = |circle: &Circle| usize::from(circle.figures.width);
    let dial = circles.dial;
    let texts = [
        (dial.hour.text.as_str(), width(hour)),
        (dial.dec.text.as_str(), width(dec)),
    ];
    let height = usize::from(hour.figures.height);
    let [hour_figures, dec_figures] = Figures::together(texts, height, look.glyphs);
    draw_hour(look, buffer, hour, &hour_figures, circles);
    draw_dec(look, buffer, dec, &dec_figures, circles);
}

fn draw_hour(
    look: Look,
    buffer: &mut Buffer,
    at: &Circle,
    figures: &Figures,
    circles: &Circles<'_>,
) {
    let &Circles {
        mount,
        dial,
        sidereal,
        zone,
        tube,
        ..
    } = circles;
    let circle = &mount.hour_circle;
    let scale = circle.scale();
    let mark = match &dial.hour.next_mark {
        Some(mark) => {
            let wait = words::span(mark.wait_s);
            let clock = zone.civil(mark.utc).format("%H:%M:%S").to_string();
            vec![
                format!("wait on the mark {} in {wait}, at {clock}", mark.text),
                format!("mark {} in {wait}, at {clock}", mark.text),
                format!("{} in {wait}, at {clock}", mark.text),
            ]
        }
        None if circle.ring == Ring::Driven => vec!["the ring rides with the drive".to_owned()],
        None => Vec::new(),
    };
    let swing = dial.swing.map_or_else(Vec::new, |swing| {
        let way = if swing.hour.radians() < 0.0 {
            "east"
        } else {
            "west"
        };
        let far = words::turn(swing.hour, scale.unit());
        if tube.is_some_and(|side| side != dial.side) {
            vec![
                format!("turn the tube over: {far} {way}"),
                format!("turn over: {far} {way}"),
            ]
        } else {
            vec![swing_words(swing.hour, &far, way)]
        }
    });
    let pane = Pane {
        label: "hour circle",
        figures,
        lies: lies(&scale.graduation(dial.hour.reading)),
        mark,
        swing,
    };
    draw_words(look, buffer, at, &pane);
    let columns = columns(at.picture, scale.numbered_step() / scale.division());
    let divisions = picture::divisions(at.picture.width, columns);
    let marks = circle.strip(dial.axes.hour, sidereal, dial.side, divisions);
    let strip = Strip {
        marks: &marks,
        columns,
    };
    picture::draw(look, buffer, at.picture, &strip);
}

fn draw_dec(
    look: Look,
    buffer: &mut Buffer,
    at: &Circle,
    figures: &Figures,
    circles: &Circles<'_>,
) {
    let &Circles {
        mount, dial, tube, ..
    } = circles;
    let circle = &mount.declination_circle;
    let scale = circle.scale();
    let swing = dial.swing.map_or_else(Vec::new, |swing| {
        // with the tube east, a growing axis angle comes down from the pole
        let northward = if tube == Some(Side::TubeEast) {
            -swing.dec
        } else {
            swing.dec
        };
        let way = if northward.radians() < 0.0 {
            "south"
        } else {
            "north"
        };
        let far = words::rough(swing.dec);
        if tube.is_some_and(|side| side != dial.side) {
            vec![format!("{far} {way}, over the pole")]
        } else {
            vec![swing_words(swing.dec, &far, way)]
        }
    });
    let pane = Pane {
        label: "declination circle",
        figures,
        lies: lies(&scale.graduation(dial.dec.reading)),
        mark: match dial.swing {
            Some(_) => vec![format!("from {}:", circles.tube_at)],
            None => Vec::new(),
        },
        swing,
    };
    draw_words(look, buffer, at, &pane);
    let columns = columns(at.picture, scale.numbered_step() / scale.division());
    let divisions = picture::divisions(at.picture.width, columns);
    let marks = circle.strip(dial.axes.dec, divisions);
    let strip = Strip {
        marks: &marks,
        columns,
    };
    picture::draw(look, buffer, at.picture, &strip);
}

/// Less than this is no swing: the hand holds it.
const NO_SWING: Angle = Angle::from_arcminutes(5.0);

fn swing_words(swing: Angle, far: &str, way: &str) -> String {
    if swing.abs() < NO_SWING {
        "no swing".to_owned()
    } else {
        format!("swing {far} {way}")
    }
}

fn columns(picture: Rect, divisions_numbered: f64) -> u16 {
    picture::columns(picture.width, divisions_numbered)
}

/// Where a reading lies, in longer and shorter words.
fn lies(graduation: &Graduation) -> Vec<String> {
    let words = graduation.by_eye();
    let short = match &graduation.vernier {
        Some(_) => words.replace("vernier line", "line"),
        None => words
            .replace(" of a division", "")
            .replace("half a division", "half"),
    };
    vec![words, short]
}

fn draw_words(look: Look, buffer: &mut Buffer, at: &Circle, pane: &Pane<'_>) {
    look.left(buffer, at.label, pane.label, Strength::Faint);
    let width = usize::from(at.figures.width);
    let style = look.style(Strength::Strong);
    Drawn {
        figures: pane.figures,
        style,
    }
    .render(at.figures, buffer);
    let mut line = |row: Rect, wordings: &[String], strength| {
        look.left(buffer, row, fitting(wordings, width), strength);
    };
    line(at.lies, &pane.lies, Strength::Plain);
    line(at.mark, &pane.mark, Strength::Plain);
    line(at.swing, &pane.swing, Strength::Strong);
}
