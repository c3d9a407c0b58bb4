//! The station: site, mount, estimate, catalogue and clock of a run, opened from the options.

use std::io::{self, Write as _};
use std::path::Path;

use crate::angle::HourAngle;
use crate::catalog::{Catalogue, Target};
use crate::command::calibrate::suspicions;
use crate::command::catalogues;
use crate::command::exit::Refused;
use crate::command::options::Common;
use crate::command::readings;
use crate::dial::{Aside, Setup, TubePlace};
use crate::estimate::{Estimate, Prior, Sight};
use crate::metal::{Mount, SideRequest};
use crate::night::{Grounds, Known, ListedTarget, Night, journal, whose};
use crate::site::builtin;
use crate::site::{Faults, Folders, Ink, ListFile, Shelf, Site, SiteFile};
use crate::sky::Moment;
use crate::time::{Clock, InstantFault, Utc};

/// Everything a run works with.
#[derive(Debug)]
pub struct Station {
    /// The user's folders.
    pub folders: Folders,
    /// The site.
    pub site: Site,
    /// The mount, by the name of its file.
    pub mount_id: String,
    /// The mount.
    pub mount: Mount,
    /// The catalogues.
    pub catalogue: Catalogue,
    /// The list of targets: the one asked for; else the one named like the site; else the user's only
    /// one; else none.
    list: Result<Option<ListFile>, Faults>,
    /// What is known of the mount's errors.
    pub estimate: Estimate,
    /// What was known before any reading.
    pub prior: Prior,
    /// The stars of the file of readings.
    pub sights: Vec<Sight>,
    /// Where the tube was at the last of them.
    pub tube: Option<TubePlace>,
    /// When the last of them was read.
    pub calibrated_at: Option<Utc>,
    /// The site is one of the program's own, which do not exist.
    pub built_in: bool,
    /// The side of the pier asked for.
    pub side: SideRequest,
    sun_risk_accepted: bool,
    at: Option<Utc>,
    clock: Clock,
    lead_s: f64,
}

impl Station {
    /// Opens the site, the mount and the file of readings the options name.
    pub fn open(common: &Common) -> anyhow::Result<Self> {
        let folders = Folders::of_the_user()?;
        let site = site_of(&folders, common.site.as_deref())?;
        let mount = match &common.mount {
            Some(name) => folders.mount(name)?,
            None => folders.mount_of(&site)?,
        };
        let list = list_of(&folders, &site.site.id, common.list.as_deref());
        if let (Some(_), Err(faults)) = (&common.list, &list) {
            return Err(faults.clone().into());
        }
        let catalogue = catalogues::open(&folders)?;
        let own = placed(&list, &catalogue);
        let prior = Prior::from_expected(&mount.mount.expected);
        let mut station = Self {
            catalogue: catalogue.with_own(own),
            list,
            estimate: Estimate::from_prior(&prior),
            prior,
            side: side_request(common, &mount.mount)?,
            built_in: site.file.is_built_in(),
            site: site.site,
            mount_id: mount.id,
            mount: mount.mount,
            sights: Vec::new(),
            tube: None,
            calibrated_at: None,
            sun_risk_accepted: common.accept_sun_risk,
            at: common.at,
            clock: common
                .at
                .map_or_else(Clock::of_the_machine, Clock::starting_at),
            lead_s: common.lead.unwrap_or(0.0),
            folders,
        };
        if station.site.latitude.degrees() == 0.0 && station.site.longitude.degrees() == 0.0 {
            // a starting file not yet made one's own: every reading would be wrong
            let _ = writeln!(
                io::stderr(),
                "warning: the site {} stands at 0°, 0°, as its starting file has it",
                station.site.id
            );
        }
        if let Some(file) = &common.readings {
            station.calibrate(file)?;
        }
        Ok(station)
    }

    fn calibrate(&mut self, file: &Path) -> anyhow::Result<()> {
        let readings = readings::load(file, self)?;
        let fit = readings.fit(self);
        for suspected in suspicions::of(&readings, self) {
            let words = suspicions::in_a_line(&readings, &suspected);
            let _ = writeln!(io::stderr(), "warning: {words}");
        }
        self.estimate = Estimate::from(&fit);
        self.tube = readings.tube(&fit);
        self.calibrated_at = readings.latest();
        self.sights = readings.rows.into_iter().map(|row| row.sight).collect();
        Ok(())
    }

