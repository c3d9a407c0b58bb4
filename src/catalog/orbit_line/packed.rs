//! The Minor Planet Center's packed forms: dates, numbers and provisional designations (from memory of its
//! published description of packed designations).

/// The value of a figure to base 62: 0 to 9, A to Z, a to z.
fn figure(c: u8) -> Option<u32> {
    match c {
        b'0'..=b'9' => Some(u32::from(c - b'0')),
        b'A'..=b'Z' => Some(u32::from(c - b'A') + 10),
        b'a'..=b'z' => Some(u32::from(c - b'a') + 36),
        _ => None,
    }
}

fn base_62(text: &str) -> Option<u32> {
    text.bytes()
        .try_fold(0_u32, |sum, c| sum.checked_mul(62)?.checked_add(figure(c)?))
}

/// Decimal figures and nothing else.
fn decimal(text: &str) -> Option<u32> {
    let digits = !text.is_empty() && text.bytes().all(|b| b.is_ascii_digit());
    text.parse().ok().filter(|_| digits)
}

/// Year, month and day of a packed date: "K205V" is 2020 May 31.
pub fn date(packed: &str) -> Option<(i32, i32, i32)> {
    if packed.len() != 5 || !packed.is_ascii() {
        return None;
    }
    let century = figure(*packed.as_bytes().first()?).filter(|c| (18..=21).contains(c))?;
    let year = century * 100 + decimal(packed.get(1..3)?)?;
    let month = figure(*packed.as_bytes().get(3)?).filter(|month| (1..=12).contains(month))?;
    let day = figure(*packed.as_bytes().get(4)?).filter(|day| (1..=31).contains(day))?;
    Some((
        i32::try_from(year).ok()?,
        i32::try_from(month).ok()?,
        i32::try_from(day).ok()?,
    ))
}

/// A designation in words: the number in brackets, or the provisional one, "2024 AH".
pub fn designation(packed: &str) -> Option<String> {
    if !packed.is_ascii() {
        return None;
    }
    match packed.len() {
        5 => number(packed).map(|number| format!("({number})")),
        7 => survey(packed)
            .or_else(|| beyond_the_cycles(packed))
            .or_else(|| provisional(packed)),
        _ => None,
    }
}

/// "00001" is 1, "A0001" is 100001, "~0000" is 620000.
fn number(packed: &str) -> Option<u32> {
    if let Some(rest) = packed.strip_prefix('~') {
        return base_62(rest)?.checked_add(620_000);
    }
    let first = figure(*packed.as_bytes().first()?)?;
    Some(first * 10_000 + decimal(packed.get(1..)?)?)
}

/// "PLS2040" is 2040 P-L, "T1S3138" is 3138 T-1.
fn survey(packed: &str) -> Option<String> {
    let number = decimal(packed.get(3..)?)?;
    let name = match packed.get(..3)? {
        "PLS" => "P-L",
        "T1S" => "T-1",
        "T2S" => "T-2",
        "T3S" => "T-3",
        _ => return None,
    };
    Some(format!("{number} {name}"))
}

/// The year, of a century's letter and two figures.
fn year(packed: &str) -> Option<u32> {
    let century = figure(*packed.as_bytes().first()?).filter(|c| (18..=21).contains(c))?;
    Some(century * 100 + decimal(packed.get(1..3)?)?)
}

/// "K24A00H" is 2024 AH, "J98SA8Q" is 1998 SQ108.
fn provisional(packed: &str) -> Option<String> {
    let letter = |at: usize| {
        packed
            .as_bytes()
            .get(at)
            .copied()
            .filter(u8::is_ascii_uppercase)
    };
    let (half_month, order) = (letter(3)?, letter(6)?);
    let tens = figure(*packed.as_bytes().get(4)?)?;
    let cycle = tens * 10 + decimal(packed.get(5..6)?)?;
    Some(in_words(year(packed)?, half_month, order, cycle))
}

/// Past 620 cycles of letters in one half-month: "_QC0000" is 2026 CA620.
fn beyond_the_cycles(packed: &str) -> Option<String> {
    const LETTERS: &[u8] = b"ABCDEFGHJKLMNOPQRSTUVWXYZ";
    let rest = packed.strip_prefix('_')?;
    let year = 2000 + figure(*rest.as_bytes().first()?)?;
    let half_month = rest
        .as_bytes()
        .get(1)
        .copied()
        .filter(u8::is_ascii_uppercase)?;
    let count = base_62(rest.get(2..)?)?;
    let order = LETTERS.get(usize::try_from(count % 25).ok()?)?;
    Some(in_words(year, half_month, *order, 620 + count / 25))
}

fn in_words(year: u32, half_month: u8, order: u8, cycle: u32) -> String {
    let (half_month, order) = (char::from(half_month), char::from(order));
    if cycle == 0 {
        format!("{year} {half_month}{order}")
    } else {
        format!("{year} {half_month}{order}{cycle}")
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn dates_are_unpacked() {
        for (packed, is) in [
            ("K205V", Some((2020, 5, 31))),
            ("K221L", Some((2022, 1, 21))),
            ("J9611", Some((1996, 1, 1))),
            ("I8A1", None),
            ("K20DV", None),
            ("K20é", None),
            ("12345", None),
        ] {
            assert_eq!(date(packed), is, "{packed}");
        }
    }

    #[test]
    fn designations_are_unpacked() {
        // Source: the examples of the Minor Planet Center's page "Packed Provisional and Permanent
        // Designations", from memory
        for (packed, is) in [
            ("00001", "(1)"),
            ("03202", "(3202)"),
            ("A0345", "(100345)"),
            ("a0017", "(360017)"),
            ("~0000", "(620000)"),
            ("~000z", "(620061)"),
            ("J95X00A", "1995 XA"),
            ("J95X01L", "1995 XL1"),
            ("J98SA8Q", "1998 SQ108"),
            ("K07Tf8A", "2007 TA418"),
            ("K24A00H", "2024 AH"),
            ("PLS2040", "2040 P-L"),
            ("T1S3138", "3138 T-1"),
            ("_QC0000", "2026 CA620"),
            ("_QC0aEM", "2026 CZ6190"),
            ("_QCzzzz", "2026 CL591673"),
        ] {
            assert_eq!(designation(packed).as_deref(), Some(is), "{packed}");
        }
        for packed in ["", "0001", "J95X0-A", "K24A0é", "?0001", "J95x00A"] {
            assert_eq!(designation(packed), None, "{packed}");
        }
    }
}
