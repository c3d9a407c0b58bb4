//! What stands before the rows of a `VOTable`: the frame of its coordinates and what each column holds.
//!
//! Source: IVOA Recommendation *`VOTable` Format Definition* 1.4 (elements `COOSYS`, `TABLE`, `FIELD`, `DATA`, `TABLEDATA`),
//! the IVOA's *UCD1+ Controlled Vocabulary* 1.4, and *Units in the VO* 1.0; all from memory. A column is known by its UCD
//! (of the older vocabulary too), else by its name if that is one of the usual ones. A unit is never guessed at: a column
//! of coordinates without one, or with one not known, is a fault. A table that states no frame is taken to be in the ICRS.

use std::collections::HashMap;
use std::ops::Range;

use quick_xml::Reader;
use quick_xml::events::Event;

use crate::site::fault::Fault;
use crate::site::own::votable_field::{Field, attribute, chosen};
use crate::site::own::votable_unit::{Angular, PerYear};
use crate::sky::Equinox;

/// What the head says.
#[derive(Clone, Debug)]
pub struct Head {
    /// Of each column in order.
    pub columns: Vec<Column>,
    /// Of the places.
    pub equinox: Equinox,
    /// Of the places, where no column says it, a Julian year.
    pub epoch: f64,
    /// Where the rows begin.
    pub begin: usize,
}

/// A column.
#[derive(Clone, Debug, PartialEq)]
pub struct Column {
    /// Its name.
    pub name: String,
    /// What it holds.
    pub holds: Holds,
    /// The text that stands for nothing.
    pub null: Option<String>,
}

/// What a column holds.
#[derive(Clone, Copy, Debug, PartialEq)]
pub enum Holds {
    /// The name a row goes by.
    Name,
    /// A further name.
    Also,
    /// Right ascension.
    Ra(Angular),
    /// Declination.
    Dec(Angular),
    /// Proper motion in right ascension, on the sky.
    PmRa(PerYear),
    /// Proper motion in declination.
    PmDec(PerYear),
    /// Parallax, of so many milliseconds of arc a unit.
    Parallax(f64),
    /// Magnitude.
    Magnitude,
    /// The epoch of the place, in years.
    Epoch,
    /// Nothing that is wanted.
    Other,
}

/// A `COOSYS` as it is written.
#[derive(Clone, Debug)]
struct Frame {
    system: String,
    equinox: Option<String>,
    epoch: Option<String>,
    at: Range<usize>,
}

impl Head {
    /// Reads the head of the first table of a document.
    pub fn read(text: &str) -> Result<Self, Vec<Fault>> {
        let mut reader = Reader::from_str(text);
        let mut frames: HashMap<String, Frame> = HashMap::new();
        let mut fields: Vec<Field> = Vec::new();
        let mut from = 0;
        let whole = |message: String, hint: &str| vec![Fault::new(0..0, message).hint(hint)];
        loop {
            let event = reader.read_event();
            let at = from..position(&reader);
            from = at.end;
            match event {
                Ok(Event::Start(tag)) if tag.local_name().as_ref() == "TABLEDATA" => {
                    return of(&frames, &fields, at.end);
                }
                Ok(Event::Start(tag) | Event::Empty(tag)) => match tag.local_name().as_ref() {
                    "COOSYS" => {
                        let id = attribute(&tag, "ID").unwrap_or_default();
                        frames.insert(
                            id,
                            Frame {
                                system: attribute(&tag, "system").unwrap_or_default(),
                                equinox: attribute(&tag, "equinox"),
                                epoch: attribute(&tag, "epoch"),
                                at,
                            },
                        );
                    }
                    "FIELD" => fields.push(Field::of(&tag, at)),
                    "VALUES" => {
                        if let Some(field) = fields.last_mut() {
                            field.null = attribute(&tag, "null");
                        }
                    }
                    "BINARY" | "BINARY2" | "FITS" => {
                        return Err(vec![
                            Fault::new(at, "rows in this form are not read")
                                .hint("save the table with its rows as TABLEDATA"),
                        ]);
                    }
                    _ => {}
                },
                Ok(Event::Eof) => {
                    return Err(whole(
                        "this VOTable has no rows in a TABLEDATA".to_owned(),
                        "save it with its rows as TABLEDATA",
                    ));
                }
                Ok(_) => {}
                Err(error) => {
                    let message = format!("this is not well-formed XML: {error}");
                    return Err(vec![Fault::new(at, message).hint("save the table anew")]);
                }
            }
        }
    }
}

