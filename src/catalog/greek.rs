//! The Greek letters of Bayer's star designations: name, usual short spellings, and the letter itself.
//!
//! The three-letter abbreviations are those in common use in star catalogues (common practice, no source).

use std::fmt;

/// A lower-case Greek letter.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Greek(&'static (&'static str, &'static [&'static str], char));

/// Name, spellings besides the name, letter.
const LETTERS: [(&str, &[&str], char); 24] = [
    ("alpha", &["alf", "alp", "α"], 'α'),
    ("beta", &["bet", "β", "ϐ"], 'β'),
    ("gamma", &["gam", "γ"], 'γ'),
    ("delta", &["del", "δ"], 'δ'),
    ("epsilon", &["eps", "ε", "ϵ"], 'ε'),
    ("zeta", &["zet", "ζ"], 'ζ'),
    ("eta", &["η"], 'η'),
    ("theta", &["tet", "the", "θ", "ϑ"], 'θ'),
    ("iota", &["iot", "ι"], 'ι'),
    ("kappa", &["kap", "κ", "ϰ"], 'κ'),
    ("lambda", &["lam", "λ"], 'λ'),
    ("mu", &["μ", "µ"], 'μ'),
    ("nu", &["ν"], 'ν'),
    ("xi", &["ksi", "ξ"], 'ξ'),
    ("omicron", &["omi", "ο"], 'ο'),
    ("pi", &["π", "ϖ"], 'π'),
    ("rho", &["ρ", "ϱ"], 'ρ'),
    ("sigma", &["sig", "σ", "ς"], 'σ'),
    ("tau", &["τ"], 'τ'),
    ("upsilon", &["ups", "υ"], 'υ'),
    ("phi", &["φ", "ϕ"], 'φ'),
    ("chi", &["khi", "χ"], 'χ'),
    ("psi", &["ψ"], 'ψ'),
    ("omega", &["ome", "ω"], 'ω'),
];

impl Greek {
    /// Every letter in alphabetical order.
    pub fn all() -> impl Iterator<Item = Self> {
        LETTERS.iter().map(Self)
    }

    /// The letter of this exact name.
    #[must_use]
    pub fn named(name: &str) -> Option<Self> {
        Self::all().find(|letter| letter.name() == name)
    }

    /// Its name in English, in lower case.
    #[must_use]
    pub const fn name(self) -> &'static str {
        self.0.0
    }

    /// The letter itself.
    #[must_use]
    pub const fn letter(self) -> char {
        self.0.2
    }

    /// Every way a folded text may begin with a Greek letter: the letter and the text after it.
    pub fn leading(folded_text: &str) -> impl Iterator<Item = (Self, &str)> {
        Self::all().flat_map(move |letter| {
            std::iter::once(letter.0.0)
                .chain(letter.0.1.iter().copied())
                .filter_map(move |spelling| Some((letter, folded_text.strip_prefix(spelling)?)))
        })
    }
}

impl fmt::Display for Greek {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        f.write_str(self.name())
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::catalog::fold::folded;

    #[test]
    fn the_alphabet_is_in_order_and_complete() {
        // α to ω are the code points 3B1 to 3C9 of Unicode, with the final sigma ς among them
        let letters: Vec<char> = ('α'..='ω').filter(|&c| c != 'ς').collect();
        assert_eq!(Greek::all().map(Greek::letter).collect::<Vec<_>>(), letters);
    }

    #[test]
    fn a_letter_is_known_by_name_abbreviation_and_itself() {
        for text in ["alpha Lyr", "Alf Lyr", "α Lyr", "Α Lyr", "alp lyr"] {
            let folded: String = folded(text).collect();
            assert!(
                Greek::leading(&folded).any(|(g, rest)| g.name() == "alpha" && rest == "lyr"),
                "{text}"
            );
        }
    }

    #[test]
    fn every_spelling_is_folded_already_and_belongs_to_one_letter() {
        let mut spellings: Vec<&str> = LETTERS
            .iter()
            .flat_map(|(name, more, _)| std::iter::once(*name).chain(more.iter().copied()))
            .collect();
        for spelling in &spellings {
            assert_eq!(folded(spelling).collect::<String>(), *spelling);
        }
        let count = spellings.len();
        spellings.sort_unstable();
        spellings.dedup();
        assert_eq!(spellings.len(), count);
    }
}
