//! Near relatives of different formula: drug structures with a group more, another halogen, or a methylene
//! more in a chain. What is left over is known, since the test put it there.

use std::time::Instant;

use molkin_graph::{
    Atom, BondOrder, Element, Limits, Mark, Molecule, MoleculeBuilder, StereoElement,
};
use molkin_relate::{Explanation, Relation, Structure, explain, mapping::map_structures};
use molkin_tests::{Comparer, Numbers, Tally, renumbered};

use crate::distances::report;

/// Constitutions of drugs in use (from memory), without stereo marks.
const PARENTS: [&str; 16] = [
    "CC(C)Cc1ccc(cc1)C(C)C(=O)O",
    "CC(=O)Nc1ccc(O)cc1",
    "Cn1cnc2c1c(=O)n(C)c(=O)n2C",
    "CCN(CC)CC(=O)Nc1c(C)cccc1C",
    "CN1C(=O)CN=C(c2ccccc2)c2cc(Cl)ccc12",
    "CC(C)NCC(O)COc1cccc2ccccc12",
    "CNCCC(Oc1ccc(cc1)C(F)(F)F)c1ccccc1",
    "Cc1ccc(cc1Nc1nccc(n1)-c1cccnc1)NC(=O)c1ccc(cc1)CN1CCN(C)CC1",
    "CC(=O)CC(c1ccccc1)C1=C(O)c2ccccc2OC1=O",
    "COCCc1ccc(OCC(O)CNC(C)C)cc1",
    "O=C(O)c1cn(C2CC2)c2cc(N3CCNCC3)c(F)cc2c1=O",
    "O=C(CCCN1CCC(O)(CC1)c1ccc(Cl)cc1)c1ccc(F)cc1",
    "CCCc1nn(C)c2c1nc([nH]c2=O)-c1cc(ccc1OCC)S(=O)(=O)N1CCN(C)CC1",
    "OC(=O)COCCN1CCN(CC1)C(c1ccccc1)c1ccc(Cl)cc1",
    "COc1ccc2[nH]c(nc2c1)S(=O)Cc1ncc(C)c(OC)c1C",
    "CCOC(=O)C1=C(COCCN)NC(C)=C(C1c1ccccc1Cl)C(=O)OC",
];

/// What is put in the place of a hydrogen: symbol, hydrogens, and the name that the explanation gives.
const GROUPS: [(&str, u8, &str); 5] = [
    ("C", 3, "methyl group"),
    ("O", 1, "hydroxy group"),
    ("N", 2, "amino group"),
    ("F", 0, "fluorine"),
    ("Cl", 0, "chlorine"),
];

/// A molecule in pieces.
#[derive(Clone)]
struct Parts {
    atoms: Vec<Atom>,
    bonds: Vec<(u32, u32, BondOrder)>,
    marks: Vec<molkin_graph::DrawnStereo>,
}

impl Parts {
    fn of(molecule: &Molecule) -> Self {
        Self {
            atoms: molecule.atoms().copied().collect(),
            bonds: molecule.bonds().collect(),
            marks: molecule.drawn_stereo().to_vec(),
        }
    }

    fn molecule(&self) -> Molecule {
        let mut builder = MoleculeBuilder::new();
        for atom in &self.atoms {
            builder.add_atom(*atom);
        }
        for &(a, b, order) in &self.bonds {
            builder.add_bond(a, b, order).unwrap();
        }
        for mark in &self.marks {
            builder.add_stereo(*mark);
        }
        builder.build().unwrap()
    }

    /// With a group in the place of a hydrogen.
    fn substituted(mut self, at: u32, symbol: &str, hydrogens: u8) -> Self {
        let group = Atom {
            hydrogens,
            ..Atom::new(Element::from_symbol(symbol).unwrap())
        };
        self.atoms[at as usize].hydrogens -= 1;
        self.bonds
            .push((at, self.atoms.len() as u32, BondOrder::Single));
        self.atoms.push(group);
        self
    }

    /// With CH2 within a bond.
    fn inserted(mut self, bond: usize) -> Self {
        let methylene = Atom {
            hydrogens: 2,
            ..Atom::new(Element::CARBON)
        };
        let (a, b, _) = self.bonds[bond];
        let new = self.atoms.len() as u32;
        self.bonds[bond] = (a, new, BondOrder::Single);
        self.bonds.push((new, b, BondOrder::Single));
        self.atoms.push(methylene);
        self
    }

