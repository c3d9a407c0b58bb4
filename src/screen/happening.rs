//! Everything that can happen to the screen, in one queue: keys, pasted text, a new size, the second
//! of the clock, signals.
//!
//! One thread reads the terminal and one the signals; both sleep until there is something. The main
//! loop waits on the queue until the next whole second of the corrected clock, so the seconds shown
//! change when they change, and nothing runs in between.

use std::sync::mpsc::{self, Receiver, RecvTimeoutError, Sender};
use std::thread;
use std::time::{Duration, Instant};

use crossterm::event::{Event, KeyCode, KeyEvent, KeyEventKind, KeyModifiers};

use crate::time::{Clock, InstantFault, Utc};

/// A key struck.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Stroke {
    /// The key.
    pub key: KeyCode,
    /// When, on a clock that only ever runs on, since the queue was opened.
    pub at: Duration,
}

/// What happens.
#[derive(Clone, Debug, PartialEq, Eq)]
pub enum Happening {
    /// A key was struck.
    Key(Stroke),
    /// Text was pasted.
    Pasted(String),
    /// The terminal has another size.
    Resized,
    /// A whole second of UTC has begun.
    Tick,
    /// The program is asked to stop for a while.
    Stop,
    /// The program goes on after a stop.
    Continue,
    /// The program is asked to end, by the signal of this number.
    End(i32),
    /// The terminal can no longer be read.
    InputClosed,
}

/// The number of the signal a terminal's interrupt key stands for (POSIX).
pub const INTERRUPT: i32 = 2;

/// The queue of what happens.
pub struct Queue {
    happenings: Receiver<Happening>,
    opened: Instant,
    due: Option<Utc>,
}

impl Queue {
    /// Opens the queue and starts listening to the terminal and to signals.
    pub fn open() -> std::io::Result<Self> {
        let (sender, happenings) = mpsc::channel();
        let opened = Instant::now();
        #[cfg(unix)]
        signals::listen(sender.clone())?;
        thread::Builder::new()
            .name("keys".to_owned())
            .spawn(move || read_terminal(&sender, opened))?;
        Ok(Self {
            happenings,
            opened,
            due: None,
        })
    }

    /// How long ago something happened, in seconds.
    #[must_use]
    pub fn seconds_since(&self, at: Duration) -> f64 {
        self.opened.elapsed().saturating_sub(at).as_secs_f64()
    }

    /// Waits for what happens next: at the latest, the next whole second of the clock.
    pub fn wait(&mut self, clock: &Clock) -> Result<Happening, InstantFault> {
        loop {
            let now = clock.now()?;
            let due = *self.due.get_or_insert_with(|| now.next_second());
            let left_s = due.seconds_since(now);
            // more than a second away: the clock was set back
            if !(0.0..=1.0).contains(&left_s) || left_s == 0.0 {
                self.due = Some(now.next_second());
                return Ok(Happening::Tick);
            }
            match self
                .happenings
                .recv_timeout(Duration::from_secs_f64(left_s))
            {
                Ok(happening) => return Ok(happening),
                Err(RecvTimeoutError::Timeout) => {}
                Err(RecvTimeoutError::Disconnected) => return Ok(Happening::InputClosed),
            }
        }
    }

    /// What has happened already, without waiting.
    pub fn at_once(&mut self) -> Option<Happening> {
        self.happenings.try_recv().ok()
    }
}

fn read_terminal(sender: &Sender<Happening>, opened: Instant) {
    loop {
        let happening = match crossterm::event::read() {
            Ok(event) => understand(event, opened.elapsed()),
            Err(_) => Some(Happening::InputClosed),
        };
        let Some(happening) = happening else { continue };
        let closed = happening == Happening::InputClosed;
        if sender.send(happening).is_err() || closed {
            return;
        }
    }
}

/// A terminal's event, `at` so long after the queue was opened, as one of ours.
fn understand(event: Event, at: Duration) -> Option<Happening> {
    match event {
        Event::Key(key) if key.kind != KeyEventKind::Release => Some(understand_key(&key, at)),
        Event::Paste(text) => Some(Happening::Pasted(text)),
        Event::Resize(..) => Some(Happening::Resized),
        _ => None,
    }
}

/// In raw mode the terminal's interrupt and stop keys arrive as keys.
fn understand_key(key: &KeyEvent, at: Duration) -> Happening {
    match (key.code, key.modifiers.contains(KeyModifiers::CONTROL)) {
        (KeyCode::Char('c'), true) => Happening::End(INTERRUPT),
        (KeyCode::Char('z'), true) => Happening::Stop,
        (KeyCode::Char('h'), true) => Happening::Key(Stroke {
            key: KeyCode::Backspace,
            at,
        }),
        // held with control, a letter is not the letter
        (KeyCode::Char(_), true) => Happening::Key(Stroke {
            key: KeyCode::Null,
            at,
        }),
        (code, _) => Happening::Key(Stroke { key: code, at }),
    }
}

