//! Inputs on which a fuzz target failed once.

use molkin_tests::{fuzz, workspace};

type Target = fn(&[u8]);

/// The targets by the names of their folders.
const TARGETS: [(&str, Target); 5] = [
    ("smiles", fuzz::smiles),
    ("round_trip", fuzz::round_trip),
    ("molfile", fuzz::molfile),
    ("sdf", fuzz::sdf),
    ("table", fuzz::table),
];

#[test]
fn findings_stay_fixed() {
    let mut cases = 0;
    for (target, run) in TARGETS {
        let folder = workspace("fixtures/fuzz").join(target);
        // A target without findings has no folder.
        for entry in folder.read_dir().into_iter().flatten() {
            run(&std::fs::read(entry.unwrap().path()).unwrap());
            cases += 1;
        }
    }
    assert!(cases >= 1, "{cases} cases");
}
