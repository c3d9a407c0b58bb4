//! The loop: waits for what happens, lets it take effect, makes the record safe, draws.
//!
//! Nothing else here holds a clock, a file or the terminal. The seconds shown change on the second of
//! UTC; between, everything sleeps.

use std::time::Instant;

use crate::night::{Begun, Session};
use crate::screen::desk::Desk;
use crate::screen::figures::Glyphs;
use crate::screen::happening::{Happening, Queue};
use crate::screen::light::{Depth, Light, Palette};
use crate::screen::look::Look;
use crate::screen::observatory::Observatory;
use crate::screen::terminal::Hold;
use crate::time::{Clock, InstantFault, Utc};

/// How the screen is to look on this terminal.
#[derive(Clone, Copy, Debug)]
pub struct Options {
    /// The light it opens in.
    pub light: Light,
    /// The colours of the terminal.
    pub depth: Depth,
    /// The glyphs of the terminal.
    pub glyphs: Glyphs,
}

/// How the screen came to its end.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Ending {
    /// The observer left.
    Left,
    /// A signal of this number asked for it.
    Asked(i32),
    /// The terminal went away.
    TerminalGone,
}

/// Why the screen cannot go on.
#[derive(Debug, thiserror::Error)]
pub enum ScreenFault {
    /// There is no terminal to draw on, or it refuses.
    #[error("the terminal cannot be used: {0}")]
    Terminal(#[from] std::io::Error),
    /// The machine's clock is set outside the years that can be used.
    #[error("the machine's clock cannot be used: {0}")]
    Clock(#[from] InstantFault),
}

/// A clock that runs away from the monotonic one by more than this between two looks has jumped, or
/// the machine has slept; time services slew by milliseconds.
const JUMP_S: f64 = 5.0;

/// The machine's clock against one that only runs on.
struct Steadiness {
    shown: Utc,
    since: Instant,
}

impl Steadiness {
    fn new(clock: &Clock) -> Result<Self, InstantFault> {
        Ok(Self {
            shown: clock.uncorrected()?,
            since: Instant::now(),
        })
    }

    /// By how much the clock has jumped since the last look, in seconds, if it has.
    fn jump(&mut self, clock: &Clock) -> Result<Option<f64>, InstantFault> {
        let now = Self::new(clock)?;
        let shown = now.shown.seconds_since(self.shown);
        let passed = now.since.duration_since(self.since).as_secs_f64();
        *self = now;
        Ok(Some(shown - passed).filter(|jump| jump.abs() > JUMP_S))
    }
}

/// Opens the screen on a night begun, until the observer leaves.
pub fn run(
    observatory: &Observatory,
    session: &mut Session,
    begun: &Begun,
    clock: Clock,
    options: Options,
) -> Result<Ending, ScreenFault> {
    let mut steadiness = Steadiness::new(&clock)?;
    let mut desk = Desk::open(observatory, session, begun, options.light, clock.now()?);
    let mut hold = Hold::take()?;
    let mut queue = Queue::open()?;
    let ending = loop {
        let clock = clock.corrected_by(desk.clock_correction_s());
        desk.show(clock.now()?);
        let look = Look {
            palette: Palette::new(desk.light(), options.depth),
            glyphs: options.glyphs,
        };
        if hold
            .draw(|frame| desk.draw(look, frame.buffer_mut()))
            .is_err()
        {
            break Ending::TerminalGone;
        }
        let first = queue.wait(&clock)?;
        if let Some(seconds) = steadiness.jump(&clock)? {
            desk.clock_jumped(seconds, clock.now()?);
        }
        // a burst of keys or sizes is drawn once
        let mut burst = vec![first];
        burst.extend(std::iter::from_fn(|| queue.at_once()));
        if let Some(ending) = take_in(&mut desk, &mut hold, &clock, &queue, &burst)? {
            break ending;
        }
    };
    let clock = clock.corrected_by(desk.clock_correction_s());
    desk.close(clock.now()?);
    Ok(ending)
}

/// Takes in a burst of happenings; gives the ending if one of them is it.
fn take_in(
    desk: &mut Desk<'_>,
    hold: &mut Hold,
    clock: &Clock,
    queue: &Queue,
    burst: &[Happening],
) -> Result<Option<Ending>, ScreenFault> {
    for happening in burst {
        match happening {
            Happening::End(signal) => return Ok(Some(Ending::Asked(*signal))),
            Happening::InputClosed => return Ok(Some(Ending::TerminalGone)),
            #[cfg(unix)]
            Happening::Stop => hold.stop()?,
            Happening::Continue => hold.retake()?,
            _ => {
                // a key belongs to the moment it was struck, however long the disk took since
                let ago_s = match happening {
                    Happening::Key(stroke) => queue.seconds_since(stroke.at),
                    _ => 0.0,
                };
                let utc = clock.now()?.plus_seconds(-ago_s);
                if desk.take_in(happening, utc) {
                    return Ok(Some(Ending::Left));
                }
            }
        }
    }
    Ok(None)
}