#[cfg(unix)]
mod signals {
    //! The signals that concern a program that holds a terminal.

    use std::sync::mpsc::Sender;
    use std::thread;

    use signal_hook::consts::{SIGCONT, SIGHUP, SIGINT, SIGTERM, SIGTSTP};
    use signal_hook::iterator::Signals;

    use super::Happening;
    use crate::screen::terminal;

    /// Listens for them, and puts each into the queue.
    ///
    /// Asked to end a second time, the program does so at once, whatever holds up the main loop.
    pub(super) fn listen(sender: Sender<Happening>) -> std::io::Result<()> {
        let mut signals = Signals::new([SIGINT, SIGTERM, SIGHUP, SIGTSTP, SIGCONT])?;
        thread::Builder::new()
            .name("signals".to_owned())
            .spawn(move || {
                let mut asked_before = false;
                for signal in signals.forever() {
                    let happening = match signal {
                        SIGTSTP => Happening::Stop,
                        SIGCONT => Happening::Continue,
                        _ if asked_before => {
                            terminal::give_back();
                            let _ = signal_hook::low_level::emulate_default_handler(signal);
                            return;
                        }
                        ending => {
                            asked_before = true;
                            Happening::End(ending)
                        }
                    };
                    if sender.send(happening).is_err() {
                        return;
                    }
                }
            })?;
        Ok(())
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    fn key(code: KeyCode, modifiers: KeyModifiers) -> Option<Happening> {
        understand(
            Event::Key(KeyEvent::new(code, modifiers)),
            Duration::from_secs(1),
        )
    }

    #[test]
    fn the_interrupt_and_stop_keys_are_what_they_stand_for() {
        assert_eq!(
            key(KeyCode::Char('c'), KeyModifiers::CONTROL),
            Some(Happening::End(INTERRUPT))
        );
        assert_eq!(
            key(KeyCode::Char('z'), KeyModifiers::CONTROL),
            Some(Happening::Stop)
        );
    }

    #[test]
    fn a_letter_with_control_is_not_the_letter() {
        let Some(Happening::Key(stroke)) = key(KeyCode::Char('f'), KeyModifiers::CONTROL) else {
            panic!("no key");
        };
        assert_ne!(stroke.key, KeyCode::Char('f'));
    }

    #[test]
    fn letting_go_of_a_key_is_nothing() {
        let mut event = KeyEvent::new(KeyCode::Char('f'), KeyModifiers::NONE);
        event.kind = KeyEventKind::Release;
        assert_eq!(understand(Event::Key(event), Duration::ZERO), None);
    }

    fn queue() -> (Sender<Happening>, Queue) {
        let (sender, happenings) = mpsc::channel();
        let queue = Queue {
            happenings,
            opened: Instant::now(),
            due: None,
        };
        (sender, queue)
    }

    #[test]
    fn a_tick_comes_as_the_second_of_utc_begins() {
        /// A busy machine may wake a thread late; far less than a second is early enough to show.
        const LATE_S: f64 = 0.5;
        let start = Utc::parse("2026-12-01T21:30:00.900Z").unwrap();
        let clock = Clock::starting_at(start);
        let (_sender, mut queue) = queue();
        assert_eq!(queue.wait(&clock), Ok(Happening::Tick));
        let after = clock.now().unwrap().seconds_since(start);
        assert!((0.1..0.1 + LATE_S).contains(&after), "{after}");
    }

    #[test]
    fn what_happens_comes_before_the_tick() {
        let clock = Clock::starting_at(Utc::parse("2026-12-01T21:30:00Z").unwrap());
        let (sender, mut queue) = queue();
        sender.send(Happening::Resized).unwrap();
        assert_eq!(queue.wait(&clock), Ok(Happening::Resized));
        assert_eq!(queue.at_once(), None);
    }

    #[test]
    fn a_clock_set_back_ticks_at_once() {
        let later = Clock::starting_at(Utc::parse("2026-12-01T21:30:00.5Z").unwrap());
        let earlier = Clock::starting_at(Utc::parse("2026-12-01T20:30:00.5Z").unwrap());
        let (sender, mut queue) = queue();
        sender.send(Happening::Resized).unwrap();
        assert_eq!(queue.wait(&later), Ok(Happening::Resized));
        assert_eq!(queue.wait(&earlier), Ok(Happening::Tick));
    }
}
