//! Rows of cells as columns a person reads.

use std::io::{self, Write};

/// Prints rows, the columns wide enough for their widest cells; numbers stand under one another at their right ends in the
/// columns that `is_right` names.
pub fn print<const N: usize>(
    rows: &[[String; N]],
    is_right: impl Fn(usize) -> bool,
    out: &mut dyn Write,
) -> io::Result<()> {
    let widths: [usize; N] = std::array::from_fn(|column| {
        let cells = rows.iter().filter_map(|row| row.get(column));
        cells.map(|cell| cell.chars().count()).max().unwrap_or(0)
    });
    for row in rows {
        let cells = row.iter().zip(widths).enumerate();
        let line: Vec<String> = cells
            .map(|(column, (cell, width))| {
                if is_right(column) {
                    format!("{cell:>width$}")
                } else {
                    format!("{cell:<width$}")
                }
            })
            .collect();
        writeln!(out, "{}", line.join("  ").trim_end())?;
    }
    Ok(())
}
