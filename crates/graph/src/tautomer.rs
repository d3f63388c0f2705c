//! The tautomers of a compound: one class, and one of them to stand for it.
//!
//! Hydrogens on heteroatoms, and on carbons that exchange hydrogen with these, are mobile within a
//! conjugated region ([`region`]). A class is settled by the σ skeleton, the places that can bear mobile
//! hydrogen, and their number in each region; its members are perfect matchings. Which of them stands
//! for the class is decided in the canonical order of the class itself ([`placement`]), so that it should not depend on
//! the tautomer that came in. It does so for a few records (docs/definitions.md, Tautomers).

mod placement;
mod region;
mod room;
mod rules;

use crate::{
    Canonical, Limits, Molecule, OrderError, Orderer,
    matching::{Matching, NONE},
    mesomer::{AtomState, MOBILE},
};

use placement::Placement;
use region::Regions;
use room::{Drawing, Room, pi};

/// Scratch that is reused from one molecule to the next.
#[derive(Debug, Default)]
pub(crate) struct Scratch {
    view: Canonical,
    drawing: Drawing,
    rank: Vec<u32>,
    rooms: Vec<Room>,
    regions: Regions,
    matching: Matching,
    placement: Placement,
}

/// An atom of the tautomer that stands for the class, where hydrogens, charges or bonds may differ from
/// what was drawn.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub struct TautomerAtom {
    /// The atom's index in the molecule.
    pub atom: u32,
    /// All its hydrogens.
    pub hydrogens: u8,
    /// Its charge.
    pub charge: i8,
}

/// The tautomer that stands for all of a class.
#[derive(Debug, Clone, Default, PartialEq, Eq)]
pub struct Tautomer {
    /// The atoms of all regions of mobile hydrogen.
    pub atoms: Vec<TautomerAtom>,
    /// The bonds between them: both ends and the number of electron pairs.
    pub bonds: Vec<(u32, u32, u8)>,
    /// Centres and double bonds (atoms in ascending order) that bear a mark here and cannot in some
    /// other tautomer.
    pub erased: Vec<[u32; 2]>,
}

impl Orderer {
    /// The tautomer that stands for the class of this one; `None` where no hydrogen is mobile.
    ///
    /// # Errors
    /// As [`Orderer::order`].
    ///
    /// # Complexity
    /// A few searches for alternating paths and one canonical order; polynomial but for the latter.
    pub fn tautomer(&mut self, molecule: &Molecule) -> Result<Option<Tautomer>, OrderError> {
        let mut scratch = std::mem::take(&mut self.tautomer);
        let found = scratch.tautomer(self, molecule);
        self.tautomer = scratch;
        found
    }
}

impl Scratch {
    fn tautomer(
        &mut self,
        orderer: &mut Orderer,
        molecule: &Molecule,
    ) -> Result<Option<Tautomer>, OrderError> {
        orderer.perceive(molecule, &mut self.view)?;
        let limits = orderer.limits;
        self.find(&limits)?;
        let atoms = 0..self.rooms.len() as u32;
        if !atoms.into_iter().any(|atom| self.moves(atom)) {
            return Ok(None);
        }
        let erased = self.erased(molecule);
        self.fold();
        orderer.order_perceived(molecule, &mut self.view)?;
        let mut tautomer = self.place();
        tautomer.erased = erased;
        if self.matching.is_exhausted() {
            return Err(OrderError::StepLimit {
                limit: limits.order_steps,
            });
        }
        Ok(Some(tautomer))
    }

    /// Finds the regions and their sites.
    fn find(&mut self, limits: &Limits) -> Result<(), OrderError> {
        let Self {
            view,
            drawing,
            rank,
            rooms,
            regions,
            matching,
            ..
        } = self;
        let (skeleton, mesomer) = (&view.skeleton, &view.mesomer);
        drawing.load(skeleton, mesomer, rank);
        matching.work = 0;
        matching.budget = limits.order_steps / 4;
        room::load(rooms, skeleton, mesomer, drawing);
        let negative = |rooms: &[Room]| rooms.iter().filter(|room| room.negative).count();
        let mut left = usize::MAX;
        loop {
            // Each round cancels a charge, or none is left to cancel.
            let cancelling = negative(rooms) < left;
            left = negative(rooms);
            if !regions.find(skeleton, drawing, rooms, cancelling, (matching, limits))? {
                return Ok(());
            }
            placement::redraw(skeleton, (rooms, regions), matching, drawing);
            room::load(rooms, skeleton, mesomer, drawing);
        }
    }

