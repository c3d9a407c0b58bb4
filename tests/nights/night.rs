//! Whole nights: stars read, objects looked for, and what came of it.

use nonius::angle::Angle;
use nonius::estimate::{Covariance, Estimate, Offered, Prior, Sight, Station, Wanted, fit};
use nonius::metal::errors::COUNT;
use nonius::metal::{ExpectedErrors, Side, to_axes_with_slopes};

use crate::chance::Chance;
use crate::circles::Circles;
use crate::sky::{Hand, Place, Sky};
use crate::tally::{Rate, Stated, median};

/// Objects of a night's list.
const OBJECTS: usize = 20;
/// Stars the tool may choose from.
const CANDIDATES: usize = 18;
/// Objects found and read, in the nights that read every one.
pub const FED: usize = 50;
/// Looks that say how well the mount is known after each of them.
const LOOKS_BETWEEN: usize = 4;

/// All figures of a simulation.
#[derive(Clone, Debug, Default)]
pub struct Figures {
    pub count: usize,
    /// Indexes only, from one star; nothing else allowed for.
    pub index_only: Rate,
    /// With one, three and six stars taken at random.
    pub random: [Rate; 3],
    /// The same, chosen for the list.
    pub chosen: [Rate; 3],
    /// The same, chosen and timed, the objects awaited on the mark.
    pub timed: [Rate; 3],
    /// With every error of the mount known.
    pub perfect: Rate,
    /// With each kind of circles, read, rounded, typed and set as an observer does: after one, three and six stars chosen
    /// for the list, and with every error known.
    pub circles: [[Rate; 4]; 3],
    /// After so many objects found, at the first look or by a sweep, and read, beside three stars chosen.
    pub fed: Vec<Rate>,
    /// What was stated at any of the stages with random stars.
    pub stated: Stated,
    /// Root mean square of the estimate's error against the bound, at six stars; one is the bound.
    pub against_bound: f64,
    /// With one wrong reading among six: how far other places are told wrong, in stated sigmas, median.
    pub one_wrong: f64,
    squares: f64,
    wrong: Vec<f64>,
}

const STAGES: [usize; 3] = [1, 3, 6];

/// Simulates so many nights.
pub fn nights(count: usize, seed: u64) -> Figures {
    let mut figures = Figures {
        count,
        fed: vec![Rate::default(); FED + 1],
        ..Figures::default()
    };
    for night in 0..count as u64 {
        // a stream for each night, so that one night can be looked at alone
        let mut chance = Chance::seeded(seed.wrapping_mul(0x1_0000_0001).wrapping_add(night << 20));
        one(&mut figures, &mut chance);
    }
    figures.against_bound = (figures.squares / (count * COUNTED) as f64).sqrt();
    figures.one_wrong = median(&mut figures.wrong);
    figures
}

/// The errors a portable mount's prior leaves free to move.
const COUNTED: usize = 7;

fn prior() -> Prior {
    Prior::from_expected(&ExpectedErrors::default())
}

fn known(sky: &Sky, sights: &[Sight]) -> Estimate {
    Estimate::from(&fit(sky.latitude, &prior(), sights))
}

