//! The whole way of a mount's errors: what the circles show, a file, the fit, the settings.

use nalgebra::SMatrix;
use nonius::angle::{Angle, Declination, HourAngle};
use nonius::metal::geometry::to_axes_with_slopes;
use nonius::metal::{MountErrors, Side, to_axes};
use serde_json::{Value, json};

use crate::pretended::{
    AS_ENGRAVED, EXACTLY, NAMES, NORTHERN, SALTPAN_RIDGE, SOUTHERN, Station, TARN_HOLLOW, TRUE,
    observed, pretended, readings,
};
use crate::program::{Home, cautions, number, text, wrapped};
use crate::shape::assert_shape;

pub fn calibrated(home: &Home, station: &Station, mount: &str, file: &str) -> Value {
    let report = home.json(&["calibrate", file, "--site", station.site, "--mount", mount]);
    for (term, name) in report["errors"].as_array().unwrap().iter().zip(NAMES) {
        assert_eq!(term["name"], name);
    }
    report
}

/// Value and sigma of each error, in arcminutes.
pub fn errors(report: &Value) -> Vec<(f64, f64)> {
    let terms = report["errors"].as_array().unwrap();
    assert_eq!(terms.len(), 7);
    terms
        .iter()
        .map(|term| (number(term, "/value_arcmin"), number(term, "/sigma_arcmin")))
        .collect()
}

fn covariance(report: &Value) -> SMatrix<f64, 7, 7> {
    let rows = report["covariance_arcmin2"].as_array().unwrap();
    assert!(rows.len() == 7 && rows.iter().all(|row| row.as_array().unwrap().len() == 7));
    SMatrix::from_fn(|row, column| number(&rows[row], &format!("/{column}")))
}

#[test]
fn circles_read_finely_give_back_the_errors_of_the_mount() {
    /// Readings to a hundredth of a second and the pull of what was expected beforehand.
    const TOLERANCE_ARCMIN: f64 = 0.1;
    for (station, stars) in [(TARN_HOLLOW, NORTHERN), (SALTPAN_RIDGE, SOUTHERN)] {
        let home = Home::new();
        let mount = home.write("fine.toml", &station.finely_read());
        let file = home.write("night.csv", &readings(&station, &stars, EXACTLY));
        let report = calibrated(&home, &station, &mount, &file);
        for ((value, sigma), (truth, name)) in
            errors(&report).into_iter().zip(TRUE.into_iter().zip(NAMES))
        {
            assert!(
                (value - truth).abs() < 3.0 * sigma,
                "{name}: {value} ± {sigma}, not {truth}"
            );
            assert!(
                (value - truth).abs() < TOLERANCE_ARCMIN,
                "{name}: {value}, not {truth}"
            );
            assert!(sigma > 0.01 && sigma < 1.5, "{name}: ± {sigma}");
        }
        assert!(number(&report, "/spread_arcmin") < 0.05);
        let residuals = report["residuals"].as_array().unwrap();
        assert_eq!(
            (residuals.len(), &report["readings_used"]),
            (12, &json!(12))
        );
        for (index, residual) in residuals.iter().enumerate() {
            assert_eq!(
                (&residual["row"], &residual["star"]),
                (&json!(index + 1), &json!(stars[index]))
            );
            assert!(
                number(residual, "/hour_arcmin").abs() < TOLERANCE_ARCMIN,
                "{residual}"
            );
            assert!(
                number(residual, "/dec_arcmin").abs() < TOLERANCE_ARCMIN,
                "{residual}"
            );
            assert!(
                (number(residual, "/weight") - 1.0).abs() < 1e-12,
                "{residual}"
            );
        }
    }
}

#[test]
fn circles_read_as_engraved_give_them_back_within_what_they_claim() {
    let home = Home::new();
    let file = home.write("night.csv", &readings(&TARN_HOLLOW, &NORTHERN, AS_ENGRAVED));
    let report = calibrated(&home, &TARN_HOLLOW, "six-inch", &file);
    for ((value, sigma), (truth, name)) in
        errors(&report).into_iter().zip(TRUE.into_iter().zip(NAMES))
    {
        assert!(
            (value - truth).abs() < 3.0 * sigma,
            "{name}: {value} ± {sigma}, not {truth}"
        );
        assert!(sigma < 5.0, "{name}: ± {sigma}");
    }
    // half a vernier line is 2.5' on either circle
    assert!(number(&report, "/spread_arcmin") < 2.5, "{report}");
    for residual in report["residuals"].as_array().unwrap() {
        assert!(number(residual, "/hour_arcmin").abs() < 5.0, "{residual}");
        assert!(number(residual, "/dec_arcmin").abs() < 5.0, "{residual}");
    }
}

