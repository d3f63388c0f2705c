use std::{
    cell::Cell,
    num::NonZeroUsize,
    sync::atomic::{AtomicUsize, Ordering},
};

use proptest::prelude::*;
use rstest::rstest;

use super::*;

/// Adds up all numbers below an item, so that items differ in how long they take.
#[derive(Default)]
struct Sums {
    scratches: AtomicUsize,
    begun: AtomicUsize,
}

impl Work for Sums {
    type Item = u64;
    type Output = u64;
    type Scratch = Vec<u64>;

    fn scratch(&self) -> Vec<u64> {
        self.scratches.fetch_add(1, Ordering::Relaxed);
        Vec::new()
    }

    fn run(&self, scratch: &mut Vec<u64>, item: &mut u64, sum: &mut u64) {
        self.begun.fetch_add(1, Ordering::Relaxed);
        scratch.clear();
        scratch.extend(0..*item);
        *sum = scratch.iter().sum();
    }

    fn bytes(item: &u64) -> usize {
        *item as usize
    }
}

fn plan(threads: usize, chunk: usize) -> Plan {
    Plan {
        threads: NonZeroUsize::new(threads).unwrap(),
        chunk: NonZeroUsize::new(chunk).unwrap(),
    }
}

/// Fills places from an iterator.
fn filled<T>(mut items: impl Iterator<Item = T>) -> impl FnMut(&mut T) -> bool {
    move |place| items.next().map(|item| *place = item).is_some()
}

fn sums(plan: Plan, items: &[u64]) -> Vec<u64> {
    let mut found = Vec::new();
    let outcome = in_order(
        &Sums::default(),
        plan,
        filled(items.iter().copied()),
        |sum| {
            found.push(*sum);
            Ok::<(), ()>(())
        },
    );
    assert_eq!(outcome, Ok(()));
    found
}

proptest! {
    #[test]
    fn the_order_is_that_of_the_items(
        items in prop::collection::vec(0_u64..20_000, 0..300),
        threads in 1_usize..6,
        chunk in 1_usize..9,
    ) {
        let expected: Vec<u64> = items.iter().map(|&item| (0..item).sum()).collect();
        prop_assert_eq!(sums(plan(threads, chunk), &items), expected);
    }
}

#[rstest]
fn one_scratch_for_each_thread(#[values(1, 2, 5)] threads: usize) {
    let work = Sums::default();
    let outcome = in_order(&work, plan(threads, 1), filled(0..2_000), |_| {
        Ok::<(), ()>(())
    });
    assert_eq!(outcome, Ok(()));
    assert!(work.scratches.into_inner() <= threads);
    assert_eq!(work.begun.into_inner(), 2_000);
}

/// What is read ahead of the results is bounded, by items and by bytes.
#[rstest]
#[case::by_items(7, 10, 2 * CHUNKS_PER_THREAD * 7)]
#[case::by_bytes(1_000, CHUNK_BYTES as u64 / 2, 2 * CHUNKS_PER_THREAD * 2)]
fn memory_is_bounded(#[case] chunk: usize, #[case] item: u64, #[case] most: usize) {
    let under_way = Cell::new(0_usize);
    let highest = Cell::new(0);
    let items = std::iter::repeat_n(item, 5_000).inspect(|_| {
        under_way.set(under_way.get() + 1);
        highest.set(highest.get().max(under_way.get()));
    });
    let outcome = in_order(&Sums::default(), plan(2, chunk), filled(items), |_| {
        under_way.set(under_way.get() - 1);
        Ok::<(), ()>(())
    });
    assert_eq!((outcome, under_way.get()), (Ok(()), 0));
    assert!((1..=most).contains(&highest.get()), "{highest:?}");
}

#[rstest]
fn the_first_error_of_the_sink_ends_it(#[values(1, 3)] threads: usize) {
    let work = Sums::default();
    let mut seen = 0;
    let outcome = in_order(
        &work,
        plan(threads, 4),
        filled(std::iter::repeat(5)),
        |_| {
            seen += 1;
            if seen < 100 { Ok(()) } else { Err("enough") }
        },
    );
    assert_eq!((outcome, seen), (Err("enough"), 100));
    assert!(work.begun.into_inner() <= 100 + 4 * 3 * CHUNKS_PER_THREAD);
}

struct Fails;

impl Work for Fails {
    type Item = u32;
    type Output = u32;
    type Scratch = ();

    fn scratch(&self) {}

    fn run(&self, (): &mut (), item: &mut u32, output: &mut u32) {
        assert_ne!(*item, 50, "the item that fails");
        *output = *item;
    }

    fn bytes(_: &u32) -> usize {
        4
    }
}

/// A panic is passed on; nobody waits for results that will never come.
#[test]
#[should_panic(expected = "a scoped thread panicked")]
fn a_panic_is_passed_on() {
    let _ = in_order(&Fails, plan(2, 1), filled(0..), |item| {
        assert!(*item < 50);
        Ok::<(), ()>(())
    });
}
