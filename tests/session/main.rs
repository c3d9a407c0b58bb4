//! The program itself on a pseudo-terminal: a night worked, killed and gone on with; signals; sizes.
#![cfg(unix)]
#![allow(clippy::unwrap_used, clippy::expect_used, clippy::panic)]

mod night;
mod seat;
mod signals;
