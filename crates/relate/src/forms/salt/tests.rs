//! The tables row by row, and parents of salts and solvates. Structures are hand-written from common
//! practice.

use molkin_graph::{Limits, Orderer};
use rstest::rstest;

use super::{
    CounterIons,
    listed::{rows, settled_keys},
};
use crate::forms::tests::{key, overlooked, structure};

/// What a SMILES is listed as.
fn listed_as(text: &str) -> Option<String> {
    let mut orderer = Orderer::new(Limits::default());
    let (constitution, compound) = settled_keys(&mut orderer, &structure(text)).unwrap();
    let known = CounterIons::standard();
    let listed = known.find(constitution, compound)?;
    Some(listed.salt.clone())
}

#[test]
fn every_row_finds_itself_and_not_its_near_miss() {
    let mut counts = [0, 0];
    for row in rows() {
        let [salt, ion, own, kind, charge, example, near, source] = row[..] else {
            panic!("eight cells are expected: {row:?}");
        };
        assert!(!ion.is_empty() && !source.is_empty(), "{row:?}");
        assert!(charge.parse::<i8>().is_ok(), "{row:?}");
        for text in [own, example] {
            assert_eq!(listed_as(text).as_deref(), Some(salt), "{text}");
        }
        assert_ne!(listed_as(near).as_deref(), Some(salt), "{near}");
        counts[usize::from(kind == "solvent")] += 1;
    }
    assert_eq!(CounterIons::standard().len(), counts.iter().sum::<usize>());
    assert!(counts[0] >= 120 && counts[1] >= 40, "{counts:?}");
}

#[rstest]
#[case::hydrochloride("CCN.Cl", "CCN")]
#[case::ammonium_chloride_drawn_as_ions("CC[NH3+].[Cl-]", "CCN")]
#[case::dihydrochloride("[NH3+]CCC[NH3+].[Cl-].[Cl-]", "NCCCN")]
#[case::hemisulfate("CC(N)CC.CC(N)CC.OS(=O)(=O)O", "CC(N)CC")]
#[case::hemisulfate_as_ions("CC([NH3+])CC.CC([NH3+])CC.[O-]S(=O)(=O)[O-]", "CC(N)CC")]
#[case::hydrate("Cn1cnc2c1c(=O)n(C)c(=O)n2C.O", "Cn1cnc2c1c(=O)n(C)c(=O)n2C")]
#[case::hemihydrate("CCCN.CCCN.O", "CCCN")]
#[case::sodium_salt("[Na+].[O-]C(=O)CCCC1CCCC1", "OC(=O)CCCC1CCCC1")]
#[case::calcium_salt("[Ca+2].[O-]C(=O)CCCC1CCCC1.[O-]C(=O)CCCC1CCCC1", "OC(=O)CCCC1CCCC1")]
#[case::sodium_benzoate("[Na+].[O-]C(=O)c1ccccc1", "OC(=O)c1ccccc1")]
#[case::sodium_acetate_trihydrate("[Na+].CC(=O)[O-].O.O.O", "CC(=O)O")]
#[case::choline_chloride("C[N+](C)(C)CCO.[Cl-]", "C[N+](C)(C)CCO")]
#[case::quaternary_bromide("C[N+](C)(C)CCCCl.[Br-]", "C[N+](C)(C)CCCCl")]
#[case::betaine_hydrochloride("C[N+](C)(C)CC(=O)O.[Cl-]", "C[N+](C)(C)CC(=O)[O-]")]
#[case::inorganic_salt_stays("[Na+].[Cl-]", "[Na+].[Cl-]")]
#[case::inorganic_hydrate("[Cu+2].[O-]S(=O)(=O)[O-].O.O.O.O.O", "[Cu+2].[O-]S(=O)(=O)[O-]")]
#[case::solvents_stay("O.CCO", "O.CCO")]
#[case::two_parents_stay(
    "CC(=O)Nc1ccc(O)cc1.Cn1cnc2c1c(=O)n(C)c(=O)n2C",
    "CC(=O)Nc1ccc(O)cc1.Cn1cnc2c1c(=O)n(C)c(=O)n2C"
)]
#[case::two_parents_as_ions("CCC(C)C[NH3+].[O-]C(=O)CCCC1CCCC1", "CCC(C)CN.OC(=O)CCCC1CCCC1")]
#[case::two_listed_parents(
    "C1CNCCN1.OC(=O)CC(O)(CC(=O)O)C(=O)O",
    "C1CNCCN1.OC(=O)CC(O)(CC(=O)O)C(=O)O"
)]
#[case::ratio_of_a_mixture("CCCN.CCCN.CCCCS.CCCCS", "CCCN.CCCCS")]
#[case::labelled_water("CCCN.[2H]O[2H]", "CCCN")]
#[case::bare_proton("CCCN.[H+].[Cl-]", "CCCN")]
#[case::one_component("CC[NH3+]", "CC[NH3+]")]
#[case::fluoroborate("CCC[NH3+].F[B-](F)(F)F", "CCCN")]
fn parents(#[case] record: &str, #[case] parent: &str) {
    assert_eq!(overlooked(record, "salt"), key(parent));
    assert_eq!(overlooked(parent, "salt"), key(parent));
}

/// A salt of the two enantiomers is no salt of one twice.
#[test]
fn both_enantiomers_stay() {
    let both = "C[C@H](N)c1cccs1.C[C@@H](N)c1cccs1.OS(=O)(=O)O";
    assert_eq!(
        overlooked(both, "salt"),
        key("C[C@H](N)c1cccs1.C[C@@H](N)c1cccs1")
    );
    assert_eq!(overlooked(both, "salt,stereo"), key("CC(N)c1cccs1"));
}

#[test]
fn a_table_of_ones_own() {
    let known = CounterIons::standard();
    let table = "kind\tstructure\tsalt\nacid\tOC(=O)CCCCC#N\tcyanovalerate\n";
    let more = known.extended(table).unwrap();
    assert_eq!(more.len(), known.len() + 1);
    for (table, message) in [
        ("salt\tkind\n", "line 1: there is no column 'structure'"),
        (
            "salt\tstructure\tkind\nx\tCC\tmetall\n",
            "line 2: the kind is none of",
        ),
        (
            "salt\tstructure\tkind\nx\tC.C\tacid\n",
            "line 2: C.C is not one component",
        ),
    ] {
        let error = known.extended(table).unwrap_err().to_string();
        assert!(error.starts_with(message), "{error}");
    }
}
