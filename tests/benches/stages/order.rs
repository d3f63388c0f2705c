//! From molecules to canonical views: normal form, stereo, order and keys together, since each needs
//! what comes before.

use divan::{Bencher, black_box};
use molkin_graph::{Canonical, Identity, Limits, Orderer};

use crate::inputs;

/// In reused memory.
#[divan::bench(args = inputs::NAMES)]
fn order_and_key(bencher: Bencher<'_, '_>, name: &str) {
    let molecule = inputs::molecule(name);
    let mut orderer = Orderer::new(Limits::default());
    let mut view = Canonical::default();
    orderer.order_into(&molecule, &mut view).unwrap();
    assert_eq!(view.order().len(), molecule.atom_count());
    bencher.bench_local(|| orderer.order_into(black_box(&molecule), &mut view));
}

/// In memory of its own for each.
#[divan::bench(args = inputs::NAMES)]
fn order_in_new_memory(bencher: Bencher<'_, '_>, name: &str) {
    let molecule = inputs::molecule(name);
    let mut orderer = Orderer::new(Limits::default());
    let expected = inputs::canonical(name).compound_key();
    assert_eq!(orderer.order(&molecule).unwrap().compound_key(), expected);
    bencher.bench_local(|| orderer.order(black_box(&molecule)));
}

/// What names a record, in reused memory.
#[divan::bench(args = inputs::NAMES)]
fn identify(bencher: Bencher<'_, '_>, name: &str) {
    let molecule = inputs::molecule(name);
    let mut orderer = Orderer::new(Limits::default());
    let mut identity = Identity::default();
    orderer.identify_into(&molecule, &mut identity).unwrap();
    let expected = inputs::canonical(name).compound_key();
    assert_eq!(identity.compound_key(), expected);
    bencher.bench_local(|| orderer.identify_into(black_box(&molecule), &mut identity));
}
