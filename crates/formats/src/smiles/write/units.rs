//! Planar units: the places where a reader looks for `/` and `\`.

use molkin_graph::{Ligand, Shape};

use super::{
    Lost,
    layout::Layout,
    rows::{Row, RowIndex},
    slopes::Carrier,
    structure::Structure,
};

/// A double bond, or an odd number of cumulated ones, whose arrangement text can state.
#[derive(Debug, Clone)]
pub(super) struct Unit {
    /// Whether its first ligands lie on opposite sides (true); `None` for a unit that is not marked,
    /// and must not be by accident.
    pub(super) mark: Option<bool>,
    pub(super) ends: [End; 2],
    /// The atom of the row that is bonded to the first end.
    pub(super) inner: u32,
}

/// One end of a unit.
#[derive(Debug, Clone, Default)]
pub(super) struct End {
    pub(super) atom: u32,
    /// What can carry a slope that says where the first ligand lies, best first: two bonds at most,
    /// and where there is one, it comes first.
    pub(super) options: [Option<Choice>; 2],
}

impl End {
    fn new(atom: u32, options: impl Iterator<Item = Choice>) -> Self {
        let mut options = options.fuse();
        Self {
            atom,
            options: [options.next(), options.next()],
        }
    }
}

/// A bond that can carry a slope, seen from an end.
#[derive(Debug, Clone, Copy)]
pub(super) struct Choice {
    pub(super) carrier: Carrier,
    /// Whether the first ligand is below the end when the slope is `/`, and above when it is `\`.
    pub(super) opposite: bool,
}

/// The units of a form with their marks. Marks that fit no unit are lost.
pub(super) fn units(
    structure: &Structure,
    layout: &Layout,
    rows: &[Row],
    lost: &mut Vec<Lost>,
) -> Vec<Unit> {
    let index = RowIndex::new(rows);
    let mut marks = vec![None; rows.len()];
    for element in &structure.form.stereo {
        if element.shape != Shape::DoubleBond {
            continue;
        }
        let place = index.between(element.centres);
        match place.filter(|(_, row)| row.is_planar() && is_readable(structure, row)) {
            Some((at, _)) => marks[at] = Some(element),
            None => lost.push(Lost::Arrangement {
                shape: element.shape,
                centres: element.centres,
            }),
        }
    }
    let context = Context { structure, layout };
    let mut found = Vec::new();
    for (row, mark) in rows.iter().zip(marks) {
        if !row.is_planar() || !is_readable(structure, row) {
            continue;
        }
        let [a, b] = row.ends();
        let [a_inner, b_inner] = row.inner();
        let ligands = mark.map(|element| {
            let [first, second, third, fourth] = element.ligands;
            if element.centres[0] == a {
                [[first, second], [third, fourth]]
            } else {
                [[third, fourth], [first, second]]
            }
        });
        let ends = match ligands {
            Some([at_a, at_b]) => [context.marked_end(a, at_a), context.marked_end(b, at_b)],
            None => [context.other_end(a, a_inner), context.other_end(b, b_inner)],
        };
        found.push(Unit {
            mark: mark.map(|element| element.parity.is_odd()),
            ends,
            inner: a_inner,
        });
    }
    found
}

/// Whether a reader takes the row for a unit: two ligands at each end, one of which may be a
/// hydrogen that is counted, or a lone pair.
fn is_readable(structure: &Structure, row: &Row) -> bool {
    row.ends().iter().all(|&end| {
        let others = structure.arcs(end).len() - 1;
        matches!((others, structure.atom(end).hydrogens), (2, 0) | (1, 0 | 1))
    })
}

struct Context<'a> {
    structure: &'a Structure<'a>,
    layout: &'a Layout,
}

impl Context<'_> {
    fn marked_end(&self, atom: u32, ligands: [Ligand; 2]) -> End {
        let choice = |(ligand, is_second): (Ligand, bool)| match ligand {
            Ligand::Atom(to) => {
                let mut arcs = self.structure.arcs(atom).iter();
                let arc = arcs.find(|arc| arc.to == to && arc.order == 1)?;
                // The glyph is `/` where the later atom lies above the earlier one.
                let from_later = self.layout.place(atom) > self.layout.place(to);
                Some(Choice {
                    carrier: Carrier::Bond(arc.bond),
                    opposite: from_later ^ is_second,
                })
            }
            Ligand::Hydrogen => Some(Choice {
                carrier: Carrier::Hydrogen(atom),
                opposite: is_second,
            }),
            Ligand::LonePair => None,
        };
        let [first, second] = ligands;
        let options = [(first, false), (second, true)].into_iter();
        End::new(atom, options.filter_map(choice))
    }

    /// The end of a unit without a mark: only which bonds touch it matters.
    fn other_end(&self, atom: u32, inner: u32) -> End {
        let arcs = self.structure.arcs(atom).iter();
        let options = arcs.filter(|arc| arc.to != inner && arc.order == 1);
        End::new(
            atom,
            options.map(|arc| Choice {
                carrier: Carrier::Bond(arc.bond),
                opposite: false,
            }),
        )
    }
}
