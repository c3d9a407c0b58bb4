//! Sun, Moon and planets as targets.

use crate::catalog::target::Origin;
use crate::catalog::{Kind, Target};
use crate::sky::{Body, Source};

/// What kind of body it is.
#[must_use]
pub const fn kind(body: Body) -> Kind {
    match body {
        Body::Sun => Kind::Sun,
        Body::Moon => Kind::Moon,
        _ => Kind::Planet,
    }
}

/// The body as a target. Its magnitude changes, and it is in no constellation for long.
#[must_use]
pub fn target(body: Body) -> Target {
    Target {
        name: body.name().to_owned(),
        also: Vec::new(),
        kind: kind(body),
        source: Source::Body(body),
        magnitude: None,
        size_arcmin: None,
        constellation: None,
        catalogue: Origin::SolarSystem,
        note: String::new(),
    }
}
