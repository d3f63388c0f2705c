//! Numbers of stereoisomers of coordination compounds.

use std::collections::BTreeSet;

use molkin_graph::{DrawnCoordination, Key, Ligand, Molecule, MoleculeBuilder, Polyhedron};
use molkin_tests::{Comparer, mirrored};
use rstest::rstest;

/// The molecule with its ligands placed about its one centre.
fn arranged(molecule: &Molecule, mark: DrawnCoordination) -> Molecule {
    let mut builder = MoleculeBuilder::new();
    molecule.atoms().for_each(|atom| {
        builder.add_atom(*atom);
    });
    for (a, b, order) in molecule.bonds() {
        builder.add_bond(a, b, order).unwrap();
    }
    builder.add_coordination(mark);
    builder.build().unwrap()
}

/// Every order of some items.
fn orders(items: &[u32]) -> Vec<Vec<u32>> {
    let Some((&first, rest)) = items.split_first() else {
        return vec![Vec::new()];
    };
    let shorter = orders(rest);
    let places = shorter.iter().flat_map(|order| {
        (0..=order.len()).map(move |at| {
            let mut longer = order.clone();
            longer.insert(at, first);
            longer
        })
    });
    places.collect()
}

/// Positions that face each other; see [`Polyhedron`].
fn opposite(polyhedron: Polyhedron) -> &'static [[usize; 2]] {
    match polyhedron {
        Polyhedron::SquarePlanar => &[[0, 2], [1, 3]],
        Polyhedron::TrigonalBipyramidal => &[[0, 1]],
        Polyhedron::Octahedral => &[[0, 1], [2, 4], [3, 5]],
    }
}

/// Donors that a short bridge of two or three atoms holds next to each other.
fn is_bridged(molecule: &Molecule, centre: u32, a: u32, b: u32) -> bool {
    let mut reached = BTreeSet::from([a]);
    for _ in 0..3 {
        let next: Vec<u32> = reached
            .iter()
            .filter(|&&atom| atom == a || !is_donor(molecule, centre, atom))
            .flat_map(|&atom| molecule.neighbours(atom))
            .map(|(to, _)| to)
            .filter(|&to| to != centre)
            .collect();
        reached.extend(next);
    }
    reached.contains(&b)
}

fn is_donor(molecule: &Molecule, centre: u32, atom: u32) -> bool {
    molecule.neighbours(atom).any(|(to, _)| to == centre)
}

/// Compounds, and compounds when mirror images count once, among all arrangements in which no short
/// bridge joins opposite donors. The centre is the first atom.
fn arrangements(text: &str, polyhedron: Polyhedron) -> (usize, usize) {
    const CENTRE: u32 = 0;
    let mut comparer = Comparer::default();
    let molecule = comparer.molecule(text).unwrap();
    let donors: Vec<u32> = molecule.neighbours(CENTRE).map(|(to, _)| to).collect();
    assert_eq!(donors.len(), polyhedron.positions());
    let mut keys: BTreeSet<Key> = BTreeSet::new();
    let mut pairs: BTreeSet<Key> = BTreeSet::new();
    for order in orders(&donors) {
        let strained = opposite(polyhedron)
            .iter()
            .any(|&[i, j]| is_bridged(&molecule, CENTRE, order[i], order[j]));
        if strained {
            continue;
        }
        let mark = DrawnCoordination {
            polyhedron,
            centre: CENTRE,
            ligands: order.into_iter().map(Ligand::Atom).collect(),
        };
        let marked = arranged(&molecule, mark);
        let key = comparer.key(&marked).unwrap();
        let image = comparer.key(&mirrored(&marked)).unwrap();
        keys.insert(key);
        pairs.insert(key.min(image));
    }
    (keys.len(), pairs.len())
}

