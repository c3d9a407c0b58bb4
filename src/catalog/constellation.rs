//! The 88 constellations: abbreviation, Latin name, genitive.
//!
//! Abbreviations and names as adopted by the International Astronomical Union (1922, 1930); the
//! genitives are written from memory.

use std::fmt;

use crate::catalog::fold::{folded, is_same};

/// A constellation.
#[derive(Debug, PartialEq, Eq)]
pub struct Constellation {
    /// The three letters of the International Astronomical Union.
    pub abbreviation: &'static str,
    /// Its Latin name.
    pub name: &'static str,
    /// "Of the constellation", as in alpha *Lyrae*.
    pub genitive: &'static str,
}

const fn of(
    abbreviation: &'static str,
    name: &'static str,
    genitive: &'static str,
) -> Constellation {
    Constellation {
        abbreviation,
        name,
        genitive,
    }
}

/// All of them, by abbreviation.
pub static CONSTELLATIONS: [Constellation; 88] = [
    of("And", "Andromeda", "Andromedae"),
    of("Ant", "Antlia", "Antliae"),
    of("Aps", "Apus", "Apodis"),
    of("Aql", "Aquila", "Aquilae"),
    of("Aqr", "Aquarius", "Aquarii"),
    of("Ara", "Ara", "Arae"),
    of("Ari", "Aries", "Arietis"),
    of("Aur", "Auriga", "Aurigae"),
    of("Boo", "Boötes", "Boötis"),
    of("CMa", "Canis Major", "Canis Majoris"),
    of("CMi", "Canis Minor", "Canis Minoris"),
    of("CVn", "Canes Venatici", "Canum Venaticorum"),
    of("Cae", "Caelum", "Caeli"),
    of("Cam", "Camelopardalis", "Camelopardalis"),
    of("Cap", "Capricornus", "Capricorni"),
    of("Car", "Carina", "Carinae"),
    of("Cas", "Cassiopeia", "Cassiopeiae"),
    of("Cen", "Centaurus", "Centauri"),
    of("Cep", "Cepheus", "Cephei"),
    of("Cet", "Cetus", "Ceti"),
    of("Cha", "Chamaeleon", "Chamaeleontis"),
    of("Cir", "Circinus", "Circini"),
    of("Cnc", "Cancer", "Cancri"),
    of("Col", "Columba", "Columbae"),
    of("Com", "Coma Berenices", "Comae Berenices"),
    of("CrA", "Corona Australis", "Coronae Australis"),
    of("CrB", "Corona Borealis", "Coronae Borealis"),
    of("Crt", "Crater", "Crateris"),
    of("Cru", "Crux", "Crucis"),
    of("Crv", "Corvus", "Corvi"),
    of("Cyg", "Cygnus", "Cygni"),
    of("Del", "Delphinus", "Delphini"),
    of("Dor", "Dorado", "Doradus"),
    of("Dra", "Draco", "Draconis"),
    of("Equ", "Equuleus", "Equulei"),
    of("Eri", "Eridanus", "Eridani"),
    of("For", "Fornax", "Fornacis"),
    of("Gem", "Gemini", "Geminorum"),
    of("Gru", "Grus", "Gruis"),
    of("Her", "Hercules", "Herculis"),
    of("Hor", "Horologium", "Horologii"),
    of("Hya", "Hydra", "Hydrae"),
    of("Hyi", "Hydrus", "Hydri"),
    of("Ind", "Indus", "Indi"),
    of("LMi", "Leo Minor", "Leonis Minoris"),
    of("Lac", "Lacerta", "Lacertae"),
    of("Leo", "Leo", "Leonis"),
    of("Lep", "Lepus", "Leporis"),
    of("Lib", "Libra", "Librae"),
    of("Lup", "Lupus", "Lupi"),
    of("Lyn", "Lynx", "Lyncis"),
    of("Lyr", "Lyra", "Lyrae"),
    of("Men", "Mensa", "Mensae"),
    of("Mic", "Microscopium", "Microscopii"),
    of("Mon", "Monoceros", "Monocerotis"),
    of("Mus", "Musca", "Muscae"),
    of("Nor", "Norma", "Normae"),
    of("Oct", "Octans", "Octantis"),
    of("Oph", "Ophiuchus", "Ophiuchi"),
    of("Ori", "Orion", "Orionis"),
    of("Pav", "Pavo", "Pavonis"),
    of("Peg", "Pegasus", "Pegasi"),
    of("Per", "Perseus", "Persei"),
    of("Phe", "Phoenix", "Phoenicis"),
    of("Pic", "Pictor", "Pictoris"),
    of("PsA", "Piscis Austrinus", "Piscis Austrini"),
    of("Psc", "Pisces", "Piscium"),
    of("Pup", "Puppis", "Puppis"),
    of("Pyx", "Pyxis", "Pyxidis"),
    of("Ret", "Reticulum", "Reticuli"),
    of("Scl", "Sculptor", "Sculptoris"),
    of("Sco", "Scorpius", "Scorpii"),
    of("Sct", "Scutum", "Scuti"),
    of("Ser", "Serpens", "Serpentis"),
    of("Sex", "Sextans", "Sextantis"),
    of("Sge", "Sagitta", "Sagittae"),
    of("Sgr", "Sagittarius", "Sagittarii"),
    of("Tau", "Taurus", "Tauri"),
    of("Tel", "Telescopium", "Telescopii"),
    of("TrA", "Triangulum Australe", "Trianguli Australis"),
    of("Tri", "Triangulum", "Trianguli"),
    of("Tuc", "Tucana", "Tucanae"),
    of("UMa", "Ursa Major", "Ursae Majoris"),
    of("UMi", "Ursa Minor", "Ursae Minoris"),
    of("Vel", "Vela", "Velorum"),
    of("Vir", "Virgo", "Virginis"),
    of("Vol", "Volans", "Volantis"),
    of("Vul", "Vulpecula", "Vulpeculae"),
];

