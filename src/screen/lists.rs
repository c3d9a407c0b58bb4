//! The lists to choose from: stars well placed, and objects that match what is typed.

use ratatui::buffer::Buffer;
use ratatui::layout::Rect;

use crate::catalog::Target;
use crate::screen::entry;
use crate::screen::light::Strength;
use crate::screen::look::Look;
use crate::screen::panel::Panel;
use crate::screen::stars::Placed;
use crate::screen::target_line::description;
use crate::screen::words::compass;

/// Draws the stars to choose from.
pub fn draw_stars(look: Look, buffer: &mut Buffer, area: Rect, panel: &Panel, stars: &[Placed]) {
    let lines: Vec<String> = stars
        .iter()
        .map(|placed| {
            let place = &placed.observed;
            format!(
                "{:<14} {:<3} mag {:>4.1}  {:>2.0}° up  {:>3.0}° {:<2}  {}",
                shortened(&placed.star.name, 14),
                placed.star.constellation.map_or("", |c| c.abbreviation),
                placed.star.magnitude.unwrap_or_default(),
                place.altitude.degrees(),
                place.azimuth.degrees(),
                compass(place.azimuth),
                placed.side.in_words(),
            )
        })
        .collect();
    let heading = "stars well placed now, the brightest first";
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
