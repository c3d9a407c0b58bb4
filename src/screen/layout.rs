//! Where everything stands.
//!
//! ```text
//!  +------------------------------------------------------------------+
//!  | site · mount · side                                         date |  header
//!  | sidereal              civil                                  UTC |
//!  |------------------------------------------------------------------|  (from 24 rows up)
//!  | target: name, kind, constellation, magnitude, size       4 of 18 |
//!  | hour circle                     | declination circle             |
//!  |   what to set, in               |   what to set, in              |  figures: what room is
//!  |   figures several rows tall     |   figures several rows tall    |  left, 3 rows at least
//!  | where it lies among the marks   |                                |
//!  |            picture of the circle under its index                 |  2 rows, 3 from 24 up
//!  | the next mark, and when         |                                |
//!  | which way to swing              |                                |
//!  |------------------------------------------------------------------|
//!  | altitude, where it is going                          how well    |  truth
//!  | chances at the first look                            known       |
//!  | ! cautions                                                       |
//!  | what was said last                                               |
//!  |------------------------------------------------------------------|
//!  | keys                                                             |
//!  +------------------------------------------------------------------+
//! ```
//!
//! While something is typed or chosen, its pane stands between header and what was said last.

use ratatui::layout::Rect;

/// The least columns the screen is useful with.
pub const LEAST_WIDTH: u16 = 60;
/// The least rows the screen is useful with.
pub const LEAST_HEIGHT: u16 = 20;
/// From so many rows up there is room to spare.
const ROOMY: u16 = 24;

/// The regions of the whole screen.
#[derive(Clone, Copy, Debug)]
pub struct Regions {
    /// Two rows.
    pub header: Rect,
    /// A rule under the header, where there is room.
    pub upper_rule: Option<Rect>,
    /// What the mode is about.
    pub body: Rect,
    /// What was said last.
    pub said: Rect,
    /// A rule above the keys.
    pub lower_rule: Rect,
    /// The keys.
    pub hints: Rect,
}

/// The regions of the body while settings are shown.
#[derive(Clone, Copy, Debug)]
pub struct Dialling {
    /// The target, one row.
    pub target: Rect,
    /// The hour circle.
    pub hour: Circle,
    /// The declination circle.
    pub dec: Circle,
    /// Both circles, where something stands in their place.
    pub both: Rect,
    /// A rule.
    pub rule: Rect,
    /// The truth: two rows.
    pub truth: Rect,
    /// The cautions, and what else there is to say.
    pub cautions: Rect,
}

/// The regions of one circle.
#[derive(Clone, Copy, Debug)]
pub struct Circle {
    /// What it is called, one row.
    pub label: Rect,
    /// The figures.
    pub figures: Rect,
    /// Where the reading lies, one row.
    pub lies: Rect,
    /// The picture, two or three rows.
    pub picture: Rect,
    /// The next mark, one row.
    pub mark: Rect,
    /// The swing, one row.
    pub swing: Rect,
}

/// Takes rows off the top of an area.
fn take(area: &mut Rect, rows: u16) -> Rect {
    let rows = rows.min(area.height);
    let taken = Rect {
        height: rows,
        ..*area
    };
    area.y += rows;
    area.height -= rows;
    taken
}

/// Takes rows off the bottom of an area.
fn take_below(area: &mut Rect, rows: u16) -> Rect {
    let rows = rows.min(area.height);
    area.height -= rows;
    Rect {
        y: area.bottom(),
        height: rows,
        ..*area
    }
}

/// Some rows of an area, from so many below its top.
#[must_use]
pub fn rows_of(area: Rect, from: u16, rows: u16) -> Rect {
    let mut rest = area;
    take(&mut rest, from);
    take(&mut rest, rows)
}

/// The regions of a screen, with a column of margin on either side; none if it is too small.
#[must_use]
pub fn regions(screen: Rect) -> Option<Regions> {
    if screen.width < LEAST_WIDTH || screen.height < LEAST_HEIGHT {
        return None;
    }
    let mut area = screen;
    if screen.width > LEAST_WIDTH {
        area.x += 1;
        area.width -= 2;
    }
    let header = take(&mut area, 2);
    let upper_rule = (screen.height >= ROOMY).then(|| take(&mut area, 1));
    let hints = take_below(&mut area, 1);
    let lower_rule = take_below(&mut area, 1);
    let said = take_below(&mut area, 1);
    Some(Regions {
        header,
        upper_rule,
        body: area,
        said,
        lower_rule,
        hints,
    })
}

/// The most rows figures take.
const FIGURES_AT_MOST: u16 = 9;

/// The regions of the body while settings are shown; `wanted` are the columns each circle's figures
/// would like, the hour circle's first.
#[must_use]
pub fn dialling(body: Rect) -> Dialling {
    let mut area = body;
    let picture_rows = if body.height >= ROOMY - 6 { 3 } else { 2 };
    let target = take(&mut area, 1);
    let fixed_below = 1 + 2 + 2;
    let fixed_beside = 1 + 1 + picture_rows + 1 + 1;
    let figures_rows = area
        .height
        .saturating_sub(fixed_below + fixed_beside)
        .clamp(1, FIGURES_AT_MOST);
    let both = take(&mut area, fixed_beside + figures_rows);
    let half = (both.width - 2) / 2;
    let circle = |x: u16, width: u16| {
        let mut column = Rect { x, width, ..both };
        Circle {
            label: take(&mut column, 1),
            figures: take(&mut column, figures_rows),
            lies: take(&mut column, 1),
            picture: take(&mut column, picture_rows),
            mark: take(&mut column, 1),
            swing: take(&mut column, 1),
        }
    };
    let right = both.width - half - 2;
    Dialling {
        target,
        hour: circle(both.x, half),
        dec: circle(both.x + half + 2, right),
        both,
        rule: take(&mut area, 1),
        truth: take(&mut area, 2),
        cautions: area,
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn figures_have_three_rows_at_least_and_more_where_there_is_room() {
        for (width, height, rows) in [(60, 20, 3), (80, 24, 5), (80, 22, 5), (120, 40, 9)] {
            let regions = regions(Rect::new(0, 0, width, height)).unwrap();
            let dialling = dialling(regions.body);
            assert_eq!(dialling.hour.figures.height, rows, "{width}x{height}");
            assert!(dialling.hour.swing.height == 1 && dialling.cautions.height >= 2);
            assert!(dialling.hour.figures.width >= 29);
        }
        assert!(regions(Rect::new(0, 0, 59, 20)).is_none());
        assert!(regions(Rect::new(0, 0, 60, 19)).is_none());
    }

    #[test]
    fn no_region_covers_another() {
        for (width, height) in [(60, 20), (61, 23), (80, 24), (200, 60)] {
            let screen = Rect::new(0, 0, width, height);
            let all = regions(screen).unwrap();
            let inside = dialling(all.body);
            let mut rects = vec![all.header, all.said, all.lower_rule, all.hints];
            rects.extend(all.upper_rule);
            rects.extend([inside.target, inside.rule, inside.truth, inside.cautions]);
            for circle in [inside.hour, inside.dec] {
                rects.extend([circle.label, circle.figures, circle.lies, circle.picture]);
                rects.extend([circle.mark, circle.swing]);
            }
            for (place, one) in rects.iter().enumerate() {
                assert_eq!(one.intersection(screen), *one);
                for other in &rects[place + 1..] {
                    assert!(!one.intersects(*other), "{one:?} {other:?}");
                }
            }
        }
    }
}
