//! `@` and `@@`: tetrahedral atoms, and the middle atoms of allenes and longer rows.

use molkin_graph::{FormStereo, Ligand, Shape};

use super::{
    Lost,
    layout::Layout,
    rows::{Row, RowIndex},
    structure::Structure,
};

/// The tag of each atom: whether it is `@@`.
#[derive(Debug)]
pub(super) struct Tags {
    clockwise: Vec<Option<bool>>,
}

impl Tags {
    /// Finds the tags. `shown` counts the hydrogens of each atom that the text has as atoms.
    pub(super) fn new(
        structure: &Structure,
        layout: &Layout,
        rows: &[Row],
        shown: &[u8],
        lost: &mut Vec<Lost>,
    ) -> Self {
        let context = Context {
            structure,
            layout,
            shown,
            rows: RowIndex::new(rows),
        };
        let mut clockwise = vec![None; structure.len()];
        for element in &structure.form.stereo {
            let tag = match element.shape {
                Shape::Tetrahedral => context.tetrahedral(element),
                Shape::Axis => context.axis(element),
                Shape::DoubleBond => continue,
            };
            match tag {
                Some((atom, odd)) => {
                    clockwise[atom as usize] = Some(element.parity.is_odd() ^ odd);
                }
                None => lost.push(Lost::Arrangement {
                    shape: element.shape,
                    centres: element.centres,
                }),
            }
        }
        Self { clockwise }
    }

    /// The tag of an atom: true for `@@`.
    pub(super) fn of(&self, atom: u32) -> Option<bool> {
        self.clockwise[atom as usize]
    }
}

struct Context<'a> {
    structure: &'a Structure<'a>,
    layout: &'a Layout,
    shown: &'a [u8],
    rows: RowIndex<'a>,
}

impl Context<'_> {
    /// The atom that carries the tag, and whether the ligands in text order are an odd permutation
    /// of those of the element.
    fn tetrahedral(&self, element: &FormStereo) -> Option<(u32, bool)> {
        let atom = element.centres[0];
        let has_lone_pair = element.ligands.contains(&Ligand::LonePair);
        let written = self.ligands(atom, has_lone_pair)?;
        Some((atom, is_odd(&element.ligands, &written)?))
    }

    /// The same for an axis. The end that comes first in the text has the first two ligands; both
    /// ends change places by two swaps, so nothing turns on which one that is.
    fn axis(&self, element: &FormStereo) -> Option<(u32, bool)> {
        let (_, row) = self.rows.between(element.centres)?;
        let [a, b] = element.centres;
        let [a_inner, b_inner] = if row.ends()[0] == a {
            row.inner()
        } else {
            let [b_inner, a_inner] = row.inner();
            [a_inner, b_inner]
        };
        let [first, second, third, fourth] = element.ligands;
        let a_odd = self.is_end_odd(a, a_inner, [first, second])?;
        let b_odd = self.is_end_odd(b, b_inner, [third, fourth])?;
        Some((row.middle()?, a_odd ^ b_odd))
    }

    fn is_end_odd(&self, atom: u32, inner: u32, ligands: [Ligand; 2]) -> Option<bool> {
        let has_lone_pair = ligands.contains(&Ligand::LonePair);
        let mut written = self.ligands(atom, has_lone_pair)?;
        written.retain(|&ligand| ligand != Ligand::Atom(inner));
        is_odd(&ligands, &written)
    }

    /// The ligands of an atom in the order of the text: the atom before it; its hydrogen or lone
    /// pair that is no atom; ring labels; branches; the chain.
    fn ligands(&self, atom: u32, has_lone_pair: bool) -> Option<Vec<Ligand>> {
        let hydrogens = self.structure.form.atoms.get(atom as usize)?.hydrogens;
        let shown = self.shown[atom as usize];
        let repeat = |ligand, count: u8| std::iter::repeat_n(ligand, usize::from(count));
        let bonded = |to| Ligand::Atom(to);
        let parent = self.layout.parent(atom).map(|arc| bonded(arc.to));
        let rings = self.layout.rings(atom).iter();
        let children = self.layout.children(atom).iter();
        Some(
            parent
                .into_iter()
                .chain(repeat(Ligand::Hydrogen, hydrogens.saturating_sub(shown)))
                .chain(repeat(Ligand::LonePair, u8::from(has_lone_pair)))
                .chain(rings.map(|end| bonded(end.arc.to)))
                .chain(repeat(Ligand::Hydrogen, shown))
                .chain(children.map(|arc| bonded(arc.to)))
                .collect(),
        )
    }
}

/// Whether `written` is an odd permutation of `ligands`; `None` if it is no permutation of them.
fn is_odd(ligands: &[Ligand], written: &[Ligand]) -> Option<bool> {
    if ligands.len() != written.len() {
        return None;
    }
    let mut odd = false;
    for (at, ligand) in ligands.iter().enumerate() {
        let place = written.iter().position(|other| other == ligand)?;
        for earlier in &ligands[..at] {
            let other = written.iter().position(|other| other == earlier)?;
            if other == place {
                return None;
            }
            odd ^= other > place;
        }
    }
    Some(odd)
}
