//! The canonical form: the molecule as canonical text writes it, numbered in canonical order.

use crate::{
    Canonical, DrawnCoordination, Element, GroupKind, Ligand, Orderer, Parity, Shape, stereo::slot,
};

use super::placement::Placed;

/// An atom of the canonical form.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub struct FormAtom {
    /// The element.
    pub element: Element,
    /// The mass number, where given.
    pub isotope: Option<u16>,
    /// Formal charge in the placement that is written.
    pub charge: i8,
    /// Hydrogens of natural composition. Labelled ones are atoms of their own.
    pub hydrogens: u8,
}

/// A marked stereo element of the canonical form.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub struct FormStereo {
    /// The geometry.
    pub shape: Shape,
    /// The centre twice, or the two ends.
    pub centres: [u32; 2],
    /// The ligands, two at each end for double bonds and axes.
    pub ligands: [Ligand; 4],
    /// The arrangement.
    pub parity: Parity,
}

/// A molecule in canonical form: hydrogens folded, π bonds and charges in the placement that is
/// least in canonical order, customary rather than charge-separated where custom has a neutral form,
/// only marks that count.
#[derive(Debug, Clone, Default, PartialEq, Eq)]
pub struct CanonicalForm {
    /// The atoms in canonical order, then labelled hydrogens.
    pub atoms: Vec<FormAtom>,
    /// The bonds: lower atom, higher atom, order 1 to 4, 6 for a coordination bond and 0 for a
    /// hydrogen bond; sorted.
    pub bonds: Vec<(u32, u32, u8)>,
    /// The marked stereo elements, sorted by centres.
    pub stereo: Vec<FormStereo>,
    /// Arrangements about centres that are not tetrahedral, by centre; each turned so that it is
    /// least.
    pub coordination: Vec<DrawnCoordination>,
    /// The kinds of the stereo groups that make a difference, sorted. The marks show one arrangement
    /// of each.
    pub groups: Vec<GroupKind>,
}

/// Scratch that is reused from one form to the next.
#[derive(Debug, Default)]
pub(super) struct Scratch {
    placed: Placed,
    /// Labelled hydrogens, for stereo ligands.
    labelled: Vec<Labelled>,
    /// Mobile bonds that carry a mark.
    marked: Vec<u32>,
}

/// A hydrogen that is an atom of the form.
#[derive(Debug, Clone, Copy)]
struct Labelled {
    host: u32,
    mass: u32,
    atom: u32,
}

impl Orderer {
    /// As [`Canonical::form`], into a form whose storage is reused.
    pub fn form_into(&mut self, view: &Canonical, form: &mut CanonicalForm) {
        view.load_form(&mut self.form, form);
    }
}

impl Canonical {
    /// The canonical form.
    pub fn form(&self) -> CanonicalForm {
        let mut form = CanonicalForm::default();
        self.load_form(&mut Scratch::default(), &mut form);
        form
    }

    fn load_form(&self, scratch: &mut Scratch, form: &mut CanonicalForm) {
        let Scratch {
            placed,
            labelled,
            marked,
        } = scratch;
        self.list_marked_mobile_bonds(marked);
        placed.place(&self.skeleton, &self.mesomer, &self.written(), |bond| {
            marked.contains(&bond)
        });
        form.atoms.clear();
        form.bonds.clear();
        form.stereo.clear();
        form.coordination.clear();
        labelled.clear();
        self.add_atoms(form, placed, labelled);
        self.add_bonds(form, placed, labelled);
        self.add_stereo(form, labelled);
    }

    fn add_atoms(&self, form: &mut CanonicalForm, placed: &Placed, labelled: &mut Vec<Labelled>) {
        let mut next = self.skeleton.len() as u32;
        for (host, &atom) in (0..).zip(&self.written().order) {
            let record = &self.skeleton.atoms[atom as usize];
            let mut own = FormAtom {
                element: record.element,
                isotope: record.isotope,
                charge: placed.drawing.charges[atom as usize],
                hydrogens: record.hydrogens,
            };
            if record.labelled == 0 {
                form.atoms.push(own);
                continue;
            }
            let counts = [0, 4, 8].map(|shift| record.labelled >> shift & 15);
            let natural = u16::from(record.hydrogens).saturating_sub(counts.iter().sum());
            own.hydrogens = natural as u8;
            form.atoms.push(own);
            for (mass, count) in (1..).zip(counts) {
                for _ in 0..count {
                    let atom = next;
                    labelled.push(Labelled { host, mass, atom });
                    next += 1;
                }
            }
        }
        form.atoms.extend(labelled.iter().map(|own| FormAtom {
            element: Element::HYDROGEN,
            isotope: Some(own.mass as u16),
            charge: 0,
            hydrogens: 0,
        }));
    }