fn position(reader: &Reader<&[u8]>) -> usize {
    usize::try_from(reader.buffer_position()).unwrap_or(usize::MAX)
}

/// From what is written to what it means.
fn of(frames: &HashMap<String, Frame>, fields: &[Field], begin: usize) -> Result<Head, Vec<Fault>> {
    let mut found = Finding {
        fields,
        holds: vec![Holds::Other; fields.len()],
        faults: Vec::new(),
    };
    let ra = chosen(fields, Field::is_ra, Field::is_main);
    found.names(begin);
    found.place(ra, begin);
    found.motion();
    found.light_and_time();
    let frame = frame(frames, ra.and_then(|at| fields.get(at)));
    let (equinox, epoch) = frame.unwrap_or_else(|fault| {
        found.faults.push(fault);
        (Equinox::Icrs, 2000.0)
    });
    if !found.faults.is_empty() {
        return Err(found.faults);
    }
    let columns = fields.iter().zip(found.holds).map(|(field, holds)| Column {
        name: field.name.replace('_', " "),
        holds,
        null: field.null.clone(),
    });
    Ok(Head {
        columns: columns.collect(),
        equinox,
        epoch,
        begin,
    })
}

/// What has been found out of the columns.
struct Finding<'f> {
    fields: &'f [Field],
    holds: Vec<Holds>,
    faults: Vec<Fault>,
}

impl Finding<'_> {
    fn set(&mut self, at: usize, what: Holds) {
        if let Some(held) = self.holds.get_mut(at) {
            *held = what;
        }
    }

    /// A column in its unit, if that is one of the known ones.
    fn in_its_unit(
        &mut self,
        at: Option<usize>,
        holds: impl FnOnce(&Field) -> Option<Holds>,
        known: &str,
    ) {
        let Some((at, field)) = at.and_then(|at| Some((at, self.fields.get(at)?))) else {
            return;
        };
        match holds(field) {
            Some(holds) => self.set(at, holds),
            None => self.faults.push(unit_fault(field, known)),
        }
    }

    fn missing(&mut self, begin: usize, what: &str, ucd: &str) {
        let hint = format!("give the FIELD that does ucd=\"{ucd}\"");
        let message = format!("no column holds {what}");
        self.faults
            .push(Fault::new(begin..begin, message).hint(hint));
    }

    fn names(&mut self, begin: usize) {
        for (at, field) in self.fields.iter().enumerate() {
            if field.is_name() {
                self.set(at, Holds::Also);
            }
        }
        match chosen(self.fields, Field::is_name, Field::is_main) {
            Some(at) => self.set(at, Holds::Name),
            None => self.missing(begin, "the name of a row", "meta.id;meta.main"),
        }
    }

    fn place(&mut self, ra: Option<usize>, begin: usize) {
        const KNOWN: &str = "deg, rad, or for text \"h:m:s\" and \"d:m:s\"";
        let dec = chosen(self.fields, Field::is_dec, Field::is_main);
        if ra.is_none() {
            self.missing(begin, "the right ascension", "pos.eq.ra;meta.main");
        }
        if dec.is_none() {
            self.missing(begin, "the declination", "pos.eq.dec;meta.main");
        }
        let unit = |field: &Field, hours| Angular::of(field.unit.as_deref(), field.is_text, hours);
        self.in_its_unit(ra, |field| unit(field, true).map(Holds::Ra), KNOWN);
        self.in_its_unit(dec, |field| unit(field, false).map(Holds::Dec), KNOWN);
    }

    fn motion(&mut self) {
        for (part, hold) in [
            ("ra", Holds::PmRa as fn(PerYear) -> Holds),
            ("dec", Holds::PmDec),
        ] {
            let is_motion = |field: &Field| {
                field.has(&["pos.pm", &format!("pos.eq.{part}")])
                    || field.has(&[&format!("pos_eq_pm{part}")])
                    || field.is_called(&[&format!("pm{part}")])
            };
            let at = chosen(self.fields, is_motion, Field::is_main);
            let unit = |field: &Field| PerYear::of(field.unit.as_deref()).map(hold);
            self.in_its_unit(at, unit, "mas/yr, arcsec/yr, deg/yr or rad/yr");
        }
        let is_parallax = |field: &Field| field.has(&["pos.parallax"]);
        let at = chosen(self.fields, is_parallax, Field::is_main);
        let unit = |field: &Field| match field.unit.as_deref() {
            Some("mas") => Some(Holds::Parallax(1.0)),
            Some("arcsec") => Some(Holds::Parallax(1000.0)),
            _ => None,
        };
        self.in_its_unit(at, unit, "mas or arcsec");
    }

    fn light_and_time(&mut self) {
        let visual = |field: &Field| field.has(&["em.opt.v"]) || field.name.starts_with(['V', 'v']);
        if let Some(at) = chosen(self.fields, Field::is_magnitude, visual) {
            self.set(at, Holds::Magnitude);
        }
        let is_epoch = |field: &Field| {
            let in_years = matches!(field.unit.as_deref(), Some("yr" | "a" | "year"));
            field.has(&["time.epoch"]) && in_years
        };
        if let Some(at) = chosen(self.fields, is_epoch, Field::is_main) {
            self.set(at, Holds::Epoch);
        }
    }
}

