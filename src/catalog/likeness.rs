//! How like a name is to what was typed, on a scale of 0 to 1.
//!
//! Every word typed must be found in the name: whole, as the beginning of a word, or with one slip
//! (a letter wrong, missing, too many, or two changed round). Words may stand in any order. What is
//! found among the words beside the name (kind, constellation) counts half.

use crate::catalog::Greek;
use crate::catalog::fold::Words;

/// For the beginning of a word, and what is added as it nears the whole.
const BEGINNING: (f64, f64) = (0.8, 0.2);
/// The shortest word in which a slip is looked for: shorter ones are too easily another.
const SLIP_FROM_LETTERS: usize = 4;
/// The shortest words that may tell of the thing without being of its name, right and with a slip.
const BESIDE_FROM_LETTERS: usize = 3;
const BESIDE_SLIP_FROM_LETTERS: usize = 5;
/// For a word that is not of the name but tells of the thing.
pub(super) const BESIDE: f64 = 0.5;
/// The share of the score that depends on how much of the name was typed.
const OF_THE_NAME: f64 = 0.1;

/// How near a word typed is to a word of a name.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(super) enum Nearness {
    /// It is that word.
    Whole,
    /// It is the first letters of it.
    Beginning {
        /// So many.
        letters: usize,
        /// Of so many.
        of: usize,
    },
    /// It is the first digits of it, which are another number.
    FirstDigits,
    /// It is that word but for one slip.
    OneSlip,
}

impl Nearness {
    /// On the scale of likeness.
    pub fn value(self) -> f64 {
        match self {
            Self::Whole => 1.0,
            Self::Beginning { letters, of } => {
                let (least, more) = BEGINNING;
                least + more * letters as f64 / of.max(1) as f64
            }
            Self::FirstDigits => 0.6,
            Self::OneSlip => 0.7,
        }
    }

    /// Of two folded words; nothing if they are not near.
    fn of(typed: &str, word: &str) -> Option<Self> {
        if typed == word {
            return Some(Self::Whole);
        }
        if word.starts_with(typed) {
            return Some(if is_number(word) {
                Self::FirstDigits
            } else {
                Self::Beginning {
                    letters: typed.len(),
                    of: word.len(),
                }
            });
        }
        (may_have_a_slip(typed) && is_one_slip(typed, word)).then_some(Self::OneSlip)
    }
}

/// True of a folded word that is a number.
pub(super) fn is_number(word: &str) -> bool {
    word.starts_with(|c: char| c.is_ascii_digit())
}

/// True of a folded word in which a slip is looked for.
pub(super) fn may_have_a_slip(typed: &str) -> bool {
    !is_number(typed) && typed.len() >= SLIP_FROM_LETTERS
}

/// True if a word is another but for one slip.
pub(super) fn is_one_slip(typed: &str, word: &str) -> bool {
    !is_number(word)
        && may_be_one_slip(typed.as_bytes(), word.as_bytes())
        && strsim::damerau_levenshtein(typed, word) == 1
}

/// The likeness of a whole name: the mean of those of the words typed, a little less where little of the name was typed.
pub(super) fn whole(sum: f64, typed: usize, of_name: usize, length: usize) -> f64 {
    let share = of_name as f64 / length.max(of_name).max(1) as f64;
    sum / typed.max(1) as f64 * (1.0 - OF_THE_NAME + OF_THE_NAME * share)
}

/// What was typed.
#[derive(Clone, Debug)]
pub struct Typed(Vec<String>);

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
    pub fn words(&self) -> impl Iterator<Item = &str> {
        self.0.iter().map(String::as_str)
    }

    /// The digits typed after "HIP", if that is all.
    #[must_use]
    pub fn hip_digits(&self) -> Option<&str> {
        match self.0.as_slice() {
            [word, number] if word == "hip" => Some(number),
            _ => None,
        }
    }

    /// For every word typed, how like it is to the likest of these.
    #[must_use]
    pub fn each(&self, words: &Words) -> Vec<f64> {
        self.0.iter().map(|typed| likest(typed, words)).collect()
    }

    /// The same for words that tell of a thing but are not its name: a letter or two, and a slip in
    /// a short word, mean nothing there.
    #[must_use]
    pub fn beside(&self, words: &Words) -> Vec<f64> {
        let strict = |typed: &String| {
            let likeness = likest(typed, words);
            let slip =
                likeness <= Nearness::OneSlip.value() && typed.len() < BESIDE_SLIP_FROM_LETTERS;
            if slip || typed.len() < BESIDE_FROM_LETTERS {
                0.0
            } else {
                likeness
            }
        };
        self.0.iter().map(strict).collect()
    }

    /// How like a name is; 0 if a word typed is nowhere in it, nor beside it.
    ///
    /// `words` are those of the name, folded. `last` says for every word typed how like it is to
    /// the name's last word in any of its spellings, where that word (a constellation) is not among
    /// `words`; `beside`, how like it is to what is said beside the name.
    pub fn likeness<'w>(
        &self,
        words: impl Iterator<Item = &'w str> + Clone,
        last: Option<&[f64]>,
        beside: &[f64],
    ) -> f64 {
        if self.0.is_empty() {
            return 0.0;
        }
        let mut taken = 0_u64;
        let mut sum = 0.0;
        let mut of_name = 0_usize;
        for (at, (typed, beside)) in self.0.iter().zip(beside).enumerate() {
            let in_name = take_likest(typed, words.clone(), &mut taken);
            let in_last = last.and_then(|last| last.get(at)).copied().unwrap_or(0.0);
            let likeness = in_name.max(in_last);
            if likeness > 0.0 {
                of_name += 1;
                sum += likeness;
            } else if *beside > 0.0 {
                sum += BESIDE * beside;
            } else {
                return 0.0;
            }
        }
        let length = words.count() + usize::from(last.is_some());
        whole(sum, self.0.len(), of_name, length)
    }
}

/// How like a word typed is to the likest word not yet taken, which then is; a bit for each word,
/// and words beyond the last bit are not looked at.
fn take_likest<'w>(typed: &str, words: impl Iterator<Item = &'w str>, taken: &mut u64) -> f64 {
    let mut best = (0.0, 0);
    let bits = std::iter::successors(Some(1_u64), |bit| bit.checked_mul(2));
    for (word, bit) in words.zip(bits) {
        let likeness = word_likeness(typed, word);
        if likeness > best.0 && *taken & bit == 0 {
            best = (likeness, bit);
        }
    }
    *taken |= best.1;
    best.0
}

fn likest(typed: &str, words: &Words) -> f64 {
    let likenesses = words.iter().map(|word| word_likeness(typed, word));
    likenesses.fold(0.0, f64::max)
}

/// How like one word is to another, both folded.
fn word_likeness(typed: &str, word: &str) -> f64 {
    Nearness::of(typed, word).map_or(0.0, Nearness::value)
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
        let typed = Typed::new(typed);
        let beside = typed.beside(&Words::of(beside));
        typed.likeness(Words::of(words).iter(), None, &beside)
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
