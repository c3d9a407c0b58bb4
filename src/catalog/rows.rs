//! Rows of a comma-separated table, read in place: nothing is copied, a field is looked at when it is asked for.
//!
//! The built-in tables have thousands of rows, and most runs of the program want one of them. So
//! the text stays as it is; a row is a line of it, and a row is found by halving where the table is
//! in order. Lines that begin with `#` at the head are about the table; the first other line names
//! the columns. No field may hold a comma or stand in quotes: the tables are the project's own.

use std::cmp::Ordering;

/// A table as text: the head is passed over, the rows remain.
#[derive(Clone, Copy, Debug)]
pub struct Table<'a> {
    rows: &'a str,
}

impl<'a> Table<'a> {
    /// Finds where the rows begin.
    #[must_use]
    pub fn new(text: &'a str) -> Self {
        let mut rest = text;
        loop {
            let (line, after) = cut_line(rest);
            if !line.starts_with('#') || after.is_empty() {
                return Self { rows: after };
            }
            rest = after;
        }
    }

    /// Every row.
    pub fn rows(&self) -> impl Iterator<Item = Row<'a>> + use<'a> {
        let rows = self.rows;
        let ends = memchr::memchr_iter(b'\n', rows.as_bytes()).chain(std::iter::once(rows.len()));
        let lines = ends.scan(0, move |start, end| {
            let line = rows.get(*start..end).unwrap_or("");
            *start = end + 1;
            Some(Row(without_return(line)))
        });
        lines.filter(|row| !row.0.is_empty())
    }

    /// The row whose first field is this number, in a table that is in order of that number.
    #[must_use]
    pub fn numbered(&self, number: u32) -> Option<Row<'a>> {
        self.halved(|row| Some(row.first().parse::<u32>().ok()?.cmp(&number)))
    }

    /// The row that stands where it should in a table in order, found by halving.
    ///
    /// `order` says where a row stands from the one that is wanted; nothing ends the search.
    pub fn halved(&self, order: impl Fn(Row<'a>) -> Option<Ordering>) -> Option<Row<'a>> {
        let mut rest = self.rows;
        while !rest.is_empty() {
            // the line that holds the middle byte: a newline is never within another character
            let middle = rest.as_bytes().get(..rest.len() / 2)?;
            let start = middle
                .iter()
                .rposition(|&b| b == b'\n')
                .map_or(0, |at| at + 1);
            let (before, from) = rest.split_at_checked(start)?;
            let (line, after) = cut_line(from);
            match order(Row(line))? {
                Ordering::Equal => return Some(Row(line)),
                Ordering::Less => rest = after,
                Ordering::Greater => rest = before,
            }
        }
        None
    }
}

/// The first line without its end, and what follows.
fn cut_line(text: &str) -> (&str, &str) {
    let (line, after) = text.split_once('\n').unwrap_or((text, ""));
    (without_return(line), after)
}

/// A line without the carriage return some systems write before its end.
fn without_return(line: &str) -> &str {
    line.strip_suffix('\r').unwrap_or(line)
}

/// One row.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Row<'a>(&'a str);

impl<'a> Row<'a> {
    /// The first field.
    #[must_use]
    pub fn first(self) -> &'a str {
        let end = memchr::memchr(b',', self.0.as_bytes()).unwrap_or(self.0.len());
        self.0.get(..end).unwrap_or("")
    }

    /// One field, counted from 0; empty where the row has none.
    #[must_use]
    pub fn field(self, index: usize) -> &'a str {
        self.0.split(',').nth(index).unwrap_or("")
    }

    /// True if the last field is empty.
    #[must_use]
    pub fn ends_empty(self) -> bool {
        self.0.ends_with(',')
    }

    /// The field so many places before the last one; 0 is the last itself.
    #[must_use]
    pub fn field_from_end(self, index: usize) -> &'a str {
        self.0.rsplit(',').nth(index).unwrap_or("")
    }

    /// So many fields at once; those the row has not are empty.
    #[must_use]
    pub fn all<const N: usize>(self) -> [&'a str; N] {
        let mut fields = self.0.split(',');
        std::array::from_fn(|_| fields.next().unwrap_or(""))
    }
}

/// The names in a field that holds several, `;` between them.
pub fn several(field: &str) -> impl Iterator<Item = &str> {
    field
        .split(';')
        .map(str::trim)
        .filter(|name| !name.is_empty())
}

#[cfg(test)]
mod tests {
    use proptest::prelude::*;

    use super::*;

    const TEXT: &str = "# about\n# more\nnumber,name\n3,three\n10,ten\n11,\n200,last";

    #[test]
    fn head_and_columns_are_no_rows() {
        let table = Table::new(TEXT);
        let rows: Vec<[&str; 2]> = table.rows().map(Row::all).collect();
        assert_eq!(
            rows,
            [["3", "three"], ["10", "ten"], ["11", ""], ["200", "last"]]
        );
    }

    #[test]
    fn a_row_is_found_by_its_number_and_only_by_that() {
        let table = Table::new(TEXT);
        for (number, name) in [(3, "three"), (10, "ten"), (11, ""), (200, "last")] {
            assert_eq!(table.numbered(number).unwrap().field(1), name);
        }
        for number in [0, 4, 12, 199, 201] {
            assert_eq!(table.numbered(number), None);
        }
    }

    #[test]
    fn several_names_part_at_semicolons() {
        assert_eq!(
            several("NGC 2099; Salt ;").collect::<Vec<_>>(),
            ["NGC 2099", "Salt"]
        );
        assert_eq!(several("").count(), 0);
    }

    proptest! {
        #[test]
        fn any_text_is_a_table_of_some_kind(text in "[\\PC\n\r\",#0-9]{0,60}", number in 0..20_u32) {
            let table = Table::new(&text);
            let _ = table.numbered(number);
            for row in table.rows() {
                prop_assert_eq!(row.field(0), row.first());
            }
        }

        #[test]
        fn halving_finds_what_reading_through_finds(numbers in proptest::collection::btree_set(0..500_u32, 0..40)) {
            let rows: Vec<String> = numbers.iter().map(|n| format!("{n},x{n}")).collect();
            let text = format!("n,x\n{}\n", rows.join("\n"));
            let table = Table::new(&text);
            for number in 0..500 {
                prop_assert_eq!(table.numbered(number).is_some(), numbers.contains(&number));
            }
        }
    }
}
