//! A way of having taken some objects, and which of several ways are worth going on from.

use crate::plan::order::route::Node;

/// A way of having taken some objects.
#[derive(Clone, Copy, Debug)]
pub struct Way {
    /// The last of them and its window.
    pub node: Node,
    /// When it is done with, in seconds.
    pub ends: f64,
    /// What it has cost so far.
    pub price: f64,
    /// Which of the ways without the last object it goes on from.
    pub before: usize,
}

/// Keeps a way unless another that ends in the same window of the same object is neither later nor dearer; drops those that
/// are both.
pub fn keep(ways: &mut Vec<Way>, way: Way) {
    let alike =
        |other: &Way| (other.node.object, other.node.window) == (way.node.object, way.node.window);
    if ways
        .iter()
        .any(|other| alike(other) && other.ends <= way.ends && other.price <= way.price)
    {
        return;
    }
    ways.retain(|other| !(alike(other) && way.ends <= other.ends && way.price <= other.price));
    ways.push(way);
}
