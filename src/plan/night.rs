//! The night: from noon to noon of the site's civil date, what the Sun and the Moon do in it, and when it is how dark.
//!
//! A moment that does not come in the night is nothing: in a polar summer there is no dusk, in a polar winter no
//! rise. Rising, setting and twilight are the almanacs' (`sky/rise_set.rs`).

use crate::sky::{Body, Moment, Observer, Passage, Source, Turning, Twilight};
use crate::time::{self, CivilZone, Utc};

/// A time with its two ends.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Span {
    /// Its beginning.
    pub from: Utc,
    /// Its end.
    pub until: Utc,
}

/// What the Sun does in a night, in the order it does it.
#[derive(Clone, Copy, Debug, Default, PartialEq)]
pub struct SunTimes {
    /// Its upper limb goes below the horizon.
    pub set: Option<Utc>,
    /// It is 6° down.
    pub civil_dusk: Option<Utc>,
    /// It is 12° down.
    pub nautical_dusk: Option<Utc>,
    /// It is 18° down.
    pub astronomical_dusk: Option<Utc>,
    /// It comes up to 18° below the horizon.
    pub astronomical_dawn: Option<Utc>,
    /// To 12° below.
    pub nautical_dawn: Option<Utc>,
    /// To 6° below.
    pub civil_dawn: Option<Utc>,
    /// Its upper limb comes up.
    pub rise: Option<Utc>,
}

/// What the Moon does in a night.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct MoonTimes {
    /// Its upper limb first comes up.
    pub rise: Option<Utc>,
    /// Its upper limb first goes down.
    pub set: Option<Utc>,
    /// The share of its disc the Sun lights in the middle between the two noons, 0 to 1.
    pub illuminated: f64,
}

/// A night at a site.
#[derive(Clone, Debug)]
pub struct Almanac {
    /// The night, named by the civil date of its evening.
    pub night: time::Night,
    /// From noon to noon.
    pub whole: Span,
    /// What of it is asked for.
    pub asked: Span,
    /// The Sun.
    pub sun: SunTimes,
    /// The Moon.
    pub moon: MoonTimes,
    turning: Turning,
    /// By twilight, civil first: when it is darker than that.
    dark: [Vec<Span>; 3],
}

impl Span {
    /// How long it is, in seconds; negative if its ends are the wrong way round.
    #[must_use]
    pub fn seconds(&self) -> f64 {
        self.until.seconds_since(self.from)
    }

    /// What it has in common with another, if that is more than an instant.
    #[must_use]
    pub fn common(&self, other: &Self) -> Option<Self> {
        let common = Self {
            from: self.from.max(other.from),
            until: self.until.min(other.until),
        };
        (common.from < common.until).then_some(common)
    }

    /// True from its beginning to its end.
    #[must_use]
    pub fn holds(&self, utc: Utc) -> bool {
        (self.from..=self.until).contains(&utc)
    }
}

/// Where a twilight's times are kept.
const fn place(twilight: Twilight) -> usize {
    match twilight {
        Twilight::Civil => 0,
        Twilight::Nautical => 1,
        Twilight::Astronomical => 2,
    }
}

/// The first that falls, and the first that rises after it (the first of all, if none falls).
fn fall_and_rise(passages: &[Passage]) -> (Option<Utc>, Option<Utc>) {
    let fall = passages.iter().position(|passage| !passage.rising);
    let after = passages.get(fall.unwrap_or(0)..).unwrap_or_default();
    let utc = |passage: &Passage| passage.utc;
    (
        fall.and_then(|fall| passages.get(fall)).map(utc),
        after.iter().find(|passage| passage.rising).map(utc),
    )
}

/// The times in which what passes is below.
fn times_below(whole: Span, below_at_first: bool, passages: &[Passage]) -> Vec<Span> {
    let mut spans = Vec::new();
    let mut from = below_at_first.then_some(whole.from);
    for passage in passages {
        if !passage.rising {
            from = Some(passage.utc);
        } else if let Some(from) = from.take() {
            let until = passage.utc;
            spans.push(Span { from, until });
        }
    }
    let until = whole.until;
    spans.extend(from.map(|from| Span { from, until }));
    spans
}

impl Almanac {
    /// The night that begins on a civil date, whole; nothing where the years of UTC end.
    #[must_use]
    pub fn of(observer: &Observer, zone: CivilZone, night: time::Night) -> Option<Self> {
        let next = time::Night::of_evening(night.evening().succ_opt()?);
        let whole = Span {
            from: zone.noon(night)?,
            until: zone.noon(next)?,
        };
        let (noon, span_s) = (Moment::new(observer, whole.from), whole.seconds());
        let sun = Source::Body(Body::Sun);
        let at_noon = noon.airless_altitude(&noon.apparent(&sun)).angle();
        let all = [Twilight::Civil, Twilight::Nautical, Twilight::Astronomical];
        let [civil, nautical, astronomical] = all.map(|twilight| {
            let passages = noon.twilights(twilight, span_s);
            let dark = times_below(whole, at_noon < twilight.altitude(), &passages);
            (fall_and_rise(&passages), dark)
        });
        let (set, rise) = fall_and_rise(&noon.rises_and_sets(&sun, span_s));
        let of_moon = noon.rises_and_sets(&Source::Body(Body::Moon), span_s);
        let first = |rising| {
            let found = of_moon.iter().find(|passage| passage.rising == rising);
            found.map(|passage| passage.utc)
        };
        Some(Self {
            night,
            whole,
            asked: whole,
            sun: SunTimes {
                set,
                civil_dusk: civil.0.0,
                nautical_dusk: nautical.0.0,
                astronomical_dusk: astronomical.0.0,
                astronomical_dawn: astronomical.0.1,
                nautical_dawn: nautical.0.1,
                civil_dawn: civil.0.1,
                rise,
            },
            moon: MoonTimes {
                rise: first(true),
                set: first(false),
                illuminated: noon.later(span_s / 2.0).illuminated(Body::Moon),
            },
            turning: Turning::new(&noon, span_s),
            dark: [civil.1, nautical.1, astronomical.1],
        })
    }

