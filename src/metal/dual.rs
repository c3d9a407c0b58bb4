//! Numbers that carry their derivatives, for the exact slopes of the mount's geometry.
//!
//! A [`Dual`] is a value with its partial derivatives by [`INPUTS`] independent quantities; arithmetic carries
//! both along by the rules of calculus (forward automatic differentiation), so the derivatives are as exact as
//! the value, without any step to choose. [`Scalar`] lets one writing of the geometry serve plain numbers too.

use std::array;
use std::ops::{Add, Div, Mul, Neg, Sub};

/// How many independent quantities a [`Dual`] is differentiated by.
pub const INPUTS: usize = 7;

/// Below this the series of sin x / x to the fourth power of x is exact in double precision: x^6 / 5040 < 1e-16.
const SINC_SERIES_BELOW_RAD: f64 = 0.005;

/// What the geometry asks of a number.
pub trait Scalar:
    Copy
    + From<f64>
    + Add<Output = Self>
    + Sub<Output = Self>
    + Mul<Output = Self>
    + Div<Output = Self>
    + Neg<Output = Self>
{
    /// The number without its derivatives.
    fn value(self) -> f64;
    /// The number put through a function of one variable, given the function's value and slope there.
    fn through(self, value: f64, slope: f64) -> Self;
    /// The angle of the point (x, self), in radians.
    fn angle_from(self, x: Self) -> Self;

    /// Sine and cosine.
    fn sine_cosine(self) -> (Self, Self) {
        let (sin, cos) = self.value().sin_cos();
        (self.through(sin, cos), self.through(cos, -sin))
    }

    /// Inverse sine, in radians; the slope is infinite at -1 and 1.
    fn inverse_sine(self) -> Self {
        let v = self.value();
        self.through(v.asin(), 1.0 / ((1.0 - v) * (1.0 + v)).sqrt())
    }

    /// Square root of a sum of squares; its slope is taken as nothing at nothing.
    fn root(self) -> Self {
        let root = self.value().sqrt();
        let slope = if root > 0.0 { 0.5 / root } else { 0.0 };
        self.through(root, slope)
    }

    /// sin x / x.
    fn sinc(self) -> Self {
        let x = self.value();
        if x.abs() < SINC_SERIES_BELOW_RAD {
            let squared = x * x;
            self.through(
                1.0 - squared / 6.0 * (1.0 - squared / 20.0),
                -x / 3.0 * (1.0 - squared / 10.0),
            )
        } else {
            let (sin, cos) = x.sin_cos();
            self.through(sin / x, (cos - sin / x) / x)
        }
    }
}

impl Scalar for f64 {
    fn value(self) -> f64 {
        self
    }

    fn through(self, value: f64, _slope: f64) -> Self {
        value
    }

    fn angle_from(self, x: Self) -> Self {
        self.atan2(x)
    }
}

/// A value and its partial derivatives.
#[derive(Clone, Copy, Debug, PartialEq)]
pub struct Dual {
    value: f64,
    slopes: [f64; INPUTS],
}

impl Dual {
    /// A value with its derivatives.
    pub const fn new(value: f64, slopes: [f64; INPUTS]) -> Self {
        Self { value, slopes }
    }

    /// The independent quantity of that number, counted from 0; a number beyond the last gives a constant.
    pub fn independent(value: f64, number: usize) -> Self {
        Self::new(
            value,
            array::from_fn(|input| f64::from(u8::from(input == number))),
        )
    }

    /// The derivatives.
    pub const fn slopes(self) -> [f64; INPUTS] {
        self.slopes
    }

    /// `value`, of slope `a` by this and slope `b` by the other.
    fn joined(self, a: f64, other: Self, b: f64, value: f64) -> Self {
        let mut slopes = self.slopes;
        for (mine, theirs) in slopes.iter_mut().zip(other.slopes) {
            *mine = a * *mine + b * theirs;
        }
        Self { value, slopes }
    }
}

impl From<f64> for Dual {
    fn from(value: f64) -> Self {
        Self::new(value, [0.0; INPUTS])
    }
}

impl Add for Dual {
    type Output = Self;
    fn add(self, other: Self) -> Self {
        self.joined(1.0, other, 1.0, self.value + other.value)
    }
}

impl Sub for Dual {
    type Output = Self;
    fn sub(self, other: Self) -> Self {
        self.joined(1.0, other, -1.0, self.value - other.value)
    }
}

impl Mul for Dual {
    type Output = Self;
    fn mul(self, other: Self) -> Self {
        self.joined(other.value, other, self.value, self.value * other.value)
    }
}

impl Div for Dual {
    type Output = Self;
    fn div(self, other: Self) -> Self {
        let value = self.value / other.value;
        self.joined(1.0 / other.value, other, -value / other.value, value)
    }
}

impl Neg for Dual {
    type Output = Self;
    fn neg(self) -> Self {
        self.through(-self.value, -1.0)
    }
}

impl Scalar for Dual {
    fn value(self) -> f64 {
        self.value
    }

    fn through(self, value: f64, slope: f64) -> Self {
        Self::new(value, self.slopes.map(|mine| slope * mine))
    }

    fn angle_from(self, x: Self) -> Self {
        let squared = self.value * self.value + x.value * x.value;
        self.joined(
            x.value / squared,
            x,
            -self.value / squared,
            self.value.atan2(x.value),
        )
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    /// Rounding of a few operations on numbers near one.
    const ROUNDING: f64 = 1e-14;

    fn slope_of(function: impl Fn(Dual) -> Dual, at: f64) -> f64 {
        function(Dual::independent(at, 0)).slopes()[0]
    }

    #[test]
    fn slopes_are_those_of_calculus() {
        let x = 0.37_f64;
        let cases: [(f64, f64); 7] = [
            (
                slope_of(|d| d * d / (d + 1.0.into()), x),
                (x * x + 2.0 * x) / (x + 1.0).powi(2),
            ),
            (slope_of(|d| -d.sine_cosine().0, x), -x.cos()),
            (slope_of(|d| d.sine_cosine().1, x), -x.sin()),
            (slope_of(Dual::inverse_sine, x), 1.0 / (1.0 - x * x).sqrt()),
            (slope_of(Dual::root, x), 0.5 / x.sqrt()),
            (
                slope_of(|d| d.angle_from(2.0.into()), x),
                2.0 / (4.0 + x * x),
            ),
            (
                slope_of(|d| Dual::from(2.0).angle_from(d), x),
                -2.0 / (4.0 + x * x),
            ),
        ];
        for (found, expected) in cases {
            assert!((found - expected).abs() < ROUNDING, "{found} {expected}");
        }
    }

    #[test]
    fn the_series_of_sinc_joins_the_quotient() {
        for at in [
            SINC_SERIES_BELOW_RAD * 0.999_999,
            SINC_SERIES_BELOW_RAD * 1.000_001,
        ] {
            let x = Dual::independent(at, 0).sinc();
            // the quotient's slope loses what cancels between cos x and sin x / x
            let lost = 1e-16 / at;
            assert!((x.value() - at.sin() / at).abs() < ROUNDING);
            assert!((x.slopes()[0] + at / 3.0 * (1.0 - at * at / 10.0)).abs() < 10.0 * lost);
        }
        assert!((Dual::independent(0.0, 0).sinc().value() - 1.0).abs() < f64::EPSILON);
    }
}
