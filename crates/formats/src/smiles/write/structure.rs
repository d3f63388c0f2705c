//! The form with the bonds of each atom at hand.

use molkin_graph::{BondOrder, CanonicalForm, FormAtom};

use super::Lost;

/// A bond seen from one of its atoms.
#[derive(Debug, Clone, Copy, Default, PartialEq, Eq)]
pub(super) struct Arc {
    /// The atom at the other end.
    pub(super) to: u32,
    /// The bond, by its index in the form.
    pub(super) bond: u32,
    /// As it is written: 1 to 4.
    pub(super) order: u8,
}

/// The bonds of each atom; storage that is filled anew for every form.
#[derive(Debug, Default)]
pub(super) struct ArcTable {
    starts: Vec<u32>,
    arcs: Vec<Arc>,
}

/// Atoms and bonds. Every atom number in an [`Arc`] is that of an atom of the form: bonds that name
/// others, which no form of a molecule has, are left out.
#[derive(Debug)]
pub(super) struct Structure<'a> {
    pub(super) form: &'a CanonicalForm,
    table: &'a ArcTable,
}

const COORDINATION: u8 = BondOrder::Coordination as u8;
const HYDROGEN: u8 = BondOrder::Hydrogen as u8;

/// The order that a bond is written with; `None` for one that is left out.
fn written_order(order: u8) -> Option<u8> {
    match order {
        COORDINATION => Some(1),
        HYDROGEN => None,
        order => Some(order),
    }
}

impl ArcTable {
    /// Counts the arcs of each atom, makes room, and fills it from the back. Linear.
    fn load(&mut self, form: &CanonicalForm) {
        let Self { starts, arcs } = self;
        let count = form.atoms.len() as u32;
        let written =
            |&(a, b, order): &(u32, u32, u8)| written_order(order).filter(|_| a < b && b < count);
        let (mut sum, mut highest) = (0, 0);
        starts.clear();
        starts.resize(form.atoms.len() + 1, 0);
        for bond in &form.bonds {
            if let Some(order) = written(bond) {
                starts[bond.0 as usize] += 1;
                starts[bond.1 as usize] += 1;
                highest = highest.max(order);
            }
        }
        for start in starts.iter_mut() {
            sum += *start;
            *start = sum;
        }
        arcs.clear();
        arcs.resize(sum as usize, Arc::default());
        // Multiple bonds first: the tree then follows them, and rings close at single bonds. Bonds come
        // sorted, so within an order the arcs of each atom are by the other atom.
        for order in 1..=highest {
            let mut bond = form.bonds.len() as u32;
            for ends in form.bonds.iter().rev() {
                bond -= 1;
                if written(ends) != Some(order) {
                    continue;
                }
                for (from, to) in [(ends.0, ends.1), (ends.1, ends.0)] {
                    let start = &mut starts[from as usize];
                    *start -= 1;
                    arcs[*start as usize] = Arc { to, bond, order };
                }
            }
        }
    }
}

impl<'a> Structure<'a> {
    /// The form, its bonds sorted into the table.
    pub(super) fn new(form: &'a CanonicalForm, table: &'a mut ArcTable) -> Self {
        table.load(form);
        Self { form, table }
    }

    /// Says of each bond that the notation has no symbol for that it is lost.
    pub(super) fn report_lost_bonds(&self, lost: &mut Vec<Lost>) {
        let bonds = self.form.bonds.iter();
        lost.extend(bonds.filter_map(|&(a, b, order)| {
            let order = match order {
                COORDINATION => BondOrder::Coordination,
                HYDROGEN => BondOrder::Hydrogen,
                _ => return None,
            };
            let atoms = [a, b];
            Some(Lost::Bond { atoms, order })
        }));
    }

    pub(super) fn len(&self) -> usize {
        self.form.atoms.len()
    }

    pub(super) fn atom(&self, atom: u32) -> &FormAtom {
        &self.form.atoms[atom as usize]
    }

    /// The bonds of an atom, those of higher order first, then by the other atom.
    pub(super) fn arcs(&self, atom: u32) -> &[Arc] {
        let at = atom as usize;
        let ArcTable { starts, arcs } = self.table;
        &arcs[starts[at] as usize..starts[at + 1] as usize]
    }

    /// The bonds of all atoms, atom by atom, and where those of each begin; one place more than there
    /// are atoms.
    pub(super) fn all_arcs(&self) -> (&[u32], &[Arc]) {
        (&self.table.starts, &self.table.arcs)
    }

    /// Whether an atom lies inside a row of cumulated double bonds: two of them and nothing else.
    pub(super) fn is_cumulated(&self, atom: u32) -> bool {
        let arcs = self.arcs(atom);
        arcs.len() == 2 && self.atom(atom).hydrogens == 0 && arcs.iter().all(|arc| arc.order == 2)
    }
}