    /// Adds the bonds by their lower atom, each with its labelled hydrogens, so that all are sorted.
    fn add_bonds(&self, form: &mut CanonicalForm, placed: &Placed, labelled: &[Labelled]) {
        let mut labelled = labelled.iter().peekable();
        for (host, &atom) in (0..).zip(&self.written().order) {
            let from = form.bonds.len();
            for &(to, bond) in self.skeleton.arcs(atom) {
                let to = self.written().rank[to as usize];
                if to > host {
                    form.bonds
                        .push((host, to, placed.drawing.orders[bond as usize]));
                }
            }
            while let Some(own) = labelled.next_if(|own| own.host == host) {
                form.bonds.push((host, own.atom, 1));
            }
            if form.bonds.len() > from + 1 {
                form.bonds[from..].sort_unstable();
            }
        }
    }

    fn list_marked_mobile_bonds(&self, marked: &mut Vec<u32>) {
        let places = self.variables.iter().zip(&self.claims.shown);
        let bonds = places
            .filter(|(variable, shown)| variable.quiet && shown.is_some())
            .flat_map(|(variable, _)| &variable.members)
            .map(|&(index, _)| &self.perception.candidates[index])
            .filter(|candidate| !candidate.remembered)
            .filter_map(|candidate| {
                let [a, b] = candidate.centres;
                self.skeleton.bond_between(a, b)
            });
        marked.clear();
        marked.extend(bonds);
    }

    fn add_stereo(&self, form: &mut CanonicalForm, labelled: &[Labelled]) {
        let rank = |atom: u32| self.written().rank[atom as usize];
        for (variable, shown) in self.variables.iter().zip(&self.claims.shown) {
            let Some(odd) = *shown else {
                continue;
            };
            for &(index, opposite) in &variable.members {
                let candidate = &self.perception.candidates[index];
                if candidate.remembered {
                    continue;
                }
                let centres = candidate.centres.map(rank);
                let mut at = 0;
                let ligands = candidate.ligands.map(|ligand| {
                    let centre = centres[at / 2];
                    at += 1;
                    self.ligand(ligand, centre, labelled)
                });
                let parity = Parity::from_odd(odd ^ opposite);
                form.stereo.push(FormStereo {
                    shape: candidate.shape,
                    centres,
                    ligands,
                    parity,
                });
            }
        }
        form.stereo.sort_unstable_by_key(|element| element.centres);
        let groups = self.claims.groups.iter();
        form.groups = groups.map(|group| group.freedom.group()).collect();
        form.groups.sort_unstable();
        for placed in &self.perception.placed {
            let centre = rank(placed.centre);
            let own = |ligand: u32| {
                if ligand < slot::HYDROGEN {
                    rank(ligand)
                } else {
                    ligand
                }
            };
            let numbers: Vec<u32> = placed.ligands.iter().map(|&ligand| own(ligand)).collect();
            let turned = placed.polyhedron.least(&numbers);
            let atoms = &self.written().order;
            let back = |number: u32| atoms.get(number as usize).copied().unwrap_or(number);
            let ligands = turned
                .into_iter()
                .map(|number| self.ligand(back(number), centre, labelled))
                .collect();
            form.coordination.push(DrawnCoordination {
                polyhedron: placed.polyhedron,
                centre,
                ligands,
            });
        }
        form.coordination.sort_by_key(|mark| mark.centre);
    }

    /// A skeleton ligand in the numbering of the form; `labelled` lists hydrogens that are atoms.
    fn ligand(&self, ligand: u32, centre: u32, labelled: &[Labelled]) -> Ligand {
        match ligand {
            slot::LONE_PAIR => Ligand::LonePair,
            slot::HYDROGEN => Ligand::Hydrogen,
            l if l > slot::HYDROGEN => {
                let mass = l - slot::HYDROGEN;
                let own = labelled
                    .iter()
                    .find(|own| own.host == centre && own.mass == mass);
                own.map_or(Ligand::Hydrogen, |own| Ligand::Atom(own.atom))
            }
            atom => Ligand::Atom(self.written().rank[atom as usize]),
        }
    }
}