/// Small letters of a name are ligands with one donor, capital ones donors of a chelate. Sources:
/// the table of numbers of isomers in Miessler and Tarr, *Inorganic Chemistry* (from memory), and
/// Burnside's lemma with the rotations of the polyhedron where all donors are single.
#[rstest]
#[case::ma6("[Co](F)(F)(F)(F)(F)F", 1, 1)]
#[case::ma5b("[Co](F)(F)(F)(F)(F)Cl", 1, 1)]
#[case::ma4b2("[Co](F)(F)(F)(F)(Cl)Cl", 2, 2)]
#[case::ma3b3("[Co](F)(F)(F)(Cl)(Cl)Cl", 2, 2)]
#[case::ma4bc("[Co](F)(F)(F)(F)(Cl)Br", 2, 2)]
#[case::ma3b2c("[Co](F)(F)(F)(Cl)(Cl)Br", 3, 3)]
#[case::ma3bcd("[Co](F)(F)(F)(Cl)(Br)I", 5, 4)]
#[case::ma2b2c2("[Co](F)(F)(Cl)(Cl)(Br)Br", 6, 5)]
#[case::ma2b2cd("[Co](F)(F)(Cl)(Cl)(Br)I", 8, 6)]
#[case::ma2bcde("[Co](F)(F)(Cl)(Br)(I)O", 15, 9)]
#[case::mabcdef("[Co](F)(Cl)(Br)(I)(O)S", 30, 15)]
#[case::m_aa_3("[Co]123(NCCN1)(NCCN2)NCCN3", 2, 1)]
#[case::m_aa_2_b2("[Co]12(NCCN1)(NCCN2)(Cl)Cl", 3, 2)]
#[case::m_aa_2_bc("[Co]12(NCCN1)(NCCN2)(Cl)Br", 3, 2)]
#[case::m_aa_b4("[Co]1(NCCN1)(Cl)(Cl)(Cl)Cl", 1, 1)]
#[case::m_aa_b2_c2("[Co]1(NCCN1)(Cl)(Cl)(Br)Br", 4, 3)]
#[case::m_ab_3("[Co]123(NCCO1)(NCCO2)NCCO3", 4, 2)]
#[case::m_ab_2_c2("[Co]12(NCCO1)(NCCO2)(Cl)Cl", 8, 5)]
#[case::m_ab_2_de("[Co]12(NCCO1)(NCCO2)(Cl)Br", 11, 6)]
#[case::m_aa_bc_de("[Co]12(NCCN1)(SCCO2)(Cl)Br", 10, 5)]
#[case::m_ab_cd_ef("[Co]12(NCCO1)(SCC[Se]2)(Cl)Br", 20, 10)]
#[case::m_aba_cde("[Co]12(NCCO1CCN2)(Cl)(Br)I", 9, 6)]
#[case::m_abc_2("[Co]1234(NCCO1CCS2)NCCO3CCS4", 11, 6)]
#[case::m_abba_cd("[Co]123(NCCO1CCO2CCN3)(Cl)Br", 7, 4)]
#[case::m_abcba_d("[Co]1234(NCCO1CC[NH]2CCO3CCN4)Cl", 7, 4)]
fn octahedral(#[case] text: &str, #[case] compounds: usize, #[case] without_mirror_images: usize) {
    let counts = arrangements(text, Polyhedron::Octahedral);
    assert_eq!(counts, (compounds, without_mirror_images));
}

/// None is chiral by its centre: the plane of the square is one of symmetry (textbook).
#[rstest]
#[case::ma4("[Pt](F)(F)(F)F", 1)]
#[case::ma3b("[Pt](F)(F)(F)Cl", 1)]
#[case::ma2b2("[Pt](F)(F)(Cl)Cl", 2)]
#[case::ma2bc("[Pt](F)(F)(Cl)Br", 2)]
#[case::mabcd("[Pt](F)(Cl)(Br)I", 3)]
#[case::m_aa_b2("[Pt]1(NCCN1)(Cl)Cl", 1)]
#[case::m_ab_2("[Pt]12(NCCO1)NCCO2", 2)]
fn square_planar(#[case] text: &str, #[case] compounds: usize) {
    let counts = arrangements(text, Polyhedron::SquarePlanar);
    assert_eq!(counts, (compounds, compounds));
}

/// By Burnside's lemma with the six rotations; twenty for five different ligands is in any textbook.
#[rstest]
#[case::ma5("[Fe](F)(F)(F)(F)F", 1, 1)]
#[case::ma4b("[Fe](F)(F)(F)(F)Cl", 2, 2)]
#[case::ma3b2("[Fe](F)(F)(F)(Cl)Cl", 3, 3)]
#[case::ma3bc("[Fe](F)(F)(F)(Cl)Br", 4, 4)]
#[case::ma2b2c("[Fe](F)(F)(Cl)(Cl)Br", 6, 5)]
#[case::ma2bcd("[Fe](F)(F)(Cl)(Br)I", 10, 7)]
#[case::mabcde("[Fe](F)(Cl)(Br)(I)O", 20, 10)]
fn trigonal_bipyramidal(
    #[case] text: &str,
    #[case] compounds: usize,
    #[case] without_mirror_images: usize,
) {
    let counts = arrangements(text, Polyhedron::TrigonalBipyramidal);
    assert_eq!(counts, (compounds, without_mirror_images));
}
