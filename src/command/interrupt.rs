//! An interrupt from the keyboard, for work that goes on until one comes.

use std::sync::mpsc::{Receiver, channel};

/// Gives a channel that says so once when an interrupt comes.
#[cfg(unix)]
pub fn listen() -> anyhow::Result<Receiver<()>> {
    let (say, said) = channel();
    let mut signals = signal_hook::iterator::Signals::new([signal_hook::consts::SIGINT])?;
    std::thread::spawn(move || {
        for _ in signals.forever() {
            if say.send(()).is_err() {
                break;
            }
        }
    });
    Ok(said)
}

/// Elsewhere an interrupt ends the program by itself.
#[cfg(not(unix))]
pub fn listen() -> anyhow::Result<Receiver<()>> {
    let (say, said) = channel();
    // kept open for as long as the program runs
    std::mem::forget(say);
    Ok(said)
}
