//! Where things are, for an observer at a place: catalogue place, apparent place, observed place.
