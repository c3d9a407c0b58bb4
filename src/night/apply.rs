//! What one event makes of a state. Pure: no file, no clock, no chance; any event on any state.
//!
//! A correction of the clock moves what was timed by the wrong clock: the hour angles and the sidereal
//! times of the readings since the clock last jumped, and with them the axis angle shown by a ring
//! that rides with the drive. A ring that stands still was read as it was. (The refraction at the
//! moved hour angle is left as it was: 0.1' a minute of correction at 20° altitude.)

use crate::angle::{Angle, AxisAngle, HourAngle};
use crate::night::event::{Circle, Event, Opening, Stamped};
use crate::night::listed::ListedTarget;
use crate::night::reading::{Setting, StarReading};
use crate::night::state::{NightReading, NightTarget, Outcome, State, TubeShown};
use crate::time::Utc;
use crate::time::sidereal::{DEGREES_PER_SECOND, SiderealTime};

impl State {
    /// The state after one more event. Taking back is not done here: see [`crate::night::Night`].
    pub(super) fn apply(&mut self, stamped: &Stamped) {
        let (line, utc) = (stamped.number, stamped.utc);
        match &stamped.event {
            Event::NightOpened(opening) => self.open(opening),
            Event::SessionResumed => self.closed = false,
            Event::SessionClosed => self.closed = true,
            Event::TargetTaken { place, target } => self.take(*place, target),
            Event::TargetAdded { target } => {
                self.targets.push(NightTarget::new((**target).clone()));
            }
            Event::StarRead(reading) => self.read(line, utc, reading),
            Event::ReadingUsed { line, used } => {
                for read in self.readings.iter_mut().filter(|read| read.line == *line) {
                    read.reading.used = *used;
                }
            }
            Event::Found {
                target,
                setting,
                reading,
            } => {
                self.change(target, |entry| entry.outcome = Some(Outcome::Found(utc)));
                self.set_to(target, setting.as_ref(), utc);
                if let Some(reading) = reading {
                    self.read(line, utc, reading);
                }
            }
            Event::Missed { target, setting } => {
                self.change(target, |entry| entry.outcome = Some(Outcome::Missed(utc)));
                self.set_to(target, setting.as_ref(), utc);
            }
            Event::Note { target, text } => match target {
                Some(name) => self.change(name, |entry| entry.notes.push(text.clone())),
                None => self.notes.push(text.clone()),
            },
            Event::RingSet { circle, reading } => {
                match circle {
                    Circle::Hour => self.zeros.hour += 1,
                    Circle::Declination => self.zeros.dec += 1,
                }
                // what the ring showed before says nothing of where the tube is now
                self.tube = None;
                if let Some(reading) = reading {
                    self.read(line, utc, reading);
                }
            }
            Event::AxisAdjusted => {
                self.zeros.axis += 1;
                // the tube has gone with the axis
                self.tube = None;
            }
            Event::StartedFrom { earlier } => self.started_from = earlier.as_deref().cloned(),
            Event::ClockCorrected { seconds } => self.correct_clock(*seconds),
            Event::ClockJumped { seconds } => {
                self.clock_jumps += 1;
                self.clock_leapt_s = Some(*seconds);
                // how far a driven tube has gone since is no longer known
                self.tube = None;
            }
            Event::SideChanged { side } => self.side = *side,
            Event::SunRiskAcknowledged { target } => {
                self.sun_risks.insert(target.clone());
            }
            Event::Undone { .. } => {}
        }
    }

    /// Opens the night. A second opening counts only where the first was lost, and then keeps what
    /// became of the objects meanwhile.
    fn open(&mut self, opening: &Opening) {
        if self.opening.is_some() {
            return;
        }
        let current = self.current_target().map(|entry| entry.target.name.clone());
        let mut known = std::mem::take(&mut self.targets);
        for target in &opening.targets {
            let found = known
                .iter()
                .position(|entry| entry.target.name == target.name);
            let mut entry = match found {
                Some(index) => known.remove(index),
                None => NightTarget::new(target.clone()),
            };
            entry.target = target.clone();
            self.targets.push(entry);
        }
        self.targets.append(&mut known);
        self.current = current.and_then(|name| {
            let mut targets = self.targets.iter();
            targets.position(|entry| entry.target.name == name)
        });
        if self.side.is_none() {
            self.side = opening.side;
        }
        if self.clock_correction_s == 0.0 {
            self.clock_correction_s = opening.clock_correction_s;
        }
        self.opening = Some(opening.clone());
    }

    /// Takes an object: at its place, else wherever it stands, else put at the end.
    fn take(&mut self, place: usize, target: &ListedTarget) {
        let is_it = |entry: &NightTarget| entry.target.name == target.name;
        let at_place = place
            .checked_sub(1)
            .filter(|index| self.targets.get(*index).is_some_and(is_it));
        let index = at_place.or_else(|| self.targets.iter().position(is_it));
        let index = index.unwrap_or_else(|| {
            self.targets.push(NightTarget::new(target.clone()));
            self.targets.len() - 1
        });
        self.current = Some(index);
    }

    /// The tube was set by the circles, as told.
    fn set_to(&mut self, target: &str, setting: Option<&Setting>, utc: Utc) {
        if let Some(&Setting { axes, side, .. }) = setting {
            let at = target.to_owned();
            self.tube = Some(TubeShown {
                at,
                axes,
                side,
                utc,
            });
        }
    }

    fn read(&mut self, line: u64, utc: Utc, reading: &StarReading) {
        if let Some(axes) = reading.shown() {
            let side = reading.side;
            let at = reading.star.clone();
            self.tube = Some(TubeShown {
                at,
                axes,
                side,
                utc,
            });
        }
        self.readings.push(NightReading {
            line,
            utc,
            reading: reading.clone(),
            zeros: self.zeros,
            clock_jumps: self.clock_jumps,
        });
    }

    fn correct_clock(&mut self, seconds: f64) {
        let later = seconds - self.clock_correction_s;
        self.clock_correction_s = seconds;
        let turned = Angle::from_degrees(later * DEGREES_PER_SECOND);
        let jumps = self.clock_jumps;
        for read in self
            .readings
            .iter_mut()
            .filter(|read| read.clock_jumps == jumps)
        {
            read.utc = read.utc.plus_seconds(later);
            let reading = &mut read.reading;
            let hour_angle = Angle::from_degrees(reading.hour_angle_deg) + turned;
            reading.hour_angle_deg = HourAngle::new(hour_angle).degrees();
            let sidereal = Angle::from_degrees(reading.sidereal_deg) + turned;
            reading.sidereal_deg = SiderealTime::new(sidereal).degrees();
            if reading.driven {
                let taken_as = reading.taken_as.iter_mut().map(|shown| &mut shown.hour_deg);
                for axis in taken_as.chain(&mut reading.hour_candidates_deg) {
                    *axis = AxisAngle::new(Angle::from_degrees(*axis) + turned).degrees();
                }
            }
        }
        if let Some(tube) = &mut self.tube {
            tube.utc = tube.utc.plus_seconds(later);
        }
    }

    /// Changes the list's entry of this name; one whose line was lost is put at the end.
    fn change(&mut self, name: &str, change: impl FnOnce(&mut NightTarget)) {
        let index = self.index_of(name);
        if let Some(entry) = index.and_then(|index| self.targets.get_mut(index)) {
            change(entry);
        } else {
            let mut entry = NightTarget::named(name);
            change(&mut entry);
            self.targets.push(entry);
        }
    }
}
