//! Which stereo elements differ between two records of one constitution.

use std::collections::{HashMap, HashSet, VecDeque};

use molkin_graph::{GroupKind, Label, Ligand, Limits, Mark, Polyhedron, Shape, StereoElement};

use crate::Structure;

use super::{
    BondDifference, Explanation, coordination,
    named::{named, unfolded},
    stereo_groups::{self, Marked},
};

/// The geometry of what differs.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Hash)]
pub enum Geometry {
    /// A stereo element with two arrangements.
    Element(Shape),
    /// A centre whose ligands sit on a polyhedron.
    Coordination(Polyhedron),
}

impl Geometry {
    /// The word of the output contract.
    pub fn as_str(self) -> &'static str {
        match self {
            Self::Element(Shape::Tetrahedral) => "tetrahedral",
            Self::Element(Shape::DoubleBond) => "double-bond",
            Self::Element(Shape::Axis) => "axis",
            Self::Coordination(Polyhedron::SquarePlanar) => "square-planar",
            Self::Coordination(Polyhedron::TrigonalBipyramidal) => "trigonal-bipyramidal",
            Self::Coordination(Polyhedron::Octahedral) => "octahedral",
        }
    }
}

/// What happens to a stereo element from A to B.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Hash)]
#[non_exhaustive]
pub enum StereoChange {
    /// Both mark it, with opposite arrangements.
    Inverted,
    /// Both give an arrangement of ligands about the centre, and they are not the same.
    Rearranged,
    /// Only A marks it.
    MarkedOnlyInA,
    /// Only B marks it.
    MarkedOnlyInB,
    /// Both mark it, but in stereo groups of different kind or extent, or in a group and absolutely.
    GroupDiffers,
}

impl StereoChange {
    /// The word of the output contract.
    pub fn as_str(self) -> &'static str {
        match self {
            Self::Inverted => "inverted",
            Self::Rearranged => "rearranged",
            Self::MarkedOnlyInA => "marked-only-in-a",
            Self::MarkedOnlyInB => "marked-only-in-b",
            Self::GroupDiffers => "group-differs",
        }
    }
}

/// A stereo element that differs; atoms from 0.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct StereoDifference {
    /// Its geometry.
    pub geometry: Geometry,
    /// The centre, or both ends, in A.
    pub a: Vec<u32>,
    /// The same in B.
    pub b: Vec<u32>,
    /// What happens.
    pub change: StereoChange,
    /// The stereo groups of the mark in A and in B: kind and number.
    pub groups: [Option<(GroupKind, usize)>; 2],
    /// Its CIP labels in A and B, where it has them.
    pub labels: [Option<Label>; 2],
}

/// Work for one pair, in atoms mapped: some 4,000 maps of a hundred atoms.
const MOST_WORK: usize = 400_000;

pub(super) fn explain(a: &Structure, b: &Structure, limits: &Limits) -> Explanation {
    let (elements_a, elements_b) = (
        a.canonical().stereo_elements(),
        b.canonical().stereo_elements(),
    );
    let maps = Maps::new(a, b, &elements_a);
    let (found, least) = maps.least(|map| {
        differences(a, b, &elements_a, &elements_b, &|atom| {
            map.get(&atom).copied()
        })
    });
    let (map, mut stereo) = found;
    let labels = [
        labels(a, &elements_a, limits),
        labels(b, &elements_b, limits),
    ];
    for difference in &mut stereo {
        let places = [&difference.a, &difference.b];
        difference.labels = [0, 1].map(|side| labels[side].get(places[side]).copied());
    }
    let mut atom_map: Vec<(u32, u32)> = map.into_iter().collect();
    atom_map.sort_unstable();
    let form = a.canonical().normal_form();
    let heavy = |at: u32| form.atoms[at as usize].element != molkin_graph::Element::HYDROGEN;
    let kept = form
        .bonds
        .iter()
        .filter(|bond| heavy(bond.a) && heavy(bond.b))
        .count();
    let hydrogen: HashSet<u32> = form
        .atoms
        .iter()
        .filter(|atom| atom.element == molkin_graph::Element::HYDROGEN)
        .map(|atom| atom.source)
        .collect();
    atom_map.retain(|(atom, _)| !hydrogen.contains(atom));
    Explanation {
        atom_map,
        bonds: Some(BondDifference {
            kept,
            minimal: true,
            unrelated: Some(false),
            ..BondDifference::default()
        }),
        stereo,
        stereo_least: least,
        ..Explanation::default()
    }
}

