//! The session: events, state, journal, replay.
