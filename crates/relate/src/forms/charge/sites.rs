//! Which atom takes a proton, or gives one, when the charge of a cluster is settled.

use molkin_graph::Element;

use super::{
    clusters::Cluster,
    view::{View, is_chalcogen},
};

/// Atoms that may take up one proton more (`change` 1) or give one (−1): what one cluster can do.
#[derive(Debug)]
pub(super) struct Choice {
    pub(super) change: i8,
    /// Positions, ascending; at least one.
    pub(super) atoms: Vec<u32>,
    /// A ring nitrogen without hydrogens bears the positive charge as well, as in N-alkylaminopyridinium:
    /// a proton may go only where it leaves the ring aromatic.
    pub(super) quaternary: bool,
}

impl Choice {
    /// What a cluster can do about its charge; `None` where it is settled or fixed.
    pub(super) fn of(view: &View, cluster: &Cluster) -> Option<Self> {
        let (change, mut atoms) = match cluster.charge {
            0 => return None,
            1.. => (-1, donors(view, cluster)),
            _ => (1, acceptors(view, cluster)),
        };
        atoms.sort_unstable();
        atoms.dedup();
        let carbon = |at: u32| view.site(at).element == Element::CARBON;
        if atoms.iter().any(|&at| !carbon(at)) {
            atoms.retain(|&at| !carbon(at));
        } else if atoms
            .iter()
            .any(|&at| view.site(at).orbit != view.site(atoms[0]).orbit)
        {
            // A charge that is mobile over unlike carbons: no rule says which of them takes the proton.
            return None;
        }
        let quaternary = cluster.atoms.iter().any(|&at| {
            let site = view.site(at);
            change < 0
                && site.element == Element::NITROGEN
                && site.in_ring
                && site.mobile
                && site.bonds.len() == 3
        });
        (!atoms.is_empty()).then_some(Self {
            change,
            atoms,
            quaternary,
        })
    }

    /// The atom, if the constitution relates all of them: any is as good as the first.
    pub(super) fn settled(&self, view: &View) -> Option<u32> {
        let (&first, rest) = self.atoms.split_first()?;
        let orbit = view.site(first).orbit;
        if self.quaternary {
            return None;
        }
        rest.iter()
            .all(|&at| view.site(at).orbit == orbit)
            .then_some(first)
    }

    /// One atom of each orbit.
    pub(super) fn representatives(&self, view: &View) -> Vec<u32> {
        let mut orbits = Vec::new();
        let mut found = Vec::new();
        for &at in &self.atoms {
            let orbit = view.site(at).orbit;
            if !orbits.contains(&orbit) {
                orbits.push(orbit);
                found.push(at);
            }
        }
        found
    }
}

/// Charged heteroatoms with a hydrogen; or the hydroxy group on a charged atom without any (N-oxides).
fn donors(view: &View, cluster: &Cluster) -> Vec<u32> {
    let acidic = |at: u32| {
        let site = view.site(at);
        site.hydrogens > 0
            && (site.charge > 0 || site.mobile)
            && !matches!(site.element, Element::CARBON | Element::HYDROGEN)
            && !site.element.is_metal()
    };
    let atoms = cluster.atoms.iter().copied();
    let own: Vec<u32> = atoms.clone().filter(|&at| acidic(at)).collect();
    if !own.is_empty() {
        return own;
    }
    let hydroxy = atoms
        .filter(|&at| view.site(at).charge > 0 && !view.site(at).element.is_metal())
        .flat_map(|at| view.site(at).bonds.iter())
        .filter(|bond| {
            let other = view.site(bond.to);
            is_chalcogen(other.element) && other.hydrogens > 0 && other.charge == 0
        });
    hydroxy.map(|bond| bond.to).collect()
}

/// Negative atoms with room for a hydrogen, places that a mobile charge can be at, and oxo groups beside
/// an anionic one of the same phosphorus or sulfur, which the charge-separated form makes equal.
fn acceptors(view: &View, cluster: &Cluster) -> Vec<u32> {
    let negative = |at: u32| {
        let site = view.site(at);
        site.charge < 0 && !site.mobile && site.has_room()
    };
    let mut found: Vec<u32> = cluster
        .atoms
        .iter()
        .copied()
        .filter(|&at| negative(at) || can_take(view, at))
        .collect();
    for at in found.clone() {
        for (centre, _) in view.neighbours(at) {
            if !is_chalcogen(view.site(at).element)
                || matches!(centre.element, Element::CARBON | Element::NITROGEN)
            {
                continue;
            }
            let oxo = centre.bonds.iter().filter(|bond| {
                let other = view.site(bond.to);
                bond.order == 2 && is_chalcogen(other.element) && other.bonds.len() == 1
            });
            found.extend(oxo.map(|bond| bond.to));
        }
    }
    found
}

fn can_take(view: &View, at: u32) -> bool {
    let site = view.site(at);
    site.mobile
        && matches!(
            site.element.symbol(),
            "C" | "N" | "O" | "P" | "S" | "Se" | "Te"
        )
}
