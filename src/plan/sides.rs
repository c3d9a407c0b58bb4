//! Turning over the pier: when an object can be reached from each side, what ends it, and on which side to take each object
//! of a list so that the tube is turned over as seldom as can be.

use crate::angle::{Angle, HourAngle};
use crate::metal::{HourAngleSpan, Mount, Side};
use crate::sky::{HorizonMask, Moment, Observed, Source};
use crate::time::Utc;

/// What a site and its mount leave of the sky.
#[derive(Clone, Copy, Debug)]
pub struct Site<'s> {
    /// What hides the sky.
    pub horizon: &'s HorizonMask,
    /// The mount.
    pub mount: &'s Mount,
}

/// A time in which an object can be reached from one side of the pier.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Reach {
    /// The side.
    pub side: Side,
    /// From then on; the beginning of the time asked about if it could be reached before.
    pub from: Utc,
    /// Until then.
    pub until: Utc,
    /// What ends it.
    pub end: End,
}

/// What ends a reach.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum End {
    /// The time asked about.
    Asked,
    /// The side's limit in hour angle, or the meridian where none is stated.
    Side,
    /// The horizon mask, or the lowest altitude the mount may go to.
    Low,
}

/// The halves of the sky that a side usually takes, where the mount file states no limit: the tube west for objects east
/// of the meridian, and the reverse.
fn usual(side: Side) -> Option<HourAngleSpan> {
    let hours = |hours| HourAngle::new(Angle::from_hours(hours));
    match side {
        Side::TubeWest => Some((-12.0, 0.0)),
        Side::TubeEast => Some((0.0, 12.0)),
        Side::Single => None,
    }
    .map(|(from, to)| HourAngleSpan {
        from: hours(from),
        to: hours(to),
    })
}

impl Site<'_> {
    /// The sides there are.
    pub(super) fn sides(&self) -> &'static [Side] {
        if self.mount.kind.has_two_sides() {
            &[Side::TubeWest, Side::TubeEast]
        } else {
            &[Side::Single]
        }
    }

    /// The hour angles a side takes: its limits, else its usual half of the sky; a fork or yoke may have neither.
    pub(super) fn span(&self, side: Side) -> Option<HourAngleSpan> {
        self.mount.limits.span(side).or_else(|| usual(side))
    }

    /// How far above mask, limit and level horizon; negative below any of them.
    pub(super) fn above(&self, place: &Observed) -> Angle {
        let lowest = self.mount.limits.lowest_altitude.unwrap_or_default();
        let mask = self.horizon.altitude_at(place.azimuth);
        let floor = if lowest > mask { lowest } else { mask };
        place.altitude.angle() - floor.angle()
    }

    /// How far within the side's reach; negative outside.
    pub(super) fn within(&self, side: Side, hour_angle: HourAngle) -> Angle {
        let Some(span) = self.span(side) else {
            return Angle::TURN;
        };
        let half = span.width() / 2.0;
        let middle = span.from.angle() + half;
        half - (hour_angle.angle() - middle).wrapped_signed().abs()
    }
}

/// The times in which an object can be reached, within so many seconds from a moment on, in order.
#[must_use]
pub fn reaches(site: &Site<'_>, moment: &Moment, span_s: f64, source: &Source) -> Vec<Reach> {
    let place = |then: &Moment| then.observed(&then.apparent(source));
    let end = moment.utc().plus_seconds(span_s);
    let mut found = Vec::new();
    for &side in site.sides() {
        let margin = |place: &Observed| {
            let (above, within) = (site.above(place), site.within(side, place.hour_angle));
            if within < above { within } else { above }
        };
        let passages = moment.passages(span_s, |then| margin(&place(then)));
        let mut from = (margin(&place(moment)) >= Angle::ZERO).then(|| moment.utc());
        for passage in passages {
            if passage.rising {
                from = Some(passage.utc);
            } else if let Some(began) = from.take() {
                let then = place(&moment.later(passage.utc.seconds_since(moment.utc())));
                let within = site.within(side, then.hour_angle);
                found.push(Reach {
                    side,
                    from: began,
                    until: passage.utc,
                    end: if within < site.above(&then) {
                        End::Side
                    } else {
                        End::Low
                    },
                });
            }
        }
        found.extend(from.map(|from| Reach {
            side,
            from,
            until: end,
            end: End::Asked,
        }));
    }
    found.sort_by_key(|reach| reach.from.chrono());
    found
}

/// The side to take each object of a list on, in its order, so that the tube is turned over as seldom as can be: of each
/// object the sides it can be had from at its time, none where it cannot be had; `present` is the side the tube is on.
#[must_use]
pub fn fewest_turns(objects: &[Vec<Side>], present: Option<Side>) -> Vec<Option<Side>> {
    let mut taken = Vec::with_capacity(objects.len());
    let mut on = present;
    for (place, sides) in objects.iter().enumerate() {
        let stays = on.filter(|side| sides.contains(side));
        // to turn late never costs more than to turn early; where it must be turned, onto the side that lasts longer
        let side = stays.or_else(|| {
            sides.iter().copied().max_by_key(|side| {
                let rest = objects.iter().skip(place).filter(|sides| !sides.is_empty());
                rest.take_while(|sides| sides.contains(side)).count()
            })
        });
        taken.push(side);
        on = side.or(on);
    }
    taken
}

#[cfg(test)]
mod tests {
    use proptest::prelude::*;

