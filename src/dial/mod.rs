//! The main job: from a target and an instant to what to set on each circle.
