//! Reads the reference tables of `tests/reference`: comment lines, a header row, rows of CSV.

use std::collections::HashMap;
use std::path::Path;

/// One row, by the names of its columns.
#[derive(Debug)]
pub struct Row(HashMap<String, String>);

impl Row {
    /// What stands in a column, as text.
    pub fn text(&self, column: &str) -> &str {
        self.0
            .get(column)
            .unwrap_or_else(|| panic!("there is no column {column}"))
    }

    /// What stands in a column, as a number.
    pub fn number(&self, column: &str) -> f64 {
        let text = self.text(column);
        text.parse()
            .unwrap_or_else(|_| panic!("{column}: {text:?} is not a number"))
    }
}

/// The rows of a reference table, at least one.
pub fn rows(file: &str) -> Vec<Row> {
    let path = Path::new(env!("CARGO_MANIFEST_DIR"))
        .join("tests/reference")
        .join(file);
    let mut reader = csv::ReaderBuilder::new()
        .comment(Some(b'#'))
        .from_path(path)
        .unwrap();
    let rows: Vec<Row> = reader.deserialize().map(|row| Row(row.unwrap())).collect();
    assert!(!rows.is_empty(), "{file} holds no rows");
    rows
}

/// The number in degrees of a quantity, in a table that holds one a row.
pub fn number_of(table: &[Row], quantity: &str) -> f64 {
    let row = table.iter().find(|row| row.text("quantity") == quantity);
    row.unwrap_or_else(|| panic!("there is no {quantity}"))
        .number("value_deg")
}