    /// The same night with only a part of it asked for; nothing if that part is empty.
    #[must_use]
    pub fn narrowed(self, from: Option<Utc>, until: Option<Utc>) -> Option<Self> {
        let part = Span {
            from: from.unwrap_or(self.whole.from),
            until: until.unwrap_or(self.whole.until),
        };
        let asked = self.whole.common(&part)?;
        Some(Self { asked, ..self })
    }

    /// The sky at the first noon.
    #[must_use]
    pub const fn noon(&self) -> &Moment {
        self.turning.start()
    }

    /// The sky turning over the site, from the first noon to the next.
    #[must_use]
    pub const fn turning(&self) -> &Turning {
        &self.turning
    }

    /// When the night is darker than a twilight, asked for or not.
    #[must_use]
    pub fn dark(&self, twilight: Twilight) -> &[Span] {
        self.dark.get(place(twilight)).map_or(&[], Vec::as_slice)
    }

    /// When the night is darker than a twilight in the part asked for.
    pub fn dark_as_asked(&self, twilight: Twilight) -> impl Iterator<Item = Span> {
        let spans = self.dark(twilight).iter();
        spans.filter_map(|span| span.common(&self.asked))
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::angle::{Latitude, Longitude};
    use crate::sky::Air;
    use crate::time::Dut1;

    fn almanac(latitude: f64, longitude: f64, zone: &str, night: &str) -> Almanac {
        let observer = Observer {
            latitude: Latitude::from_degrees(latitude),
            longitude: Longitude::from_degrees(longitude),
            elevation_m: 0.0,
            dut1: Dut1::default(),
            air: Air::standard(0.0),
        };
        Almanac::of(&observer, zone.parse().unwrap(), night.parse().unwrap()).unwrap()
    }

    #[test]
    fn the_moments_of_a_common_night_come_in_their_order_in_both_hemispheres() {
        for (latitude, longitude, zone) in [
            (54.5, -2.2, "Europe/London"),
            (-31.4, 21.1, "Africa/Johannesburg"),
        ] {
            let night = almanac(latitude, longitude, zone, "2026-12-01");
            let sun = night.sun;
            let moments = [
                sun.set,
                sun.civil_dusk,
                sun.nautical_dusk,
                sun.astronomical_dusk,
                sun.astronomical_dawn,
                sun.nautical_dawn,
                sun.civil_dawn,
                sun.rise,
            ]
            .map(Option::unwrap);
            assert!(moments.is_sorted(), "{sun:?}");
            assert!(night.whole.holds(moments[0]) && night.whole.holds(moments[7]));
            let dark = night.dark(Twilight::Astronomical);
            assert_eq!(dark.len(), 1);
            assert_eq!((dark[0].from, dark[0].until), (moments[3], moments[4]));
        }
    }

    #[test]
    fn a_polar_summer_has_no_dusk_and_a_polar_winter_no_sunset() {
        let summer = almanac(69.6, 19.0, "Europe/Oslo", "2026-06-21");
        assert_eq!(summer.sun, SunTimes::default());
        assert!(summer.dark(Twilight::Civil).is_empty());
        let winter = almanac(78.2, 15.6, "Europe/Oslo", "2026-12-21");
        assert_eq!((winter.sun.set, winter.sun.rise), (None, None));
        assert_eq!(winter.dark(Twilight::Civil), [winter.whole]);
        // 78.2° + 23.4° - 90° = 11.7°: no darker than nautical twilight about noon
        assert!(winter.sun.astronomical_dusk.is_some());
    }

    #[test]
    fn in_a_white_night_the_deeper_twilights_do_not_come() {
        let night = almanac(55.5, -2.2, "Europe/London", "2026-06-21");
        assert!(night.sun.civil_dusk.is_some() && night.sun.civil_dawn.is_some());
        assert_eq!(night.sun.nautical_dusk, None);
        assert!(night.dark(Twilight::Nautical).is_empty());
    }

    #[test]
    fn the_part_asked_for_is_cut_from_the_night() {
        let night = almanac(54.5, -2.2, "Europe/London", "2026-12-01");
        let at = |text: &str| Some(Utc::parse(text).unwrap());
        let part = night
            .clone()
            .narrowed(at("2026-12-01T20:00:00Z"), at("2026-12-03T00:00:00Z"))
            .unwrap();
        assert_eq!(Some(part.asked.from), at("2026-12-01T20:00:00Z"));
        assert_eq!(part.asked.until, part.whole.until);
        let dark: Vec<Span> = part.dark_as_asked(Twilight::Civil).collect();
        assert_eq!(Some(dark[0].from), at("2026-12-01T20:00:00Z"));
        assert!(night.narrowed(at("2026-12-03T00:00:00Z"), None).is_none());
    }
}
