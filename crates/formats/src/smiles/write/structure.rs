//! The form with the bonds of each atom at hand.

use std::cmp::Reverse;

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
        let bonds = form.bonds.iter().enumerate();
        let written = bonds
            .filter(|&(_, &(a, b, _))| a < b && b < count)
            .filter_map(|(bond, &(a, b, order))| Some((bond as u32, a, b, written_order(order)?)));
        starts.clear();
        starts.resize(form.atoms.len() + 1, 0);
        for (_, a, b, _) in written.clone() {
            starts[a as usize] += 1;
            starts[b as usize] += 1;
        }
        let mut sum = 0;
        for start in starts.iter_mut() {
            sum += *start;
            *start = sum;
        }
        arcs.clear();
        arcs.resize(sum as usize, Arc::default());
        // Bonds come sorted, so the arcs of each atom now are by the other atom.
        for (bond, a, b, order) in written.rev() {
            for (from, to) in [(a, b), (b, a)] {
                let start = &mut starts[from as usize];
                *start -= 1;
                arcs[*start as usize] = Arc { to, bond, order };
            }
        }
        // Multiple bonds first: the tree then follows them, and rings close at single bonds.
        for ends in starts.windows(2) {
            let own = &mut arcs[ends[0] as usize..ends[1] as usize];
            let key = |arc: &Arc| (Reverse(arc.order), arc.to, arc.bond);
            if !own.is_sorted_by_key(key) {
                own.sort_unstable_by_key(key);
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

    /// Whether an atom lies inside a row of cumulated double bonds: two of them and nothing else.
    pub(super) fn is_cumulated(&self, atom: u32) -> bool {
        let arcs = self.arcs(atom);
        arcs.len() == 2 && self.atom(atom).hydrogens == 0 && arcs.iter().all(|arc| arc.order == 2)
    }
}
