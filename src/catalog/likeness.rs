//! How like a name is to what was typed, on a scale of 0 to 1.
//!
//! Every word typed must be found in the name: whole, as the beginning of a word, or with one slip
//! (a letter wrong, missing, too many, or two changed round). Words may stand in any order. What is
//! found among the words beside the name (kind, constellation) counts half.

use crate::catalog::Greek;
use crate::catalog::fold::Words;

/// For a word given whole.
const WHOLE: f64 = 1.0;
/// For the beginning of a word, and what is added as it nears the whole.
const BEGINNING: (f64, f64) = (0.8, 0.2);
/// For the first digits of a number, which are another number.
const FIRST_DIGITS: f64 = 0.6;
/// For a word with one slip.
const ONE_SLIP: f64 = 0.7;
/// The shortest word in which a slip is looked for: shorter ones are too easily another.
const SLIP_FROM_LETTERS: usize = 4;
/// For a word that is not of the name but tells of the thing.
const BESIDE: f64 = 0.5;
/// The share of the score that depends on how much of the name was typed.
const OF_THE_NAME: f64 = 0.1;

/// What was typed.
#[derive(Clone, Debug)]
pub struct Typed(Vec<String>);

/// A name to be held against it, filled again and again.
#[derive(Clone, Debug, Default)]
pub struct Name {
    /// The words of the name.
    pub words: Words,
    /// Further spellings of its words, as the genitive of a constellation: they count as the name
    /// but add nothing to its length.
    pub spellings: Words,
    taken: Vec<bool>,
}

impl Typed {
    /// The words of a text, Greek letters by their names, without an article.
    #[must_use]
    pub fn new(text: &str) -> Self {
        let words = Words::of(text);
        let spelt = |word: &str| {
            let mut letters = Greek::leading(word)
                .filter(|(letter, rest)| rest.is_empty() && !letter.name().starts_with(word));
            letters
                .next()
                .map_or_else(|| word.to_owned(), |(letter, _)| letter.name().to_owned())
        };
        let mut typed: Vec<String> = words
            .iter()
            .filter(|word| *word != "the")
            .map(spelt)
            .collect();
        let numbered = typed
            .get(1)
            .is_some_and(|word| word.starts_with(|c: char| c.is_ascii_digit()));
        if let Some(first) = typed
            .first_mut()
            .filter(|first| numbered && *first == "messier")
        {
            "m".clone_into(first);
        }
        Self(typed)
    }

    /// True if nothing was typed.
    #[must_use]
    pub fn is_empty(&self) -> bool {
        self.0.is_empty()
    }

    /// The words.
    #[must_use]
    pub fn words(&self) -> &[String] {
        &self.0
    }

    /// How like the name is; 0 if a word typed is nowhere in it, nor beside it.
    pub fn likeness(&self, name: &mut Name, beside: &Words) -> f64 {
        let mut sum = 0.0;
        let mut of_name = 0;
        name.taken.clear();
        name.taken.resize(name.words.len(), false);
        for typed in &self.0 {
            let in_name = name
                .words
                .iter()
                .enumerate()
                .filter(|(at, _)| name.taken.get(*at) == Some(&false))
                .map(|(at, word)| (word_likeness(typed, word), at))
                .max_by(|a, b| a.0.total_cmp(&b.0))
                .filter(|(likeness, _)| *likeness > 0.0);
            let best = |words: &Words| {
                words
                    .iter()
                    .map(|word| word_likeness(typed, word))
                    .fold(0.0, f64::max)
            };
            let spelt = best(&name.spellings);
            match in_name {
                Some((likeness, at)) if likeness >= spelt => {
                    if let Some(taken) = name.taken.get_mut(at) {
                        *taken = true;
                    }
                    of_name += 1;
                    sum += likeness;
                }
                _ if spelt > 0.0 => {
                    of_name += 1;
                    sum += spelt;
                }
                _ => {
                    let beside = best(beside);
                    if beside <= 0.0 {
                        return 0.0;
                    }
                    sum += BESIDE * beside;
                }
            }
        }
        if self.0.is_empty() {
            return 0.0;
        }
        let length = name.words.len().max(of_name).max(1) as f64;
        let typed_share = f64::from(u32::try_from(of_name).unwrap_or(0)) / length;
        sum / self.0.len() as f64 * (1.0 - OF_THE_NAME + OF_THE_NAME * typed_share)
    }
}

