//! The charge axis: the protonation states of one compound.
//!
//! Every acid gets its proton, every onium ion gives its own, as far as protons can do it. What is left
//! are charges that no proton takes away: quaternary ions, metals, BF4−. Those are balanced by the
//! strongest acids, or bases, of the record, so that a betaine stays an inner salt and sodium acetate
//! keeps its acetate. Nothing depends on which protonation state was drawn: the charges of the drawing
//! are settled first, then balanced anew.

mod clusters;
mod sites;
mod strength;
mod view;

#[cfg(test)]
mod tests;

use std::cmp::Reverse;

use molkin_graph::{Canonical, Element, Molecule, Orderer, Revised};

use crate::{PrepareError, Structure, constitution::Constitution, groups::aromatic};

use super::{Axis, Change, FormError, Outcome, remembering};
use clusters::{Cluster, clusters};
use sites::Choice;
use view::View;

/// Settles the protons of a record. `None` where it is settled already.
pub(super) fn normalise(
    orderer: &mut Orderer,
    structure: &Structure,
) -> Result<Option<Outcome>, FormError> {
    if is_settled_at_sight(structure.molecule()) {
        return Ok(None);
    }
    let mut work = Work::new(orderer, structure)?;
    work.remove_bare_protons()?;
    work.neutralise()?;
    work.balance()?;
    if work.canonical.same_compound(structure.canonical()) {
        return Ok(None);
    }
    Ok(Some(work.finish()?))
}

/// Whether every charge stands beside its opposite on a heteroatom, as in nitro groups and N-oxides: a
/// record of which the rest is neutral has nothing to settle.
fn is_settled_at_sight(molecule: &Molecule) -> bool {
    let charge = |at: u32| molecule.atom(at).map_or(0, |atom| i32::from(atom.charge));
    let cancels = |at: u32| {
        let own = charge(at);
        let opposite = |other: &u32| charge(*other) * own < 0;
        let neighbours = || molecule.neighbours(at).map(|(other, _)| other);
        let sum: i32 = neighbours().filter(opposite).map(charge).sum();
        own > 0 && own + sum == 0 || own == -1 && neighbours().filter(opposite).count() == 1
    };
    let mut atoms = (0..).zip(molecule.atoms());
    atoms.all(|(at, atom)| {
        atom.charge == 0 || (cancels(at) && (atom.charge > 0 || atom.element != Element::CARBON))
    })
}

/// A record on its way.
struct Work<'s> {
    orderer: &'s mut Orderer,
    structure: &'s Structure,
    /// Per atom of the record: protons added so far.
    protons: Vec<i8>,
    removed: Vec<u32>,
    revised: Revised,
    canonical: Canonical,
}

impl<'s> Work<'s> {
    fn new(orderer: &'s mut Orderer, structure: &'s Structure) -> Result<Self, FormError> {
        let mut work = Self {
            orderer,
            structure,
            protons: vec![0; structure.molecule().atom_count()],
            removed: Vec::new(),
            revised: Revised::default(),
            canonical: Canonical::default(),
        };
        work.rebuild()?;
        Ok(work)
    }

    fn drawn(&self) -> Result<Revised, FormError> {
        let mut revision = remembering(self.structure);
        for (atom, &change) in (0..).zip(&self.protons) {
            revision.set_protons(atom, change);
        }
        for &atom in &self.removed {
            revision.remove_atom(atom);
        }
        Ok(revision.finish()?)
    }

    fn rebuild(&mut self) -> Result<(), FormError> {
        self.revised = self.drawn()?;
        let canonical = self.orderer.order(&self.revised.molecule);
        self.canonical = canonical.map_err(PrepareError::from)?;
        Ok(())
    }

    /// Adds protons to the atom at a position of the view.
    fn put(&mut self, view: &View, at: u32, change: i8) {
        let source = view.site(at).source as usize;
        if let Some(&atom) = self.revised.sources.get(source) {
            self.protons[atom as usize] = self.protons[atom as usize].saturating_add(change);
        }
    }

    /// H+ on its own is a proton that has found no base yet.
    fn remove_bare_protons(&mut self) -> Result<(), FormError> {
        let molecule = self.structure.molecule();
        let atoms = (0..).zip(molecule.atoms());
        let bare = atoms.filter(|&(at, atom)| {
            atom.element == Element::HYDROGEN
                && atom.charge == 1
                && atom.hydrogens == 0
                && molecule.neighbours(at).next().is_none()
        });
        let bare: Vec<u32> = bare.map(|(at, _)| at).collect();
        if bare.is_empty() || bare.len() == molecule.atom_count() {
            return Ok(());
        }
        self.removed = bare;
        self.rebuild()
    }

    /// Settles all clusters. Each round takes a unit of charge from some cluster, so there are as many
    /// rounds at most as there are charges, drawn or in the normal form. More mean that some round took
    /// none, as where deuterium is all that an atom could give: then there is no form.
    fn neutralise(&mut self) -> Result<(), FormError> {
        let drawn = self.structure.molecule().atoms();
        let drawn: u32 = drawn
            .map(|atom| u32::from(atom.charge.unsigned_abs()))
            .sum();
        let charges = drawn + total_charge(&View::of(&self.canonical));
        for _ in 0..=charges {
            let view = View::of(&self.canonical);
            let found = clusters(&view);
            let mut choices: Vec<Choice> = found
                .iter()
                .filter_map(|cluster| Choice::of(&view, cluster))
                .collect();
            // By the constitution first: isotopes and stereo must not steer a proton.
            choices.sort_by_key(|choice| choice.atoms.iter().map(|&at| view.site(at).orbit).min());
            let mut moved = false;
            for choice in &choices {
                if let Some(at) = choice.settled(&view) {
                    let at = self.drawn_carbanion(&view, choice).unwrap_or(at);
                    self.put(&view, at, choice.change);
                    moved = true;
                }
            }
            if !moved {
                for choice in &choices {
                    if let Some(at) = self.best(&view, choice)? {
                        self.put(&view, at, choice.change);
                        moved = true;
                        break;
                    }
                }
            }
            if !moved {
                return Ok(());
            }
            self.rebuild()?;
        }
        Err(FormError::Unsettled { axis: Axis::Charge })
    }