/// The CIP labels of a record by centre or ends.
fn labels(
    structure: &Structure,
    elements: &[StereoElement],
    limits: &Limits,
) -> HashMap<Vec<u32>, Label> {
    let labels = structure.canonical().labels(limits);
    let labelled = elements.iter().zip(labels);
    labelled
        .filter_map(|(element, labelling)| Some((distinct(element.centres), labelling.label()?)))
        .collect()
}

/// The maps from A to B that keep the constitution: one of them, and the automorphisms of B.
struct Maps {
    /// Atom of A and position in B.
    start: Vec<(u32, u32)>,
    /// Atoms of B by position.
    sources: Vec<u32>,
    /// Positions that each moves, with their images.
    automorphisms: Vec<Vec<(u32, u32)>>,
    /// Positions in B that centres and ligands of A's elements start at.
    relevant: Vec<u32>,
}

type Found = (HashMap<u32, u32>, Vec<StereoDifference>);

impl Maps {
    fn new(a: &Structure, b: &Structure, elements: &[StereoElement]) -> Self {
        let (form_a, form_b) = (a.canonical().normal_form(), b.canonical().normal_form());
        let (order_a, order_b) = (
            a.canonical().constitution_order(),
            b.canonical().constitution_order(),
        );
        let start: Vec<(u32, u32)> = order_a
            .iter()
            .zip(&order_b)
            .map(|(&x, &y)| (form_a.atoms[x as usize].source, y))
            .collect();
        let sources = form_b.atoms.iter().map(|atom| atom.source).collect();
        let named: HashSet<u32> = elements
            .iter()
            .flat_map(|element| {
                let ligands = element.ligands.iter().filter_map(|ligand| match ligand {
                    Ligand::Atom(atom) => Some(*atom),
                    _ => None,
                });
                ligands.chain(element.centres)
            })
            .collect();
        let relevant = start
            .iter()
            .filter(|(atom, _)| named.contains(atom))
            .map(|&(_, at)| at)
            .collect();
        Self {
            start,
            sources,
            automorphisms: b.canonical().automorphisms(),
            relevant,
        }
    }

    /// The first map, in the order in which automorphisms compose, with the fewest differences; and
    /// whether all maps that matter were looked at. Maps that send centres and ligands of A's
    /// elements to the same atoms give the same differences, so one of each kind is looked at.
    fn least(&self, judge: impl Fn(&HashMap<u32, u32>) -> Vec<StereoDifference>) -> (Found, bool) {
        let compose = |images: &[u32]| -> HashMap<u32, u32> {
            self.start
                .iter()
                .map(|&(atom, at)| (atom, self.sources[images[at as usize] as usize]))
                .collect()
        };
        let identity: Vec<u32> = (0..self.sources.len() as u32).collect();
        let map = compose(&identity);
        let differences = judge(&map);
        let mut best = (map, differences);
        let shadow = |images: &[u32]| -> Vec<u32> {
            self.relevant
                .iter()
                .map(|&at| images[at as usize])
                .collect()
        };
        let most = (MOST_WORK / (self.sources.len() + 1)).max(2);
        let mut seen = HashSet::from([shadow(&identity)]);
        let mut queue = VecDeque::from([identity]);
        while let Some(images) = queue.pop_front() {
            for generator in &self.automorphisms {
                let next: Vec<u32> = images.iter().map(|&at| image(generator, at)).collect();
                if seen.len() >= most {
                    return (best, false);
                }
                if !seen.insert(shadow(&next)) {
                    continue;
                }
                let map = compose(&next);
                let differences = judge(&map);
                if differences.len() < best.1.len() {
                    best = (map, differences);
                }
                queue.push_back(next);
            }
        }
        (best, true)
    }
}

/// The image of a position.
fn image(automorphism: &[(u32, u32)], at: u32) -> u32 {
    match automorphism.binary_search_by_key(&at, |&(from, _)| from) {
        Ok(found) => automorphism[found].1,
        Err(_) => at,
    }
}

