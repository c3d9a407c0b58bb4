//! Every kind of circle against a ring engraved mark by mark, and a published pair of readings.
//!
//! The rings here are lists of numbers written down by walking once round and counting, a tenth of a degree
//! a step; reading one is looking at the entry under the index, and looking up a reading is searching the
//! list. No formula of the program is used. Angles in tenths of a degree where they are whole numbers.

use nonius::angle::{Angle, AxisAngle};
use nonius::metal::{
    DeclinationCircle, DeclinationNumbering, HourCircle, HourNumbering, Increases, Reading, Ring,
    Side, read_dec, read_hour,
};
use nonius::sexagesimal::{Half, Unit, read};
use nonius::time::SiderealTime;

use crate::table::rows;

/// Rounding of a few additions and of the change of units, in degrees.
const ROUNDING_DEG: f64 = 1e-9;

/// Half a second of arc, the published numbers being rounded to a second.
const HALF_A_PRINTED_SECOND: f64 = 0.5;

/// Marks on a ring.
const MARKS: usize = 3600;
/// Half way round.
const HALF: usize = MARKS / 2;
/// A quarter of the way.
const QUARTER: usize = MARKS / 4;

/// A number as engraved, in tenths of a degree, and the letter beside it.
type Engraved = (i32, Option<Half>);

/// Numbers written down in the order of a walk once round.
fn counted_round() -> Vec<i32> {
    (0..3600).collect()
}

/// Up to half a turn and back down.
fn up_and_down() -> Vec<i32> {
    let mut numbers = Vec::new();
    let mut number = 0;
    for mark in 0..MARKS {
        numbers.push(number);
        number += if mark < HALF { 1 } else { -1 };
    }
    numbers
}

/// Up to half a turn, then from just short of minus half a turn up to zero.
fn plus_and_minus() -> Vec<i32> {
    let mut numbers = Vec::new();
    let mut number = 0;
    for mark in 0..MARKS {
        numbers.push(number);
        number = if mark == HALF { -1799 } else { number + 1 };
    }
    numbers
}

/// Up, down through zero to the opposite end, and up again.
fn swinging() -> Vec<i32> {
    let mut numbers = Vec::new();
    let mut number = 0;
    for mark in 0..MARKS {
        numbers.push(number);
        let rises = !(QUARTER..3 * QUARTER).contains(&mark);
        number += if rises { 1 } else { -1 };
    }
    numbers
}

/// Lays the numbers on a ring: the first at `start`, the others forward or backward from there.
fn laid(numbers: &[i32], start: usize, forward: bool) -> Vec<i32> {
    let mut ring = vec![0; MARKS];
    for (step, number) in numbers.iter().enumerate() {
        let mark = if forward {
            start + step
        } else {
            start + MARKS - step
        };
        ring[mark % MARKS] = *number;
    }
    ring
}

/// Letters the two halves of a ring from its zero on; none where they meet.
fn lettered(numbers: Vec<i32>, first: Half, second: Half) -> Vec<Engraved> {
    let letter = |mark: usize| match mark {
        0 | HALF => None,
        mark if mark < HALF => Some(first),
        _ => Some(second),
    };
    let letters = (0..MARKS).map(letter);
    numbers.into_iter().zip(letters).collect()
}

fn unlettered(numbers: Vec<i32>) -> Vec<Engraved> {
    numbers.into_iter().map(|number| (number, None)).collect()
}

/// What an hour ring shows at each hour axis angle, counted westward in marks.
fn hour_ring(circle: &HourCircle, sidereal_marks: usize, side: Side) -> Vec<Engraved> {
    let westward = circle.increases == Increases::West;
    let mut ring = match circle.numbering {
        HourNumbering::Full => unlettered(laid(&counted_round(), 0, westward)),
        HourNumbering::PlusMinus => unlettered(laid(&plus_and_minus(), 0, westward)),
        HourNumbering::Halves => {
            lettered(laid(&up_and_down(), 0, westward), Half::West, Half::East)
        }
    };
    if circle.ring == Ring::Driven {
        // the clock drive has carried every mark west
        ring.rotate_right(sidereal_marks);
    }
    if circle.second_fiducial && side == Side::TubeEast {
        // the eye goes to the mark half a turn on
        ring.rotate_left(HALF);
    }
    ring
}