/// The abbreviations alone, close together in memory for the thousands of rows that name one.
static ABBREVIATIONS: [[u8; 3]; 88] = {
    let mut letters = [[0; 3]; 88];
    let mut at = 0;
    while at < letters.len() {
        if let [a, b, c] = CONSTELLATIONS[at].abbreviation.as_bytes() {
            letters[at] = [*a, *b, *c];
        }
        at += 1;
    }
    letters
};

impl Constellation {
    /// The constellation of this exact abbreviation, as data files write it.
    #[must_use]
    pub fn abbreviated(abbreviation: &str) -> Option<&'static Self> {
        CONSTELLATIONS.get(Self::position(abbreviation)?)
    }

    /// Where the constellation of this exact abbreviation stands among [`CONSTELLATIONS`].
    #[must_use]
    pub fn position(abbreviation: &str) -> Option<usize> {
        let wanted: [u8; 3] = abbreviation.as_bytes().try_into().ok()?;
        let number = |[a, b, c]: [u8; 3]| u32::from_be_bytes([0, a, b, c]);
        ABBREVIATIONS
            .binary_search_by_key(&number(wanted), |&letters| number(letters))
            .ok()
    }

    /// Where it stands among [`CONSTELLATIONS`], as the row of an index keeps it.
    #[must_use]
    pub fn position_in_table(&self) -> Option<u8> {
        u8::try_from(Self::position(self.abbreviation)?).ok()
    }

    /// The constellation a folded text spells whole: abbreviation, name or genitive.
    fn spelt(folded_text: &str) -> Option<&'static Self> {
        CONSTELLATIONS.iter().find(|entry| {
            entry
                .spellings()
                .iter()
                .any(|spelling| is_same(spelling, folded_text))
        })
    }

    /// The constellation a text spells whole, whatever its case, gaps and accents.
    #[must_use]
    pub fn called(text: &str) -> Option<&'static Self> {
        Self::spelt(&folded(text).collect::<String>())
    }

    /// Abbreviation, name, genitive.
    #[must_use]
    pub const fn spellings(&self) -> [&'static str; 3] {
        [self.abbreviation, self.name, self.genitive]
    }
}

impl fmt::Display for Constellation {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        f.write_str(self.name)
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn the_table_is_in_order_so_that_halving_finds_every_one() {
        for entry in &CONSTELLATIONS {
            assert_eq!(Constellation::abbreviated(entry.abbreviation), Some(entry));
        }
        assert_eq!(Constellation::abbreviated("Xyz"), None);
    }

    #[test]
    fn each_is_known_by_all_its_spellings() {
        for (text, abbreviation) in [
            ("lyrae", "Lyr"),
            ("bootis", "Boo"),
            ("canumvenaticorum", "CVn"),
            ("umi", "UMi"),
            ("coronaborealis", "CrB"),
        ] {
            let found = Constellation::spelt(text).unwrap();
            assert_eq!(found.abbreviation, abbreviation, "{text}");
        }
        assert_eq!(Constellation::spelt("lyraex"), None);
    }

    #[test]
    fn no_spelling_belongs_to_two() {
        for entry in &CONSTELLATIONS {
            for spelling in entry.spellings() {
                let folded: String = folded(spelling).collect();
                assert_eq!(Constellation::spelt(&folded), Some(entry), "{spelling}");
            }
        }
    }
}
