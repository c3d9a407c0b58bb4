//! The whole screen at one instant. Nothing here changes anything.

use ratatui::buffer::Buffer;
use ratatui::layout::Rect;

use crate::metal::Side;
use crate::screen::circle::Circles;
use crate::screen::header::{self, Header};
use crate::screen::keys::{self, Mode};
use crate::screen::layout::{self, LEAST_HEIGHT, LEAST_WIDTH};
use crate::screen::light::Strength;
use crate::screen::look::{Look, fitting, wrapped};
use crate::screen::reading::{Line, TypedReading};
use crate::screen::scene::SUN_WORD;
use crate::screen::shown::{From, Settings, Shown};
use crate::screen::target_line::{self, place_in_list};
use crate::screen::words::chance;
use crate::screen::{
    calibration, circle, doubt, entry, field, help, lists, objects, stopped, truth,
};

/// Draws the screen.
pub fn view(look: Look, buffer: &mut Buffer, from: &From<'_>, shown: &Shown) {
    let area = buffer.area;
    look.ground(buffer, area);
    if let Some(regions) = layout::regions(area) {
        draw_header(look, buffer, regions.header, from, shown);
        for rule in regions.upper_rule.into_iter().chain([regions.lower_rule]) {
            look.rule(buffer, rule);
        }
        draw_body(look, buffer, regions.body, from, shown);
        let said = from.panel.said.as_deref().unwrap_or_default();
        look.left(buffer, regions.said, said, Strength::Strong);
        let hints = keys::hints(from.panel.mode, usize::from(regions.hints.width));
        look.left(buffer, regions.hints, &hints, Strength::Plain);
    } else {
        let words = format!(
            "too small: {} x {} at least, this is {} x {}",
            LEAST_WIDTH, LEAST_HEIGHT, area.width, area.height
        );
        for (line, row) in wrapped(&words, usize::from(area.width))
            .iter()
            .zip(area.rows())
        {
            look.left(buffer, row, line, Strength::Strong);
        }
    }
    look.settle(buffer);
}

fn draw_header(look: Look, buffer: &mut Buffer, area: Rect, from: &From<'_>, shown: &Shown) {
    let state = from.night.state();
    let side = match &shown.settings {
        Settings::Dialled(dial) => Some(dial.side),
        _ => state.side.or(state.tube.as_ref().map(|tube| tube.side)),
    };
    let header = Header {
        site: &from.observatory.site,
        mount: &from.observatory.mount.name,
        side: side
            .filter(|side| *side != Side::Single)
            .map_or("", Side::in_words),
        zone: from.observatory.zone,
        utc: shown.moment.utc(),
        sidereal: shown.moment.apparent_sidereal(),
        correction_s: state.clock_correction_s,
    };
    header::draw(look, buffer, area, &header);
}

fn draw_body(look: Look, buffer: &mut Buffer, body: Rect, from: &From<'_>, shown: &Shown) {
    let panel = from.panel;
    match panel.mode {
        Mode::Stepping | Mode::Centring | Mode::Sweeping => {
            draw_settings(look, buffer, body, from, shown);
        }
        Mode::ChoosingStar => lists::draw_stars(look, buffer, body, panel, shown),
        Mode::Searching => lists::draw_matches(look, buffer, body, panel, &shown.matches),
        Mode::Reading => draw_reading(look, buffer, body, from, shown),
        Mode::Calibration => calibration::draw(look, buffer, body, from, shown),
        Mode::Objects => objects::draw(look, buffer, body, from, &shown.ahead),
        Mode::Field => draw_field(look, buffer, body, shown),
        Mode::Doubting => doubt::draw(look, buffer, body, from),

        Mode::Help => help::draw(look, buffer, body, panel.help_from, panel.help_page),
        Mode::Noting => {
            let about = shown.target.as_ref().map_or("the night", |t| &t.name);
            let words = format!("a note about {about}");
            draw_line(look, buffer, body, from, (&words, "note"));
        }
        Mode::Clock => {
            let words = "by how many seconds is the clock on this screen slow? \
                         listen to a time signal, and type as in 2.5; -2.5 if it is fast";
            draw_line(look, buffer, body, from, (words, "seconds slow"));
        }
        Mode::Ring => {
            let words = "a circle that slipped, was knocked or was set by hand has another zero. \
                         which one? type h for the hour circle, d for the declination circle";
            draw_line(look, buffer, body, from, (words, "circle"));
        }
        Mode::SunRisk => {
            let words = format!(
                "sunlight in a telescope or a finder blinds at once. only with a filter over the \
                 full aperture, the finder capped, and by the rules of the house. \
                 to answer for this object, type {SUN_WORD}"
            );
            draw_line(look, buffer, body, from, (&words, "answer"));
        }
    }
}

fn draw_field(look: Look, buffer: &mut Buffer, body: Rect, shown: &Shown) {
    match (&shown.field, &shown.target) {
        (Some(field), Some(target)) => field::draw(look, buffer, body, &target.name, field),
        _ => stopped::draw(look, buffer, body, &shown.settings),
    }
}

