//! Taking back is exact, and a night told twice is the same night.

use nonius::night::{Event, Night, Stamped, update};
use proptest::prelude::*;

use crate::sample::{an_act, an_event, every_kind, utc};

fn stamped(events: &[Event]) -> Vec<Stamped> {
    (1..)
        .zip(events)
        .map(|(number, event)| Stamped {
            number: u64::from(number),
            utc: utc(number * 60),
            event: event.clone(),
        })
        .collect()
}

fn updated(events: &[Stamped]) -> Night {
    let mut night = Night::default();
    for event in events {
        update(&mut night, event);
    }
    night
}

fn undo(night: &mut Night) {
    let event = night.undo().unwrap();
    let number = night.history().len() as u64 + 1;
    let utc = utc(100_000);
    update(night, &Stamped { number, utc, event });
}

#[test]
fn every_kind_of_act_is_taken_back_one_after_the_other() {
    let events = stamped(&every_kind());
    let mut night = updated(&events);
    let acts = night
        .standing()
        .filter(|stamped| stamped.event.can_be_undone())
        .count();
    for _ in 0..acts {
        undo(&mut night);
    }
    assert_eq!(night.undo(), None);
    let bare: Vec<_> = events
        .into_iter()
        .filter(|stamped| !stamped.event.can_be_undone())
        .collect();
    assert_eq!(night.state(), updated(&bare).state());
}

proptest! {
    #[test]
    fn an_act_taken_back_leaves_the_night_as_if_it_had_never_been(
        before in prop::collection::vec(an_event(), 0..20),
        act in an_act(),
        after in prop::collection::vec(Just(Event::SessionClosed), 0..2),
    ) {
        let all = stamped(&[before.clone(), vec![act], after].concat());
        let mut night = updated(&all);
        undo(&mut night);
        let without: Vec<_> = all
            .into_iter()
            .filter(|stamped| stamped.number != before.len() as u64 + 1)
            .collect();
        let expected = updated(&without);
        prop_assert_eq!(night.state(), expected.state());
    }

    #[test]
    fn as_many_takings_back_as_acts_lead_back_to_where_it_stood(
        before in prop::collection::vec(an_event(), 0..12),
        acts in prop::collection::vec(an_act(), 1..12),
    ) {
        let start = updated(&stamped(&before));
        let mut night = updated(&stamped(&[before, acts.clone()].concat()));
        for _ in &acts {
            undo(&mut night);
        }
        prop_assert_eq!(night.state(), start.state());
    }

    #[test]
    fn replay_gives_the_night_that_was_lived(
        steps in prop::collection::vec(prop::option::weighted(0.75, an_event()), 0..30),
    ) {
        let mut night = Night::default();
        for step in steps {
            let Some(event) = step.or_else(|| night.undo()) else { continue };
            let number = night.history().len() as u64 + 1;
            update(&mut night, &Stamped { number, utc: utc(u32::try_from(number).unwrap()), event });
        }
        prop_assert_eq!(&Night::replay(night.history().to_vec()), &night);
    }
}
