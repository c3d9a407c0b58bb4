//! Names brought to one form, so that "M 37", "m37" and "M037" are the same name.
//!
//! Case, accents, apostrophes and every mark between words are put aside; zeros before a number too.
//! A gap between two numbers is kept as one space, so that "M 3 7" is not "M 37".

/// What one written character becomes.
enum Part {
    /// It counts.
    Counts(char),
    /// It is two letters in one.
    Two(char, char),
    /// It is passed over as if it were not there.
    Nothing,
    /// It parts two words.
    Gap,
}

/// An accented Latin letter without its accent (Latin-1 and what Latin Extended-A adds in European names).
const fn without_accent(c: char) -> char {
    match c {
        'à' | 'á' | 'â' | 'ã' | 'ä' | 'å' | 'ā' | 'ă' | 'ą' => 'a',
        'ç' | 'ć' | 'ĉ' | 'č' => 'c',
        'ď' | 'đ' | 'ð' => 'd',
        'è' | 'é' | 'ê' | 'ë' | 'ē' | 'ĕ' | 'ė' | 'ę' | 'ě' => 'e',
        'ĝ' | 'ğ' | 'ġ' | 'ģ' => 'g',
        'ì' | 'í' | 'î' | 'ï' | 'ī' | 'į' | 'ı' => 'i',
        'ĺ' | 'ľ' | 'ł' => 'l',
        'ñ' | 'ń' | 'ň' => 'n',
        'ò' | 'ó' | 'ô' | 'õ' | 'ö' | 'ø' | 'ō' | 'ő' => 'o',
        'ŕ' | 'ř' => 'r',
        'ś' | 'ŝ' | 'ş' | 'š' => 's',
        'ţ' | 'ť' => 't',
        'ù' | 'ú' | 'û' | 'ü' | 'ū' | 'ů' | 'ű' | 'ų' => 'u',
        'ý' | 'ÿ' => 'y',
        'ź' | 'ż' | 'ž' => 'z',
        other => other,
    }
}

fn part(c: char) -> Part {
    if c.is_ascii_alphanumeric() {
        return Part::Counts(c.to_ascii_lowercase());
    }
    match c {
        // apostrophes, and an accent written as a character of its own
        '\'' | '’' | '‘' | '`' | 'ʼ' | '′' | '\u{300}'..='\u{36f}' => Part::Nothing,
        '¹' => Part::Counts('1'),
        '²' => Part::Counts('2'),
        '³' => Part::Counts('3'),
        '⁴'..='⁹' => Part::Counts(char::from_digit(u32::from(c) - 0x2070, 10).unwrap_or(c)),
        'æ' | 'Æ' => Part::Two('a', 'e'),
        'œ' | 'Œ' => Part::Two('o', 'e'),
        'ß' => Part::Two('s', 's'),
        _ if c.is_ascii() || !c.is_alphanumeric() => Part::Gap,
        _ => Part::Counts(without_accent(c.to_lowercase().next().unwrap_or(c))),
    }
}

/// The characters of a name that count, in their one form.
#[derive(Clone, Debug)]
pub struct Folded<'a> {
    rest: std::str::Chars<'a>,
    held: Option<char>,
    gap: bool,
    last: Option<char>,
}

/// Folds a name.
#[must_use]
pub fn folded(text: &str) -> Folded<'_> {
    Folded {
        rest: text.chars(),
        held: None,
        gap: false,
        last: None,
    }
}

impl Folded<'_> {
    /// True for a zero that stands before a further digit and after none.
    fn is_leading_zero(&self, c: char) -> bool {
        let in_number = !self.gap && self.last.is_some_and(|last| last.is_ascii_digit());
        c == '0' && !in_number && self.rest.clone().next().is_some_and(|n| n.is_ascii_digit())
    }
}

impl Iterator for Folded<'_> {
    type Item = char;

    fn next(&mut self) -> Option<char> {
        if let Some(held) = self.held.take() {
            self.last = Some(held);
            return Some(held);
        }
        loop {
            let c = match part(self.rest.next()?) {
                Part::Nothing => continue,
                Part::Gap => {
                    self.gap = true;
                    continue;
                }
                Part::Counts(c) => c,
                Part::Two(c, then) => {
                    self.held = Some(then);
                    c
                }
            };
            if self.is_leading_zero(c) {
                continue;
            }
            let digit = |c: char| c.is_ascii_digit();
            let apart = self.gap && digit(c) && self.last.is_some_and(digit);
            self.gap = false;
            self.last = Some(c);
            if apart {
                self.held = Some(c);
                return Some(' ');
            }
            return Some(c);
        }
    }
}

