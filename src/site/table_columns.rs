//! The columns a table may have, and those it has.

use crate::site::fault::Fault;
use crate::site::likely::{did_you_mean, nearest};
use crate::site::table::Cell;

/// The columns a table may have.
#[derive(Clone, Copy, Debug)]
pub struct Columns {
    /// Those it must have.
    pub required: &'static [&'static str],
    /// Those it may have.
    pub optional: &'static [&'static str],
    /// What columns of other names are.
    pub others: Others,
}

/// What a column is that is not one of those known.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Others {
    /// A slip.
    AreFaults,
    /// Of no interest, unless it is much like one of those known.
    ArePassedOver,
}

/// The known name of each column; nothing for one that is unknown or doubled.
pub(super) fn header_names(
    header: &[Cell],
    columns: Columns,
    faults: &mut Vec<Fault>,
) -> Vec<Option<&'static str>> {
    let known: Vec<&'static str> = [columns.required, columns.optional].concat();
    let mut names = Vec::new();
    for cell in header {
        let name = known.iter().copied().find(|name| *name == cell.text);
        let passed_over = columns.others == Others::ArePassedOver
            && header.len() > 1
            && nearest(&cell.text, known.iter().copied()).is_none();
        let fault = if name.is_none() && passed_over {
            None
        } else if name.is_none() {
            let parted = [';', '\t'].iter().any(|mark| cell.text.contains(*mark));
            let hint = if parted {
                "save the table with commas between the cells".to_owned()
            } else {
                did_you_mean(&cell.text, &known)
            };
            Some((format!("unknown column \"{}\"", cell.text), hint))
        } else if name.is_some() && names.contains(&name) {
            let hint = "leave one of them out".to_owned();
            Some((format!("the column {} stands here twice", cell.text), hint))
        } else {
            None
        };
        let fresh = fault.is_none();
        faults
            .extend(fault.map(|(message, hint)| Fault::new(cell.span.clone(), message).hint(hint)));
        names.push(name.filter(|_| fresh));
    }
    if header.len() == 1 && names == [None] {
        // cells parted in another way: that the columns are missing is an echo
        return names;
    }
    let span = header.first().map_or(0, |cell| cell.span.start)
        ..header.last().map_or(0, |cell| cell.span.end);
    for column in columns.required {
        if !names.contains(&Some(column)) {
            faults.push(
                Fault::new(span.clone(), format!("the column {column} is missing")).hint(format!(
                    "a header has at least {}",
                    columns.required.join(",")
                )),
            );
        }
    }
    names
}
