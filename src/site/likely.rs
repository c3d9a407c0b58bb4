//! What was likely meant by a word that is not known.

/// Below this likeness (0 to 1, Jaro-Winkler) a suggestion would puzzle rather than help.
const MUCH_ALIKE: f64 = 0.75;

/// The known word most like another, if any is much alike.
pub fn nearest<'w>(word: &str, known: impl IntoIterator<Item = &'w str>) -> Option<&'w str> {
    let word = word.to_lowercase();
    known
        .into_iter()
        .map(|other| (strsim::jaro_winkler(&other.to_lowercase(), &word), other))
        .filter(|(likeness, _)| *likeness > MUCH_ALIKE)
        .max_by(|a, b| a.0.total_cmp(&b.0))
        .map(|(_, other)| other)
}

/// What to say after an unknown word: the nearest known one, else all of them.
pub fn did_you_mean(word: &str, known: &[&str]) -> String {
    nearest(word, known.iter().copied()).map_or_else(
        || format!("known are {}", known.join(", ")),
        |nearest| format!("did you mean {nearest}?"),
    )
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn a_slip_of_the_hand_brings_the_nearest_word() {
        assert_eq!(
            nearest("elevaton-m", ["name", "elevation-m"]),
            Some("elevation-m")
        );
        assert_eq!(
            nearest("elevation_m", ["name", "elevation-m"]),
            Some("elevation-m")
        );
        assert_eq!(nearest("xyz", ["name", "elevation-m"]), None);
    }
}
