//! From text to molecules, in reused memory.

use divan::{Bencher, black_box};
use molkin_formats::{Record, molfile, smiles};

use crate::{inputs, molfiles};

#[divan::bench(args = inputs::NAMES)]
fn read_smiles(bencher: Bencher<'_, '_>, name: &str) {
    let text = inputs::text(name);
    let mut reader = smiles::Reader::default();
    let mut record = Record::default();
    reader.read_into(&text, 1, &mut record).unwrap();
    assert_eq!(record.molecule.atom_count(), inputs::atom_count(name));
    bencher.bench_local(|| reader.read_into(black_box(&text), 1, &mut record));
}

#[divan::bench(args = inputs::NAMES)]
fn read_v2000(bencher: Bencher<'_, '_>, name: &str) {
    molfile(bencher, &molfiles::v2000(&inputs::molecule(name)), name);
}

#[divan::bench(args = inputs::NAMES)]
fn read_v3000(bencher: Bencher<'_, '_>, name: &str) {
    molfile(bencher, &molfiles::v3000(&inputs::molecule(name)), name);
}

fn molfile(bencher: Bencher<'_, '_>, text: &str, name: &str) {
    let read = molfile::parse(text.as_bytes()).unwrap().molecule;
    assert_eq!(read.formula(), inputs::molecule(name).formula());
    assert_eq!(read.bonds().len(), inputs::molecule(name).bonds().len());
    bencher.bench_local(|| molfile::parse(black_box(text.as_bytes())));
}
