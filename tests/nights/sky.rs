//! A random mount under a random piece of sky, and what an observer reads and hits there.
//!
//! A portable mount at latitudes of 30° to 58° in either hemisphere; its polar axis off by 1° each way, cone 30', skew 12',
//! sag 3' (1 sigma each), its indexes anything. Stars and objects anywhere above 20° of altitude at declinations of -17° to
//! +75° (the reverse in the south), from the usual side of the pier.

use nonius::angle::{Angle, AxisAngle, Declination, HourAngle, Latitude};
use nonius::estimate::{Estimate, Prediction, Sight};
use nonius::metal::{Axes, Kind, MountErrors, OppositeVerniers, Side, to_axes, to_sky};
use nonius::sky::separation;

use crate::chance::Chance;

/// The field of the eyepiece.
pub const FIELD: Angle = Angle::from_degrees(1.0);

/// How well a circle is read, and set.
#[derive(Clone, Copy, Debug)]
pub struct Hand {
    /// Of the hour circle, 1 sigma.
    pub hour: Angle,
    /// Of the declination circle, 1 sigma.
    pub dec: Angle,
}

impl Hand {
    /// One look at each circle.
    pub const LOOK: Self = Self {
        hour: Angle::from_degrees(0.25),
        dec: Angle::from_degrees(0.15),
    };
    /// Stars timed, and objects awaited, with the hour circle set exactly on a mark.
    pub const ON_THE_MARK: Self = Self {
        hour: Angle::from_degrees(0.05),
        dec: Angle::from_degrees(0.15),
    };
}

/// A place on the sky, with the side of the pier it is seen from.
#[derive(Clone, Copy, Debug)]
pub struct Place {
    pub hour_angle: HourAngle,
    pub declination: Declination,
    pub side: Side,
}

/// A mount under a sky.
#[derive(Clone, Debug)]
pub struct Sky {
    pub latitude: Latitude,
    pub errors: MountErrors,
}

impl Sky {
    /// Any.
    pub fn random(chance: &mut Chance) -> Self {
        let latitude = chance.between(30.0, 58.0);
        let south = chance.uniform() < 0.5;
        let mut any = |sigma_arcmin: f64| Angle::from_arcminutes(chance.normal(sigma_arcmin));
        let (polar_high, polar_east, cone, skew, sag) =
            (any(60.0), any(60.0), any(30.0), any(12.0), any(3.0));
        Self {
            latitude: Latitude::from_degrees(if south { -latitude } else { latitude }),
            errors: MountErrors {
                hour_index: Angle::from_degrees(chance.between(-180.0, 180.0)),
                dec_index: Angle::from_degrees(chance.between(-180.0, 180.0)),
                polar_high,
                polar_east,
                cone,
                skew,
                sag,
                ..MountErrors::default()
            },
        }
    }

    /// A place anywhere, the same share of every piece of sky.
    pub fn place(&self, chance: &mut Chance) -> Place {
        let latitude = self.latitude.angle();
        let south = latitude < Angle::ZERO;
        loop {
            let sine = chance.between((-17.0_f64).to_radians().sin(), 75.0_f64.to_radians().sin());
            let declination = if south { -sine.asin() } else { sine.asin() };
            let hour_angle = chance.between(-180.0, 180.0);
            let altitude = latitude.sin() * declination.sin()
                + latitude.cos() * declination.cos() * hour_angle.to_radians().cos();
            if altitude > 20.0_f64.to_radians().sin() {
                let hour_angle = HourAngle::from_degrees(hour_angle);
                return Place {
                    hour_angle,
                    declination: Declination::new(Angle::from_radians(declination)),
                    side: Kind::German.usual_side(hour_angle, None),
                };
            }
        }
    }

    /// A place on that side of the pier.
    pub fn place_on(&self, chance: &mut Chance, side: Side) -> Place {
        loop {
            let place = self.place(chance);
            if place.side == side {
                return place;
            }
        }
    }

    /// What the circles show with it in the middle; never out of reach at these declinations.
    pub fn shown(&self, place: &Place) -> Axes {
        to_axes(
            place.hour_angle,
            place.declination,
            self.latitude,
            &self.errors,
            place.side,
        )
        .expect("far from the pole")
    }

    /// A star centred, and both circles read.
    pub fn read(&self, chance: &mut Chance, place: &Place, hand: Hand) -> Sight {
        let shown = self.shown(place);
        Sight {
            hour: vec![missed_by(chance, shown.hour, hand.hour)],
            dec: vec![missed_by(chance, shown.dec, hand.dec)],
            ..sight(place, hand)
        }
    }

    /// Sets the circles as told, and looks: true if the object is in the field.
    pub fn finds(&self, chance: &mut Chance, told: Axes, place: &Place, hand: Hand) -> bool {
        let set = Axes {
            hour: missed_by(chance, told.hour, hand.hour),
            dec: missed_by(chance, told.dec, hand.dec),
        };
        self.shows(set, place)
    }

    /// True if the object is in the field with the circles standing so.
    pub fn shows(&self, set: Axes, place: &Place) -> bool {
        let (hour_angle, declination) = to_sky(set, self.latitude, &self.errors);
        let off = separation(
            (hour_angle.angle(), declination),
            (place.hour_angle.angle(), place.declination),
        );
        off < FIELD / 2.0
    }

    /// What the estimate tells for a place; never out of reach at these declinations.
    pub fn told(&self, estimate: &Estimate, place: &Place) -> Prediction {
        let Place {
            hour_angle,
            declination,
            side,
        } = *place;
        estimate
            .predict(hour_angle, declination, self.latitude, side)
            .expect("far from the pole")
    }
}

/// A star at a place, its circles not read yet.
pub fn sight(place: &Place, hand: Hand) -> Sight {
    Sight {
        hour_angle: place.hour_angle,
        declination: place.declination,
        side: place.side,
        hour: Vec::new(),
        dec: Vec::new(),
        sigma_hour: hand.hour,
        sigma_dec: hand.dec,
        opposite: OppositeVerniers::default(),
    }
}

fn missed_by(chance: &mut Chance, axis: AxisAngle, sigma: Angle) -> AxisAngle {
    AxisAngle::new(axis.angle() + Angle::from_radians(chance.normal(sigma.radians())))
}