fn one(figures: &mut Figures, chance: &mut Chance) {
    let sky = Sky::random(chance);
    let objects: Vec<Place> = (0..OBJECTS).map(|_| sky.place(chance)).collect();
    // the second and third star on either side of the meridian, and so on in turn
    let stars: Vec<Place> = (0..6)
        .map(|star| match star {
            0 => sky.place(chance),
            odd if odd % 2 == 1 => sky.place_on(chance, Side::TubeWest),
            _ => sky.place_on(chance, Side::TubeEast),
        })
        .collect();
    let look = Hand::LOOK;
    let sights: Vec<Sight> = stars
        .iter()
        .map(|star| sky.read(chance, star, look))
        .collect();
    for (rate, stars) in figures.random.iter_mut().zip(STAGES) {
        let estimate = known(&sky, &sights[..stars]);
        for object in &objects {
            let told = sky.told(&estimate, object);
            let found = sky.finds(chance, told.axes, object, look);
            rate.count(found);
            figures.stated.count(&told, look, found);
        }
    }
    let index_only = index_only(&sky, &sights[0]);
    let perfect = Estimate::new(sky.errors, Covariance::zeros());
    for object in &objects {
        let told = sky.told(&index_only, object).axes;
        figures
            .index_only
            .count(sky.finds(chance, told, object, look));
        let told = sky.told(&perfect, object).axes;
        figures.perfect.count(sky.finds(chance, told, object, look));
    }
    let three = chosen(&mut figures.chosen, chance, &sky, &objects, Hand::LOOK);
    chosen(
        &mut figures.timed,
        chance,
        &sky,
        &objects,
        Hand::ON_THE_MARK,
    );
    fed(&mut figures.fed, chance, &sky, &three[..3]);
    for (rates, circles) in figures.circles.iter_mut().zip(Circles::kinds()) {
        with_circles(rates, chance, &sky, &objects, &circles);
    }
    figures.squares += against_bound(&sky, &stars, &known(&sky, &sights));
    one_wrong(&mut figures.wrong, chance, &sky, &sights, &objects);
}

/// The mount of the index errors alone.
fn index_only(sky: &Sky, sight: &Sight) -> Estimate {
    let exact = ExpectedErrors {
        polar_high: Angle::ZERO,
        polar_east: Angle::ZERO,
        cone: Angle::ZERO,
        skew: Angle::ZERO,
        sag: Angle::ZERO,
        ..ExpectedErrors::default()
    };
    let prior = Prior::from_expected(&exact);
    Estimate::from(&fit(sky.latitude, &prior, std::slice::from_ref(sight)))
}

fn station(place: &Place, hand: Hand) -> Station {
    Station {
        hour_angle: place.hour_angle,
        declination: place.declination,
        side: place.side,
        sigma_hour: hand.hour,
        sigma_dec: hand.dec,
    }
}

/// Stars to choose from, for the objects of the list.
struct Choosing {
    candidates: Vec<Place>,
    demands: Vec<Station>,
    hand: Hand,
}

impl Choosing {
    fn new(chance: &mut Chance, sky: &Sky, objects: &[Place], hand: Hand) -> Self {
        Self {
            candidates: (0..CANDIDATES).map(|_| sky.place(chance)).collect(),
            demands: objects.iter().map(|object| station(object, hand)).collect(),
            hand,
        }
    }

    /// The one that helps most, taken from the others.
    fn next(&mut self, sky: &Sky, estimate: &Estimate) -> Place {
        let wanted = Wanted::new(estimate, sky.latitude, &self.demands);
        let offered: Vec<Offered> = self
            .candidates
            .iter()
            .filter_map(|place| Offered::new(estimate, sky.latitude, &station(place, self.hand)))
            .collect();
        self.candidates.remove(wanted.ranked(&offered)[0].0)
    }
}

/// Stars chosen one after another for the list, out of some candidates.
fn chosen(
    rates: &mut [Rate; 3],
    chance: &mut Chance,
    sky: &Sky,
    objects: &[Place],
    hand: Hand,
) -> Vec<Sight> {
    let mut night = Choosing::new(chance, sky, objects, hand);
    let mut sights = Vec::new();
    for stars in 1..=STAGES[2] {
        let star = night.next(sky, &known(sky, &sights));
        sights.push(sky.read(chance, &star, hand));
        let Some(stage) = STAGES.iter().position(|stage| *stage == stars) else {
            continue;
        };
        let estimate = known(sky, &sights);
        for object in objects {
            let told = sky.told(&estimate, object).axes;
            rates[stage].count(sky.finds(chance, told, object, hand));
        }
    }
    sights
}

