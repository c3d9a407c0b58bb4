//! The lists to choose from: stars well placed, and objects that match what is typed.

use ratatui::buffer::Buffer;
use ratatui::layout::Rect;

use crate::catalog::Target;
use crate::screen::entry;
use crate::screen::light::Strength;
use crate::screen::look::Look;
use crate::screen::panel::Panel;
use crate::screen::shown::Shown;
use crate::screen::target_line::description;
use crate::screen::words::compass;

/// Draws the stars to choose from.
pub fn draw_stars(look: Look, buffer: &mut Buffer, area: Rect, panel: &Panel, shown: &Shown) {
    let gain = |star: &str| {
        let insight = shown.insight.as_ref();
        insight.and_then(|insight| insight.gain(star))
    };
    let lines: Vec<String> = shown
        .stars
        .iter()
        .map(|placed| {
            let place = &placed.observed;
            let gain = gain(&placed.star.name);
            format!(
                "{:<14} {:<3} {:>4.1} {:>2.0}° up {:>3.0}° {:<2} {} {}",
                shortened(&placed.star.name, 14),
                placed.star.constellation.map_or("", |c| c.abbreviation),
                placed.star.magnitude.unwrap_or_default(),
                place.altitude.degrees(),
                place.azimuth.degrees().round() % 360.0,
                compass(place.azimuth),
                placed.side.in_words(),
                gain.map_or_else(String::new, |gain| format!("{:>+3.0}", 100.0 * gain)),
            )
        })
        .collect();
    let heading = "stars well placed now; first those that help most, in points";
    draw(look, buffer, area, panel, (heading, "star"), &lines);
}

/// Draws the objects that match.
pub fn draw_matches(look: Look, buffer: &mut Buffer, area: Rect, panel: &Panel, found: &[Target]) {
    let lines: Vec<String> = found
        .iter()
        .map(|target| {
            let also = target.also.first().map_or("", String::as_str);
            format!(
                "{:<14} {:<18} {}",
                target.name,
                shortened(also, 18),
                description(target)
            )
        })
        .collect();
    let heading = "an object to add: a name, or coordinates as 05:52:18.3 +32:33:11 @J2000";
    draw(look, buffer, area, panel, (heading, "name"), &lines);
}

fn shortened(text: &str, width: usize) -> String {
    text.chars().take(width).collect()
}

fn draw(
    look: Look,
    buffer: &mut Buffer,
    area: Rect,
    panel: &Panel,
    (heading, label): (&str, &str),
    lines: &[String],
) {
    let mut rows = area.rows();
    let (Some(first), Some(second)) = (rows.next(), rows.next()) else {
        return;
    };
    look.left(buffer, first, heading, Strength::Plain);
    entry::draw(look, buffer, second, label, panel.typed.line(), true);
    rows.next();
    let rows: Vec<Rect> = rows.collect();
    // keep the line chosen in sight
    let from = (panel.chosen + 1).saturating_sub(rows.len());
    for ((place, line), row) in lines.iter().enumerate().skip(from).zip(rows) {
        let (mark, strength) = if place == panel.chosen {
            (">", Strength::Strong)
        } else {
            (" ", Strength::Plain)
        };
        look.left(buffer, row, &format!("{mark} {line}"), strength);
    }
}