fn differences(
    a: &Structure,
    b: &Structure,
    in_a: &[StereoElement],
    in_b: &[StereoElement],
    image: &dyn Fn(u32) -> Option<u32>,
) -> Vec<StereoDifference> {
    let sorted = |[x, y]: [u32; 2]| (x.min(y), x.max(y));
    let mut rest: HashMap<(u32, u32), &StereoElement> = in_b
        .iter()
        .map(|element| (sorted(element.centres), element))
        .collect();
    let mut found = Vec::new();
    let mut marked = Vec::new();
    for element in in_a {
        let Some([x, y]) = both(element.centres.map(image)) else {
            continue;
        };
        let other = rest.remove(&sorted([x, y]));
        let difference = |change| StereoDifference {
            geometry: Geometry::Element(element.shape),
            a: distinct(element.centres),
            b: distinct([x, y]),
            change,
            groups: [element.group, other.and_then(|o| o.group)],
            labels: [None; 2],
        };
        match (element.mark, other.map(|o| (o, o.mark))) {
            (Mark::Given(_), Some((other, Mark::Given(_)))) => marked.push(Marked {
                opposed: opposed(a, b, element, other, image),
                difference: difference(StereoChange::Inverted),
            }),
            (Mark::Given(_), _) => found.push(difference(StereoChange::MarkedOnlyInA)),
            (Mark::Absent, Some((_, Mark::Given(_)))) => {
                found.push(difference(StereoChange::MarkedOnlyInB));
            }
            (Mark::Absent, _) => {}
        }
    }
    found.extend(stereo_groups::differences(marked));
    let inverse: HashMap<u32, u32> = if rest.is_empty() {
        HashMap::new()
    } else {
        (0..a.molecule().atom_count() as u32)
            .filter_map(|x| Some((image(x)?, x)))
            .collect()
    };
    let inverse = |atom: u32| inverse.get(&atom).copied();
    for element in in_b
        .iter()
        .filter(|e| rest.contains_key(&sorted(e.centres)))
    {
        let Some(back) = both(element.centres.map(inverse)) else {
            continue;
        };
        if element.mark != Mark::Absent {
            found.push(StereoDifference {
                geometry: Geometry::Element(element.shape),
                a: distinct(back),
                b: distinct(element.centres),
                change: StereoChange::MarkedOnlyInB,
                groups: [None, element.group],
                labels: [None; 2],
            });
        }
    }
    found.extend(coordination::differences(a, b, image));
    found.sort_by(|x, y| x.a.cmp(&y.a));
    found
}

fn both([x, y]: [Option<u32>; 2]) -> Option<[u32; 2]> {
    Some([x?, y?])
}

fn distinct([x, y]: [u32; 2]) -> Vec<u32> {
    if x == y {
        vec![x]
    } else {
        vec![x.min(y), x.max(y)]
    }
}

/// Whether two marks of the same element say opposite things.
fn opposed(
    a: &Structure,
    b: &Structure,
    element: &StereoElement,
    other: &StereoElement,
    image: &dyn Fn(u32) -> Option<u32>,
) -> bool {
    let (Mark::Given(first), Mark::Given(second)) = (element.mark, other.mark) else {
        return false;
    };
    let mut ours = element.ligands.map(|ligand| named(a, ligand, image));
    let theirs = other
        .ligands
        .map(|ligand| named(b, ligand, &|atom| unfolded(b, atom)));
    let one_centre = element.centres[0] == element.centres[1];
    if !one_centre && image(element.centres[0]) != Some(other.centres[0]) {
        ours = [ours[2], ours[3], ours[0], ours[1]];
    }
    let mut order = [0usize; 4];
    for (at, place) in order.iter_mut().enumerate() {
        // Both ends of a double bond may have a hydrogen: look within the end.
        let range = if one_centre {
            0..4
        } else {
            at / 2 * 2..at / 2 * 2 + 2
        };
        *place = range.clone().find(|&i| theirs[i] == ours[at]).unwrap_or(at);
    }
    let mut odd = first != second;
    for i in 0..4 {
        for j in i + 1..4 {
            odd ^= order[i] > order[j];
        }
    }
    odd
}