    /// Among equal carbons of a mobile anion the one that bears the charge as drawn: another could not take
    /// the proton without a shift of double bonds.
    fn drawn_carbanion(&self, view: &View, choice: &Choice) -> Option<u32> {
        let drawn = |at: u32| self.revised.molecule.atom(view.site(at).source);
        let mut atoms = choice.atoms.iter().copied();
        atoms.find(|&at| {
            drawn(at).is_some_and(|atom| atom.element == Element::CARBON && atom.charge < 0)
        })
    }

    /// The atom of a choice, if any will do, that makes the most customary molecule: acids, esters and amides
    /// kept, most of it aromatic, imines within rings, the most hydrogens where one is lost, the most
    /// symmetric. The canonical order decides what is left.
    fn best(&mut self, view: &View, choice: &Choice) -> Result<Option<u32>, FormError> {
        let total = total_charge(view);
        let before = aromatic_bonds(&self.canonical);
        let mut best = None;
        for at in choice.representatives(view) {
            let kept = self.protons.clone();
            self.put(view, at, choice.change);
            let trial = self.drawn()?;
            self.protons = kept;
            let canonical = self.orderer.order(&trial.molecule);
            let canonical = canonical.map_err(PrepareError::from)?;
            let after = View::of(&canonical);
            let aromatic = aromatic_bonds(&canonical);
            if total_charge(&after) >= total || choice.quaternary && aromatic < before {
                continue;
            }
            let site = view.site(at);
            let order = (
                Reverse(after.acyl_groups()),
                Reverse(aromatic),
                choice.change < 0 && !site.in_ring,
                Reverse(site.hydrogens),
                after.orbit_count(),
                site.element,
                site.orbit,
                at,
            );
            if best.as_ref().is_none_or(|(known, _)| order < *known) {
                best = Some((order, at));
            }
        }
        Ok(best.map(|(_, at)| at))
    }

    /// Balances the charges that protons could not take away.
    fn balance(&mut self) -> Result<(), FormError> {
        let view = View::of(&self.canonical);
        let left = clusters(&view);
        let fixed: i32 = left.iter().map(|cluster| cluster.charge).sum();
        let metals = metal_charge(&view, &left);
        for done in 0..fixed.abs() {
            let view = View::of(&self.canonical);
            let found = if fixed > 0 {
                let class = |at| self.acidity(&view, at);
                let strongest = strongest(&view, class);
                strongest.filter(|&(class, _)| class <= strength::LAST_STRONG || done < metals)
            } else {
                strongest(&view, |at| strength::basicity(&view, at))
            };
            let Some((_, at)) = found else {
                return Ok(());
            };
            self.put(&view, at, if fixed > 0 { -1 } else { 1 });
            self.rebuild()?;
        }
        Ok(())
    }

    fn acidity(&self, view: &View, at: u32) -> Option<u8> {
        let class = strength::acidity(view, at);
        let site = view.site(at);
        let drawn = self.revised.sources.get(site.source as usize);
        let added = drawn.is_some_and(|&atom| self.protons[atom as usize] > 0);
        class.or((added && site.hydrogens > 0 && site.charge <= 0).then_some(strength::DRAWN_ANION))
    }

    fn finish(self) -> Result<Outcome, FormError> {
        let moved = (0..).zip(&self.protons).filter(|&(_, &change)| change != 0);
        let moved = moved.map(|(atom, &change)| Change::Protons { atom, change });
        let bare = self.removed.iter();
        let bare = bare.map(|&atom| Change::Protons { atom, change: -1 });
        Ok(Outcome {
            changes: moved.chain(bare).collect(),
            revised: self.revised,
        })
    }
}

/// The strongest acid or base: least class, then canonical order of the constitution, then of the record.
fn strongest(view: &View, class: impl Fn(u32) -> Option<u8>) -> Option<(u8, u32)> {
    let classed = view.positions().filter_map(|at| Some((class(at)?, at)));
    classed.min_by_key(|&(class, at)| (class, view.site(at).orbit, at))
}

fn aromatic_bonds(canonical: &Canonical) -> usize {
    let aromatic = aromatic::aromatic_bonds(&Constitution::of_view(canonical));
    aromatic.into_iter().filter(|&aromatic| aromatic).count()
}

fn total_charge(view: &View) -> u32 {
    let charges = view.sites.iter();
    charges
        .map(|site| u32::from(site.charge.unsigned_abs()))
        .sum()
}

/// Charge of metal ions: against them weak acids are anions as well (sodium ethoxide).
fn metal_charge(view: &View, clusters: &[Cluster]) -> i32 {
    let of_metal = |cluster: &&Cluster| {
        let mut atoms = cluster.atoms.iter();
        cluster.charge > 0 && atoms.any(|&at| view.site(at).element.is_metal())
    };
    clusters
        .iter()
        .filter(of_metal)
        .map(|cluster| cluster.charge)
        .sum()
}