    /// Whether an atom is in a region in which hydrogen moves.
    fn moves(&self, atom: u32) -> bool {
        let region = self.regions.region[atom as usize];
        region != NONE && self.regions.mobile[region as usize]
    }

    /// Makes the view that of the class: in regions of mobile hydrogen all bonds are mobile, sites bear
    /// the number of hydrogens and the charge of their region, and no hydrogen that can move.
    fn fold(&mut self) {
        for atom in 0..self.rooms.len() as u32 {
            if !self.moves(atom) {
                continue;
            }
            let at = atom as usize;
            let room = &self.rooms[at];
            let hydrogens =
                region::mobile_hydrogens(&self.view.skeleton, &self.drawing, &self.rooms, atom);
            let record = &mut self.view.skeleton.atoms[at];
            record.hydrogens = self.drawing.hydrogens[at] - hydrogens as u8;
            record.charge = 0;
            self.view.mesomer.states[at] = AtomState {
                charge: 0,
                open: room.vertices,
                mobile: room.site,
                system: self.regions.totals(atom),
            };
        }
        let ends = self.view.skeleton.bonds.iter();
        let inside: Vec<bool> = ends
            .zip(&self.regions.shifts)
            .map(|(bond, &shifts)| shifts && self.moves(bond.a) && self.moves(bond.b))
            .collect();
        for (order, inside) in self.view.mesomer.orders.iter_mut().zip(inside) {
            if inside {
                *order = MOBILE;
            }
        }
    }

    /// Marks of places that some tautomer lacks.
    fn erased(&mut self, molecule: &Molecule) -> Vec<[u32; 2]> {
        let mut erased = Vec::new();
        let marks = molecule.drawn_stereo().iter();
        for mark in marks.chain(molecule.remembered_stereo()) {
            let [a, b] = mark.centres;
            let homes = [a, b].map(|atom| self.view.skeleton.home[atom as usize]);
            let [x, y] = homes;
            if x == NONE || y == NONE || !self.moves(x) || !self.moves(y) {
                continue;
            }
            let lacks = if x == y {
                self.rooms[x as usize].site
            } else {
                self.varies(x, y)
            };
            let place = [a.min(b), a.max(b)];
            if lacks && !erased.contains(&place) {
                erased.push(place);
            }
        }
        erased
    }

    /// Whether some tautomer has no π bond between two atoms.
    fn varies(&mut self, a: u32, b: u32) -> bool {
        let Self {
            regions,
            rooms,
            matching,
            ..
        } = self;
        let others = regions.vertices(rooms, b);
        let mut vertices = regions.vertices(rooms, a);
        let Some(x) = vertices.find(|&v| others.contains(&matching.mate(v))) else {
            return true;
        };
        matching.part(x);
        matching.block(Some((a, b)));
        let varies = matching.augment(x);
        matching.block(None);
        matching.undo_to(0);
        varies
    }

    fn place(&mut self) -> Tautomer {
        let members = (0..self.rooms.len() as u32).filter(|&atom| self.moves(atom));
        let members: Vec<u32> = members.collect();
        let Self {
            view,
            drawing,
            rooms,
            regions,
            matching,
            placement,
            ..
        } = self;
        placement.place(view, (rooms, regions), &members, matching);
        let skeleton = &view.skeleton;
        let source = |atom: u32| skeleton.atoms[atom as usize].source;
        let mut tautomer = Tautomer::default();
        for &atom in &members {
            let (hydrogens, charge) = placement::state(regions, rooms, matching, atom);
            tautomer.atoms.push(TautomerAtom {
                atom: source(atom),
                hydrogens: skeleton.atoms[atom as usize].hydrogens + hydrogens,
                charge,
            });
        }
        for ((bond, &shifts), &drawn) in skeleton
            .bonds
            .iter()
            .zip(&regions.shifts)
            .zip(&drawing.orders)
        {
            let inside = [bond.a, bond.b]
                .iter()
                .all(|atom| members.binary_search(atom).is_ok());
            if inside {
                let order = if shifts {
                    1 + placement::multiplicity(regions, rooms, matching, bond.a, bond.b)
                } else {
                    1 + pi(drawn)
                };
                tautomer.bonds.push((source(bond.a), source(bond.b), order));
            }
        }
        tautomer
    }
}