    /// Without an atom on a single bond, a hydrogen in its place.
    fn without(mut self, atom: u32) -> Self {
        let at = self
            .bonds
            .iter()
            .position(|&(a, b, _)| a == atom || b == atom);
        let (a, b, _) = self.bonds.remove(at.unwrap());
        self.atoms[(a + b - atom) as usize].hydrogens += 1;
        self.atoms.remove(atom as usize);
        for (a, b, _) in &mut self.bonds {
            *a -= u32::from(*a > atom);
            *b -= u32::from(*b > atom);
        }
        self
    }

    /// Three carbons with hydrogen, spread over the record.
    fn sites(&self) -> Vec<u32> {
        let atoms = (0..).zip(&self.atoms);
        let sites = atoms.filter(|(_, atom)| atom.element == Element::CARBON && atom.hydrogens > 0);
        let sites: Vec<u32> = sites.map(|(at, _)| at).collect();
        vec![sites[0], sites[sites.len() / 2], sites[sites.len() - 1]]
    }

    /// Single bonds outside rings.
    fn chain_bonds(&self, structure: &Structure) -> Vec<usize> {
        let form = structure.canonical().normal_form();
        let source = |at: u32| form.atoms[at as usize].source;
        let outside = |a: u32, b: u32| {
            form.bonds.iter().any(|bond| {
                let ends = (source(bond.a), source(bond.b));
                bond.order == Some(1) && !bond.in_ring && (ends == (a, b) || ends == (b, a))
            })
        };
        let bonds = self.bonds.iter().enumerate();
        let bonds = bonds.filter(|&(_, &(a, b, _))| outside(a, b));
        bonds.map(|(at, _)| at).collect()
    }
}

