//! A sweep under way: which step, where it lies, and what it and those before cover.

use crate::angle::Angle;
use crate::dial::Aside;
use crate::estimate::SweepStep;
use crate::screen::words::chance;

/// A sweep under way.
#[derive(Clone, Debug, Default, PartialEq)]
pub struct Sweeping {
    pub(super) steps: Vec<SweepStep>,
    pub(super) at: usize,
    /// The field of the eyepiece swept with.
    pub(super) field: Angle,
}

impl Sweeping {
    fn step(&self) -> Option<&SweepStep> {
        self.steps.get(self.at)
    }

    /// Where to look; at the object itself where there is no sweep.
    #[must_use]
    pub fn aside(&self) -> Aside {
        self.step().map_or_else(Aside::default, Aside::from)
    }

    /// Which step it is, and the chance that it will have been seen by then.
    #[must_use]
    pub fn place(&self) -> String {
        let covered = self.step().map_or(0.0, |step| step.covered);
        format!(
            "step {} of {}, {} by then",
            self.at + 1,
            self.steps.len(),
            chance(covered)
        )
    }

    /// Where the step lies from the one before, and from the first look, in fields; nothing where there is no sweep.
    #[must_use]
    pub fn words(&self) -> Option<String> {
        let to = Aside::from(self.step()?);
        let before = self.at.checked_sub(1).and_then(|at| self.steps.get(at));
        let from = before.map_or_else(Aside::default, Aside::from);
        let moved = Aside {
            west: to.west - from.west,
            north: to.north - from.north,
        };
        let (moved, whole) = (self.in_fields(moved), self.in_fields(to));
        Some(if before.is_some() {
            format!("sweep: {moved} ({whole} of the first look)")
        } else {
            format!("sweep: {moved} of the first look")
        })
    }

    /// An offset in fields of the eyepiece, to half a one: "a field and a half west, half a field north".
    fn in_fields(&self, aside: Aside) -> String {
        let halves = |angle: Angle| (angle.abs() / self.field * 2.0).round();
        let part = |angle: Angle, plus: &str, minus: &str| {
            let way = if angle < Angle::ZERO { minus } else { plus };
            match halves(angle) {
                0.0 => None,
                1.0 => Some(format!("half a field {way}")),
                2.0 => Some(format!("a field {way}")),
                more => Some(format!("{} fields {way}", more / 2.0)),
            }
        };
        let parts = [
            part(aside.west, "west", "east"),
            part(aside.north, "north", "south"),
        ];
        let said: Vec<String> = parts.into_iter().flatten().collect();
        if said.is_empty() {
            "the place".to_owned()
        } else {
            said.join(", ")
        }
    }
}
