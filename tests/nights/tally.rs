//! Counts of looks: how many found the object, and whether what was said of them came true.

use nonius::estimate::{Prediction, chance};

use crate::sky::{FIELD, Hand};

/// Looks, and how many found the object.
#[derive(Clone, Copy, Debug, Default)]
pub struct Rate {
    pub looks: u32,
    pub found: u32,
}

impl Rate {
    pub fn count(&mut self, found: bool) {
        self.looks += 1;
        self.found += u32::from(found);
    }

    /// In per cent.
    pub fn percent(self) -> f64 {
        100.0 * f64::from(self.found) / f64::from(self.looks.max(1))
    }
}

/// Stated chances against what came of them, by tenths.
#[derive(Clone, Debug, Default)]
pub struct Stated {
    tenths: [(f64, Rate); 10],
}

impl Stated {
    pub fn count(&mut self, predicted: &Prediction, hand: Hand, found: bool) {
        let stated = chance(&predicted.sky_with_setting(hand.hour, hand.dec), FIELD);
        let tenth = ((stated * 10.0) as usize).min(9);
        self.tenths[tenth].0 += stated;
        self.tenths[tenth].1.count(found);
    }

    /// For each tenth with a look in it: the mean of what was stated and what came true, in per cent, and the looks.
    pub fn tenths(&self) -> impl Iterator<Item = (f64, f64, u32)> + '_ {
        let with_looks = self.tenths.iter().filter(|(_, rate)| rate.looks > 0);
        with_looks.map(|(sum, rate)| {
            let mean = 100.0 * sum / f64::from(rate.looks);
            (mean, rate.percent(), rate.looks)
        })
    }
}

/// The middle of some numbers.
pub fn median(numbers: &mut [f64]) -> f64 {
    numbers.sort_by(f64::total_cmp);
    numbers.get(numbers.len() / 2).copied().unwrap_or(f64::NAN)
}
