//! However the program is made to end or to stop, the terminal comes back as it was.

use crate::seat::Seat;

fn opened(home: &std::path::Path) -> Seat {
    let seat = Seat::open(home, (80, 24));
    seat.waits_for("sidereal");
    assert!(!seat.modes_are_as_before(), "the terminal is not raw");
    assert!(seat.looks(|screen| screen.alternate_screen() && screen.hide_cursor()));
    seat
}

#[test]
fn a_signal_to_end_gives_the_terminal_back_and_keeps_the_record() {
    for signal in ["INT", "TERM", "HUP"] {
        let home = tempfile::tempdir().unwrap();
        let mut seat = opened(home.path());
        seat.types(" ");
        seat.waits_for("1 of ");
        seat.signals(signal);
        seat.ends();
        seat.gets_the_terminal_back();
        let journal = std::fs::read_to_string(home.path().join("night.jsonl")).unwrap();
        assert!(journal.contains("target-taken"), "{signal}: {journal}");
        assert!(journal.ends_with('\n') && journal.contains("session-closed"));
    }
}

#[test]
fn the_interrupt_key_ends_it_with_status_130() {
    let home = tempfile::tempdir().unwrap();
    let mut seat = opened(home.path());
    seat.types("\x03");
    assert_eq!(seat.ends().exit_code(), 130);
    seat.gets_the_terminal_back();
}

#[test]
fn stopped_it_gives_the_terminal_back_and_told_to_go_on_it_takes_it_again() {
    let home = tempfile::tempdir().unwrap();
    for by_key in [true, false] {
        let mut seat = opened(home.path());
        if by_key {
            seat.types("\x1a");
        } else {
            seat.signals("TSTP");
        }
        seat.gets_the_terminal_back();
        seat.signals("CONT");
        seat.waits_until("the screen again", |screen| {
            screen.alternate_screen() && screen.contents().contains("q leave")
        });
        seat.types("q");
        assert!(seat.ends().success());
        seat.gets_the_terminal_back();
    }
}
