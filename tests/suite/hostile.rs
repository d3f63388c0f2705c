//! Long, deep and broken input: a result or an error for each, and never a panic.

use molkin_formats::{molfile, smiles};
use molkin_graph::{Limits, Molecule};
use molkin_relate::{Relation, explain};
use molkin_tests::Comparer;
use rstest::rstest;

/// Does everything that is done with a molecule, and says how it ended.
pub(crate) fn use_up(comparer: &mut Comparer, molecule: Molecule) -> &'static str {
    let Ok(structure) = comparer.prepare(molecule) else {
        return "not ordered";
    };
    let canonical = structure.canonical();
    let written = smiles::write(&canonical.form());
    let _ = (canonical.stereo_elements(), canonical.remarks());
    let kept = written.lost.is_empty();
    let Ok(again) = comparer.molecule(&written.text) else {
        return if kept {
            "not read back"
        } else {
            "a stated loss"
        };
    };
    // Steps depend on the numbering, so one spelling may reach a limit where another does not.
    let Ok(again) = comparer.prepare(again) else {
        return "not ordered";
    };
    let limits = Limits {
        map_steps: 200,
        ..Limits::default()
    };
    let Ok(verdict) = comparer.relate(&structure, &again) else {
        return "not related";
    };
    explain(&structure, &again, verdict.relation, &limits);
    match verdict.relation {
        Relation::Identical => "identical",
        _ if kept => "changed",
        _ => "a stated loss",
    }
}

/// A molfile of one carbon atom with another counts line and other lines after its atom.
fn molfile_with(counts: &str, after: &str) -> String {
    let atom = "    0.0000    0.0000    0.0000 C   0  0";
    format!("\n\n\n{counts}  0  0  0  0            999 V2000\n{atom}\n{after}")
}

#[rstest]
#[case::as_it_should_be(molfile_with("  1  0", "M  END\n"), "identical")]
#[case::nothing(String::new(), "unexpected-end")]
#[case::blank_lines("\n".repeat(1_000_000), "malformed")]
#[case::more_atoms_claimed(molfile_with("999999", "M  END\n"), "unexpected-end")]
#[case::never_ended(molfile_with("  1  0", &"M  CHG  1   1   1\n".repeat(200_000)), "unexpected-end")]
#[case::skips_beyond_the_end(molfile_with("  1  0", "S  SKP999\nM  END\n"), "unexpected-end")]
#[case::bond_to_itself(molfile_with("  1  1", "  1  1  1  0\nM  END\n"), "self-bond")]
#[case::bond_to_nothing(molfile_with("  1  1", "  1  2  1  0\nM  END\n"), "no-such-atom")]
fn broken_molfiles(#[case] text: String, #[case] expected: &str) {
    let mut comparer = Comparer::default();
    let outcome = match molfile::parse(text.as_bytes()) {
        Ok(record) => use_up(&mut comparer, record.molecule),
        Err(error) => error.code(),
    };
    assert_eq!(outcome, expected);
}

/// Four-membered rings fused in a row, two for each turn: over one rung, back over the next.
fn ladder(turns: usize) -> String {
    format!("C1CC2C1{}CC2", "C1C2C2C1".repeat(turns))
}

/// Long and deep texts, read, ordered, written and related to themselves.
#[rstest]
#[case::parentheses("(".repeat(1_000_000), "branch-without-atom")]
#[case::open_branches("C(".repeat(150_000), "branch-not-closed")]
#[case::more_branches("C(".repeat(500_000), "too-many-atoms")]
#[case::ring_openings("C1".repeat(75_000), "duplicate-bond")]
#[case::ring_labels((10..100).map(|label| format!("C%{label}")).collect::<String>(), "ring-not-closed")]
#[case::chain("C".repeat(100_000), "identical")]
#[case::marked_double_bonds(format!("C{}", "/C=C/C".repeat(2_000)), "identical")]
#[case::polyene("C=C".repeat(2_000), "identical")]
#[case::polyyne("C#C".repeat(5_000), "identical")]
#[case::cumulene("C=".repeat(5_000) + "C", "identical")]
#[case::rings("C1CCCCC1".repeat(1_000), "identical")]
#[case::fused_rings(ladder(20), "identical")]
#[case::too_many_fused_rings(ladder(500), "a stated loss")]
#[case::branches("C(".repeat(50_000) + "C" + &")".repeat(50_000), "identical")]
#[case::nested("C(C)(".repeat(120) + "C" + &")".repeat(120), "identical")]
#[case::salts("[Na+].[Cl-].".repeat(2_000) + "O", "identical")]
#[case::waters("O.".repeat(20_000) + "O", "identical")]
#[case::hub(format!("C{}", "(C)".repeat(500)), "identical")]
#[case::great_hub(format!("C{}", "(C)".repeat(20_000)), "not ordered")]
#[case::open_centres(format!("C{}C", "C(F)".repeat(2_000)), "identical")]
#[case::marked_centres(format!("C{}C", "[C@H](F)".repeat(2_000)), "identical")]
fn long_and_deep_texts(#[case] text: String, #[case] expected: &str) {
    let mut comparer = Comparer::default();
    let outcome = match smiles::Reader::default().read(&text, 1) {
        Ok(record) => use_up(&mut comparer, record.molecule),
        Err(error) => error.code(),
    };
    assert_eq!(outcome, expected);
}
