//! The program as it is run: words in; results, messages and an exit status out.
//!
//! Every run has a home of its own, empty at first, and nothing of the user's or the machine's.
#![allow(clippy::unwrap_used, clippy::expect_used, clippy::panic)]

mod calibrate;
mod cautions;
mod circles;
mod coordinates;
mod dial;
mod eccentric;
mod faults;
mod found;
mod learnt;
mod mark;
mod misread;
mod orbits;
mod own_catalogues;
mod page;
mod plan;
mod pretended;
mod program;
mod records;
mod repeat;
mod shape;
mod sun;
mod written;
