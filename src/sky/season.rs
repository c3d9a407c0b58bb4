//! What of the sky changes little in a day and takes long to work out: precession, nutation and the
//! Earth's own place.

use crate::sky::earth::Earth;
use crate::sky::vector::Matrix;
use crate::time::Tt;

/// What changes little in a day and takes long to work out.
#[derive(Clone, Copy, Debug)]
pub struct Season {
    /// When it was worked out.
    pub tt: Tt,
    /// From the ICRS to the true equator and equinox of date.
    pub equator: Matrix,
    /// The Earth then.
    pub earth: Earth,
}

impl Season {
    /// At an instant.
    pub fn at(tt: Tt) -> Self {
        Self {
            tt,
            equator: sofars::pnp::pnm06a(tt.0, tt.1),
            earth: Earth::at(tt),
        }
    }

    /// Days from when it was worked out to an instant.
    pub fn age(&self, tt: Tt) -> f64 {
        tt.days_since(self.tt)
    }
}
