//! What an observer wants to know of a star beside its place, in lines: companions, and how its light stands.

use crate::angle::Angle;
use crate::catalog::{Catalogue, Target};
use crate::sky::{Body, Moment, Source};

/// Light takes so long from the Sun to the Earth at their mean distance (IAU 2012: 149,597,870.7 km at 299,792.458 km/s).
const LIGHT_TIME_S: f64 = 499.004_784;

/// A predicted extreme is said to so many minutes: elements from memory know no better.
const SAID_TO_S: f64 = 600.0;

/// A line for each pair and one for how it varies, with the next extreme where that can be told; none for what is not in
/// the tables.
#[must_use]
pub fn lines(moment: &Moment, target: &Target) -> Vec<String> {
    let facts = Catalogue::facts(target);
    let mut lines: Vec<String> = facts.pairs.iter().map(ToString::to_string).collect();
    lines.extend(facts.variable.map(|variable| {
        let next = variable.next(moment.utc(), sun_later_s(moment, &target.source));
        let next = next.map(|(extreme, at)| {
            let early = at.chrono().timestamp() as f64 / SAID_TO_S;
            let rounded = at.plus_seconds((early.round() - early) * SAID_TO_S);
            let said = rounded.chrono().format("%-d %B %H:%M");
            format!("; next {} about {said} UTC", extreme.word())
        });
        format!("{variable}{}", next.unwrap_or_default())
    }));
    lines
}

/// How much later the light of a star reaches the Sun than the Earth, in seconds: as much earlier as the Sun lies toward it.
fn sun_later_s(moment: &Moment, source: &Source) -> f64 {
    let sun = moment.apparent_body(Body::Sun);
    let apart: Angle = sun.separation(&moment.apparent(source));
    -moment.distance_au(Body::Sun) * apart.radians().cos() * LIGHT_TIME_S
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::angle::{Latitude, Longitude};
    use crate::sky::{Air, Observer};
    use crate::time::{Dut1, Utc};

    fn moment(utc: &str) -> Moment {
        let observer = Observer {
            latitude: Latitude::from_degrees(54.5),
            longitude: Longitude::from_degrees(-2.2),
            elevation_m: 350.0,
            dut1: Dut1::default(),
            air: Air::standard(350.0),
        };
        Moment::new(&observer, Utc::parse(utc).unwrap())
    }

    #[test]
    fn a_star_on_the_far_side_from_the_sun_shows_its_light_to_the_earth_first() {
        let catalogue = Catalogue::builtin();
        let of = |utc: &str, name: &str| {
            let source = catalogue.resolve(name).unwrap().source;
            sun_later_s(&moment(utc), &source)
        };
        // Regulus lies near the ecliptic, opposite the Sun in the third week of February
        let opposite = of("2027-02-19T00:00:00Z", "Regulus");
        assert!((opposite - 493.0).abs() < 5.0, "{opposite}");
        let behind = of("2026-08-22T12:00:00Z", "Regulus");
        assert!((behind + 504.0).abs() < 6.0, "{behind}");
        // the pole of the ecliptic is as far from the one as from the other
        let aside = of("2026-12-01T00:00:00Z", "NGC 6543");
        assert!(aside.abs() < 10.0, "{aside}");
    }

    #[test]
    fn what_the_tables_know_is_said_in_a_line_each() {
        let catalogue = Catalogue::builtin();
        let said = |name: &str| {
            lines(
                &moment("2026-12-01T21:30:00Z"),
                &catalogue.resolve(name).unwrap(),
            )
        };
        let castor = said("Castor");
        assert!(
            castor[0].starts_with("double AB, ") && castor[0].contains(" magnitudes "),
            "{castor:?}"
        );
        let algol = said("Algol");
        assert!(
            algol[0]
                .starts_with("varies from 2.1 to 3.4 every 2.87 days (Algol); next minimum about "),
            "{algol:?}"
        );
        let mira = said("Mira");
        assert!(
            mira[0].contains("in some 332 days") && !mira[0].contains("next"),
            "{mira:?}"
        );
        assert_eq!(said("M 37"), Vec::<String>::new());
    }
}