fn draw_settings(look: Look, buffer: &mut Buffer, body: Rect, from: &From<'_>, shown: &Shown) {
    let regions = layout::dialling(body);
    let state = from.night.state();
    let beside = match from.panel.mode {
        Mode::Centring => "a star to read".to_owned(),
        Mode::Sweeping => from.panel.sweep.place(),
        _ => place_in_list(state),
    };
    match &shown.target {
        Some(target) => target_line::draw(look, buffer, regions.target, target, &beside),
        None => {
            look.right(buffer, regions.target, &beside, Strength::Plain);
        }
    }
    let Settings::Dialled(dial) = &shown.settings else {
        stopped::draw(look, buffer, regions.both, &shown.settings);
        return;
    };
    let observatory = from.observatory;
    let sidereal = observatory.lead(&shown.moment).apparent_sidereal();
    let zone = observatory.zone;
    let circles = Circles {
        mount: &observatory.mount,
        dial,
        sidereal,
        zone,
        tube: state.tube.as_ref().map(|tube| tube.side),
        tube_at: state.tube.as_ref().map_or("", |tube| &tube.at),
    };
    circle::draw(look, buffer, &regions.hour, &regions.dec, &circles);
    look.rule(buffer, regions.rule);
    let calibrated = from.known.estimate.is_calibrated();
    truth::draw(
        look,
        buffer,
        regions.truth,
        dial,
        shown.outlook,
        zone,
        calibrated,
    );
    let mut cautions = regions.cautions;
    if !truth::has_chances(dial, calibrated) {
        cautions.y = cautions.y.saturating_sub(1);
        cautions.height += 1;
    }
    let lines = [
        from.panel.sweep.words(),
        rings(from, shown, usize::from(body.width)),
        pretended(shown, usize::from(body.width)),
    ];
    for words in lines.iter().flatten() {
        look.left(buffer, cautions, words, Strength::Plain);
        cautions.y += 1;
        cautions.height = cautions.height.saturating_sub(1);
    }
    let target = shown.target.as_ref();
    let note = target.map_or("", |target| {
        target_line::note_cut(regions.target, target, &beside)
    });
    let neighbour = neighbour(shown, usize::from(body.width));
    let after = [neighbour.as_deref().unwrap_or_default(), note];
    truth::draw_cautions(look, buffer, cautions, dial, after);
}

/// What to turn rings to that are set by hand, while a star is centred.
fn rings(from: &From<'_>, shown: &Shown, width: usize) -> Option<String> {
    if from.panel.mode != Mode::Centring {
        return None;
    }
    let rings = shown.rings.in_words()?;
    let wordings = [
        format!("or turn {rings}, and strike z with it in the middle"),
        format!("or turn {rings}: z"),
    ];
    Some(fitting(&wordings, width).to_owned())
}

/// Where to start from while the mount is barely known.
fn neighbour(shown: &Shown, width: usize) -> Option<String> {
    let neighbour = shown.neighbour.as_ref()?;
    let star = &neighbour.placed.star.name;
    let chances: Vec<String> = neighbour
        .chances
        .iter()
        .map(|each| format!("{} {}", each.optic, chance(each.probability)))
        .collect();
    let way = format!("from {star}: {}", neighbour.words);
    let wordings = [
        format!("{way}: {}", chances.join(", ")),
        format!("{way}: {}", chances.last().map_or("", String::as_str)),
        way,
    ];
    Some(fitting(&wordings, width).to_owned())
}

fn pretended(shown: &Shown, width: usize) -> Option<String> {
    let (hour, dec) = shown.pretended.as_ref()?;
    let wordings = [
        format!("demonstration: with it centred, the circles show {hour} and {dec}"),
        format!("demonstration: circles show {hour} and {dec}"),
    ];
    Some(fitting(&wordings, width).to_owned())
}

/// A line to type, under words that say what is wanted.
fn draw_line(
    look: Look,
    buffer: &mut Buffer,
    body: Rect,
    from: &From<'_>,
    (words, label): (&str, &str),
) {
    let mut rows = body.rows();
    for line in wrapped(words, usize::from(body.width)) {
        if let Some(row) = rows.next() {
            look.left(buffer, row, &line, Strength::Plain);
        }
    }
    rows.next();
    if let Some(row) = rows.next() {
        entry::draw(look, buffer, row, label, from.panel.typed.line(), true);
    }
}

fn draw_reading(look: Look, buffer: &mut Buffer, body: Rect, from: &From<'_>, shown: &Shown) {
    let panel = from.panel;
    let mut rows = body.rows();
    let mut put = |text: &str, strength| {
        if let Some(row) = rows.next() {
            look.left(buffer, row, text, strength);
        }
    };
    if let Some(star) = &panel.star {
        let at = star.at.map(|at| {
            from.observatory
                .zone
                .civil(at)
                .format("%H:%M:%S")
                .to_string()
        });
        let words = format!(
            "{}, centred at {}: what do the circles show?",
            star.star.name,
            at.unwrap_or_default()
        );
        put(&words, Strength::Strong);
    }
    put("type it as it is engraved", Strength::Plain);
    if let Some(words) = pretended(shown, usize::from(body.width)) {
        put(&words, Strength::Plain);
    }
    let width = usize::from(body.width);
    let typed = &panel.typed;
    let nothing = TypedReading {
        hour: Line::Empty,
        dec: Line::Empty,
        whole: None,
    };
    let understood = shown.reading.as_ref().unwrap_or(&nothing);
    for (label, input, line, active) in [
        (
            "hour circle       ",
            &typed.first,
            &understood.hour,
            !typed.at_second,
        ),
        (
            "declination circle",
            &typed.second,
            &understood.dec,
            typed.at_second,
        ),
    ] {
        rows.next();
        if let Some(row) = rows.next() {
            entry::draw(look, buffer, row, label, input, active);
        }
        let words = match line {
            Line::Empty => String::new(),
            Line::Understood(words) => format!("understood: {words}"),
            Line::Fault(words) => format!("not understood: {words}"),
        };
        for line in wrapped(&words, width).iter().take(2) {
            if let Some(row) = rows.next() {
                look.left(buffer, row, line, Strength::Plain);
            }
        }
    }
}
