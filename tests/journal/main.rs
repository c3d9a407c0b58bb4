//! The journal against what happens to files and machines, and the night against its own replay.
#![allow(clippy::unwrap_used, clippy::expect_used, clippy::panic)]

mod hurt;
mod log;
mod sample;
mod session;
mod undo;
