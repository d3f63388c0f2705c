//! Wedge drawings against the SMILES of the same structures: ../shared/data/drawings.

use molkin_formats::source;
use molkin_relate::Relation;
use molkin_tests::{Comparer, Tally, first_word, read_text, shared};

#[test]
fn drawings_say_what_their_smiles_say() {
    let Some(folder) = shared("drawings") else {
        return;
    };
    let smiles = read_text(&folder.join("2d.smi"));
    let drawings =
        source::Records::open(&folder.join("v2000.sdf.gz"), source::ReadOptions::default())
            .unwrap();
    let mut comparer = Comparer::default();
    let mut tally = Tally::new("drawings");
    for (line, drawing) in smiles.lines().zip(drawings) {
        let drawing = drawing.unwrap();
        let outcome = || {
            let record = drawing.result.map_err(|error| error.to_string())?;
            let a = comparer.prepare(record.molecule)?;
            let b = comparer.structure(first_word(line))?;
            comparer.relate(&a, &b)
        };
        let good = outcome().and_then(|verdict| match verdict.relation {
            Relation::Identical => Ok(()),
            other => Err(format!("{other:?}")),
        });
        tally.value(good.map_err(|error| format!("{line}: {error}")));
    }
    tally.finish(700);
}
