//! When something that rises and falls with the sky goes through a level: rising, setting, twilight, limits.
//!
//! A height in radians is looked at every [`LOOK_S`] from an instant on. Where it turns between two looks without having
//! gone through, the turning point is sought, so that an object that only just shows itself is not missed; each
//! crossing is then closed in on to a millisecond.

/// A height of the sky, as a function of seconds, turns but a few times a day: it is looked at as often as this.
const LOOK_S: f64 = 900.0;

/// A crossing is closed in on to this.
const FINE_S: f64 = 0.001;

/// The turning point of a height is sought to this: there it changes by less than 0.01" from it.
const TURN_S: f64 = 1.0;

/// More rounds than closing in ever takes.
const MOST_ROUNDS: usize = 60;

/// A height that goes through nothing.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Crossing {
    /// Seconds from the beginning.
    pub after_s: f64,
    /// It grows.
    pub upward: bool,
}

/// All the crossings of a height within so many seconds, in order. The height is a function of seconds from the
/// beginning, continuous, in any unit.
pub fn crossings(span_s: f64, height: impl Fn(f64) -> f64) -> Vec<Crossing> {
    let times = look_times(span_s).into_iter();
    let looks: Vec<(f64, f64)> = times.map(|at| (at, height(at))).collect();
    crossings_between(&looks, height)
}

/// When a height is looked at within so many seconds; never in no time.
#[must_use]
pub fn look_times(span_s: f64) -> Vec<f64> {
    if !(span_s > 0.0 && span_s.is_finite()) {
        return Vec::new();
    }
    let looks = (span_s / LOOK_S).ceil();
    #[allow(clippy::cast_possible_truncation, clippy::cast_sign_loss)] // a span of days
    let times = (0..=looks as u32).map(|look| f64::from(look) / looks * span_s);
    times.collect()
}

/// All the crossings of a height that has been looked at already, at each of [`look_times`].
pub fn crossings_between(looks: &[(f64, f64)], height: impl Fn(f64) -> f64) -> Vec<Crossing> {
    let mut found = Vec::new();
    for (place, pair) in looks.windows(2).enumerate() {
        let &[from, to] = pair else { continue };
        if (from.1 >= 0.0) != (to.1 >= 0.0) {
            found.push(between(from, to, &height));
            continue;
        }
        // a turn hides between these two if the height turns back toward nothing before or after them
        let before = place.checked_sub(1).and_then(|before| looks.get(before));
        let after = looks.get(place + 2);
        let Some(turn) = turn(before.copied(), from, to, after.copied(), &height) else {
            continue;
        };
        if (turn.1 >= 0.0) != (from.1 >= 0.0) {
            found.push(between(from, turn, &height));
            found.push(between(turn, to, &height));
        }
    }
    found
}

/// The point between two looks where a height on one side of nothing comes nearest to it, if it may turn there.
fn turn(
    before: Option<(f64, f64)>,
    from: (f64, f64),
    to: (f64, f64),
    after: Option<(f64, f64)>,
    height: &impl Fn(f64) -> f64,
) -> Option<(f64, f64)> {
    // toward nothing is down from above, and up from below
    let sign = if from.1 >= 0.0 { 1.0 } else { -1.0 };
    let comes = before.is_none_or(|before| sign * before.1 >= sign * from.1);
    let goes = after.is_none_or(|after| sign * after.1 >= sign * to.1);
    if !(comes && goes) {
        return None;
    }
    let (mut low, mut high) = (from.0, to.0);
    // the golden section
    let part = (5.0_f64.sqrt() - 1.0) / 2.0;
    let of = |at: f64| sign * height(at);
    let (mut a, mut b) = (high - part * (high - low), low + part * (high - low));
    let (mut at_a, mut at_b) = (of(a), of(b));
    for _ in 0..MOST_ROUNDS {
        if high - low < TURN_S || at_a.min(at_b) < 0.0 {
            break;
        }
        if at_a < at_b {
            (high, b, at_b) = (b, a, at_a);
            a = high - part * (high - low);
            at_a = of(a);
        } else {
            (low, a, at_a) = (a, b, at_b);
            b = low + part * (high - low);
            at_b = of(b);
        }
    }
    Some(if at_a < at_b {
        (a, sign * at_a)
    } else {
        (b, sign * at_b)
    })
}

/// The crossing between two looks on either side of it, by the rule of false position in the form that halves the
/// weight of an end that stays (Illinois).
fn between(from: (f64, f64), to: (f64, f64), height: &impl Fn(f64) -> f64) -> Crossing {
    let upward = to.1 >= 0.0;
    let ((mut a, mut at_a), (mut b, mut at_b)) = (from, to);
    for _ in 0..MOST_ROUNDS {
        if (b - a).abs() < FINE_S {
            break;
        }
        let straight = b - at_b * (b - a) / (at_b - at_a);
        let next = if straight.is_finite() && straight > a.min(b) && straight < a.max(b) {
            straight
        } else {
            f64::midpoint(a, b)
        };
        let there = height(next);
        if (there >= 0.0) == (at_b >= 0.0) {
            // `a` stays
            at_a /= 2.0;
        } else {
            (a, at_a) = (b, at_b);
        }
        let step = (next - b).abs();
        (b, at_b) = (next, there);
        if step < FINE_S / 10.0 {
            break;
        }
    }
    Crossing { after_s: b, upward }
}

#[cfg(test)]
mod tests {
    use super::*;

    const DAY_S: f64 = 86_400.0;

    fn height(level: f64) -> impl Fn(f64) -> f64 {
        // highest at a quarter of a day
        move |at| (at / DAY_S * std::f64::consts::TAU).sin() - level
    }

    #[test]
    fn both_crossings_of_a_day_are_found() {
        let found = crossings(DAY_S, height(0.5));
        let expected = [(30.0, true), (150.0, false)];
        assert_eq!(found.len(), 2);
        for (found, (degrees, upward)) in found.iter().zip(expected) {
            assert!((found.after_s - degrees / 360.0 * DAY_S).abs() < 2.0 * FINE_S);
            assert_eq!(found.upward, upward);
        }
    }

    #[test]
    fn what_shows_itself_for_a_minute_between_two_looks_is_found() {
        // above the level for a minute about a moment that is no look
        for shift in [0.0, 123.0, 449.0] {
            let middle = 43_200.0 + shift;
            let found = crossings(DAY_S, |at| 30.0 * 30.0 - (at - middle) * (at - middle));
            assert_eq!(found.len(), 2, "{shift}");
            assert!(
                (found[0].after_s - (middle - 30.0)).abs() < 2.0 * FINE_S,
                "{found:?}"
            );
            assert!(
                (found[1].after_s - (middle + 30.0)).abs() < 2.0 * FINE_S,
                "{found:?}"
            );
        }
        assert!(crossings(DAY_S, |at| -1.0 - (at - 40_000.0) * (at - 40_000.0)).is_empty());
    }

    #[test]
    fn nothing_crosses_in_no_time() {
        assert!(crossings(0.0, height(0.5)).is_empty());
        assert!(crossings(f64::NAN, height(0.5)).is_empty());
        assert!(crossings(DAY_S, height(2.0)).is_empty());
    }
}
