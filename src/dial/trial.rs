//! A small mount at a made-up place, for the tests of this room.

use crate::angle::{Angle, Latitude, Longitude};
use crate::catalog::{Catalogue, Target};
use crate::dial::Setup;
use crate::estimate::{Estimate, Prior};
use crate::metal::{
    DeclinationCircle, DeclinationNumbering, ExpectedErrors, HourCircle, HourNumbering, Increases,
    Kind, Limits, Mount, Ring, SideRequest,
};
use crate::sexagesimal::Unit;
use crate::sky::{Air, HorizonMask, Moment, Observer};
use crate::time::{Dut1, Utc};

/// What a setup borrows.
pub(super) struct Trial {
    pub(super) mount: Mount,
    pub(super) estimate: Estimate,
    pub(super) horizon: HorizonMask,
}

impl Trial {
    pub(super) fn new() -> Self {
        Self {
            mount: Mount {
                name: "trial".to_owned(),
                kind: Kind::German,
                clock_drive: true,
                hour_circle: HourCircle {
                    ring: Ring::Fixed,
                    unit: Unit::Hours,
                    numbering: HourNumbering::Full,
                    increases: Increases::West,
                    division: Angle::from_time_seconds(240.0),
                    vernier: Some(Angle::from_time_seconds(20.0)),
                    second_fiducial: false,
                    reading_error: None,
                },
                declination_circle: DeclinationCircle {
                    numbering: DeclinationNumbering::Signed,
                    division: Angle::from_degrees(1.0),
                    vernier: Some(Angle::from_arcminutes(5.0)),
                    slips: false,
                    reading_error: None,
                },
                limits: Limits::default(),
                expected: ExpectedErrors::default(),
                dome: None,
                tube: None,
                optics: Vec::new(),
            },
            estimate: Estimate::from_prior(&Prior::from_expected(&ExpectedErrors::default())),
            horizon: HorizonMask::default(),
        }
    }

    pub(super) fn setup(&self) -> Setup<'_> {
        Setup {
            horizon: &self.horizon,
            mount: &self.mount,
            estimate: &self.estimate,
            side: SideRequest::Auto,
            tube: None,
            aside: crate::dial::Aside::default(),
            lead_s: 0.0,
            calibrated_at: None,
            sun_risk_accepted: false,
        }
    }
}

/// The sky of a place 54.5° north on the meridian of Greenwich.
pub(super) fn moment(utc: &str) -> Moment {
    let observer = Observer {
        latitude: Latitude::from_degrees(54.5),
        longitude: Longitude::default(),
        elevation_m: 350.0,
        dut1: Dut1::default(),
        air: Air::standard(350.0),
    };
    Moment::new(&observer, Utc::parse(utc).unwrap())
}

pub(super) fn target(name: &str) -> Target {
    Catalogue::builtin().resolve(name).unwrap()
}
