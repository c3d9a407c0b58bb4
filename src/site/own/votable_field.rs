//! A column of a `VOTable` as its `FIELD` describes it, and what it is likely to hold.

use std::ops::Range;

use quick_xml::events::BytesStart;

/// A `FIELD` as it is written.
#[derive(Clone, Debug, Default)]
pub struct Field {
    /// Its name.
    pub name: String,
    /// Its UCD, in small letters.
    pub ucd: String,
    /// Its unit.
    pub unit: Option<String>,
    /// The frame it is in.
    pub reference: Option<String>,
    /// The text that stands for nothing.
    pub null: Option<String>,
    /// It holds text.
    pub is_text: bool,
    /// Where it stands in the document.
    pub at: Range<usize>,
}

/// An attribute of a tag, if it says anything.
pub fn attribute(tag: &BytesStart<'_>, name: &str) -> Option<String> {
    let found = tag.try_get_attribute(name).ok()??;
    let text = quick_xml::escape::unescape(&found.value).ok()?;
    Some(text.trim().to_owned()).filter(|text| !text.is_empty())
}

impl Field {
    /// From its tag.
    pub fn of(tag: &BytesStart<'_>, at: Range<usize>) -> Self {
        let datatype = attribute(tag, "datatype");
        Self {
            name: attribute(tag, "name").unwrap_or_default(),
            ucd: attribute(tag, "ucd").unwrap_or_default().to_lowercase(),
            unit: attribute(tag, "unit"),
            reference: attribute(tag, "ref"),
            null: None,
            is_text: datatype.is_some_and(|of| matches!(of.as_str(), "char" | "unicodeChar")),
            at,
        }
    }

    /// Its UCD has all these parts, and is not that of an error.
    pub fn has(&self, parts: &[&str]) -> bool {
        let ucd = self.ucd.as_str();
        !ucd.contains("error") && parts.iter().all(|part| ucd.contains(part))
    }

    /// Its UCD says that it is the main one of its kind.
    pub fn is_main(&self) -> bool {
        self.ucd.contains("main")
    }

    /// It has no UCD, and one of these names.
    pub fn is_called(&self, names: &[&str]) -> bool {
        self.ucd.is_empty()
            && names
                .iter()
                .any(|name| name.eq_ignore_ascii_case(&self.name))
    }

    /// It holds right ascensions.
    pub fn is_ra(&self) -> bool {
        (self.has(&["pos.eq.ra"]) && !self.has(&["pos.pm"]))
            || self.has(&["pos_eq_ra"])
            || self.is_called(&["ra", "raj2000", "_raj2000", "ra_icrs", "ra2000"])
    }

    /// It holds declinations.
    pub fn is_dec(&self) -> bool {
        (self.has(&["pos.eq.dec"]) && !self.has(&["pos.pm"]))
            || self.has(&["pos_eq_dec"])
            || self.is_called(&["dec", "de", "dej2000", "_dej2000", "de_icrs", "dec2000"])
    }

    /// It holds names.
    pub fn is_name(&self) -> bool {
        self.has(&["meta.id"])
            || self.has(&["id_main"])
            || self.is_called(&["name", "id", "designation", "main_id"])
    }

    /// It holds magnitudes.
    pub fn is_magnitude(&self) -> bool {
        self.has(&["phot.mag"])
            || self.has(&["phot_mag"])
            || self.is_called(&["mag", "vmag", "magnitude"])
    }
}

/// The one of the columns it is: the main one, else the first.
pub fn chosen(
    fields: &[Field],
    is_one: impl Fn(&Field) -> bool,
    is_better: impl Fn(&Field) -> bool,
) -> Option<usize> {
    let ones = || fields.iter().enumerate().filter(|(_, field)| is_one(field));
    let better = ones().find(|(_, field)| is_better(field));
    better.or_else(|| ones().next()).map(|(at, _)| at)
}
