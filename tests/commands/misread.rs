//! Readings that are wrong: a division misread, and a circle that is not centred.

use std::fmt::Write as _;

use crate::calibrate::{calibrated, errors};
use crate::pretended::{AS_ENGRAVED, EXACTLY, NAMES, NORTHERN, TARN_HOLLOW, TRUE, readings};
use crate::program::{Home, number};

#[test]
fn one_wrong_reading_of_twelve_stands_out_and_does_not_drag_the_others_along() {
    let home = Home::new();
    let mount = home.write("fine.toml", &TARN_HOLLOW.finely_read());
    let sound = readings(&TARN_HOLLOW, &NORTHERN, EXACTLY);
    // the seventh star read a whole division of the declination circle out
    let wrong: Vec<String> = sound
        .lines()
        .enumerate()
        .map(|(number, line)| {
            let mut cells: Vec<String> = line.split(',').map(str::to_owned).collect();
            if number == 7 {
                let (degrees, rest) = cells[3].split_once(' ').unwrap();
                cells[3] = format!("{} {rest}", degrees.parse::<u32>().unwrap() + 1);
            }
            cells.join(",")
        })
        .collect();
    let file = home.write("night.csv", &(wrong.join("\n") + "\n"));
    let report = calibrated(&home, &TARN_HOLLOW, &mount, &file);
    for (index, residual) in report["residuals"].as_array().unwrap().iter().enumerate() {
        let weight = number(residual, "/weight");
        if index == 6 {
            assert!(weight > 0.0 && weight < 0.05, "{residual}");
            assert!(
                (number(residual, "/dec_arcmin").abs() - 60.0).abs() < 2.0,
                "{residual}"
            );
        } else {
            assert!(weight > 0.5, "{residual}");
            assert!(number(residual, "/dec_arcmin").abs() < 1.0, "{residual}");
        }
    }
    for ((value, _), (truth, name)) in errors(&report).into_iter().zip(TRUE.into_iter().zip(NAMES))
    {
        // a misreading of 60' moves nothing by more than a fortieth of itself
        assert!((value - truth).abs() < 1.5, "{name}: {value}, not {truth}");
    }
}

#[test]
fn the_mean_of_opposite_verniers_is_free_of_an_eccentric_circle() {
    let home = Home::new();
    let sound = readings(&TARN_HOLLOW, &NORTHERN, EXACTLY);
    // an hour circle whose centre is off: 9' times the cosine of its reading
    let eccentric = |both: bool| {
        let mut file = String::new();
        for (number, line) in sound.lines().enumerate() {
            if number == 0 {
                writeln!(file, "{line},hour-b").unwrap();
                continue;
            }
            let mut cells: Vec<String> = line.split(',').map(str::to_owned).collect();
            let parts = cells[2].split(' ').zip([15.0, 0.25, 0.25 / 60.0]);
            let shown: f64 = parts
                .map(|(part, unit)| part.parse::<f64>().unwrap() * unit)
                .sum();
            let off = 9.0 / 60.0 * shown.to_radians().cos();
            let written = |degrees: f64| format!("{:.5}", degrees.rem_euclid(360.0) / 15.0);
            cells[2] = written(shown + off);
            let opposite = if both {
                written(shown + 180.0 - off)
            } else {
                String::new()
            };
            writeln!(file, "{},{opposite}", cells.join(",")).unwrap();
        }
        home.write(if both { "both.csv" } else { "one.csv" }, &file)
    };
    let worst = |file: &str| {
        let report = calibrated(&home, &TARN_HOLLOW, "six-inch", file);
        let off = errors(&report)
            .into_iter()
            .zip(TRUE)
            .map(|((value, _), truth)| (value - truth).abs());
        off.fold(0.0, f64::max)
    };
    let (with_both, with_one) = (worst(&eccentric(true)), worst(&eccentric(false)));
    assert!(with_both < 2.0, "{with_both}");
    assert!(with_one > 2.0 * with_both, "{with_one} {with_both}");
}

#[test]
fn dialling_by_a_file_with_a_misread_circle_says_so() {
    let home = Home::new();
    let sound = readings(&TARN_HOLLOW, &NORTHERN, AS_ENGRAVED);
    let words = |file: &str| {
        let file = home.write("night.csv", file);
        let ran = home.run(&[
            "--site",
            "tarn-hollow",
            "--at",
            "2026-12-01T21:30:00Z",
            "--readings",
            &file,
            "dial",
            "M 37",
        ]);
        assert_eq!(ran.status, 0, "{ran:?}");
        ran.err
    };
    assert_eq!(words(&sound), "");
    // the fourth star read an hour out
    let lines = sound.lines().enumerate().map(|(number, line)| {
        let mut cells: Vec<String> = line.split(',').map(str::to_owned).collect();
        if number == 4 {
            let (hours, rest) = cells[2].split_once(' ').unwrap();
            cells[2] = format!("{} {rest}", (hours.parse::<u32>().unwrap() + 1) % 24);
        }
        cells.join(",")
    });
    let wrong: Vec<String> = lines.collect();
    let said = words(&(wrong.join("\n") + "\n"));
    assert!(
        said.contains("reading 4, Mirfak") && said.contains("misread by one hour"),
        "{said}"
    );
    assert_eq!(said.lines().count(), 1, "{said}");
}