/// A pair, and what must be found: bonds that only one has at most, and the names of what is left over
/// on each side where it sits on one place.
struct Relatives {
    a: Molecule,
    b: Molecule,
    apart: usize,
    names: [Option<&'static str>; 2],
}

fn relatives(comparer: &mut Comparer, numbers: &mut Numbers) -> Vec<Relatives> {
    let mut pairs = Vec::new();
    for text in PARENTS {
        let molecule = comparer.molecule(text).unwrap();
        let parent = Parts::of(&molecule);
        for site in parent.sites() {
            for (symbol, hydrogens, name) in GROUPS {
                pairs.push(Relatives {
                    a: molecule.clone(),
                    b: parent
                        .clone()
                        .substituted(site, symbol, hydrogens)
                        .molecule(),
                    apart: 1,
                    names: [None, Some(name)],
                });
            }
            pairs.push(Relatives {
                a: parent.clone().substituted(site, "Cl", 0).molecule(),
                b: parent.clone().substituted(site, "Br", 0).molecule(),
                apart: 2,
                names: [Some("chlorine"), Some("bromine")],
            });
        }
        let structure = comparer.structure(text).unwrap();
        for bond in parent.chain_bonds(&structure).into_iter().take(3) {
            pairs.push(Relatives {
                a: molecule.clone(),
                b: parent.clone().inserted(bond).molecule(),
                apart: 3,
                names: [None, None],
            });
        }
    }
    for pair in &mut pairs {
        pair.b = renumbered(&pair.b, numbers);
    }
    pairs
}

/// Checks a pair. A group that was put in the place of a hydrogen is taken away again: what stays must
/// be one compound on both sides.
fn check(comparer: &mut Comparer, pair: &Relatives) -> Result<(), String> {
    let [a, b] = [&pair.a, &pair.b];
    let sides = [comparer.prepare(a.clone())?, comparer.prepare(b.clone())?];
    let found = explain(
        &sides[0],
        &sides[1],
        Relation::NotIsomers,
        &Limits::default(),
    );
    let bonds = found.bonds.as_ref().ok_or("no bonds")?;
    let apart = bonds.only_in_a.len() + bonds.only_in_b.len();
    if apart > pair.apart || !bonds.minimal || bonds.unrelated != Some(false) {
        return Err(format!(
            "{apart} bonds apart, {} known: {bonds:?}",
            pair.apart
        ));
    }
    if pair.names == [None, None] {
        let [none, methylene] = &found.left_over;
        let one_carbon = matches!(methylene.as_slice(), [piece] if piece.atoms.len() == 1);
        return match none.is_empty() && one_carbon {
            true => Ok(()),
            false => Err(format!("{:?}", found.left_over)),
        };
    }
    let mut rest = Vec::new();
    for ((molecule, pieces), name) in [a, b].into_iter().zip(&found.left_over).zip(pair.names) {
        let names: Vec<_> = pieces.iter().map(|piece| piece.name).collect();
        if names != Vec::from_iter(name.map(Some)) {
            return Err(format!("{names:?} left over"));
        }
        let parts = Parts::of(molecule);
        let parts = match pieces.first() {
            Some(piece) => parts.without(piece.atoms[0]),
            None => parts,
        };
        rest.push(comparer.key(&parts.molecule())?);
    }
    match rest[0] == rest[1] {
        true => Ok(()),
        false => Err("what is not left over differs".to_owned()),
    }
}

#[test]
fn what_was_put_there_is_left_over() {
    let (mut comparer, mut numbers) = (Comparer::default(), Numbers::new(6));
    let pairs = relatives(&mut comparer, &mut numbers);
    let mut tally = Tally::new("near relatives");
    let mut found = Vec::new();
    for pair in &pairs {
        tally.value(check(&mut comparer, pair));
        let [a, b] = [&pair.a, &pair.b].map(|side| comparer.prepare(side.clone()).unwrap());
        let start = Instant::now();
        let map = map_structures(&a, &b, &Limits::default()).unwrap();
        found.push((map, start.elapsed().as_secs_f64() * 1e3));
    }
    tally.finish(330);
    report("near relatives", &found);
    assert!(found.iter().all(|(map, _)| map.proved.hydrogens));
}

/// Symmetric compounds with marked centres, and a carbon each to which a methyl group is added.
const MARKED: [(&str, u32); 10] = [
    ("C[C@H](O)C[C@@H](C)O", 0),
    ("C[C@H](O)C[C@H](C)O", 0),
    ("COC(=O)[C@H](O)[C@@H](O)C(=O)OC", 0),
    ("COC(=O)[C@H](O)[C@H](O)C(=O)OC", 0),
    ("C[C@H]1CCC[C@@H](C)N1", 0),
    ("C[C@H]1CC[C@@H](C)CC1", 0),
    ("C[C@H](Cl)[C@@H](C)Cl", 0),
    ("C[C@H](N)CC[C@@H](N)C", 0),
    ("C/C=C/C/C=C/C", 0),
    ("C/C=C/C/C=C\\C", 0),
];

/// The parent's elements are all there in what was made of it, and symmetry offers maps that invert them.
#[test]
fn of_symmetric_maps_that_is_taken_which_keeps_the_stereo_elements() {
    let (mut comparer, mut numbers) = (Comparer::default(), Numbers::new(7));
    let mut tally = Tally::new("kept stereo elements");
    for (text, site) in MARKED {
        let molecule = comparer.molecule(text).unwrap();
        let larger = Parts::of(&molecule).substituted(site, "C", 3).molecule();
        for _ in 0..20 {
            let a = comparer
                .prepare(renumbered(&molecule, &mut numbers))
                .unwrap();
            let b = comparer.prepare(renumbered(&larger, &mut numbers)).unwrap();
            let found = explain(&a, &b, Relation::NotIsomers, &Limits::default());
            let lost = disturbed(&a, &b, &found);
            tally.case(lost.is_empty(), || {
                format!("{text}: {lost:?} {:?}", found.atom_map)
            });
        }
    }
    tally.finish(200);
}

/// Elements of A that the map does not take to an element of B with the same CIP label, of those that
/// have one in both.
fn disturbed(a: &Structure, b: &Structure, found: &Explanation) -> Vec<[u32; 2]> {
    let image = |atom: u32| {
        found
            .atom_map
            .iter()
            .find(|pair| pair.0 == atom)
            .map(|pair| pair.1)
    };
    let marked = |side: &Structure| -> Vec<(StereoElement, Option<molkin_graph::Label>)> {
        let labels = side.canonical().labels(&Limits::default());
        let elements = side.canonical().stereo_elements().into_iter().zip(labels);
        let marked = elements.filter(|(element, _)| element.mark != Mark::Absent);
        marked
            .map(|(element, label)| (element, label.label()))
            .collect()
    };
    let others = marked(b);
    let kept = |(element, label): &(StereoElement, Option<molkin_graph::Label>)| {
        let mut centres = element.centres.map(|atom| image(atom).unwrap());
        centres.sort_unstable();
        others.iter().any(|(other, theirs)| {
            let mut own = other.centres;
            own.sort_unstable();
            own == centres && label == theirs
        })
    };
    let elements = marked(a);
    let lost = elements.iter().filter(|element| !kept(element));
    lost.map(|(element, _)| element.centres).collect()
}
