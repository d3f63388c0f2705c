//! Double bonds and rows of cumulated ones.

use super::structure::Structure;

/// A row of one or more double bonds.
#[derive(Debug, Clone, PartialEq, Eq)]
pub(super) struct Row {
    /// Its atoms from end to end, two at least.
    atoms: Vec<u32>,
}

impl Row {
    /// The two ends.
    pub(super) fn ends(&self) -> [u32; 2] {
        [self.atoms[0], self.atoms[self.atoms.len() - 1]]
    }

    /// The atom of the row that is bonded to each end.
    pub(super) fn inner(&self) -> [u32; 2] {
        [self.atoms[1], self.atoms[self.atoms.len() - 2]]
    }

    /// Whether the ligands at both ends lie in one plane: an odd number of bonds.
    pub(super) fn is_planar(&self) -> bool {
        self.atoms.len().is_multiple_of(2)
    }

    /// The atom in the middle of a row that is not planar.
    pub(super) fn middle(&self) -> Option<u32> {
        (!self.is_planar()).then(|| self.atoms[self.atoms.len() / 2])
    }
}

/// All rows that have two ends, in the order of their first bonds. Linear.
pub(super) fn find(structure: &Structure) -> Vec<Row> {
    let mut seen = vec![false; structure.form.bonds.len()];
    let mut rows = Vec::new();
    for atom in 0..structure.len() as u32 {
        for arc in structure.arcs(atom).iter().filter(|arc| arc.order == 2) {
            if seen[arc.bond as usize] {
                continue;
            }
            seen[arc.bond as usize] = true;
            let mut atoms = Vec::new();
            if !follow(structure, arc.to, atom, &mut seen, &mut atoms) {
                continue;
            }
            atoms.reverse();
            follow(structure, atom, arc.to, &mut seen, &mut atoms);
            rows.push(Row { atoms });
        }
    }
    rows
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
