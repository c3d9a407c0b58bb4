//! A generator of random numbers of its own, so that a seed gives the same nights for ever.
//!
//! `SplitMix64` (G. Steele, D. Lea, C. Flood, *OOPSLA* 2014, p. 453; written from memory), normal numbers by the Box-Muller
//! transform.

use std::f64::consts::TAU;

/// A stream of random numbers.
#[derive(Clone, Debug)]
pub struct Chance(u64);

impl Chance {
    /// The stream of a seed.
    pub const fn seeded(seed: u64) -> Self {
        Self(seed)
    }

    const fn next(&mut self) -> u64 {
        self.0 = self.0.wrapping_add(0x9e37_79b9_7f4a_7c15);
        let mut mixed = self.0;
        mixed = (mixed ^ (mixed >> 30)).wrapping_mul(0xbf58_476d_1ce4_e5b9);
        mixed = (mixed ^ (mixed >> 27)).wrapping_mul(0x94d0_49bb_1331_11eb);
        mixed ^ (mixed >> 31)
    }

    /// Uniform from 0 to below 1.
    pub fn uniform(&mut self) -> f64 {
        (self.next() >> 11) as f64 / (1_u64 << 53) as f64
    }

    /// Uniform between two numbers.
    pub fn between(&mut self, from: f64, to: f64) -> f64 {
        from + (to - from) * self.uniform()
    }

    /// Normal, of that sigma about nothing.
    pub fn normal(&mut self, sigma: f64) -> f64 {
        // never the logarithm of nothing
        let radius = (-2.0 * (1.0 - self.uniform()).ln()).sqrt();
        sigma * radius * (TAU * self.uniform()).cos()
    }

    /// One of so many.
    pub fn one_of(&mut self, count: usize) -> usize {
        (self.uniform() * count as f64) as usize
    }
}