    /// What is believed of the mount before any star: the mount file alone.
    #[must_use]
    pub fn grounds(&self) -> Grounds<'_> {
        Grounds {
            latitude: self.site.latitude,
            expected: &self.mount.expected,
            prior: &self.prior,
            sights: &[],
            read_at: None,
        }
    }

    /// Goes by what a night's journal knows of the mount, on top of the file of readings. A journal not
    /// begun yet knows nothing.
    pub fn follow(&mut self, journal: &Path) -> anyhow::Result<()> {
        if !journal.exists() {
            return Ok(());
        }
        let night = Night::replay(journal::read(journal)?.events);
        if let Some(opening) = &night.state().opening {
            whose(opening, (&self.site.id, &self.mount_id))?;
        }
        let grounds = Grounds {
            sights: &self.sights,
            read_at: self.calibrated_at,
            ..self.grounds()
        };
        let known = Known::of(&grounds, night.state());
        self.estimate = known.estimate;
        self.calibrated_at = known.read_at;
        let shown = night.state().tube.as_ref().map(|tube| TubePlace {
            axes: tube.axes.into(),
            utc: tube.utc,
            side: tube.side,
        });
        self.tube = shown.or(self.tube);
        Ok(())
    }

    /// The name of the list and its targets. A name no catalogue knows is kept, to be seen among the
    /// others, and said.
    pub fn targets(&self) -> Result<(Option<String>, Vec<ListedTarget>), Faults> {
        let Some(list) = self.list.as_ref().map_err(Clone::clone)? else {
            return Ok((None, Vec::new()));
        };
        let (mut targets, mut unknown) = (Vec::new(), Vec::new());
        for (line, entry) in list.lines.iter().zip(list.resolve(&self.catalogue)) {
            match entry {
                Ok(entry) => targets.push(ListedTarget::from(&entry.target)),
                Err(fault) => {
                    let written = &line.written;
                    targets.push(ListedTarget::unknown(&written.name, &written.note));
                    unknown.push(fault);
                }
            }
        }
        if !unknown.is_empty() {
            let faults = Faults::new(list.file.clone(), unknown);
            let _ = writeln!(io::stderr(), "{}", faults.render(Ink::Plain).trim_end());
        }
        Ok((Some(list.id.clone()), targets))
    }

    /// The sky at the instant asked for to the nanosecond, or else by the clock; later by the lead.
    pub fn first_moment(&self) -> Result<Moment, InstantFault> {
        Ok(self.sky_at(self.at.map_or_else(|| self.clock.now(), Ok)?))
    }

    /// The sky by the clock, which runs on from the instant asked for; later by the lead.
    pub fn moment(&self) -> Result<Moment, InstantFault> {
        Ok(self.sky_at(self.clock.now()?))
    }

    fn sky_at(&self, instant: Utc) -> Moment {
        Moment::new(&self.site.observer(), instant.plus_seconds(self.lead_s))
    }

    /// What settings are worked out from.
    #[must_use]
    pub fn setup(&self) -> Setup<'_> {
        Setup {
            horizon: &self.site.horizon,
            mount: &self.mount,
            estimate: &self.estimate,
            side: self.side,
            tube: self.tube,
            aside: Aside::default(),
            lead_s: self.lead_s,
            calibrated_at: self.calibrated_at,
            sun_risk_accepted: self.sun_risk_accepted,
        }
    }
}

/// The site asked for; else the user's only one; else the demonstration's.
fn site_of(folders: &Folders, asked: Option<&str>) -> anyhow::Result<SiteFile> {
    if let Some(name) = asked {
        return Ok(folders.site(name)?);
    }
    let own = folders.paths(Shelf::Sites)?;
    match own.as_slice() {
        [] => Ok(folders.site(builtin::DEMONSTRATION_SITE)?),
        [only] => Ok(folders.site(&only.to_string_lossy())?),
        several => {
            let names: Vec<String> = several
                .iter()
                .filter_map(|path| Some(path.file_stem()?.to_string_lossy().into_owned()))
                .collect();
            let message = format!("you have {} sites: {}", several.len(), names.join(", "));
            Err(Refused::new(message, "name one with --site").into())
        }
    }
}

/// The list of targets that applies.
fn list_of(folders: &Folders, site: &str, asked: Option<&str>) -> Result<Option<ListFile>, Faults> {
    let name = match asked {
        Some(name) => name.to_owned(),
        None if folders.names(Shelf::Lists)?.iter().any(|name| name == site) => site.to_owned(),
        None => match folders.paths(Shelf::Lists)?.as_slice() {
            [only] => only.to_string_lossy().into_owned(),
            _ => return Ok(None),
        },
    };
    folders.list(&name).map(Some)
}

/// The targets of the list that have a place of their own, and so a name to dial by.
fn placed(list: &Result<Option<ListFile>, Faults>, catalogue: &Catalogue) -> Vec<Target> {
    let Ok(Some(list)) = list else {
        return Vec::new();
    };
    let placed = list
        .lines
        .iter()
        .filter(|line| line.written.place.is_some());
    placed
        .filter_map(|line| Some(catalogue.resolve_entry(&line.written).ok()?.target))
        .collect()
}

/// The side asked for, held against the mount before anything is worked out.
fn side_request(common: &Common, mount: &Mount) -> Result<SideRequest, Refused> {
    match mount.choose_side(common.side, HourAngle::default(), None) {
        Ok(_) => Ok(common.side),
        Err(why) => Err(Refused {
            message: format!("--side: {why}"),
            hint: None,
        }),
    }
}
