//! The salt axis: counter-ions, solvents and their ratio, with the protons that make the salt.
//!
//! What is listed as a counter-ion or solvent goes, what is not is a parent. Where all is listed the parents
//! are the organic acids and bases; inorganic salts and mixtures of solvents stay as they are, save for
//! solvents of the former. Of equal parents as few are left as their ratio to each other allows. Mixtures of
//! two parents stay mixtures. The protons of what is left are settled as on the charge axis.

mod listed;

#[cfg(test)]
mod tests;

use std::collections::BTreeMap;

use molkin_graph::{Element, Key, Molecule, Orderer, Revised};

use crate::Structure;

use super::{Change, FormError, Outcome, Removed, charge, remembering};
pub use listed::{CounterIons, CounterIonsError, Kind, Listed};

/// A component of a record.
struct Component<'t> {
    /// Atoms of the record.
    atoms: Vec<u32>,
    listed: Option<&'t Listed>,
    /// A proton on its own.
    bare: bool,
    /// Key of the compound with its protons settled.
    key: Key,
}

impl Component<'_> {
    fn rank(&self) -> u8 {
        match (self.bare, self.listed) {
            (true, _) => u8::MAX,
            (_, Some(listed)) => 1 + listed.kind.rank(),
            (_, None) => 0,
        }
    }
}

/// Leaves the parents of a record. `None` for a record of one component and for one that is its parents
/// already.
pub(super) fn normalise(
    orderer: &mut Orderer,
    known: impl FnOnce() -> std::sync::Arc<CounterIons>,
    structure: &Structure,
) -> Result<Option<Outcome>, FormError> {
    if structure.molecule().is_connected() {
        return Ok(None);
    }
    let known = known();
    let mut components = Vec::new();
    for Revised { molecule, sources } in structure.molecule().components()? {
        let bare = is_bare_proton(&molecule);
        let component = Structure::new(orderer, molecule)?;
        let (constitution, key) = listed::settled_keys(orderer, &component)?;
        components.push(Component {
            atoms: sources,
            listed: known.find(constitution, key),
            bare,
            key,
        });
    }
    let removed = removed(&components);
    let mut revision = remembering(structure);
    for (component, _) in &removed {
        for &atom in &component.atoms {
            revision.remove_atom(atom);
        }
    }
    let rest = revision.finish()?;
    let mut changes: Vec<Change> = removed
        .into_iter()
        .map(|(component, what)| Change::Component {
            atoms: component.atoms.clone(),
            what,
        })
        .collect();
    let left = Structure::new(orderer, rest.molecule)?;
    let revised = match charge::normalise(orderer, &left)? {
        None => Revised {
            molecule: left.into_molecule(),
            sources: rest.sources,
        },
        Some(settled) => {
            let traced = settled.changes.into_iter();
            changes.extend(traced.map(|change| change.traced(&rest.sources)));
            settled.revised.traced(&rest.sources)
        }
    };
    Ok((!changes.is_empty()).then_some(Outcome { revised, changes }))
}

fn is_bare_proton(molecule: &Molecule) -> bool {
    let mut atoms = molecule.atoms();
    let proton = atoms
        .next()
        .is_some_and(|atom| atom.element == Element::HYDROGEN && atom.charge == 1);
    proton && molecule.atom_count() == 1
}

/// The components that go, and what each of them is.
fn removed<'c, 't>(components: &'c [Component<'t>]) -> Vec<(&'c Component<'t>, Removed)> {
    let parent = components.iter().map(Component::rank).min().unwrap_or(0);
    let mut counts: BTreeMap<[u8; 16], usize> = BTreeMap::new();
    let parents = || components.iter().filter(|own| own.rank() == parent);
    for own in parents() {
        *counts.entry(own.key.bytes()).or_default() += 1;
    }
    let ratio = counts.values().copied().reduce(divisor).unwrap_or(1);
    let mut gone = Vec::new();
    for own in components.iter().filter(|own| own.rank() != parent) {
        gone.push((
            own,
            match own.listed {
                Some(listed) => Removed::Listed(listed.clone()),
                None => Removed::Proton,
            },
        ));
    }
    let mut left: BTreeMap<[u8; 16], usize> = BTreeMap::new();
    for own in parents() {
        let seen = left.entry(own.key.bytes()).or_default();
        *seen += 1;
        let kept = counts
            .get(&own.key.bytes())
            .map_or(1, |count| count / ratio);
        if *seen > kept {
            gone.push((own, Removed::Copy));
        }
    }
    gone
}

/// The greatest common divisor (Euclid).
fn divisor(a: usize, b: usize) -> usize {
    if b == 0 { a } else { divisor(b, a % b) }
}
