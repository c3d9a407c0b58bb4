//! Checks against sources outside the project, each named beside its numbers.
#![allow(clippy::unwrap_used, clippy::expect_used, clippy::panic)]

mod mount;
mod table;
