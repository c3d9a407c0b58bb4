//! The two lines at the top: where and with what, the date, and the three clocks.

use chrono::Datelike as _;
use ratatui::buffer::Buffer;
use ratatui::layout::Rect;

use crate::angle::Angle;
use crate::screen::light::Strength;
use crate::screen::look::{Look, columns, fitting};
use crate::time::{CivilZone, SiderealTime, Utc};

/// What the header says.
pub struct Header<'h> {
    /// The site's name.
    pub site: &'h str,
    /// The mount's name.
    pub mount: &'h str,
    /// The side of the pier, in words; empty for a mount with one.
    pub side: &'h str,
    /// Where civil time is taken from.
    pub zone: CivilZone,
    /// The instant.
    pub utc: Utc,
    /// Local sidereal time then.
    pub sidereal: SiderealTime,
    /// The clock's correction in force, in seconds, positive if the clock is slow.
    pub correction_s: f64,
}

/// The columns of the shortest date, `Tue 1 Dec`.
const SHORT_DATE: usize = 10;

/// Draws the header in two rows.
pub fn draw(look: Look, buffer: &mut Buffer, area: Rect, header: &Header<'_>) {
    let rows: Vec<Rect> = area.rows().collect();
    let [first, second, ..] = rows.as_slice() else {
        return;
    };
    let joined = |parts: &[&str]| {
        let parts = parts.iter().copied().filter(|part| !part.is_empty());
        parts.collect::<Vec<_>>().join(" · ")
    };
    // of the names one may have to go, the side of the pier never
    let names = [
        joined(&[header.site, header.mount, header.side]),
        joined(&[header.site, header.side]),
        joined(&[header.mount, header.side]),
        joined(&[header.side]),
    ];
    let width = usize::from(area.width);
    let named = fitting(&names, width.saturating_sub(SHORT_DATE + 2)).to_owned();
    let civil = header.zone.civil(header.utc);
    let day = civil.day();
    let dates = [
        format!("{} {day} {}", civil.format("%a"), civil.format("%B %Y")),
        format!("{} {day} {}", civil.format("%a"), civil.format("%b %Y")),
        format!("{} {day} {}", civil.format("%a"), civil.format("%b")),
    ];
    let room = width.saturating_sub(columns(&named) + 2);
    let left = look.right(buffer, *first, fitting(&dates, room), Strength::Plain);
    look.left(buffer, left, &named, Strength::Plain);

    let sidereal = format!("sidereal {}", clock(header.sidereal.angle()));
    look.left(buffer, *second, &sidereal, Strength::Strong);
    let middle = Rect {
        x: second.x + second.width * 2 / 5,
        width: second.width - second.width * 2 / 5,
        ..*second
    };
    let corrected = if header.correction_s.abs() > 0.0 {
        // said all night long, so that nobody corrects twice
        format!(" ({:+.1} s)", header.correction_s)
    } else {
        String::new()
    };
    let civil = format!("civil {}{corrected}", civil.format("%H %M %S"));
    let utc = format!("UTC {}", header.utc.chrono().format("%H %M %S"));
    let narrower = columns(&civil) + 1 + columns(&utc) > usize::from(middle.width);
    #[allow(clippy::cast_possible_truncation)] // within the row
    let early = (columns(&sidereal) + 2) as u16;
    let middle = if narrower && early < second.width {
        Rect {
            x: second.x + early,
            width: second.width - early,
            ..*second
        }
    } else {
        middle
    };
    look.left(buffer, middle, &civil, Strength::Plain);
    look.right(buffer, *second, &utc, Strength::Plain);
}

/// Hours, minutes and seconds of the second begun, as a clock shows them.
fn clock(time: Angle) -> String {
    #[allow(clippy::cast_possible_truncation, clippy::cast_sign_loss)] // 0 to 86,400
    let seconds = time.wrapped_positive().time_seconds().floor() as u32;
    format!(
        "{:02} {:02} {:02}",
        seconds / 3600,
        seconds / 60 % 60,
        seconds % 60
    )
}