#[test]
fn the_report_has_its_shape_and_the_covariance_is_one() {
    let home = Home::new();
    let file = home.write("night.csv", &readings(&TARN_HOLLOW, &NORTHERN, AS_ENGRAVED));
    let mut report = calibrated(&home, &TARN_HOLLOW, "six-inch", &file);
    let covariance = covariance(&report);
    for (index, (_, sigma)) in errors(&report).into_iter().enumerate() {
        let variance = covariance[(index, index)];
        assert!(
            (variance / sigma.powi(2) - 1.0).abs() < 1e-9,
            "{variance} {sigma}"
        );
        for other in 0..7 {
            let scale = (variance * covariance[(other, other)]).sqrt();
            let off = (covariance[(index, other)] - covariance[(other, index)]).abs();
            assert!(off <= 1e-9 * scale, "{covariance}");
        }
    }
    assert!(
        covariance.symmetric_eigenvalues().min() > 0.0,
        "{covariance}"
    );
    // what only some nights have
    assert!(report["suspicions"].is_array());
    let members = report.as_object_mut().unwrap();
    assert!(members.remove("suspicions").is_some() && members.remove("next_star").is_some());
    assert_shape(
        &report,
        &json!({
            "format": "", "site": "", "mount": "", "readings_used": 0,
            "errors": [{"name": "", "value_arcmin": 0.0, "sigma_arcmin": 0.0}],
            "covariance_arcmin2": [[0.0]],
            "residuals": [{"row": 0, "star": "", "hour_arcmin": 0.0, "dec_arcmin": 0.0, "weight": 0.0}],
            "spread_arcmin": 0.0
        }),
    );
    assert_eq!(
        (&report["format"], &report["site"], &report["mount"]),
        (
            &json!("nonius.calibration/1"),
            &json!("tarn-hollow"),
            &json!("six-inch")
        )
    );
}

#[test]
fn settings_from_the_readings_bring_the_true_mount_onto_the_target() {
    const TOLERANCE_ARCMIN: f64 = 0.15;
    for (station, stars) in [(TARN_HOLLOW, NORTHERN), (SALTPAN_RIDGE, SOUTHERN)] {
        let home = Home::new();
        let mount = home.write("fine.toml", &station.finely_read());
        let file = home.write("night.csv", &readings(&station, &stars, EXACTLY));
        let at = "2026-12-01T21:30:00Z";
        let moment = station.moment(at);
        for (word, side) in [("tube-west", Side::TubeWest), ("tube-east", Side::TubeEast)] {
            let words = [
                "dial",
                "M 37",
                "M 42",
                "Hamal",
                "--at",
                at,
                "--side",
                word,
                "--site",
                station.site,
            ];
            let words = [&words[..], &["--mount", &mount, "--readings", &file]].concat();
            let sheet = home.json(&words);
            for dial in sheet["dials"].as_array().unwrap() {
                let axes = to_axes(
                    HourAngle::from_degrees(number(dial, "/observed/hour_angle_deg")),
                    Declination::from_degrees(number(dial, "/observed/declination_deg")),
                    moment.observer().latitude,
                    &pretended(),
                    side,
                )
                .unwrap();
                let hour = wrapped(number(dial, "/axes/hour_deg") - axes.hour.degrees()) * 60.0;
                let dec = wrapped(number(dial, "/axes/dec_deg") - axes.dec.degrees()) * 60.0;
                assert!(
                    hour.abs() < TOLERANCE_ARCMIN && dec.abs() < TOLERANCE_ARCMIN,
                    "{hour} {dec} {dial}"
                );
                assert!(number(dial, "/uncertainty/hour_arcmin") < 1.0, "{dial}");
                let codes = cautions(dial);
                assert!(
                    !codes.contains(&"uncalibrated") && !codes.contains(&"stale-calibration"),
                    "{dial}"
                );
            }
            assert_eq!(sheet["dials"].as_array().unwrap().len(), 3);
        }
        let words = [
            "dial",
            "M 42",
            "--at",
            "2026-12-02T18:30:00Z",
            "--site",
            station.site,
        ];
        let stale = home.json(&[&words[..], &["--mount", &mount, "--readings", &file]].concat());
        assert!(
            cautions(&stale["dials"][0]).contains(&"stale-calibration"),
            "{stale}"
        );
    }
}

