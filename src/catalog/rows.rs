//! Rows of a comma-separated table, read in place: nothing is copied, a field is looked at when it is asked for.
//!
//! The built-in tables have thousands of rows, and most runs of the program want one of them. So
//! the text stays as it is; a row is a line of it, and a row is found by halving where the table is
//! in order. Lines that begin with `#` at the head are about the table; the first other line names
//! the columns. A field may stand in double quotes; a quote within a field is not allowed for.

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
        let mut rest = self.rows;
        std::iter::from_fn(move || {
            while !rest.is_empty() {
                let (line, after) = cut_line(rest);
                rest = after;
                if !line.is_empty() {
                    return Some(Row(line));
                }
            }
            None
        })
    }

    /// The row whose first field is this number, in a table that is in order of that number.
    #[must_use]
    pub fn numbered(&self, number: u32) -> Option<Row<'a>> {
        let mut rest = self.rows;
        while !rest.is_empty() {
            // the line that holds the middle byte: a newline is never within another character
            let bytes = rest.as_bytes();
            let middle = rest.len() / 2;
            let start = bytes
                .iter()
                .take(middle)
                .rposition(|&b| b == b'\n')
                .map_or(0, |at| at + 1);
            let (before, from) = rest.split_at_checked(start)?;
            let (line, after) = cut_line(from);
            let row = Row(line);
            match row.field(0).parse::<u32>().ok()?.cmp(&number) {
                std::cmp::Ordering::Equal => return Some(row),
                std::cmp::Ordering::Less => rest = after,
                std::cmp::Ordering::Greater => rest = before,
            }
        }
        None
    }
}

/// The first line without its end, and what follows.
fn cut_line(text: &str) -> (&str, &str) {
    let (line, after) = text.split_once('\n').unwrap_or((text, ""));
    (line.strip_suffix('\r').unwrap_or(line), after)
}

/// One row.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Row<'a>(&'a str);

impl<'a> Row<'a> {
    /// The fields in order, without quotes around them.
    pub fn fields(self) -> impl Iterator<Item = &'a str> {
        let mut rest = Some(self.0);
        std::iter::from_fn(move || {
            let text = rest?;
            let (field, after) = match text.strip_prefix('"').and_then(|t| t.split_once('"')) {
                Some((quoted, after)) => (quoted, after.strip_prefix(',')),
                None => match text.split_once(',') {
                    Some((field, after)) => (field, Some(after)),
                    None => (text, None),
                },
            };
            rest = after;
            Some(field)
        })
    }

    /// One field, counted from 0; empty where the row has none.
    #[must_use]
    pub fn field(self, index: usize) -> &'a str {
        self.fields().nth(index).unwrap_or("")
    }

    /// So many fields at once; those the row has not are empty.
    #[must_use]
    pub fn all<const N: usize>(self) -> [&'a str; N] {
        let mut fields = self.fields();
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

    const TEXT: &str = "# about\n# more\nnumber,name\n3,three\n10,\"ten, or so\"\n11,\n200,last";

    #[test]
    fn head_and_columns_are_no_rows() {
        let table = Table::new(TEXT);
        let rows: Vec<[&str; 2]> = table.rows().map(Row::all).collect();
        assert_eq!(
            rows,
            [
                ["3", "three"],
                ["10", "ten, or so"],
                ["11", ""],
                ["200", "last"]
            ]
        );
    }

    #[test]
    fn a_row_is_found_by_its_number_and_only_by_that() {
        let table = Table::new(TEXT);
        for (number, name) in [(3, "three"), (10, "ten, or so"), (11, ""), (200, "last")] {
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
                prop_assert!(row.fields().count() >= 1);
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
