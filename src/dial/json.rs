//! The JSON form of settings, `nonius.dial/1`. Angles carry full double precision.

use serde::Serialize;

use crate::dial::{Caution, Dial};
use crate::sky::Moment;

/// Everything dialled at one instant.
#[derive(Debug, Serialize)]
pub struct Sheet<'a> {
    format: &'static str,
    utc: String,
    site: &'a str,
    mount: &'a str,
    sidereal: Sidereal,
    dials: Vec<One<'a>>,
    not_dialled: Vec<Withheld>,
}

#[derive(Debug, Serialize)]
struct Sidereal {
    apparent_deg: f64,
    mean_deg: f64,
}

#[derive(Debug, Serialize)]
struct OfDate {
    ra_deg: f64,
    dec_deg: f64,
}

#[derive(Debug, Serialize)]
struct ApparentPlace {
    hour_angle_deg: f64,
    declination_deg: f64,
}

#[derive(Debug, Serialize)]
struct ObservedPlace {
    hour_angle_deg: f64,
    declination_deg: f64,
    azimuth_deg: f64,
    altitude_deg: f64,
    refraction_arcmin: f64,
}

#[derive(Debug, Serialize)]
struct TwoAxes {
    hour_deg: f64,
    dec_deg: f64,
}

#[derive(Debug, Serialize)]
struct Mark<'a> {
    text: &'a str,
    utc: String,
    wait_s: f64,
}

#[derive(Debug, Serialize)]
struct HourCircle<'a> {
    reading_deg: f64,
    text: &'a str,
    next_mark: Option<Mark<'a>>,
}

#[derive(Debug, Serialize)]
struct DeclinationCircle<'a> {
    reading_deg: f64,
    text: &'a str,
}

#[derive(Debug, Serialize)]
struct Uncertain {
    hour_arcmin: f64,
    dec_arcmin: f64,
}

#[derive(Debug, Serialize)]
struct Chance<'a> {
    optic: &'a str,
    field_deg: f64,
    probability: f64,
}

#[derive(Debug, Serialize)]
struct Slit {
    azimuth_deg: f64,
    altitude_deg: f64,
}

#[derive(Debug, Serialize)]
#[allow(clippy::struct_field_names)] // the format's own names
struct Eyepiece {
    height_m: f64,
    east_m: f64,
    north_m: f64,
}

#[derive(Debug, Serialize)]
struct One<'a> {
    target: &'a str,
    side: &'static str,
    of_date: OfDate,
    apparent: ApparentPlace,
    observed: ObservedPlace,
    axes: TwoAxes,
    hour_circle: HourCircle<'a>,
    declination_circle: DeclinationCircle<'a>,
    uncertainty: Uncertain,
    chances: Vec<Chance<'a>>,
    swing: Option<TwoAxes>,
    dome: Option<Slit>,
    eyepiece: Option<Eyepiece>,
    cautions: &'a [Caution],
}

#[derive(Debug, Serialize)]
struct Withheld {
    target: String,
    reason: String,
}

impl<'a> Sheet<'a> {
    /// Empty, for an instant, a site and a mount by their names.
    #[must_use]
    pub fn new(moment: &Moment, site: &'a str, mount: &'a str) -> Self {
        Self {
            format: "nonius.dial/1",
            utc: moment.utc().rfc3339(),
            site,
            mount,
            sidereal: Sidereal {
                apparent_deg: moment.apparent_sidereal().degrees(),
                mean_deg: moment.mean_sidereal().degrees(),
            },
            dials: Vec::new(),
            not_dialled: Vec::new(),
        }
    }

    /// Adds a setting.
    pub fn add(&mut self, dial: &'a Dial) {
        self.dials.push(One::from(dial));
    }

    /// Adds a target that was not dialled, and why.
    pub fn add_withheld(&mut self, target: &str, reason: &str) {
        self.not_dialled.push(Withheld {
            target: target.to_owned(),
            reason: reason.to_owned(),
        });
    }
}

impl<'a> From<&'a Dial> for One<'a> {
    fn from(dial: &'a Dial) -> Self {
        let Dial {
            of_date,
            observed,
            axes,
            ..
        } = dial;
        Self {
            target: &dial.target,
            side: dial.side.word(),
            of_date: OfDate {
                ra_deg: of_date.right_ascension.degrees(),
                dec_deg: of_date.declination.degrees(),
            },
            apparent: ApparentPlace {
                hour_angle_deg: of_date.hour_angle.degrees(),
                declination_deg: of_date.declination.degrees(),
            },
            observed: ObservedPlace {
                hour_angle_deg: observed.hour_angle.degrees(),
                declination_deg: observed.declination.degrees(),
                azimuth_deg: observed.azimuth.degrees(),
                altitude_deg: observed.altitude.degrees(),
                refraction_arcmin: observed.refraction.arcminutes(),
            },
            axes: TwoAxes {
                hour_deg: axes.hour.degrees(),
                dec_deg: axes.dec.degrees(),
            },
            hour_circle: HourCircle {
                reading_deg: dial.hour.reading.value.degrees(),
                text: &dial.hour.text,
                next_mark: dial.hour.next_mark.as_ref().map(|mark| Mark {
                    text: &mark.text,
                    utc: mark.utc.rfc3339(),
                    wait_s: mark.wait_s,
                }),
            },
            declination_circle: DeclinationCircle {
                reading_deg: dial.dec.reading.value.degrees(),
                text: &dial.dec.text,
            },
            uncertainty: Uncertain {
                hour_arcmin: dial.uncertainty.hour.arcminutes(),
                dec_arcmin: dial.uncertainty.dec.arcminutes(),
            },
            chances: dial
                .chances
                .iter()
                .map(|chance| Chance {
                    optic: &chance.optic,
                    field_deg: chance.field.degrees(),
                    probability: chance.probability,
                })
                .collect(),
            swing: dial.swing.map(|swing| TwoAxes {
                hour_deg: swing.hour.degrees(),
                dec_deg: swing.dec.degrees(),
            }),
            dome: dial.slit.map(|slit| Slit {
                azimuth_deg: slit.azimuth.degrees(),
                altitude_deg: slit.altitude.degrees(),
            }),
            eyepiece: dial.eyepiece.map(|place| Eyepiece {
                height_m: place.height_m,
                east_m: place.east_m,
                north_m: place.north_m,
            }),
            cautions: &dial.cautions,
        }
    }
}
