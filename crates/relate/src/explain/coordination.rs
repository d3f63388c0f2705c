//! Which arrangements about centres that are not tetrahedral differ.

use molkin_graph::DrawnCoordination;

use crate::Structure;

use super::{
    Geometry, StereoChange, StereoDifference,
    named::{Named, named, unfolded},
};

pub(super) fn differences(
    a: &Structure,
    b: &Structure,
    image: &dyn Fn(u32) -> Option<u32>,
) -> Vec<StereoDifference> {
    let in_a = a.canonical().coordination_elements();
    let in_b = b.canonical().coordination_elements();
    let mut found = Vec::new();
    for element in &in_a {
        let Some(to) = image(element.centre) else {
            continue;
        };
        let other = in_b.iter().find(|other| other.centre == to);
        let change = match other {
            None => StereoChange::MarkedOnlyInA,
            Some(other) if is_same(a, b, element, other, image) => continue,
            Some(_) => StereoChange::Rearranged,
        };
        found.push(difference(element, element.centre, to, change));
    }
    let back =
        |atom: u32| (0..a.molecule().atom_count() as u32).find(|&from| image(from) == Some(atom));
    for element in &in_b {
        let Some(from) = back(element.centre) else {
            continue;
        };
        if !in_a.iter().any(|other| other.centre == from) {
            let change = StereoChange::MarkedOnlyInB;
            found.push(difference(element, from, element.centre, change));
        }
    }
    found
}

fn difference(
    element: &DrawnCoordination,
    a: u32,
    b: u32,
    change: StereoChange,
) -> StereoDifference {
    let geometry = Geometry::Coordination(element.polyhedron);
    StereoDifference {
        geometry,
        a: vec![a],
        b: vec![b],
        change,
        groups: [None, None],
        labels: [None; 2],
    }
}

fn is_same(
    a: &Structure,
    b: &Structure,
    element: &DrawnCoordination,
    other: &DrawnCoordination,
    image: &dyn Fn(u32) -> Option<u32>,
) -> bool {
    let ours: Vec<Named> = element
        .ligands
        .iter()
        .map(|&l| named(a, l, image))
        .collect();
    let own = |atom: u32| unfolded(b, atom);
    let theirs: Vec<Named> = other.ligands.iter().map(|&l| named(b, l, &own)).collect();
    element.polyhedron == other.polyhedron && element.polyhedron.is_same(&ours, &theirs)
}
