//! A night worked at the terminal, and gone on with after the worst.

use crate::seat::Seat;

/// What the circles of the pretended mount show, as the demonstration line says.
fn circles_shown(seat: &Seat) -> (String, String) {
    let screen = seat.says();
    let line = screen.lines().find(|line| line.contains("circles show "));
    let shown = line.unwrap().split("circles show ").nth(1).unwrap();
    let (hour, dec) = shown.split_once(" and ").unwrap();
    (hour.trim().to_owned(), dec.trim().to_owned())
}

/// Reads a star as the pretended mount shows it.
fn read(seat: &mut Seat, star: &str) {
    seat.types("s");
    seat.waits_for("stars well placed");
    seat.types(star);
    seat.waits_for(&format!("> {star}"));
    seat.types("\r");
    seat.waits_for("a star to read");
    seat.types("\r");
    seat.waits_for("what do the circles show?");
    let (hour, dec) = circles_shown(seat);
    seat.types(&format!("{hour}\r{dec}"));
    // both circles understood
    seat.waits_until("understood twice", |screen| {
        screen.contents().matches("understood: ").count() == 2
    });
    seat.types("\r");
    seat.waits_for(&format!("read: {star}"));
}

#[test]
fn a_night_killed_in_the_middle_goes_on_where_it_stopped() {
    let home = tempfile::tempdir().unwrap();
    let mut seat = Seat::open(home.path(), (80, 24));
    seat.waits_for("sidereal");
    read(&mut seat, "Capella");
    seat.strikes(" ");
    seat.waits_for("1 of ");
    seat.waits_for("known to");
    seat.strikes("f");
    seat.waits_for("found · 1 of ");
    let name = seat.says().lines().nth(3).unwrap().trim().to_owned();
    let name = name.split("  ").next().unwrap().to_owned();
    seat.signals("KILL");
    seat.ends();

    let mut seat = Seat::open(home.path(), (80, 24));
    seat.waits_for("the night goes on: 1 found, 0 missed so far");
    let screen = seat.says();
    assert!(screen.contains(&name), "{name}\n{screen}");
    assert!(screen.contains("found · 1 of "), "{screen}");
    // the star read before still tells how the mount stands
    assert!(screen.contains("known to"), "{screen}");
    seat.strikes("u");
    seat.waits_for("taken back: found");
    seat.strikes("q");
    assert!(seat.ends().success());
    seat.gets_the_terminal_back();
}

#[test]
fn a_second_program_on_the_same_night_is_told_so() {
    let home = tempfile::tempdir().unwrap();
    let first = Seat::open(home.path(), (80, 24));
    first.waits_for("sidereal");
    let mut second = Seat::open(home.path(), (80, 24));
    second.waits_for("already open");
    assert_eq!(second.ends().exit_code(), 1);
    second.gets_the_terminal_back();
}

#[test]
fn coordinates_can_be_pasted() {
    let home = tempfile::tempdir().unwrap();
    let mut seat = Seat::open(home.path(), (80, 24));
    seat.waits_for("sidereal");
    seat.types("/");
    seat.waits_for("an object to add");
    seat.types("\x1b[200~05:52:18.3 +32:33:11\x1b[201~");
    seat.waits_for("> 05:52:18.3 +32:33:11");
    seat.types("\r");
    seat.waits_for("stands at the end of the list");
}

#[test]
fn at_night_the_terminal_is_sent_red_and_black_alone() {
    /// xterm's palette: 16 is black, and 16 + 36 n the pure reds.
    fn is_red(colour: vt100::Color) -> bool {
        matches!(colour, vt100::Color::Idx(index) if index > 16 && (index - 16) % 36 == 0)
    }
    let home = tempfile::tempdir().unwrap();
    let mut seat = Seat::open(home.path(), (80, 24));
    seat.waits_for("sidereal");
    seat.types(" ");
    seat.waits_for("hour circle");
    seat.looks(|screen| {
        for (row, column) in (0..24).flat_map(|row| (0..80).map(move |column| (row, column))) {
            let cell = screen.cell(row, column).unwrap();
            let (ink, ground) = (cell.fgcolor(), cell.bgcolor());
            assert!(is_red(ink), "{row} {column} {ink:?}");
            assert_eq!(ground, vt100::Color::Idx(16), "{row} {column}");
        }
    });
}

#[test]
fn a_storm_of_sizes_leaves_the_screen_whole() {
    let home = tempfile::tempdir().unwrap();
    let mut seat = Seat::open(home.path(), (80, 24));
    seat.waits_for("sidereal");
    for step in 0..120_u16 {
        seat.resizes(1 + step * 7 % 190, 1 + step * 11 % 70);
    }
    seat.resizes(60, 20);
    seat.waits_until("the keys on the last row", |screen| {
        let rows: Vec<String> = screen.rows(0, 60).collect();
        rows.first().is_some_and(|row| row.contains("Tarn Hollow"))
            && rows.last().is_some_and(|row| row.contains("q leave"))
    });
    seat.types("?");
    seat.waits_for("the other side of the pier");
}
