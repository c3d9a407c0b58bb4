//! The screen: keys typed at a fixed instant give a picture, and the colours it is drawn in.
#![allow(clippy::unwrap_used, clippy::expect_used, clippy::panic)]

mod field;
mod flows;
mod hands;
mod learning;
mod light;
mod scene;
