//! From text to a row of the table of keys: the hot path of `molkin keys`.

use divan::{Bencher, black_box};
use molkin_formats::source::{Format, Parser, ReadOptions, RecordOutcome, Records};
use molkin_graph::Limits;
use molkin_relate::wire::KeyRows;

use crate::inputs;

#[divan::bench(args = inputs::NAMES)]
fn key_row(bencher: Bencher<'_, '_>, name: &str) {
    let text = inputs::text(name);
    let options = ReadOptions::default();
    let (mut parser, mut outcome) = (Parser::new(&options), RecordOutcome::default());
    let mut rows = KeyRows::new(Limits::default());
    let mut row = |text: &[u8]| {
        let mut records = Records::new("", text, Format::Smiles, options.clone());
        let mut raw = records.cut().unwrap().unwrap();
        parser.parse_into(&mut raw, &mut outcome);
        let row = rows.row("", &mut outcome);
        (row.status, row.compound_key.clone())
    };
    let expected = inputs::canonical(name).compound_key().to_string();
    assert_eq!(row(text.as_bytes()), ("ok", expected));
    bencher.bench_local(|| row(black_box(text.as_bytes())));
}