    use super::*;
    use crate::angle::{Altitude, Latitude, Longitude};
    use crate::catalog::Catalogue;
    use crate::metal::{Kind, Limits};
    use crate::plan::samples::{mount, span};
    use crate::sky::{Air, Observer};
    use crate::time::Dut1;

    const NIGHT_S: f64 = 12.0 * 3600.0;

    fn evening(latitude: f64) -> Moment {
        let observer = Observer {
            latitude: Latitude::from_degrees(latitude),
            longitude: Longitude::default(),
            elevation_m: 0.0,
            dut1: Dut1::default(),
            air: Air::standard(0.0),
        };
        Moment::new(&observer, Utc::parse("2026-12-01T18:00:00Z").unwrap())
    }

    fn of(mount: &Mount, latitude: f64, name: &str) -> (Moment, Source, Vec<Reach>) {
        let source = Catalogue::builtin().resolve(name).unwrap().source;
        let moment = evening(latitude);
        let horizon = HorizonMask::default();
        let site = Site {
            horizon: &horizon,
            mount,
        };
        let found = reaches(&site, &moment, NIGHT_S, &source);
        (moment, source, found)
    }

    fn place_at(moment: &Moment, source: &Source, utc: Utc) -> Observed {
        let then = moment.later(utc.seconds_since(moment.utc()));
        then.observed(&then.apparent(source))
    }

    #[test]
    fn a_side_ends_where_its_limit_is_reached() {
        let limits = Limits {
            lowest_altitude: Some(Altitude::from_degrees(12.0)),
            tube_west: Some(span(-7.0, 0.5)),
            tube_east: Some(span(-0.5, 7.0)),
        };
        for (latitude, name) in [(54.5, "M 31"), (-31.4, "Achernar")] {
            let (moment, source, found) = of(&mount(Kind::German, limits), latitude, name);
            let west: Vec<&Reach> = found.iter().filter(|r| r.side == Side::TubeWest).collect();
            let east: Vec<&Reach> = found.iter().filter(|r| r.side == Side::TubeEast).collect();
            let over = place_at(&moment, &source, west[0].until);
            assert_eq!(west[0].end, End::Side);
            assert!(
                (over.hour_angle.angle().hours() - 0.5).abs() < 1e-5,
                "{over:?}"
            );
            let taken = place_at(&moment, &source, east[0].from);
            assert!(
                (taken.hour_angle.angle().hours() + 0.5).abs() < 1e-5,
                "{taken:?}"
            );
            // either side serves for an hour of hour angle
            let both = west[0].until.seconds_since(east[0].from);
            assert!((both - 3600.0 * 0.997_27).abs() < 2.0, "{both}");
        }
    }

    #[test]
    fn without_limits_the_meridian_parts_the_sides() {
        let (moment, source, found) = of(&mount(Kind::German, Limits::default()), 54.5, "Polaris");
        // circumpolar: one side hands over to the other at every meridian, and it is never lost
        let mut until = moment.utc();
        for reach in &found {
            assert!(reach.from.seconds_since(until).abs() < 0.1, "{found:?}");
            until = reach.until;
        }
        assert!(
            until
                .seconds_since(moment.utc().plus_seconds(NIGHT_S))
                .abs()
                < 0.1
        );
        let over = place_at(&moment, &source, found[0].until).hour_angle;
        let from_meridian = over
            .angle()
            .hours()
            .abs()
            .min(12.0 - over.angle().hours().abs());
        assert!(from_meridian < 1e-4, "{over:?}");
    }

    #[test]
    fn a_fork_has_one_side_and_ends_low() {
        let limits = Limits {
            lowest_altitude: Some(Altitude::from_degrees(15.0)),
            ..Limits::default()
        };
        let (moment, source, found) = of(&mount(Kind::Fork, limits), 54.5, "Altair");
        assert_eq!(found.len(), 1);
        assert_eq!((found[0].side, found[0].end), (Side::Single, End::Low));
        let low = place_at(&moment, &source, found[0].until).altitude;
        assert!((low.degrees() - 15.0).abs() < 1e-4, "{low:?}");
    }

    fn turns(taken: &[Option<Side>], present: Option<Side>) -> usize {
        let mut on = present;
        let mut turns = 0;
        for side in taken.iter().flatten() {
            turns += usize::from(on.is_some_and(|on| on != *side));
            on = Some(*side);
        }
        turns
    }

    proptest! {
        #[test]
        fn no_other_choice_of_sides_turns_the_tube_over_less_often(
            objects in prop::collection::vec(prop::sample::subsequence(vec![Side::TubeWest, Side::TubeEast], 0..=2), 0..10),
            present in prop::option::of(prop::sample::select(vec![Side::TubeWest, Side::TubeEast])),
        ) {
            let taken = fewest_turns(&objects, present);
            for (side, sides) in taken.iter().zip(&objects) {
                prop_assert_eq!(side.is_none(), sides.is_empty());
                prop_assert!(side.is_none_or(|side| sides.contains(&side)));
            }
            // every choice there is
            let mut least = usize::MAX;
            for choice in 0..1_u32 << objects.len() {
                let side = |bit: usize, sides: &Vec<Side>| match sides.as_slice() {
                    [] => None,
                    [only] => Some(*only),
                    several => several.get((choice >> bit) as usize & 1).copied(),
                };
                let all: Vec<Option<Side>> = objects.iter().enumerate().map(|(bit, sides)| side(bit, sides)).collect();
                least = least.min(turns(&all, present));
            }
            prop_assert_eq!(turns(&taken, present), least);
        }
    }
}
