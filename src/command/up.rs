//! What can be seen from the site, now or tonight.

use clap::ValueEnum;

use crate::angle::Angle;
use crate::catalog::Target;
use crate::command::exit::Refused;
use crate::command::station::Station;
use crate::plan::{Almanac, Site, Watch};
use crate::sky::Moment;

/// When it is to be up.
#[derive(Clone, Copy, Debug, PartialEq, Eq, ValueEnum)]
pub enum Up {
    /// At this instant above the horizon mask and the mount's lowest altitude, however bright the sky.
    Now,
    /// At some time of the night, dark enough and far enough from the Moon for its kind, within the mount's reach.
    Tonight,
}

/// The sky over a station, for a test of many targets.
#[derive(Debug)]
pub struct Overhead<'s> {
    station: &'s Station,
    moment: Moment,
    /// The night, if that is what is asked about.
    almanac: Option<Almanac>,
}

impl<'s> Overhead<'s> {
    /// At the station's instant, or in the night it lies in.
    pub fn of(up: Up, station: &'s Station) -> anyhow::Result<Self> {
        let moment = station.first_moment()?;
        let almanac = match up {
            Up::Now => None,
            Up::Tonight => {
                let zone = station.site.zone;
                let night = zone.night(moment.utc());
                let almanac = Almanac::of(&station.site.observer(), zone, night);
                Some(almanac.ok_or_else(|| Refused {
                    message: format!("the night {night} is outside the years of the program"),
                    hint: None,
                })?)
            }
        };
        Ok(Self {
            station,
            moment,
            almanac,
        })
    }

    /// The test.
    pub fn test(&self) -> impl Fn(&Target) -> bool + '_ {
        let site = Site {
            horizon: &self.station.site.horizon,
            mount: &self.station.mount,
        };
        let watch = self
            .almanac
            .as_ref()
            .map(|almanac| Watch::new(site, almanac));
        move |target| match &watch {
            Some(watch) => !watch.prospect(target).windows.is_empty(),
            None => self.is_up_now(target),
        }
    }

    fn is_up_now(&self, target: &Target) -> bool {
        let Station { site, mount, .. } = self.station;
        let place = self.moment.observed(&self.moment.apparent(&target.source));
        let lowest = mount.limits.lowest_altitude.unwrap_or_default();
        let mask = site.horizon.altitude_at(place.azimuth);
        let above = |floor: Angle| place.altitude.angle() >= floor;
        above(lowest.angle()) && above(mask.angle())
    }
}