#[test]
fn one_star_fixes_what_the_circles_show_there_and_leaves_the_rest_as_expected() {
    let home = Home::new();
    let mount = home.write("fine.toml", &TARN_HOLLOW.finely_read());
    // row two of a file is read with the tube west
    let all = readings(&TARN_HOLLOW, &["Vega", "Capella"], EXACTLY);
    let lines: Vec<&str> = all.lines().collect();
    let file = home.write("one.csv", &format!("{}\n{}\n", lines[0], lines[2]));
    let report = calibrated(&home, &TARN_HOLLOW, &mount, &file);
    let found = errors(&report);
    // the mount file's own expectations: 10' for the polar axis, 8', 6' and 3'
    for ((value, sigma), expected) in found[2..].iter().zip([10.0, 10.0, 8.0, 6.0, 3.0]) {
        assert!((sigma - expected).abs() < 0.001, "{sigma}, not {expected}");
        assert!(value.abs() < 0.05, "{value}");
    }
    // the indexes alone are known no better than what the rest may add to them
    assert!(found[0].1 > 5.0 && found[1].1 > 5.0, "{found:?}");

    // together they show what was read, to the reading's own error: 1 s of time and 0.2'
    let utc = lines[2].split(',').next().unwrap();
    let moment = TARN_HOLLOW.moment(utc);
    let place = observed(&moment, "Capella");
    let fitted: Vec<Angle> = found
        .iter()
        .map(|(value, _)| Angle::from_arcminutes(*value))
        .collect();
    let fitted = MountErrors::with_centred_circles(fitted.try_into().unwrap());
    let latitude = moment.observer().latitude;
    let (_, slopes) = to_axes_with_slopes(
        place.hour_angle,
        place.declination,
        latitude,
        &fitted,
        Side::TubeWest,
    )
    .unwrap();
    let by_errors = slopes.by_errors.fixed_columns::<7>(0).into_owned();
    let there = by_errors * covariance(&report) * by_errors.transpose();
    assert!((there.m11.sqrt() / 0.25 - 1.0).abs() < 0.001, "{there}");
    assert!((there.m22.sqrt() / 0.2 - 1.0).abs() < 0.001, "{there}");

    // and so do the settings; the further from that star, the less is known
    let words = [
        "dial",
        "Capella",
        "Mirfak",
        "M 31",
        "Vega",
        "--at",
        utc,
        "--side",
        "tube-west",
    ];
    let sheet = home.json(&[&words[..], &["--mount", &mount, "--readings", &file]].concat());
    let dials = sheet["dials"].as_array().unwrap();
    assert!(
        (number(&dials[0], "/uncertainty/hour_arcmin") - 0.25).abs() < 0.001,
        "{sheet}"
    );
    assert!(
        (number(&dials[0], "/uncertainty/dec_arcmin") - 0.2).abs() < 0.001,
        "{sheet}"
    );
    let smallest_field = |dial: &Value| number(&dial["chances"][2], "/probability");
    assert!(smallest_field(&dials[0]) > 0.99, "{sheet}");
    for two in dials.windows(2) {
        let total = |dial: &Value| {
            // on the sky
            let stretch = number(dial, "/observed/declination_deg").to_radians().cos();
            (number(dial, "/uncertainty/hour_arcmin") * stretch)
                .hypot(number(dial, "/uncertainty/dec_arcmin"))
        };
        assert!(total(&two[1]) > total(&two[0]), "{sheet}");
        assert!(
            smallest_field(&two[1]) <= smallest_field(&two[0]),
            "{sheet}"
        );
    }
}

