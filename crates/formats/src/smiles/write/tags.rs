//! Stereo tags: tetrahedral atoms, the middle atoms of allenes and longer rows, and centres with more
//! ligands.

use molkin_graph::{DrawnCoordination, FormStereo, Ligand, Shape};

use super::{
    Lost,
    layout::Layout,
    rows::{Row, RowIndex},
    structure::Structure,
};
use crate::smiles::{
    polyhedra,
    syntax::{StereoTag, TagClass},
};

/// The tag of each atom.
#[derive(Debug, Default)]
pub(super) struct Tags {
    tags: Vec<Option<StereoTag>>,
}

impl Tags {
    /// Finds the tags. `shown` counts the hydrogens of each atom that the text has as atoms.
    pub(super) fn load(
        &mut self,
        structure: &Structure,
        layout: &Layout,
        rows: &[Row],
        shown: &[u8],
        lost: &mut Vec<Lost>,
    ) {
        let context = Context {
            structure,
            layout,
            shown,
            rows: RowIndex::new(rows),
        };
        let tags = &mut self.tags;
        tags.clear();
        tags.resize(structure.len(), None);
        for element in &structure.form.stereo {
            let tag = match element.shape {
                Shape::Tetrahedral => context.tetrahedral(element),
                Shape::Axis => context.axis(element),
                Shape::DoubleBond => continue,
            };
            match tag {
                Some((atom, odd)) => {
                    tags[atom as usize] = Some(StereoTag {
                        class: TagClass::Plain,
                        number: 1 + u8::from(element.parity.is_odd() ^ odd),
                    });
                }
                None => lost.push(Lost::Arrangement {
                    shape: element.shape,
                    centres: element.centres,
                }),
            }
        }
        for mark in &structure.form.coordination {
            match context.coordination(mark) {
                Some(tag) => tags[mark.centre as usize] = Some(tag),
                None => lost.push(Lost::Coordination {
                    polyhedron: mark.polyhedron,
                    centre: mark.centre,
                }),
            }
        }
    }

    /// The tag of an atom.
    pub(super) fn of(&self, atom: u32) -> Option<StereoTag> {
        self.tags[atom as usize]
    }
}

/// Asks for a hydrogen as an atom where a tagged centre has a lone pair beside it (a secondary
/// phosphine): the standard gives the order of one unwritten ligand, not of two.
pub(super) fn show_hydrogens(stereo: &[FormStereo], shown: &mut [u8]) {
    for element in stereo.iter().filter(|e| e.shape == Shape::Tetrahedral) {
        let has = |ligand| element.ligands.contains(&ligand);
        if has(Ligand::Hydrogen) && has(Ligand::LonePair) {
            let own = &mut shown[element.centres[0] as usize];
            *own = (*own).max(1);
        }
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
        let lone_pairs = count(&element.ligands, Ligand::LonePair);
        let written = listed(self.ligands(atom, lone_pairs)?)?;
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
        let written = self.ligands(atom, count(&ligands, Ligand::LonePair))?;
        let own = written.filter(|&ligand| ligand != Ligand::Atom(inner));
        is_odd(&ligands, &listed(own)?)
    }

    /// The tag that puts the ligands, in text order, where the mark has them. Ligands that are alike
    /// may stand for each other. More than one empty site is not read back.
    fn coordination(&self, mark: &DrawnCoordination) -> Option<StereoTag> {
        let lone_pairs = count(&mark.ligands, Ligand::LonePair);
        let positions = mark.polyhedron.positions();
        let mut free: Vec<_> = self.ligands(mark.centre, lone_pairs)?.map(Some).collect();
        if lone_pairs > 1 || free.len() != positions || mark.ligands.len() != positions {
            return None;
        }
        let mut placement = [0; 6];
        for (ligand, place) in mark.ligands.iter().zip(&mut placement) {
            let at = free.iter().position(|other| *other == Some(*ligand))?;
            free[at] = None;
            *place = u8::try_from(at).ok()?;
        }
        Some(StereoTag {
            class: TagClass::Polyhedral(mark.polyhedron),
            number: polyhedra::tag(mark.polyhedron, placement)?,
        })
    }

    /// The ligands of an atom in the order of the text: the atom before it; its hydrogen or lone
    /// pair that is no atom; ring labels; branches; the chain.
    fn ligands(&self, atom: u32, lone_pairs: usize) -> Option<impl Iterator<Item = Ligand>> {
        let hydrogens = self.structure.form.atoms.get(atom as usize)?.hydrogens;
        let shown = self.shown[atom as usize];
        let repeat = |ligand, count: u8| std::iter::repeat_n(ligand, usize::from(count));
        let bonded = |to| Ligand::Atom(to);
        let parent = self.layout.parent(atom).map(|arc| bonded(arc.to));
        let rings = self.layout.rings(atom).iter();
        let children = self.layout.children(atom);
        Some(
            parent
                .into_iter()
                .chain(repeat(Ligand::Hydrogen, hydrogens.saturating_sub(shown)))
                .chain(std::iter::repeat_n(Ligand::LonePair, lone_pairs))
                .chain(rings.map(move |end| bonded(end.arc.to)))
                .chain(repeat(Ligand::Hydrogen, shown))
                .chain(children.map(bonded)),
        )
    }
}

fn count(ligands: &[Ligand], wanted: Ligand) -> usize {
    ligands.iter().filter(|&&ligand| ligand == wanted).count()
}

/// Exactly `N` ligands in an array; `None` where there are more or fewer.
fn listed<const N: usize>(mut ligands: impl Iterator<Item = Ligand>) -> Option<[Ligand; N]> {
    let mut list = [Ligand::LonePair; N];
    for place in &mut list {
        *place = ligands.next()?;
    }
    ligands.next().is_none().then_some(list)
}

/// Whether `written` is an odd permutation of `ligands`; `None` if it is no permutation of them.
fn is_odd<const N: usize>(ligands: &[Ligand; N], written: &[Ligand; N]) -> Option<bool> {
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
