//! What a run ends with: its message and its exit status, in one place.
//!
//! 0 done, and also when the reader of a pipe has gone; 1 the work failed; 2 the request or a file
//! is wrong; 130 after an interrupt.

use std::io::{self, Write as _};
use std::process::ExitCode;

use crate::command::find::NearFault;
use crate::command::log::NoSuchLog;
use crate::site::{Faults, Ink};

/// The request itself is wrong: what, and what to do about it.
#[derive(Clone, Debug, PartialEq, Eq, thiserror::Error)]
#[error("{message}")]
pub struct Refused {
    /// What is wrong.
    pub message: String,
    /// What to do instead.
    pub hint: Option<String>,
}

impl Refused {
    /// A refusal with its hint.
    #[must_use]
    pub fn new(message: impl Into<String>, hint: impl Into<String>) -> Self {
        Self {
            message: message.into(),
            hint: Some(hint.into()),
        }
    }
}

/// Files were checked and found wrong; the faults themselves have been said.
#[derive(Clone, Copy, Debug, PartialEq, Eq, thiserror::Error)]
#[error("{0} fault{s} found", s = if *.0 == 1 { "" } else { "s" })]
pub struct FaultsFound(pub usize);

/// A signal ended the work: an interrupt from the keyboard, or a request to end.
#[derive(Clone, Copy, Debug, PartialEq, Eq, thiserror::Error)]
#[error("ended by signal {0}")]
pub struct Signalled(pub u8);

impl Signalled {
    /// The interrupt from the keyboard.
    pub const INTERRUPT: Self = Self(2);
}

const WORK_FAILED: u8 = 1;
const REQUEST_WRONG: u8 = 2;
/// A shell adds the signal's number to this.
const SIGNALLED: u8 = 128;

/// Says what went wrong on standard error and gives the exit status.
#[must_use]
pub fn report(error: &anyhow::Error, color: bool) -> ExitCode {
    if is_closed_pipe(error) {
        return ExitCode::SUCCESS;
    }
    if let Some(Signalled(number)) = error.downcast_ref() {
        return ExitCode::from(SIGNALLED.saturating_add(*number));
    }
    let (text, status) = if let Some(faults) = error.downcast_ref::<Faults>() {
        (
            faults.render(if color { Ink::Coloured } else { Ink::Plain }),
            REQUEST_WRONG,
        )
    } else if let Some(Refused { message, hint }) = error.downcast_ref() {
        let hint = hint.as_ref().map(|hint| format!("\nhint: {hint}"));
        (
            format!("error: {message}{}", hint.unwrap_or_default()),
            REQUEST_WRONG,
        )
    } else if let Some(fault) = error.downcast_ref::<NearFault>() {
        (
            format!("error: {fault}\nhint: {}", fault.hint()),
            REQUEST_WRONG,
        )
    } else {
        let wrong = error.is::<NoSuchLog>() || error.is::<FaultsFound>();
        let status = if wrong { REQUEST_WRONG } else { WORK_FAILED };
        (format!("error: {}", told(error)), status)
    };
    // with standard error gone there is nobody left to tell
    let _ = writeln!(io::stderr(), "{}", text.trim_end());
    ExitCode::from(status)
}

/// The message and its causes, each said once: many a message says its cause itself.
fn told(error: &anyhow::Error) -> String {
    let mut text = error.to_string();
    for cause in error.chain().skip(1).map(ToString::to_string) {
        if !text.contains(&cause) {
            text += ": ";
            text += &cause;
        }
    }
    text
}

fn is_closed_pipe(error: &anyhow::Error) -> bool {
    error.chain().any(|cause| {
        let closed = |error: &io::Error| error.kind() == io::ErrorKind::BrokenPipe;
        cause.downcast_ref().is_some_and(closed)
            || cause
                .downcast_ref::<serde_json::Error>()
                .and_then(serde_json::Error::io_error_kind)
                == Some(io::ErrorKind::BrokenPipe)
    })
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn a_closed_pipe_ends_quietly_however_deep() {
        let closed = io::Error::from(io::ErrorKind::BrokenPipe);
        let error = anyhow::Error::from(closed).context("writing the table");
        assert!(is_closed_pipe(&error));
        assert!(!is_closed_pipe(&anyhow::anyhow!("disk full")));
    }
}
