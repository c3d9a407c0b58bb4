//! The terminal taken over for the screen, and given back whatever happens.
//!
//! Taken: raw mode, the alternate screen, bracketed paste, no cursor (the terminal draws its cursor
//! in a colour of its own, often white and blinking, which has no place in the dark). Given back: when
//! the hold is dropped, when the program panics, and while it is stopped. All output goes through one
//! buffer and leaves in one write a frame.

use std::io::{self, BufWriter, Stdout, Write};
use std::sync::Once;
use std::sync::atomic::{AtomicBool, Ordering};

use crossterm::cursor::{Hide, Show};
use crossterm::event::{DisableBracketedPaste, EnableBracketedPaste};
use crossterm::terminal::{
    EnterAlternateScreen, LeaveAlternateScreen, disable_raw_mode, enable_raw_mode,
};
use crossterm::{execute, queue};
use ratatui::Frame;
use ratatui::Terminal;
use ratatui::backend::CrosstermBackend;
use ratatui::layout::{Position, Rect};

/// More than the largest frame of an ordinary terminal, so that it leaves in one write.
const FRAME_BYTES: usize = 64 * 1024;

/// True while the terminal is ours.
static TAKEN: AtomicBool = AtomicBool::new(false);

/// The terminal, ours until dropped.
pub struct Hold {
    terminal: Terminal<CrosstermBackend<BufWriter<Stdout>>>,
}

impl Hold {
    /// Takes the terminal over. Fails if there is none or it refuses.
    pub fn take() -> io::Result<Self> {
        give_back_on_panic();
        let output = BufWriter::with_capacity(FRAME_BYTES, io::stdout());
        let mut backend = CrosstermBackend::new(output);
        take(&mut backend)?;
        match Terminal::new(backend) {
            Ok(terminal) => Ok(Self { terminal }),
            Err(refused) => {
                give_back();
                Err(refused)
            }
        }
    }

    /// Draws a frame; only the cells that changed are sent.
    pub fn draw(&mut self, view: impl FnOnce(&mut Frame)) -> io::Result<()> {
        self.terminal.draw(view).map(|_| ())
    }

    /// Rings the terminal's bell.
    pub fn ring(&mut self) -> io::Result<()> {
        let output = self.terminal.backend_mut();
        output.write_all(b"\x07")?;
        Write::flush(output)
    }

    /// Gives the terminal back, stops as a program does that got no word in the matter, and takes
    /// the terminal again when told to go on.
    #[cfg(unix)]
    pub fn stop(&mut self) -> io::Result<()> {
        give_back();
        signal_hook::low_level::emulate_default_handler(signal_hook::consts::SIGTSTP)?;
        self.retake()
    }

    /// Takes the terminal again after another program had it, and draws everything anew.
    pub fn retake(&mut self) -> io::Result<()> {
        // the shell may have set modes of its own meanwhile: they are what to give back later
        give_back_modes();
        take(self.terminal.backend_mut())?;
        // everything anew; to clear would ask the terminal where its cursor is, and the answer would
        // go to the thread that reads the keys
        let size = self.terminal.size()?;
        self.terminal.resize(Rect::from((Position::ORIGIN, size)))
    }
}

impl Drop for Hold {
    fn drop(&mut self) {
        give_back();
    }
}

/// What is asked of the terminal leaves with the next frame, so that no empty screen in the terminal's
/// own colours is seen in the dark.
fn take(output: &mut impl Write) -> io::Result<()> {
    enable_raw_mode()?;
    TAKEN.store(true, Ordering::SeqCst);
    queue!(output, EnterAlternateScreen, EnableBracketedPaste, Hide)
}

/// Gives the terminal back as it was found; does nothing if it is not ours.
///
/// Errors are not looked at: after a hangup nobody is left to be told.
pub fn give_back() {
    if TAKEN.swap(false, Ordering::SeqCst) {
        let _ = execute!(
            io::stdout(),
            DisableBracketedPaste,
            Show,
            LeaveAlternateScreen
        );
        give_back_modes();
    }
}

fn give_back_modes() {
    let _ = disable_raw_mode();
}

/// The message of a panic is for the ordinary screen, in lines that start at the left.
fn give_back_on_panic() {
    static ONCE: Once = Once::new();
    ONCE.call_once(|| {
        let before = std::panic::take_hook();
        std::panic::set_hook(Box::new(move |panic| {
            give_back();
            before(panic);
        }));
    });
}
