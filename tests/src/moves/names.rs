//! Names of substituents by the keys of structures: the fragment with astatine for the rest.

use std::collections::HashMap;

use molkin_formats::smiles;
use molkin_graph::{Atom, BondOrder, Element, Key, Molecule, MoleculeBuilder, Orderer};
use molkin_relate::Structure;

use crate::{Table, workspace};

/// The table of names, by key.
pub struct SubstituentNames {
    names: HashMap<Key, String>,
}

impl SubstituentNames {
    /// Reads the table of the library.
    ///
    /// # Panics
    /// If a row has no structure, or two rows the same one.
    pub fn read() -> Self {
        let path = workspace("crates/relate/src/explain/moves/substituents.tsv");
        let table = Table::read(&path);
        let mut orderer = Orderer::default();
        let mut names = HashMap::new();
        for [name, fragment] in table.columns(["name", "fragment"]) {
            let molecule = smiles::parse(&fragment.replacen('*', "[At]", 1)).unwrap();
            let key = orderer.order(&molecule).unwrap().compound_key();
            let before = names.insert(key, name.to_owned());
            assert_eq!(before, None, "{name} is there twice");
        }
        Self { names }
    }

    /// How many there are.
    pub fn count(&self) -> usize {
        self.names.len()
    }

    /// The name of the atoms of a record that hang by `through` on `seat`.
    pub(super) fn of(
        &self,
        structure: &Structure,
        atoms: &[u32],
        through: u32,
        seat: u32,
    ) -> Option<String> {
        let molecule = fragment(structure.molecule(), atoms, through, seat)?;
        let key = Orderer::default().order(&molecule).ok()?.compound_key();
        self.names.get(&key).cloned()
    }
}

/// The fragment as drawn, with astatine for its seat; stereo marks are left out.
fn fragment(record: &Molecule, atoms: &[u32], through: u32, seat: u32) -> Option<Molecule> {
    let mut builder = MoleculeBuilder::new();
    let astatine = builder.add_atom(Atom::new(Element::from_symbol("At")?));
    let mut places = HashMap::from([(seat, astatine)]);
    for (atom, drawn) in (0u32..).zip(record.atoms()) {
        let bears = |(other, _): (u32, BondOrder)| atoms.contains(&other);
        let hydrogen = drawn.element == Element::HYDROGEN && record.neighbours(atom).any(bears);
        if atoms.contains(&atom) || hydrogen {
            places.insert(atom, builder.add_atom(*drawn));
        }
    }
    for (a, b, order) in record.bonds() {
        let (Some(&x), Some(&y)) = (places.get(&a), places.get(&b)) else {
            continue;
        };
        let to_seat = a == seat || b == seat;
        if !to_seat || [a, b].contains(&through) {
            builder.add_bond(x, y, order).ok()?;
        }
    }
    builder.build().ok()
}