/// True if the name folds to exactly this text, which is folded already.
#[must_use]
pub fn is_same(name: &str, folded_text: &str) -> bool {
    folded(name).eq(folded_text.chars())
}

/// The words of a name, folded, in one buffer that is filled again and again.
///
/// Words part at every gap and between letters and digits: "NGC2099" has two.
#[derive(Clone, Debug, Default)]
pub struct Words {
    text: String,
    ends: Vec<usize>,
}

impl Words {
    /// The words of one text.
    #[must_use]
    pub fn of(text: &str) -> Self {
        let mut words = Self::default();
        words.add(text);
        words
    }

    /// Forgets all words.
    pub fn clear(&mut self) {
        self.text.clear();
        self.ends.clear();
    }

    /// Adds the words of a further text.
    pub fn add(&mut self, text: &str) {
        let mut digits_before = None;
        for c in text.chars() {
            let (first, second) = match part(c) {
                Part::Nothing => continue,
                Part::Gap => {
                    self.end_word();
                    digits_before = None;
                    continue;
                }
                Part::Counts(c) => (c, None),
                Part::Two(c, then) => (c, Some(then)),
            };
            let digit = first.is_ascii_digit();
            if digits_before.is_some_and(|before| before != digit) {
                self.end_word();
            }
            digits_before = Some(digit);
            self.text.push(first);
            self.text.extend(second);
        }
        self.end_word();
    }

    fn end_word(&mut self) {
        if self.text.len() > self.ends.last().copied().unwrap_or(0) {
            self.ends.push(self.text.len());
        }
    }

    /// The words in order; a number is without the zeros before it.
    pub fn iter(&self) -> impl Iterator<Item = &str> + Clone {
        let mut start = 0;
        self.ends.iter().map(move |&end| {
            let word = self.text.get(start..end).unwrap_or("");
            start = end;
            match word.trim_start_matches('0') {
                "" => word.get(..1).unwrap_or(word),
                number if number.starts_with(|c: char| c.is_ascii_digit()) => number,
                _ => word,
            }
        })
    }
}

#[cfg(test)]
mod tests {
    use proptest::prelude::*;

    use super::*;

    fn fold(text: &str) -> String {
        folded(text).collect()
    }

    #[test]
    fn spellings_of_one_name_fold_together() {
        for (spellings, one) in [
            (&["M 37", "m37", " M-037 ", "M_37"][..], "m37"),
            (
                &["Barnard's Star", "barnards star", "Barnard’s  star"],
                "barnardsstar",
            ),
            (&["Boötes", "bootes", "Boo\u{308}tes"], "bootes"),
            (&["α¹ Cap", "Α1cap"], "α1cap"),
            (&["Præsepe", "PRAESEPE"], "praesepe"),
            (&["NGC 0457", "ngc457"], "ngc457"),
        ] {
            for spelling in spellings {
                assert_eq!(fold(spelling), one, "{spelling}");
            }
        }
    }

    #[test]
    fn two_numbers_do_not_run_together() {
        assert_eq!(fold("M 3 7"), "m3 7");
        assert_ne!(fold("M 3 7"), fold("M 37"));
        assert_eq!(fold("M 0"), "m0");
        assert_eq!(fold("M 100"), "m100");
    }

    #[test]
    fn words_part_at_gaps_and_at_numbers() {
        let words = Words::of("NGC0457, the Owl's (cluster)");
        let listed: Vec<_> = words.iter().collect();
        assert_eq!(listed, ["ngc", "457", "the", "owls", "cluster"]);
        assert_eq!(Words::of(" -- ").iter().count(), 0);
    }

    proptest! {
        #[test]
        fn folding_what_is_folded_changes_nothing(text in "\\PC{0,24}") {
            let once = fold(&text);
            prop_assert_eq!(fold(&once), once.clone());
            prop_assert!(is_same(&text, &once));
            for word in Words::of(&text).iter() {
                prop_assert!(!word.is_empty());
            }
        }
    }
}
