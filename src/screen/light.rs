//! The light of the screen: night, dim, day.
//!
//! Night is a black ground and one deep red in three strengths, nothing else; dim is the same, darker;
//! day is the terminal's own. No meaning hangs on a colour: what matters is also said in words, or is
//! larger, or stands in reverse.
//!
//! The reds have no green and no blue in them at all, so that rods see as little as possible of them
//! (that dark-adapted eyes are least disturbed by deep red is common practice at telescopes, no source).

use ratatui::style::{Color, Modifier, Style};

/// How bright the surroundings are.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq)]
pub enum Light {
    /// Dark: red on black.
    #[default]
    Night,
    /// Very dark: less of it.
    Dim,
    /// The terminal's ordinary colours.
    Day,
}

impl Light {
    /// All of them.
    pub const ALL: [Self; 3] = [Self::Night, Self::Dim, Self::Day];

    /// The next one round.
    #[must_use]
    pub const fn next(self) -> Self {
        match self {
            Self::Night => Self::Dim,
            Self::Dim => Self::Day,
            Self::Day => Self::Night,
        }
    }

    /// Its name.
    #[must_use]
    pub const fn word(self) -> &'static str {
        match self {
            Self::Night => "night",
            Self::Dim => "dim",
            Self::Day => "day",
        }
    }
}

/// What colours a terminal has.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Depth {
    /// None, or none wanted.
    Monochrome,
    /// The sixteen of old.
    Sixteen,
    /// The palette of 256.
    Indexed,
    /// Any.
    Full,
}

impl Depth {
    /// What the environment's `COLORTERM` and `TERM` say of the terminal.
    #[must_use]
    pub fn of_terminal(colorterm: Option<&str>, term: Option<&str>) -> Self {
        let term = term.unwrap_or_default();
        match colorterm {
            Some("truecolor" | "24bit") => Self::Full,
            _ if term.ends_with("-direct") => Self::Full,
            _ if term.contains("256color") => Self::Indexed,
            _ if term.is_empty() || term == "dumb" || term.starts_with("vt") => Self::Monochrome,
            _ if term.ends_with("-mono") || term.ends_with("-m") => Self::Monochrome,
            _ => Self::Sixteen,
        }
    }
}

/// How much something is to be seen.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Strength {
    /// The settings, what was typed, what is chosen.
    Strong,
    /// Ordinary text.
    Plain,
    /// Rules, labels, what can wait.
    Faint,
}

/// The light, on a terminal with its colours.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Palette {
    light: Light,
    depth: Depth,
}

impl Palette {
    /// A light on a terminal.
    #[must_use]
    pub const fn new(light: Light, depth: Depth) -> Self {
        Self { light, depth }
    }

    /// The style of a strength; its ground is always set, so that no cell keeps another's.
    #[must_use]
    pub fn style(self, strength: Strength) -> Style {
        let style = match self.colours(strength) {
            Some((ink, ground)) => Style::new().fg(ink).bg(ground),
            None => Style::new().fg(Color::Reset).bg(Color::Reset),
        };
        style.add_modifier(self.weight(strength))
    }

    /// The style of a caution, or of the line chosen: strong, and in reverse.
    #[must_use]
    pub fn reverse(self) -> Style {
        self.style(Strength::Strong)
            .add_modifier(Modifier::REVERSED)
    }

    fn colours(self, strength: Strength) -> Option<(Color, Color)> {
        use Strength::{Faint, Plain, Strong};
        // hue 0, no green, no blue; each about two thirds of the one before
        let level = match (self.light, strength) {
            (Light::Day, _) => return None,
            (Light::Night, Strong) => 0xd7,
            (Light::Night, Plain) => 0x9b,
            (Light::Night, Faint) => 0x66,
            (Light::Dim, Strong) => 0x87,
            (Light::Dim, Plain) => 0x5f,
            (Light::Dim, Faint) => 0x40,
        };
        // the pure reds of the 256: 0x5f, 0x87, 0xaf, 0xd7
        let index = match (self.light, strength) {
            (Light::Night, Strong) => 160,
            (Light::Night, Plain) => 124,
            (Light::Night, Faint) | (_, Strong) => 88,
            _ => 52,
        };
        match self.depth {
            Depth::Monochrome => None,
            Depth::Sixteen => Some((Color::Red, Color::Black)),
            Depth::Indexed => Some((Color::Indexed(index), Color::Indexed(16))),
            Depth::Full => Some((Color::Rgb(level, 0, 0), Color::Rgb(0, 0, 0))),
        }
    }

    /// Bold and faint, where colours cannot show a strength.
    const fn weight(self, strength: Strength) -> Modifier {
        let by_colour =
            !matches!(self.light, Light::Day) && matches!(self.depth, Depth::Indexed | Depth::Full);
        // bold makes many terminals brighter: not in the dim light of sixteen colours
        let bold_is_bright =
            matches!(self.light, Light::Dim) && matches!(self.depth, Depth::Sixteen);
        match strength {
            Strength::Strong if !bold_is_bright => Modifier::BOLD,
            Strength::Faint if !by_colour => Modifier::DIM,
            _ => Modifier::empty(),
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    const STRENGTHS: [Strength; 3] = [Strength::Strong, Strength::Plain, Strength::Faint];

    #[test]
    fn night_and_dim_hold_red_and_black_alone() {
        for light in [Light::Night, Light::Dim] {
            for strength in STRENGTHS {
                let style = Palette::new(light, Depth::Full).style(strength);
                assert!(matches!(style.fg, Some(Color::Rgb(red, 0, 0)) if red > 0));
                assert_eq!(style.bg, Some(Color::Rgb(0, 0, 0)));
                let style = Palette::new(light, Depth::Indexed).style(strength);
                // xterm's 6x6x6 cube: 16 + 36 red + 6 green + blue
                let Some(Color::Indexed(index)) = style.fg else {
                    panic!("{style:?}");
                };
                assert!(index > 16 && (index - 16) % 36 == 0, "{index}");
                let style = Palette::new(light, Depth::Sixteen).style(strength);
                assert_eq!((style.fg, style.bg), (Some(Color::Red), Some(Color::Black)));
            }
        }
    }

    #[test]
    fn the_three_strengths_differ_on_every_terminal_at_night() {
        for depth in [
            Depth::Monochrome,
            Depth::Sixteen,
            Depth::Indexed,
            Depth::Full,
        ] {
            for light in [Light::Night, Light::Day] {
                let [strong, plain, faint] =
                    STRENGTHS.map(|strength| Palette::new(light, depth).style(strength));
                assert!(strong != plain && plain != faint, "{depth:?} {light:?}");
            }
        }
    }

    #[test]
    fn without_colours_none_is_set() {
        for light in Light::ALL {
            let style = Palette::new(light, Depth::Monochrome).style(Strength::Strong);
            assert_eq!(
                (style.fg, style.bg),
                (Some(Color::Reset), Some(Color::Reset))
            );
        }
    }

    #[test]
    fn the_terminal_says_what_it_has() {
        let of = Depth::of_terminal;
        assert_eq!(of(Some("truecolor"), Some("xterm")), Depth::Full);
        assert_eq!(of(None, Some("tmux-256color")), Depth::Indexed);
        assert_eq!(of(None, Some("linux")), Depth::Sixteen);
        assert_eq!(of(None, Some("vt220")), Depth::Monochrome);
        assert_eq!(of(Some(""), None), Depth::Monochrome);
    }
}