#[test]
fn the_table_says_what_the_json_says() {
    let home = Home::new();
    let file = home.write("night.csv", &readings(&TARN_HOLLOW, &NORTHERN, AS_ENGRAVED));
    let words = ["calibrate", &file, "--site", "tarn-hollow"];
    let (report, table) = (home.json(&words), home.out(&words));
    let lines: Vec<&str> = table.lines().collect();
    assert!(lines[0].ends_with("12 of 12 readings used"), "{table}");
    for (name, (value, sigma)) in NAMES.into_iter().zip(errors(&report)) {
        let line = lines.iter().find(|line| line.starts_with(name)).unwrap();
        let numbers = minutes_of(line.strip_prefix(name).unwrap());
        assert_eq!(numbers.len(), 2, "{line}");
        // written to a tenth of a minute
        assert!((numbers[0] - value).abs() <= 0.05 + 1e-9, "{line}: {value}");
        assert!((numbers[1] - sigma).abs() <= 0.05 + 1e-9, "{line}: {sigma}");
    }
    for residual in report["residuals"].as_array().unwrap() {
        let line = lines
            .iter()
            .find(|line| line.contains(text(residual, "/star")))
            .unwrap();
        let cells: Vec<f64> = line
            .split_whitespace()
            .filter_map(|cell| cell.trim_end_matches('\'').parse().ok())
            .collect();
        let expected = ["/row", "/hour_arcmin", "/dec_arcmin", "/weight"]
            .map(|member| number(residual, member));
        assert_eq!(cells.len(), 4, "{line}");
        for (cell, expected) in cells.iter().zip(expected) {
            assert!((cell - expected).abs() <= 0.05 + 1e-9, "{line}: {residual}");
        }
    }
    let spread = format!(
        "spread of the residuals {:.1}'",
        number(&report, "/spread_arcmin")
    );
    assert!(lines.contains(&spread.as_str()), "{table}");
    // the target has every row, by its number
    let target = lines
        .iter()
        .skip_while(|line| !line.contains("dec: too far north"))
        .skip(1)
        .take_while(|line| !line.is_empty());
    let mut drawn: Vec<usize> = target
        .flat_map(|line| line.split(|c: char| !c.is_ascii_digit()))
        .filter_map(|number| number.parse().ok())
        .collect();
    drawn.sort_unstable();
    assert_eq!(drawn, (1..=12).collect::<Vec<usize>>(), "{table}");
    // the pretended axis is 14' too high and lies 22' too far west
    assert!(
        table.contains("lower its raised (north) end by 1"),
        "{table}"
    );
    assert!(table.contains(" east (known within "), "{table}");
    assert!(
        lines.iter().all(|line| line.chars().count() < 80),
        "{table}"
    );
}

/// The angles of a line such as `+3° 26.9'    1.9'`, in minutes.
fn minutes_of(line: &str) -> Vec<f64> {
    line.split_inclusive('\'')
        .filter(|part| part.ends_with('\''))
        .map(|part| {
            let numbers: Vec<f64> = part
                .split(|c: char| !c.is_ascii_digit() && c != '.')
                .filter_map(|number| number.parse().ok())
                .collect();
            let size = match numbers.as_slice() {
                [degrees, minutes] => degrees * 60.0 + minutes,
                [minutes] => *minutes,
                _ => panic!("{line}"),
            };
            if part.contains('-') { -size } else { size }
        })
        .collect()
}

#[test]
fn an_hour_misread_in_a_file_is_suspected_and_explained() {
    let home = Home::new();
    let sound = readings(&TARN_HOLLOW, &NORTHERN, AS_ENGRAVED);
    let file = home.write("sound.csv", &sound);
    let report = calibrated(&home, &TARN_HOLLOW, "six-inch", &file);
    assert_eq!(report["suspicions"], json!([]));

    // the third star's hour, one more than it was
    let line = sound.lines().nth(3).unwrap();
    let cells: Vec<&str> = line.split(',').collect();
    let (hour, rest) = cells[2].split_once(' ').unwrap();
    let wrong = format!("{} {rest}", (hour.parse::<u32>().unwrap() + 1) % 24);
    let misread = line.replace(cells[2], &wrong);
    let file = home.write("misread.csv", &sound.replace(line, &misread));
    let report = calibrated(&home, &TARN_HOLLOW, "six-inch", &file);
    let suspicions = report["suspicions"].as_array().unwrap();
    assert_eq!(suspicions.len(), 1, "{report}");
    assert_eq!(suspicions[0]["row"], 3);
    assert!(number(&suspicions[0], "/improbability") < 1e-6);
    let explanations = suspicions[0]["explanations"].as_array().unwrap();
    assert_eq!(explanations[0]["kind"], "hour-misread");
    assert!(number(&explanations[0], "/share") > 0.9);
    let shares: f64 = explanations.iter().map(|one| number(one, "/share")).sum();
    assert!(shares <= 1.0 + 1e-9, "{report}");
    for one in explanations {
        assert_shape(one, &json!({"text": "", "kind": "", "share": 0.0}));
    }
    let said = text(&explanations[0], "/text");
    assert!(
        said.starts_with("hour circle misread by one hour: "),
        "{said}"
    );
    let table = home.out(&["calibrate", &file, "--site", "tarn-hollow"]);
    assert!(table.contains(said) && table.contains("row 3, "), "{table}");
}
