//! Elements that are stereogenic only because others are, and meso compounds.

use molkin_graph::{Canonical, Limits};
use molkin_tests::{Comparer, Markings, Numbers, definition_pairs, mirrored, renumbered};
use rstest::rstest;

/// The ends of each element, and of those that it depends on, under the numbers that `number` gives.
fn dependences(canonical: &Canonical, number: impl Fn(u32) -> u32) -> Option<Vec<Element>> {
    let named = |ends: [u32; 2]| {
        let mut ends = ends.map(&number);
        ends.sort_unstable();
        ends
    };
    let elements = canonical.stereo_elements().into_iter();
    let mut found: Vec<Element> = elements
        .zip(canonical.dependences()?)
        .map(|(element, supports)| {
            let mut supports: Vec<[u32; 2]> = supports.into_iter().map(named).collect();
            supports.sort_unstable();
            (named(element.centres), supports)
        })
        .collect();
    found.sort_unstable();
    Some(found)
}

type Element = ([u32; 2], Vec<[u32; 2]>);

/// `2; 4: 2 6; 6`: each element by its centre or ends, and those that it depends on.
fn told(text: &str) -> String {
    let canonical = Comparer::new(Limits::default()).canonical(text).unwrap();
    let name = |[a, b]: [u32; 2]| match a == b {
        true => a.to_string(),
        false => format!("{a}={b}"),
    };
    let found = dependences(&canonical, |atom| atom + 1).unwrap();
    let found = found.into_iter().map(|(element, supports)| {
        let supports: Vec<String> = supports.into_iter().map(name).collect();
        match supports.is_empty() {
            true => name(element),
            false => format!("{}: {}", name(element), supports.join(" ")),
        }
    });
    found.collect::<Vec<String>>().join("; ")
}

/// Worked out by hand from the definition in docs/definitions.md; atoms from 1.
#[rstest]
#[case::one_centre("CC(O)CC", "2")]
#[case::middle_of_three("CC(O)C(O)C(O)C", "2; 4: 2 6; 6")]
#[case::middle_of_five("CC(O)C(O)C(O)C(O)C(O)C", "2; 4; 6: 2 4 8 10; 8; 10")]
#[case::para_centres("CC1CCC(C)CC1", "2: 5; 5: 2")]
#[case::meta_centres("CC1CC(C)CCC1", "2; 4")]
#[case::three_in_a_ring("CC1CC(C)CC(C)C1", "2: 4 7; 4: 2 7; 7: 2 4")]
#[case::inositol(
    "OC1C(O)C(O)C(O)C(O)C1O",
    "2: 3 5 7 9 11; 3: 2 5 7 9 11; 5: 2 3 7 9 11; 7: 2 3 5 9 11; 9: 2 3 5 7 11; 11: 2 3 5 7 9"
)]
#[case::spiro("CC1CC2(C1)CC(C)C2", "2: 4 7; 4: 2 7; 7: 2 4")]
// Either pair of equal arms will do: two smallest sets.
#[case::two_pairs_of_arms("CC(O)C(C(C)O)(C(N)C)C(N)C", "2; 4: 2 5 8 11; 5; 8; 11")]
// Exchanging equal ends leaves cis as it is, and trans too.
#[case::equal_ends("CC(O)C=CC(O)C", "2; 4=5; 6")]
// An end with two equal arms: exchanging the arms inverts the bond and moves the centres.
#[case::equal_arms("CC=C(C(C)O)C(C)O", "2=3: 4 7; 4; 7")]
#[case::equal_arms_on_both_ends("CC(O)C(C(C)O)=C(C(C)O)C(C)O", "2; 4=8: 2 5 9 12; 5; 9; 12")]
fn elements_that_depend(#[case] text: &str, #[case] expected: &str) {
    assert_eq!(told(text), expected);
}

/// Of arms that can be exchanged in more than 512 ways nothing is said.
#[test]
fn many_automorphisms_give_no_answer() {
    let arm = "C(C(C)O)(C(C)O)C(C)O";
    let text = format!("C({arm})({arm}){arm}");
    let canonical = Comparer::new(Limits::default()).canonical(&text).unwrap();
    assert_eq!(canonical.dependences(), None);
    assert!(canonical.stereo_elements().len() > 9);
}

/// Dependences are of the constitution: no numbering changes them.
#[test]
fn numberings_do_not_matter() {
    let mut comparer = Comparer::new(Limits::default());
    let mut numbers = Numbers::new(61);
    let (mut records, mut dependent) = (0, 0);
    for text in definition_pairs()
        .into_iter()
        .flat_map(|pair| [pair.a, pair.b])
    {
        let Ok(molecule) = comparer.molecule(&text) else {
            continue;
        };
        let Ok(canonical) = comparer.order(&molecule) else {
            continue;
        };
        // Classes of equivalent atoms are all that a renumbered copy can be compared by.
        let profile = |canonical: &Canonical| {
            let found = dependences(canonical, |_| 0)?;
            let mut counts: Vec<usize> = found.iter().map(|(_, s)| s.len()).collect();
            counts.sort_unstable();
            Some((counts, canonical.is_meso()))
        };
        let own = profile(&canonical);
        for _ in 0..3 {
            let copy = renumbered(&molecule, &mut numbers);
            assert_eq!(profile(&comparer.order(&copy).unwrap()), own, "{text}");
        }
        records += 1;
        dependent += usize::from(own.is_some_and(|(counts, _)| counts.iter().any(|&n| n > 0)));
    }
    assert!(records >= 500 && dependent >= 20, "{records}, {dependent}");
    eprintln!("{records} records, {dependent} with dependent elements");
}

/// A full marking is meso exactly if its mirror image has its key and some other marking of the same
/// constitution has a mirror image with another key: by keys alone.
#[rstest]
#[case("OC(=O)C(O)C(O)C(=O)O")]
#[case("CC(O)C(O)C(O)C")]
#[case("CC1CCC(C)CC1")]
#[case("CC1CC(C)CCC1")]
#[case("CC1CC(C)CC(C)C1")]
#[case("OC1C(O)C(O)C(O)C(O)C1O")]
#[case("OC1C(O)C(O)C1O")]
#[case("CC(O)CC")]
#[case("CC1CC2(C1)CC(C)C2")]
fn meso_by_keys(#[case] text: &str) {
    let mut comparer = Comparer::new(Limits::default());
    let molecule = comparer.molecule(text).unwrap();
    let markings = Markings::new(&molecule, &[]);
    let mut records = Vec::new();
    for marks in markings.full() {
        let marked = markings.marked(&marks);
        let key = comparer.key(&marked).unwrap();
        let achiral = comparer.key(&mirrored(&marked)).unwrap() == key;
        records.push((comparer.order(&marked).unwrap(), achiral));
    }
    let chiral_members = records.iter().any(|(_, achiral)| !achiral);
    for (canonical, achiral) in &records {
        assert_eq!(canonical.is_meso(), Some(*achiral && chiral_members));
    }
}
