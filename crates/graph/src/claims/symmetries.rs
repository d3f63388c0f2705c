//! Small groups of automorphisms, element by element.

use std::collections::BTreeSet;

use crate::{order::Labelling, stereo::Perception};

use super::{Variable, action::Action, place::canonical_place};

/// A group of more elements is not written out.
const MOST_ELEMENTS: usize = 512;

/// What one automorphism does: per coordinate where it goes, and whether it is inverted.
type Signed = Vec<(usize, bool)>;

/// The group of all automorphisms as they act on variables, in coordinates that equal constitutions
/// share: variables by canonical place, and values by the canonical order of ligands.
#[derive(Debug)]
pub(crate) struct Symmetries {
    /// Per coordinate its variable, and whether an even value is odd there.
    coordinates: Vec<(usize, bool)>,
    elements: Vec<Signed>,
}

impl Symmetries {
    /// The group on the variables that some automorphism moves or inverts, `never` aside. `None` if it
    /// is large.
    pub(super) fn of(
        action: &Action,
        never: &[bool],
        bare: &Labelling,
        perception: &Perception,
        variables: &[Variable],
    ) -> Option<Self> {
        let touched = action.touched(variables.len());
        let moving = (0..variables.len()).filter(|&v| touched[v] && !never[v]);
        let mut places = moving
            .map(|v| {
                let (place, odd) = canonical_place(&variables[v], perception, bare)?;
                Some((place, v, odd))
            })
            .collect::<Option<Vec<_>>>()?;
        places.sort_unstable();
        let coordinates: Vec<(usize, bool)> = places.iter().map(|&(_, v, odd)| (v, odd)).collect();
        let mut at = vec![usize::MAX; variables.len()];
        for (index, &(v, _)) in coordinates.iter().enumerate() {
            at[v] = index;
        }
        let generators = action.moves.iter().map(|moves| {
            let mut own: Signed = (0..coordinates.len()).map(|index| (index, false)).collect();
            for step in moves.iter().filter(|step| !never[step.from]) {
                let (from, to) = (at[step.from], at[step.to]);
                own[from] = (to, step.inverts ^ coordinates[from].1 ^ coordinates[to].1);
            }
            own
        });
        let generators: Vec<Signed> = generators.collect();
        let elements = closure(coordinates.len(), &generators)?;
        Some(Self {
            coordinates,
            elements,
        })
    }

    /// The variables that some automorphism moves or inverts, in canonical order.
    pub(crate) fn variables(&self) -> impl Iterator<Item = usize> + '_ {
        self.coordinates.iter().map(|&(variable, _)| variable)
    }

    /// For each automorphism that leaves a variable in its place and inverts it, the other variables
    /// that it moves or inverts.
    pub(crate) fn inverting(&self, variable: usize) -> impl Iterator<Item = BTreeSet<usize>> + '_ {
        let own = self.variables().position(|other| other == variable);
        let inverts = move |element: &&Signed| own.is_some_and(|at| element[at] == (at, true));
        self.elements.iter().filter(inverts).map(move |element| {
            let changed = element
                .iter()
                .enumerate()
                .filter(move |&(at, &image)| Some(at) != own && image != (at, false));
            changed.map(|(at, _)| self.coordinates[at].0).collect()
        })
    }

    /// The least image of an assignment; equal exactly for assignments that an automorphism relates.
    pub(crate) fn least(&self, value: impl Fn(usize) -> Option<bool>) -> Vec<u64> {
        let own: Vec<Option<bool>> = self
            .coordinates
            .iter()
            .map(|&(v, odd)| value(v).map(|value| value ^ odd))
            .collect();
        let image = |element: &Signed| {
            let mut image = vec![0; own.len()];
            for (value, &(to, inverts)) in own.iter().zip(element) {
                image[to] = value.map_or(2, |value| u64::from(value ^ inverts));
            }
            image
        };
        self.elements.iter().map(image).min().unwrap_or_default()
    }
}

/// All products of some generators.
fn closure(coordinates: usize, generators: &[Signed]) -> Option<Vec<Signed>> {
    let identity: Signed = (0..coordinates).map(|index| (index, false)).collect();
    let mut seen = BTreeSet::from([identity.clone()]);
    let mut elements = vec![identity];
    let mut next = 0;
    while next < elements.len() {
        for generator in generators {
            let product: Signed = elements[next]
                .iter()
                .map(|&(to, inverts)| {
                    let (end, again) = generator[to];
                    (end, inverts ^ again)
                })
                .collect();
            if seen.insert(product.clone()) {
                elements.push(product);
            }
        }
        if elements.len() > MOST_ELEMENTS {
            return None;
        }
        next += 1;
    }
    Some(elements)
}
