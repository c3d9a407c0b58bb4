//! Wait on the mark: the next engraved mark of an hour circle that stands still, and the moment the
//! undriven target crosses it.
//!
//! The circle is set exactly on that line, and the object drifts in. The moment is found with the
//! full model (place, refraction, the mount's errors) at the instant itself, not from a rounded rate.

use crate::angle::Angle;
use crate::time::{Utc, sidereal};

/// The next engraved mark.
#[derive(Clone, Debug, PartialEq)]
pub struct NextMark {
    /// The mark as numbered on the circle.
    pub text: String,
    /// When the target crosses it.
    pub utc: Utc,
    /// Seconds from the dialled instant to then.
    pub wait_s: f64,
}

/// The moment, in seconds from now, at which the shown hour axis angle has moved on by `ahead`.
///
/// `moved(t)` is how far it has moved after `t` seconds, near to the sidereal rate; `None` where it
/// cannot be had, or where no moment is found.
pub fn moment_of(ahead: Angle, moved: impl Fn(f64) -> Option<Angle>) -> Option<f64> {
    /// Newton's rule with the sidereal rate for a slope: each step leaves the rate's own error, a
    /// thousandth or less away from the mount's pole.
    const MOST_STEPS: usize = 12;
    const CLOSE_ENOUGH_S: f64 = 1e-3;
    let rate = sidereal::DEGREES_PER_SECOND;
    let mut t = ahead.degrees() / rate;
    for _ in 0..MOST_STEPS {
        let step = (ahead - moved(t)?).degrees() / rate;
        t += step;
        if step.abs() < CLOSE_ENOUGH_S {
            return Some(t);
        }
    }
    None
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn the_moment_is_exact_where_the_rate_is_not_quite_sidereal() {
        let moved = |t: f64| Some(Angle::from_degrees(t * sidereal::DEGREES_PER_SECOND * 1.01));
        let t = moment_of(Angle::from_degrees(1.0), moved).unwrap();
        assert!(
            (t - 1.0 / (sidereal::DEGREES_PER_SECOND * 1.01)).abs() < 1e-3,
            "{t}"
        );
    }

    #[test]
    fn a_target_that_does_not_move_never_crosses() {
        assert_eq!(
            moment_of(Angle::from_degrees(1.0), |_| Some(Angle::ZERO)),
            None
        );
    }
}
