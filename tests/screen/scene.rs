//! A scene: the screen on a night at a fixed instant, keys typed, and the picture that comes of it.
//!
//! The site and the mount are invented for these tests.

use std::path::PathBuf;
use std::time::{Duration, Instant};

use crossterm::event::KeyCode;
use nonius::angle::{Altitude, Angle, Azimuth, Latitude, Longitude};
use nonius::catalog::Catalogue;
use nonius::estimate::Prior;
use nonius::metal::{
    DeclinationCircle, DeclinationNumbering, ExpectedErrors, HourCircle, HourNumbering, Increases,
    Kind, Limits, Mount, MountErrors, Optic, Ring, View,
};
use nonius::night::{Begun, JournalFault, ListedTarget, Opening, Session, SessionFault};
use nonius::screen::desk::Desk;
use nonius::screen::figures::Glyphs;
use nonius::screen::happening::{Happening, Stroke};
use nonius::screen::light::{Depth, Light, Palette};
use nonius::screen::look::Look;
use nonius::screen::observatory::Observatory;
use nonius::sexagesimal::Unit;
use nonius::sky::{Air, HorizonMask, Observer};
use nonius::time::{Dut1, Utc};
use ratatui::buffer::Buffer;
use ratatui::layout::Rect;
use tempfile::TempDir;

/// A December evening with the Sun well down.
pub const EVENING: &str = "2026-12-01T21:30:05Z";
/// Far longer than it takes to start a process.
const LOCKED_AT_MOST: Duration = Duration::from_secs(10);
/// The same day at noon.
pub const NOON: &str = "2026-12-01T12:10:00Z";

/// A big German mount of a field station that does not exist.
pub fn mount() -> Mount {
    Mount {
        name: "Six-inch refractor".to_owned(),
        kind: Kind::German,
        clock_drive: true,
        hour_circle: HourCircle {
            ring: Ring::Fixed,
            unit: Unit::Hours,
            numbering: HourNumbering::Full,
            increases: Increases::West,
            division: Angle::from_time_seconds(240.0),
            vernier: Some(Angle::from_time_seconds(20.0)),
            second_fiducial: false,
            reading_error: None,
        },
        declination_circle: DeclinationCircle {
            numbering: DeclinationNumbering::Quarters,
            division: Angle::from_degrees(1.0),
            vernier: Some(Angle::from_arcminutes(5.0)),
            slips: false,
            reading_error: None,
        },
        limits: Limits::default(),
        expected: ExpectedErrors::default(),
        dome: None,
        tube: None,
        optics: vec![
            Optic {
                name: "finder".to_owned(),
                field: Angle::from_degrees(6.0),
                view: View::Inverted,
                turned: None,
            },
            Optic {
                name: "40 mm".to_owned(),
                field: Angle::from_degrees(1.0),
                view: View::Mirrored,
                turned: None,
            },
        ],
    }
}

/// The errors of the mount that is pretended to stand there.
pub fn errors() -> MountErrors {
    MountErrors {
        hour_index: Angle::from_arcminutes(83.0),
        dec_index: Angle::from_arcminutes(-47.0),
        polar_high: Angle::from_arcminutes(18.0),
        polar_east: Angle::from_arcminutes(-22.0),
        cone: Angle::from_arcminutes(9.0),
        skew: Angle::from_arcminutes(-5.0),
        sag: Angle::from_arcminutes(2.0),
        ..MountErrors::default()
    }
}

/// The observatory of the scenes.
pub fn observatory() -> Observatory {
    let mount = mount();
    let mask = [(0.0, 8.0), (90.0, 12.0), (180.0, 5.0), (270.0, 10.0)];
    Observatory {
        site: "Tarn Hollow Field Station".to_owned(),
        zone: "Europe/London".parse().unwrap(),
        observer: Observer {
            latitude: Latitude::from_degrees(54.52),
            longitude: Longitude::from_degrees(-2.21),
            elevation_m: 352.0,
            dut1: Dut1::default(),
            air: Air::standard(352.0),
        },
        horizon: HorizonMask::new(
            mask.map(|(azimuth, altitude)| {
                (
                    Azimuth::from_degrees(azimuth),
                    Altitude::from_degrees(altitude),
                )
            })
            .to_vec(),
        ),
        prior: Prior::from_expected(&mount.expected),
        mount,
        catalogue: Catalogue::builtin(),
        earlier_sights: Vec::new(),
        earlier_read_at: None,
        lead_s: 0.0,
        sun_risk_accepted: false,
        earlier_night: None,
        demonstration: Some(errors()),
    }
}

/// The screen on a night of its own.
#[derive(Debug)]
pub struct Scene {
    pub observatory: Observatory,
    pub utc: Utc,
    pub light: Light,
    pub glyphs: Glyphs,
    size: (u16, u16),
    folder: TempDir,
    list: Vec<&'static str>,
}

