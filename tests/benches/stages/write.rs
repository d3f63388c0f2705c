//! From canonical views to canonical SMILES.

use divan::{Bencher, black_box};
use molkin_formats::smiles;

use crate::inputs;

#[divan::bench(args = inputs::NAMES)]
fn write_smiles(bencher: Bencher<'_, '_>, name: &str) {
    let form = inputs::canonical(name).form();
    let mut writer = smiles::Writer::default();
    let written = writer.write(&form);
    assert!(written.lost.is_empty());
    let again = smiles::parse(&written.text).unwrap();
    assert_eq!(again.formula(), inputs::molecule(name).formula());
    bencher.bench_local(|| writer.write(black_box(&form)));
}