/// The same with circles as they are built.
fn with_circles(
    rates: &mut [Rate; 4],
    chance: &mut Chance,
    sky: &Sky,
    objects: &[Place],
    circles: &Circles,
) {
    let hand = circles.hand();
    let mut night = Choosing::new(chance, sky, objects, hand);
    let mut sights = Vec::new();
    let look = |rate: &mut Rate, chance: &mut Chance, estimate: &Estimate| {
        for object in objects {
            let told = sky.told(estimate, object).axes;
            rate.count(sky.shows(circles.set(chance, told, object), object));
        }
    };
    for stars in 1..=STAGES[2] {
        let star = night.next(sky, &known(sky, &sights));
        sights.push(circles.read(sky, chance, &star));
        if let Some(stage) = STAGES.iter().position(|stage| *stage == stars) {
            look(&mut rates[stage], chance, &known(sky, &sights));
        }
    }
    let perfect = Estimate::new(sky.errors, Covariance::zeros());
    look(&mut rates[STAGES.len()], chance, &perfect);
}

/// Some stars, then every object is read too, found at the first look or by a sweep.
fn fed(rates: &mut [Rate], chance: &mut Chance, sky: &Sky, stars: &[Sight]) {
    let mut sights = stars.to_vec();
    for rate in rates {
        let estimate = known(sky, &sights);
        for _ in 0..LOOKS_BETWEEN {
            let object = sky.place(chance);
            let told = sky.told(&estimate, &object).axes;
            rate.count(sky.finds(chance, told, &object, Hand::LOOK));
        }
        let object = sky.place(chance);
        sights.push(sky.read(chance, &object, Hand::LOOK));
    }
}

/// The square of the estimate's error, measured by the (Bayesian) bound of Cramér and Rao: the inverse of what the prior
/// and the readings, at the mount's true errors, together can tell.
fn against_bound(sky: &Sky, stars: &[Place], estimate: &Estimate) -> f64 {
    let mut information = Covariance::zeros();
    let unread = *prior().covariance();
    for place in 0..COUNT {
        let variance = unread[(place, place)];
        // an error that is held at nothing tells nothing, and cannot be wrong
        information[(place, place)] = if variance > 0.0 { 1.0 / variance } else { 1.0 };
    }
    for star in stars {
        let slopes = to_axes_with_slopes(
            star.hour_angle,
            star.declination,
            sky.latitude,
            &sky.errors,
            star.side,
        )
        .expect("far from the pole")
        .1;
        let (hour, dec) = (Hand::LOOK.hour.radians(), Hand::LOOK.dec.radians());
        let by_errors = slopes.by_errors;
        let (west, north) = (by_errors.row(0), by_errors.row(1));
        information += west.transpose() * west / (hour * hour);
        information += north.transpose() * north / (dec * dec);
    }
    let (truth, found) = (sky.errors.to_array(), estimate.errors().to_array());
    let off = nalgebra::SVector::<f64, COUNT>::from_fn(|place, _| {
        (found[place] - truth[place]).wrapped_signed().radians()
    });
    (off.transpose() * information * off).x
}

/// One of six readings is wrong by something an observer does; how far are the objects told wrong, in stated sigmas?
fn one_wrong(
    wrong: &mut Vec<f64>,
    chance: &mut Chance,
    sky: &Sky,
    sights: &[Sight],
    objects: &[Place],
) {
    let mut sights = sights.to_vec();
    let sight = chance.one_of(sights.len());
    let sight = &mut sights[sight];
    let sign = if chance.uniform() < 0.5 { 1.0 } else { -1.0 };
    let (circle, by) = match chance.one_of(4) {
        0 => (&mut sight.hour, 15.0),
        1 => (&mut sight.dec, 10.0),
        2 => (&mut sight.hour, 2.5),
        _ => (&mut sight.dec, 5.0),
    };
    for axis in circle {
        *axis = nonius::angle::AxisAngle::new(axis.angle() + Angle::from_degrees(sign * by));
    }
    let estimate = known(sky, &sights);
    for object in objects {
        let (told, truth) = (sky.told(&estimate, object), sky.shown(object));
        let hour = (told.axes.hour.angle() - truth.hour.angle()).wrapped_signed();
        let dec = (told.axes.dec.angle() - truth.dec.angle()).wrapped_signed();
        wrong.push(hour.abs() / told.hour_sigma());
        wrong.push(dec.abs() / told.dec_sigma());
    }
}
