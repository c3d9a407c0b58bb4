//! Numbers by chance that are the same on every run (G. L. Steele, D. Lea, C. H. Flood, "Fast splittable pseudorandom
//! number generators", 2014; the constants are from memory).

/// A source of chance.
pub struct Chance(u64);

impl Chance {
    pub fn new(seed: u64) -> Self {
        Self(seed)
    }

    fn next(&mut self) -> u64 {
        self.0 = self.0.wrapping_add(0x9e37_79b9_7f4a_7c15);
        let mut z = self.0;
        z = (z ^ (z >> 30)).wrapping_mul(0xbf58_476d_1ce4_e5b9);
        z = (z ^ (z >> 27)).wrapping_mul(0x94d0_49bb_1331_11eb);
        z ^ (z >> 31)
    }

    /// Evenly in [0, 1).
    pub fn unit(&mut self) -> f64 {
        (self.next() >> 11) as f64 / (1_u64 << 53) as f64
    }

    /// Evenly between two numbers.
    pub fn between(&mut self, least: f64, most: f64) -> f64 {
        least + (most - least) * self.unit()
    }

    /// Normal of spread one (G. E. P. Box, M. E. Muller, 1958).
    pub fn normal(&mut self) -> f64 {
        let radius = (-2.0 * (1.0 - self.unit()).ln()).sqrt();
        radius * (std::f64::consts::TAU * self.unit()).cos()
    }

    /// True so often.
    pub fn happens(&mut self, share: f64) -> bool {
        self.unit() < share
    }

    /// One of them.
    pub fn pick<T: Copy>(&mut self, from: &[T]) -> T {
        from[self.below(from.len())]
    }

    /// A whole number below that.
    pub fn below(&mut self, count: usize) -> usize {
        // the remainder favours the first by one in 2^50 for the small counts asked for
        usize::try_from(self.next() >> 12).unwrap_or(0) % count
    }
}