fn unit_fault(field: &Field, known: &str) -> Fault {
    let message = match &field.unit {
        Some(unit) => format!("the unit \"{unit}\" is not known here"),
        None => format!("the column {} states no unit", field.name),
    };
    Fault::new(field.at.clone(), message).hint(format!("known are {known}"))
}

/// Equinox and epoch of the places, by the frame their column names, else the only one.
fn frame(frames: &HashMap<String, Frame>, column: Option<&Field>) -> Result<(Equinox, f64), Fault> {
    let named = column.and_then(|field| frames.get(field.reference.as_ref()?));
    let only = || frames.values().next().filter(|_| frames.len() == 1);
    let Some(frame) = named.or_else(only) else {
        return Ok((Equinox::Icrs, 2000.0));
    };
    let fault = |message: String| {
        Fault::new(frame.at.clone(), message)
            .hint("known are ICRS, FK5 and FK4 with their equinoxes")
    };
    let system = frame.system.to_lowercase();
    let (usual, letter) = match system.trim_start_matches("eq_") {
        "icrs" | "" => (Equinox::Icrs, 'J'),
        "fk5" => (Equinox::J2000, 'J'),
        "fk4" => (Equinox::B1950, 'B'),
        _ => {
            let system = &frame.system;
            return Err(fault(format!(
                "the frame \"{system}\" is not one of right ascension and declination known here"
            )));
        }
    };
    let year = |text: &str| -> Result<Equinox, Fault> {
        let lettered = if text.starts_with(|c: char| c.is_ascii_digit()) {
            format!("{letter}{text}")
        } else {
            text.to_owned()
        };
        let read = lettered.parse::<Equinox>();
        read.map_err(|wrong| fault(wrong.to_string()))
    };
    let equinox = match (&usual, &frame.equinox) {
        (Equinox::Icrs, _) | (_, None) => usual,
        (_, Some(text)) => year(text)?,
    };
    let epoch = match &frame.epoch {
        Some(text) => year(text)?.epoch(),
        None => equinox.epoch(),
    };
    Ok((equinox, epoch))
}
