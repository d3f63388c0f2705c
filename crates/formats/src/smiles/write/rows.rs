//! Double bonds and rows of cumulated ones.

use super::structure::Structure;

/// A row of one or more double bonds.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub(super) struct Row {
    ends: [u32; 2],
    inner: [u32; 2],
    middle: u32,
    /// Its atoms from end to end, two at least.
    length: usize,
}

impl Row {
    /// A row of these atoms, two at least.
    fn of(atoms: &[u32]) -> Self {
        let last = atoms.len() - 1;
        Self {
            ends: [atoms[0], atoms[last]],
            inner: [atoms[1], atoms[last - 1]],
            middle: atoms[atoms.len() / 2],
            length: atoms.len(),
        }
    }

    /// The two ends.
    pub(super) fn ends(&self) -> [u32; 2] {
        self.ends
    }

    /// The atom of the row that is bonded to each end.
    pub(super) fn inner(&self) -> [u32; 2] {
        self.inner
    }

    /// Whether the ligands at both ends lie in one plane: an odd number of bonds.
    pub(super) fn is_planar(&self) -> bool {
        self.length.is_multiple_of(2)
    }

    /// The atom in the middle of a row that is not planar.
    pub(super) fn middle(&self) -> Option<u32> {
        (!self.is_planar()).then_some(self.middle)
    }
}

/// The rows of a form; storage that is filled anew for every form.
#[derive(Debug, Default)]
pub(super) struct Rows {
    rows: Vec<Row>,
    /// Per bond.
    seen: Vec<bool>,
    /// Those of the row at hand.
    atoms: Vec<u32>,
}

impl Rows {
    /// Empties the list.
    pub(super) fn clear(&mut self) {
        self.rows.clear();
    }

    /// Finds all rows that have two ends, in the order of their first bonds. Linear.
    pub(super) fn find(&mut self, structure: &Structure) {
        let Self { rows, seen, atoms } = self;
        seen.clear();
        seen.resize(structure.form.bonds.len(), false);
        for atom in 0..structure.len() as u32 {
            for arc in structure.arcs(atom).iter().filter(|arc| arc.order == 2) {
                if std::mem::replace(&mut seen[arc.bond as usize], true) {
                    continue;
                }
                atoms.clear();
                if !follow(structure, arc.to, atom, seen, atoms) {
                    continue;
                }
                atoms.reverse();
                follow(structure, atom, arc.to, seen, atoms);
                rows.push(Row::of(atoms));
            }
        }
    }

    pub(super) fn all(&self) -> &[Row] {
        &self.rows
    }
}

/// Adds the atoms from `to` to the end of the row, coming from `from`; false where there is no end
/// since the row closes to a ring.
fn follow(
    structure: &Structure,
    mut from: u32,
    mut to: u32,
    seen: &mut [bool],
    atoms: &mut Vec<u32>,
) -> bool {
    atoms.push(to);
    while structure.is_cumulated(to) {
        let Some(arc) = structure.arcs(to).iter().find(|arc| arc.to != from) else {
            return false;
        };
        if std::mem::replace(&mut seen[arc.bond as usize], true) {
            return false;
        }
        (from, to) = (to, arc.to);
        atoms.push(to);
    }
    true
}

/// Rows by their ends.
#[derive(Debug)]
pub(super) struct RowIndex<'a> {
    rows: &'a [Row],
    /// Lower end, higher end, row; sorted.
    entries: Vec<(u32, u32, u32)>,
}

impl<'a> RowIndex<'a> {
    pub(super) fn new(rows: &'a [Row]) -> Self {
        let mut entries: Vec<_> = (0..)
            .zip(rows)
            .map(|(index, row)| {
                let [a, b] = row.ends();
                (a.min(b), a.max(b), index)
            })
            .collect();
        entries.sort_unstable();
        Self { rows, entries }
    }

    /// The row between two atoms, in either direction.
    pub(super) fn between(&self, [a, b]: [u32; 2]) -> Option<(usize, &'a Row)> {
        let wanted = (a.min(b), a.max(b));
        let at = self
            .entries
            .partition_point(|&(low, high, _)| (low, high) < wanted);
        let &(low, high, index) = self.entries.get(at)?;
        let row = self.rows.get(index as usize)?;
        ((low, high) == wanted).then_some((index as usize, row))
    }
}
