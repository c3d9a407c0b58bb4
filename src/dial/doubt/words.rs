//! Explanations in plain words.

use crate::angle::Angle;
use crate::dial::doubt::Questioned;
use crate::dial::doubt::account::What;
use crate::dial::doubt::explanation::{Circle, Off};
use crate::metal::{Misreading, Mistake, Mount, Reading, Scale, Side, Step};
use crate::sexagesimal::{Notation, Unit};

/// What may have gone wrong, in plain words.
pub(super) fn of(questioned: &Questioned<'_>, what: &What, off: Off) -> String {
    let mount = questioned.mount;
    match what {
        What::Misread(circle, misreading) => misread(questioned, *circle, misreading),
        What::Star(star) => format!("this was {}, not {}", star.name, questioned.target.name),
        What::Side(Side::TubeEast) => "the tube stood east of the pier".to_owned(),
        What::Side(_) => "the tube stood west of the pier".to_owned(),
        What::Slipped(slipped) => {
            let hour = size(&mount.hour_circle.scale(), off.hour);
            let dec = size(&mount.declination_circle.scale(), off.dec);
            match (slipped.hour, slipped.dec) {
                (true, true) => {
                    format!("both circles have slipped, by {hour} and {dec}")
                }
                (true, false) => format!("the hour circle has slipped by {hour}"),
                _ => format!("the declination circle has slipped by {dec}"),
            }
        }
        What::Clock(seconds) => clock(*seconds),
    }
}

/// A number as the engraving has it.
pub(super) fn engraved(mount: &Mount, circle: Circle, reading: Reading) -> String {
    scale(mount, circle).text(reading)
}

fn scale(mount: &Mount, circle: Circle) -> Scale {
    match circle {
        Circle::Hour | Circle::HourOpposite => mount.hour_circle.scale(),
        Circle::Dec | Circle::DecOpposite => mount.declination_circle.scale(),
    }
}

fn misread(questioned: &Questioned<'_>, circle: Circle, misreading: &Misreading) -> String {
    let sighting = questioned.sighting;
    let (name, was) = match circle {
        Circle::Hour => ("hour circle", Some(sighting.hour)),
        Circle::HourOpposite => ("hour circle's opposite vernier", sighting.hour_opposite),
        Circle::Dec => ("declination circle", Some(sighting.dec)),
        Circle::DecOpposite => (
            "declination circle's opposite vernier",
            sighting.dec_opposite,
        ),
    };
    let scale = scale(questioned.mount, circle);
    let how = match misreading.mistake {
        Mistake::Step(step) => format!("misread by {}", step_in_words(&scale, step)),
        Mistake::Letter => "with the wrong letter".to_owned(),
        Mistake::Sign => "with the wrong sign".to_owned(),
        Mistake::CountedBack => "counted the wrong way from a number".to_owned(),
        Mistake::FromTheMarkAhead => "counted from the wrong mark".to_owned(),
        Mistake::OtherEnd => "read by the wrong row of numbers".to_owned(),
        Mistake::Complement => "read from the wrong end of the quarter".to_owned(),
        Mistake::OppositeMark => "read at the opposite mark".to_owned(),
    };
    let right = scale.text(misreading.reading);
    let typed = was.map_or_else(String::new, |was| {
        format!(" rather than {}", scale.text(was))
    });
    format!("{name} {how}: {right}{typed}")
}

fn step_in_words(scale: &Scale, step: Step) -> String {
    match step {
        Step::Hour => "one hour".to_owned(),
        Step::TenMinutes => "ten minutes".to_owned(),
        Step::TenDegrees => "ten degrees".to_owned(),
        Step::FiveDegrees => "five degrees".to_owned(),
        Step::Degree => "one degree".to_owned(),
        Step::Number => format!("one number ({})", size(scale, scale.step(step))),
        Step::Division => format!("one division ({})", size(scale, scale.step(step))),
        Step::HalfDivision => format!("half a division ({})", size(scale, scale.step(step))),
    }
}

/// An amount in the unit of the circle, as fine as the eye can set it.
fn size(scale: &Scale, amount: Angle) -> String {
    Notation::new(scale.unit(), scale.settable_step()).write_size(amount)
}

/// A clock ahead is put right by taking away.
fn clock(seconds: f64) -> String {
    let way = if seconds < 0.0 { "ahead" } else { "behind" };
    let amount = seconds.abs();
    if (amount - 3600.0).abs() < 1.0 {
        format!("the clock was an hour {way}")
    } else {
        let time = Angle::from_time_seconds(amount);
        let written = Notation::new(Unit::Hours, Angle::from_time_seconds(1.0)).write_size(time);
        format!("the clock was {written} {way}")
    }
}