/// What a declination circle shows at each declination axis angle, counted northward in marks.
fn declination_ring(numbering: DeclinationNumbering) -> Vec<Engraved> {
    match numbering {
        DeclinationNumbering::Signed => unlettered(swinging()),
        DeclinationNumbering::Quarters => lettered(
            swinging().into_iter().map(i32::abs).collect(),
            Half::North,
            Half::South,
        ),
        DeclinationNumbering::PolarDistance => unlettered(laid(&up_and_down(), QUARTER, false)),
        DeclinationNumbering::SouthPolarDistance => {
            unlettered(laid(&up_and_down(), 3 * QUARTER, true))
        }
        DeclinationNumbering::Full => unlettered(counted_round()),
    }
}

fn hour_circles() -> Vec<HourCircle> {
    let mut circles = Vec::new();
    for ring in [Ring::Fixed, Ring::Slips, Ring::Driven] {
        for numbering in [
            HourNumbering::Full,
            HourNumbering::Halves,
            HourNumbering::PlusMinus,
        ] {
            for increases in [Increases::West, Increases::East] {
                for unit in [Unit::Hours, Unit::Degrees] {
                    for second_fiducial in [false, true] {
                        circles.push(HourCircle {
                            ring,
                            unit,
                            numbering,
                            increases,
                            division: Angle::from_degrees(0.5),
                            vernier: Some(Angle::from_degrees(0.1)),
                            second_fiducial,
                            reading_error: None,
                        });
                    }
                }
            }
        }
    }
    circles
}

fn declination_circles() -> Vec<DeclinationCircle> {
    [
        DeclinationNumbering::Signed,
        DeclinationNumbering::Quarters,
        DeclinationNumbering::PolarDistance,
        DeclinationNumbering::SouthPolarDistance,
        DeclinationNumbering::Full,
    ]
    .map(|numbering| DeclinationCircle {
        numbering,
        division: Angle::from_degrees(0.5),
        vernier: Some(Angle::from_degrees(0.1)),
        slips: false,
        reading_error: None,
    })
    .into()
}

fn degrees_of(mark: usize) -> f64 {
    f64::from(u32::try_from(mark).unwrap()) / 10.0
}

/// True if two axis angles are the same.
fn same(a: AxisAngle, b: AxisAngle) -> bool {
    (a.angle() - b.angle()).wrapped_signed().degrees().abs() < ROUNDING_DEG
}

fn assert_shows(reading: Reading, engraved: Engraved, what: &dyn std::fmt::Debug) {
    let off = reading.value.degrees() - f64::from(engraved.0) / 10.0;
    assert!(
        off.abs() < ROUNDING_DEG,
        "{reading:?} for {engraved:?} on {what:?}"
    );
    assert_eq!(reading.half, engraved.1, "{what:?}");
}

/// Every mark of a ring that can be meant by a number and a letter, or by the number alone.
fn search(ring: &[Engraved], number: i32, letter: Option<Half>) -> Vec<AxisAngle> {
    let meant = |engraved: &Engraved| {
        engraved.0 == number && (letter.is_none() || engraved.1.is_none() || engraved.1 == letter)
    };
    ring.iter()
        .enumerate()
        .filter(|(_, engraved)| meant(engraved))
        .map(|(mark, _)| AxisAngle::from_degrees(degrees_of(mark)))
        .collect()
}

fn assert_found(found: &[AxisAngle], expected: &[AxisAngle], what: &dyn std::fmt::Debug) {
    assert_eq!(
        found.len(),
        expected.len(),
        "{found:?} {expected:?} {what:?}"
    );
    for one in expected {
        assert!(
            found.iter().any(|other| same(*one, *other)),
            "{one:?} {what:?}"
        );
    }
}

