//! The index held against the names it was made of.

use proptest::prelude::*;

use crate::catalog::fold::{Words, folded};
use crate::catalog::index::{Builder, Bytes, Candidates, Facts, Index, Stamp};
use crate::catalog::likeness::Typed;
use crate::catalog::surroundings::Surroundings;
use crate::catalog::{Constellation, Kind};

/// A row: its names, its magnitude, its kind, its constellation.
type Row = (Vec<String>, Option<f32>, Kind, Option<&'static str>);

fn built(rows: &[Row]) -> Vec<u8> {
    let mut builder = Builder::default();
    for (reference, (names, magnitude, kind, constellation)) in rows.iter().enumerate() {
        builder.row(Facts {
            reference: reference as u64,
            magnitude: *magnitude,
            direction: None,
            kinds: kind.bit(),
            constellation: constellation
                .and_then(Constellation::position)
                .and_then(|position| u8::try_from(position).ok()),
        });
        for name in names {
            builder.name(name);
        }
    }
    let stamp = Stamp {
        length: 7,
        written: 8,
        unread: 9,
    };
    builder.finish(&stamp)
}

/// What a row scores, held against the words typed by itself.
fn score(typed: &Typed, around: &Surroundings, (names, _, kind, constellation): &Row) -> f64 {
    let mut beside = Vec::new();
    around.fill(
        &mut beside,
        || kind.bit(),
        || constellation.and_then(Constellation::position),
    );
    let scores = names.iter().map(|name| {
        let words = Words::of(name);
        typed.likeness(words.iter(), None, &beside)
    });
    scores.fold(0.0, f64::max)
}

fn any_name() -> impl Strategy<Value = String> {
    "(m|ngc|owl|ring|vega|wega|nebula|alpha|TYC|é|[0-9]{1,3}|[a-d]{1,3}| |-){1,5}"
}

fn any_row() -> impl Strategy<Value = Row> {
    (
        proptest::collection::vec(any_name(), 1..4),
        proptest::option::of(-2.0..15.0_f32),
        proptest::sample::select(vec![Kind::Star, Kind::Galaxy, Kind::OpenCluster]),
        proptest::option::of(proptest::sample::select(vec!["And", "Lyr", "UMa"])),
    )
}

proptest! {
    #[test]
    fn no_row_scores_more_than_its_words_promise_and_none_that_scores_is_missed(
        rows in proptest::collection::vec(any_row(), 0..40),
        typed in "(m|owl|vega|vgea|neb|alp|ty|gal|lyr|[0-9]{1,2}| ){1,4}",
    ) {
        let index = Index::open(Bytes::Memory(built(&rows))).unwrap();
        let typed = Typed::new(&typed);
        let around = Surroundings::new(&typed);
        if typed.is_empty() {
            return Ok(());
        }
        let mut promised = vec![0.0; rows.len()];
        let mut last = f64::INFINITY;
        for (row, most) in index.candidates(&typed, &around).iter() {
            prop_assert!(most <= last);
            last = most;
            promised[usize::try_from(index.reference(row).unwrap()).unwrap()] = most;
        }
        for (row, promised) in rows.iter().zip(promised) {
            let score = score(&typed, &around, row);
            prop_assert!(score <= promised + 1e-9, "{row:?} {score} {promised}");
            if row.0.len() == 1 && score > 0.0 {
                // the words of one name promise no more than they keep, but where two words typed want the same one
                let words: Vec<&str> = typed.words().collect();
                if words.len() == 1 {
                    prop_assert!(promised <= score + Candidates::step(), "{row:?} {score} {promised}");
                }
            }
        }
    }

    #[test]
    fn rows_stand_in_order_of_brightness_and_are_found_by_their_exact_names(
        rows in proptest::collection::vec(any_row(), 0..40),
    ) {
        let index = Index::open(Bytes::Memory(built(&rows))).unwrap();
        prop_assert_eq!(index.rows(), rows.len());
        let magnitude = |row: usize| {
            let reference = usize::try_from(index.reference(row).unwrap()).unwrap();
            rows[reference].1.unwrap_or(f32::INFINITY)
        };
        prop_assert!((1..rows.len()).all(|row| magnitude(row - 1) <= magnitude(row)));
        for (reference, row) in rows.iter().enumerate() {
            for name in &row.0 {
                let folded: String = folded(name).collect();
                let found = index.rows_named(&folded);
                prop_assert!(found.iter().any(|row| index.reference(*row) == Some(reference as u64)));
            }
        }
        let brighter = rows.iter().filter(|row| row.1.is_some_and(|magnitude| magnitude < 6.0));
        prop_assert_eq!(index.brighter_than(6.0), brighter.count());
    }

    #[test]
    fn an_index_cut_short_or_of_other_bytes_is_refused_or_finds_less(
        rows in proptest::collection::vec(any_row(), 1..10),
        cut in 0.0..1.0_f64,
        change in proptest::option::of((0.0..1.0_f64, any::<u8>())),
    ) {
        let mut bytes = built(&rows);
        let whole = bytes.len();
        #[allow(clippy::cast_possible_truncation, clippy::cast_sign_loss)] // within the bytes
        let at = |share: f64| ((share * whole as f64) as usize).min(whole - 1);
        if let Some((place, byte)) = change {
            bytes[at(place)] = byte;
        } else {
            bytes.truncate(at(cut));
            prop_assert!(Index::open(Bytes::Memory(bytes)).is_err());
            return Ok(());
        }
        if let Ok(index) = Index::open(Bytes::Memory(bytes)) {
            let typed = Typed::new("owl 1");
            let found = index.candidates(&typed, &Surroundings::new(&typed));
            prop_assert!(found.iter().count() <= index.rows());
            let _ = index.rows_named("owl");
        }
    }
}

#[test]
fn an_index_knows_of_what_it_was_made() {
    let index = Index::open(Bytes::Memory(built(&[]))).unwrap();
    assert_eq!(
        index.stamp(),
        Stamp {
            length: 7,
            written: 8,
            unread: 9
        }
    );
    assert!(Index::open(Bytes::Memory(b"nonsense".to_vec())).is_err());
}
