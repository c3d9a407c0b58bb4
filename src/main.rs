//! nonius
fn main() {}