#[test]
fn every_hour_circle_reads_as_engraved_and_is_found_again() {
    const SIDEREAL_MARKS: usize = 2413;
    let sidereal = SiderealTime::from_degrees(degrees_of(SIDEREAL_MARKS));
    let mut looked_at = 0;
    for circle in hour_circles() {
        for side in [Side::TubeWest, Side::TubeEast, Side::Single] {
            let ring = hour_ring(&circle, SIDEREAL_MARKS, side);
            // a stride that shares nothing with a quarter; the joints are all multiples of one
            for mark in (0..MARKS).filter(|mark| mark % 31 == 0 || mark % QUARTER < 2) {
                let shown = AxisAngle::from_degrees(degrees_of(mark));
                let reading = circle.reading(shown, sidereal, side);
                let (number, letter) = ring[mark];
                assert_shows(reading, ring[mark], &(circle, side, mark));
                for letter in [letter, None] {
                    let asked = Reading {
                        half: letter,
                        ..reading
                    };
                    let found = circle.candidates(asked, sidereal, side);
                    assert_found(
                        &found,
                        &search(&ring, number, letter),
                        &(circle, side, asked),
                    );
                }
                looked_at += 1;
            }
        }
    }
    assert!(looked_at > 25_000, "only {looked_at} marks were looked at");
}

#[test]
fn every_declination_circle_reads_as_engraved_and_is_found_again() {
    let mut most = 0;
    for circle in declination_circles() {
        let ring = declination_ring(circle.numbering);
        for mark in 0..MARKS {
            let shown = AxisAngle::from_degrees(degrees_of(mark));
            let reading = circle.reading(shown);
            let (number, letter) = ring[mark];
            assert_shows(reading, ring[mark], &(circle, mark));
            for letter in [letter, None] {
                let asked = Reading {
                    half: letter,
                    ..reading
                };
                let found = circle.candidates(asked);
                assert_found(&found, &search(&ring, number, letter), &(circle, asked));
                most = most.max(found.len());
            }
        }
    }
    assert_eq!(most, 4);
}

#[test]
fn what_is_written_on_a_circle_is_read_back_from_it() {
    let sidereal = SiderealTime::default();
    for circle in hour_circles() {
        for mark in 0..MARKS {
            let shown = AxisAngle::from_degrees(degrees_of(mark));
            let reading = circle.reading(shown, sidereal, Side::TubeEast);
            let text = circle.scale().text(reading);
            let back = read_hour(&circle, &text).unwrap();
            let found = circle.candidates(back, sidereal, Side::TubeEast);
            assert!(
                found.len() == 1 && same(found[0], shown),
                "{text} {circle:?} {mark}"
            );
        }
    }
    for circle in declination_circles() {
        for mark in 0..MARKS {
            let shown = AxisAngle::from_degrees(degrees_of(mark));
            let text = circle.scale().text(circle.reading(shown));
            let found = circle.candidates(read_dec(&circle, &text).unwrap());
            assert!(
                found.iter().any(|one| same(*one, shown)),
                "{text} {circle:?} {mark}"
            );
        }
    }
}

#[test]
fn one_star_read_on_both_sides_gives_the_published_index_error() {
    // Source: tests/reference/mount_two_sides.csv (Lockyer), a quartered circle with a vernier.
    let table = rows("mount_two_sides.csv");
    let printed = |quantity: &str| {
        let row = table.iter().find(|row| row.text("quantity") == quantity);
        row.unwrap().text("as_printed").to_owned()
    };
    let circle = DeclinationCircle {
        numbering: DeclinationNumbering::Quarters,
        division: Angle::from_arcminutes(10.0),
        vernier: Some(Angle::from_arcseconds(10.0)),
        slips: false,
        reading_error: None,
    };
    let on = |quantity: &str, beyond_the_pole: bool| {
        let text = format!("{} N", printed(quantity));
        let reading = read_dec(&circle, &text).unwrap();
        let found = circle.candidates(reading);
        assert_eq!(found.len(), 2, "{text}");
        let is_beyond = |shown: &&AxisAngle| (shown.degrees() > 90.0) == beyond_the_pole;
        found.iter().find(is_beyond).unwrap().angle()
    };
    let (west, east) = (
        on("reading tube on one side", false),
        on("reading tube on the other side", true),
    );
    // D + i on one side, 180° - D + i on the other
    let index = (west + east - Angle::HALF_TURN) / 2.0;
    let declination = west - index;
    let expect = |quantity| read(&printed(quantity), Unit::Degrees).unwrap().signed();
    let off = |a: Angle, b: Angle| (a - b).arcseconds().abs();
    assert!(off(index.abs(), expect("index error")) < HALF_A_PRINTED_SECOND);
    assert!(off(declination, expect("mean of the readings")) < HALF_A_PRINTED_SECOND);
}