/// What was drawn at the end of a scene.
pub struct Picture {
    pub buffer: Buffer,
    pub left: bool,
}

impl Scene {
    pub fn at(utc: &str, width: u16, height: u16) -> Self {
        Self {
            observatory: observatory(),
            utc: Utc::parse(utc).unwrap(),
            light: Light::Night,
            glyphs: Glyphs::Full,
            size: (width, height),
            folder: tempfile::tempdir().unwrap(),
            list: vec!["M 37", "M 31", "M 13", "M 42"],
        }
    }

    pub fn with_list(mut self, list: &[&'static str]) -> Self {
        self.list = list.to_vec();
        self
    }

    fn opening(&self) -> Opening {
        let targets = self.list.iter().map(|name| {
            let target = self.observatory.catalogue.resolve(name);
            target.map_or_else(
                |_| ListedTarget::unknown(name, ""),
                |target| ListedTarget::from(&target),
            )
        });
        Opening {
            program: "test".to_owned(),
            site: "tarn-hollow".to_owned(),
            site_name: self.observatory.site.clone(),
            latitude_deg: self.observatory.observer.latitude.degrees(),
            longitude_deg: self.observatory.observer.longitude.degrees(),
            elevation_m: self.observatory.observer.elevation_m,
            time_zone: self.observatory.zone.name().to_owned(),
            mount: "six-inch".to_owned(),
            list: Some("scene".to_owned()),
            side: None,
            clock_correction_s: 0.0,
            targets: targets.collect(),
        }
    }

    /// The journal's file.
    pub fn journal(&self) -> PathBuf {
        self.folder.path().join("night.jsonl")
    }

    /// Opens the night (goes on with it if it was opened before) and its record.
    pub fn session(&self) -> (Session, Begun) {
        let path = self.journal();
        let started = Instant::now();
        loop {
            match Session::begin(&path, self.utc, self.opening()) {
                Ok(session) => return session,
                // a process being started by another test holds every file for a moment, and with
                // it the lock of a night just closed
                Err(SessionFault::Journal(JournalFault::Locked { .. }))
                    if started.elapsed() < LOCKED_AT_MOST =>
                {
                    std::thread::yield_now();
                }
                Err(fault) => panic!("{fault}"),
            }
        }
    }

    /// Types keys, a second apart, and gives the picture: `s vega <enter>`; a blank stands for none.
    pub fn play(&self, script: &str) -> Picture {
        let strokes: Vec<(KeyCode, Duration)> = keys(script)
            .into_iter()
            .zip(1..)
            .map(|(key, second)| (key, Duration::from_secs(second)))
            .collect();
        self.play_strokes(&strokes)
    }

    /// Types keys at their times since the screen was opened.
    pub fn play_strokes(&self, strokes: &[(KeyCode, Duration)]) -> Picture {
        let (mut session, begun) = self.session();
        let mut desk = Desk::open(
            &self.observatory,
            &mut session,
            &begun,
            self.light,
            self.utc,
        );
        let mut left = false;
        for &(key, at) in strokes {
            assert!(!left, "the screen was left before the last key");
            left = desk.take_in(&Happening::Key(Stroke { key, at }), self.utc);
        }
        let look = Look {
            palette: Palette::new(desk.light(), Depth::Full),
            glyphs: self.glyphs,
        };
        let mut buffer = Buffer::empty(Rect::new(0, 0, self.size.0, self.size.1));
        desk.draw(look, &mut buffer);
        Picture { buffer, left }
    }
}

/// The keys of a script: words are typed letter by letter, `<enter>` and its like are keys.
fn keys(script: &str) -> Vec<KeyCode> {
    let mut keys = Vec::new();
    for word in script.split_whitespace() {
        match word {
            "<enter>" => keys.push(KeyCode::Enter),
            "<esc>" => keys.push(KeyCode::Esc),
            "<space>" => keys.push(KeyCode::Char(' ')),
            "<up>" => keys.push(KeyCode::Up),
            "<down>" => keys.push(KeyCode::Down),
            "<tab>" => keys.push(KeyCode::Tab),
            "<left>" => keys.push(KeyCode::Left),
            "<right>" => keys.push(KeyCode::Right),
            letters => keys.extend(letters.chars().map(KeyCode::Char)),
        }
    }
    keys
}

impl Picture {
    /// The rows as text, without the blanks at their ends.
    pub fn text(&self) -> String {
        let width = usize::from(self.buffer.area.width);
        self.buffer
            .content
            .chunks(width)
            .map(|row| {
                let row: String = row.iter().map(ratatui::buffer::Cell::symbol).collect();
                row.trim_end().to_owned()
            })
            .collect::<Vec<_>>()
            .join("\n")
    }

    pub fn says(&self, words: &str) -> bool {
        self.text().contains(words)
    }
}