/// How like one word is to another, both folded.
fn word_likeness(typed: &str, word: &str) -> f64 {
    if typed == word {
        return WHOLE;
    }
    let number = |word: &str| word.starts_with(|c: char| c.is_ascii_digit());
    if word.starts_with(typed) {
        if number(word) {
            return FIRST_DIGITS;
        }
        let (least, more) = BEGINNING;
        return least + more * typed.len() as f64 / word.len() as f64;
    }
    if number(typed) || number(word) || !may_be_one_slip(typed.as_bytes(), word.as_bytes()) {
        return 0.0;
    }
    if strsim::damerau_levenshtein(typed, word) == 1 {
        ONE_SLIP
    } else {
        0.0
    }
}

/// A quick look that passes every pair one slip apart, and few others: what is alike at both ends
/// leaves no more than the slip between.
fn may_be_one_slip(a: &[u8], b: &[u8]) -> bool {
    /// The longest character folding leaves, in bytes.
    const LONGEST: usize = 4;
    let (short, long) = (a.len().min(b.len()), a.len().max(b.len()));
    if short < SLIP_FROM_LETTERS || long - short > LONGEST {
        return false;
    }
    let alike =
        |pairs: &mut dyn Iterator<Item = (&u8, &u8)>| pairs.take_while(|(x, y)| x == y).count();
    let at_start = alike(&mut a.iter().zip(b));
    let at_end = alike(&mut a.iter().rev().zip(b.iter().rev()));
    at_start + at_end + 2 * LONGEST >= long
        && (at_start + at_end + 2 >= long || !a.is_ascii() || !b.is_ascii())
}

#[cfg(test)]
mod tests {
    use super::*;

    fn likeness(typed: &str, words: &str, beside: &str) -> f64 {
        let mut name = Name::default();
        name.words.add(words);
        Typed::new(typed).likeness(&mut name, &Words::of(beside))
    }

    #[test]
    fn the_whole_name_is_like_itself_in_any_order() {
        for typed in ["Owl Cluster", "cluster owl", "the owl CLUSTER"] {
            assert!(
                (likeness(typed, "Owl Cluster", "") - 1.0).abs() < f64::EPSILON,
                "{typed}"
            );
        }
    }

    #[test]
    fn beginnings_and_one_slip_are_forgiven_and_no_more() {
        assert!(likeness("owl clus", "Owl Cluster", "") > 0.9);
        for slip in ["wega", "veega", "evga"] {
            assert!(likeness(slip, "Vega", "") > 0.6, "{slip}");
        }
        assert!(likeness("betelguese", "Betelgeuse", "") > 0.6);
        for wrong in ["viga x", "waga", "owl"] {
            assert!(likeness(wrong, "Vega", "") <= 0.0, "{wrong}");
        }
    }

    #[test]
    fn a_number_has_no_slips() {
        assert!(likeness("m 31", "M 32", "") <= 0.0);
        assert!(likeness("m 3", "M 3", "") > likeness("m 3", "M 31", ""));
        assert!(likeness("ngc 20999", "NGC 2099", "") <= 0.0);
    }

    #[test]
    fn kind_and_constellation_help_but_count_less() {
        let beside = "galaxy Andromeda";
        assert!(likeness("galaxy", "M 31", beside) > 0.0);
        assert!(likeness("m 31", "M 31", beside) > likeness("m 31 galaxy", "M 31", beside));
    }

    #[test]
    fn the_quick_look_passes_all_that_is_one_slip_away() {
        let words = ["betelgeuse", "vega", "αβγδε", "krüger", "cluster"];
        for word in words {
            let letters: Vec<char> = word.chars().collect();
            for at in 0..letters.len() {
                let mut changed = letters.clone();
                changed[at] = 'x';
                let mut longer = letters.clone();
                longer.insert(at, 'x');
                let mut shorter = letters.clone();
                shorter.remove(at);
                let mut turned = letters.clone();
                turned.swap(at, (at + 1) % letters.len().max(1));
                for slip in [changed, longer, shorter, turned] {
                    let slip: String = slip.into_iter().collect();
                    if strsim::damerau_levenshtein(word, &slip) == 1
                        && slip.len().min(word.len()) >= SLIP_FROM_LETTERS
                    {
                        assert!(
                            may_be_one_slip(word.as_bytes(), slip.as_bytes()),
                            "{word} {slip}"
                        );
                    }
                }
            }
        }
    }
}
