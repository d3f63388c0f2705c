//! What the trade calls the place of a substituent: ortho, alpha, on a tertiary carbon.

use molkin_graph::Element;

use super::{
    frame::{Frame, Graph, MOBILE},
    substituent::Substituent,
};

/// Where a substituent sits, relative to something else in the record.
#[derive(Debug, Clone, PartialEq, Eq)]
pub enum Place {
    /// On a benzene ring: so many bonds along the ring from another substituent.
    OnBenzene {
        /// 1 for ortho, 2 for meta, 3 for para.
        distance: u8,
        /// The other substituent.
        to: Neighbour,
    },
    /// On a chain or a saturated ring: so many bonds from an atom with another such substituent.
    BesideAlike {
        /// 0 for geminal, 1 for vicinal.
        distance: u8,
        /// The other substituent.
        to: Neighbour,
    },
    /// On a saturated carbon so many bonds from a carbonyl carbon, or on that carbon.
    FromCarbonyl {
        /// 0 for the carbonyl carbon, 1 for alpha, and so on.
        distance: u8,
        /// The carbonyl carbon.
        carbonyl: u32,
        /// Whether the record has no other carbonyl group.
        only: bool,
    },
    /// On a pyridine ring, so many bonds from its nitrogen.
    OnPyridine {
        /// 1 for alpha, 2 for beta, 3 for gamma.
        distance: u8,
        /// The nitrogen.
        nitrogen: u32,
    },
    /// On a carbon with so many other carbons: 1 for primary.
    OnCarbon {
        /// Carbon neighbours.
        degree: u8,
    },
}

/// A substituent that a place is told by.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct Neighbour {
    /// Its first atom.
    pub atom: u32,
    /// Its name, where it has one.
    pub name: Option<&'static str>,
    /// Whether no other substituent there has this name, so that the name alone tells it.
    pub only: bool,
}

/// A substituent on one side: the atom that bears it, and its own atoms, all on the common numbering.
pub(super) struct Seat<'s> {
    pub(super) atom: u32,
    pub(super) group: &'s [u32],
    pub(super) name: Option<&'static str>,
}

/// The places of a substituent in both records, by the same yardstick where one holds for both.
pub(super) fn places(frame: &Frame, seats: [&Seat<'_>; 2]) -> [Option<Place>; 2] {
    if let Some(both) = on_one_benzene(frame, seats) {
        return both.map(Some);
    }
    [0, 1].map(|side| {
        let seat = seats[side];
        on_benzene(frame, side, seat)
            .or_else(|| beside_alike(frame, side, seat))
            .or_else(|| on_pyridine(frame, side, seat))
            .or_else(|| from_carbonyl(frame, side, seat))
            .or_else(|| on_carbon(&frame.graphs[side], seat))
    })
}

/// A benzene ring that is fused to no other.
struct Benzene {
    ring: [u32; 6],
    /// What else hangs on it: the ring atom's place, its neighbour outside, the name.
    others: Vec<(usize, u32, Option<&'static str>)>,
}

impl Benzene {
    fn of(frame: &Frame, side: usize, seat: &Seat<'_>) -> Option<Self> {
        let graph = &frame.graphs[side];
        let ring = graph.mobile_six_ring(seat.atom)?;
        if !ring.iter().all(|&atom| graph.is_carbon(atom)) {
            return None;
        }
        let mut others = Vec::new();
        for (at, &atom) in ring.iter().enumerate() {
            for &(to, order) in graph.near(atom) {
                if ring.contains(&to) || seat.group.contains(&to) {
                    continue;
                }
                let beyond = graph.beyond(atom, to)?;
                let name = Substituent::of(frame, side, &beyond, to, order).name;
                others.push((at, to, name));
            }
        }
        Some(Self { ring, others })
    }

    /// Whether the name alone tells a substituent of this ring.
    fn is_told(&self, name: Option<&'static str>) -> bool {
        name.is_some() && self.others.iter().filter(|other| other.2 == name).count() == 1
    }

    /// Substituents on other atoms of the ring.
    fn yardsticks(&self) -> impl Iterator<Item = &(usize, u32, Option<&'static str>)> {
        self.others.iter().filter(|other| other.0 > 0)
    }

    fn place(&self, frame: &Frame, side: usize, to: u32) -> Option<Place> {
        let &(at, to, name) = self.yardsticks().find(|other| other.1 == to)?;
        Some(Place::OnBenzene {
            distance: at.min(6 - at) as u8,
            to: Neighbour {
                atom: frame.source(side, to),
                name,
                only: self.is_told(name),
            },
        })
    }

    /// Told by its name, hydroxy rather than methyl, small rather than large: what is easily seen in a
    /// drawing comes first.
    fn conspicuous(
        &self,
        graph: &Graph,
        &(at, to, name): &(usize, u32, Option<&'static str>),
    ) -> (bool, bool, usize, u32) {
        let beyond = graph.beyond(self.ring[at], to);
        let size = beyond.map_or(usize::MAX, |all| all.len());
        (!self.is_told(name), graph.is_carbon(to), size, to)
    }
}

/// Both on the same ring, told by the same other substituent.
fn on_one_benzene(frame: &Frame, seats: [&Seat<'_>; 2]) -> Option<[Place; 2]> {
    let rings = [
        Benzene::of(frame, 0, seats[0])?,
        Benzene::of(frame, 1, seats[1])?,
    ];
    if !rings[0]
        .ring
        .iter()
        .all(|atom| rings[1].ring.contains(atom))
    {
        return None;
    }
    let graph = &frame.graphs[0];
    let common = rings[0].yardsticks().filter(|&&(at, to, name)| {
        let on = rings[0].ring[at];
        let mut theirs = rings[1].yardsticks();
        theirs.any(|&(place, atom, own)| (rings[1].ring[place], atom) == (on, to) && own == name)
    });
    let &(_, to, _) = common.min_by_key(|other| rings[0].conspicuous(graph, other))?;
    Some([rings[0].place(frame, 0, to)?, rings[1].place(frame, 1, to)?])
}

fn on_benzene(frame: &Frame, side: usize, seat: &Seat<'_>) -> Option<Place> {
    let benzene = Benzene::of(frame, side, seat)?;
    let graph = &frame.graphs[side];
    let all = benzene.yardsticks();
    let &(_, to, _) = all.min_by_key(|other| benzene.conspicuous(graph, other))?;
    benzene.place(frame, side, to)
}

/// The only other substituent of the same name on the same saturated carbon, or else on a neighbour.
fn beside_alike(frame: &Frame, side: usize, seat: &Seat<'_>) -> Option<Place> {
    let graph = &frame.graphs[side];
    let first = *seat.group.first().filter(|_| seat.name.is_some())?;
    // Hydrocarbon groups are everywhere; only hetero substituents are told this way.
    if graph.is_carbon(first) && seat.group.len() == 1 || !is_saturated_carbon(graph, seat.atom) {
        return None;
    }
    let alike_on = |atom: u32| -> Vec<u32> {
        let others = graph.near(atom).iter().filter(|&&(to, order)| {
            if seat.group.contains(&to) || to == seat.atom {
                return false;
            }
            let beyond = graph.beyond(atom, to);
            let small = beyond.filter(|all| all.len() == seat.group.len());
            small.is_some_and(|all| Substituent::of(frame, side, &all, to, order).name == seat.name)
        });
        others.map(|&(to, _)| to).collect()
    };
    let near = graph
        .neighbours(seat.atom)
        .filter(|&to| !seat.group.contains(&to) && is_saturated_carbon(graph, to));
    let found = [
        alike_on(seat.atom),
        near.flat_map(alike_on).collect::<Vec<u32>>(),
    ];
    let distance = found.iter().position(|list| !list.is_empty())?;
    let [atom] = found[distance][..] else {
        return None;
    };
    Some(Place::BesideAlike {
        distance: distance as u8,
        to: Neighbour {
            atom: frame.source(side, atom),
            name: seat.name,
            only: true,
        },
    })
}

fn is_saturated_carbon(graph: &Graph, atom: u32) -> bool {
    graph.is_carbon(atom) && graph.near(atom).iter().all(|&(_, order)| order == 1)
}

/// Whether a carbon bears a doubly bound oxygen.
pub(super) fn is_carbonyl(graph: &Graph, atom: u32) -> bool {
    let oxygen = |&(to, order): &(u32, u8)| {
        order == 2 && graph.atom(to).element == Element::OXYGEN && graph.near(to).len() == 1
    };
    graph.is_carbon(atom) && graph.near(atom).iter().any(oxygen)
}

/// The one nearest carbonyl carbon, over saturated carbons, up to the delta position.
fn from_carbonyl(frame: &Frame, side: usize, seat: &Seat<'_>) -> Option<Place> {
    let graph = &frame.graphs[side];
    let mut shell = vec![seat.atom];
    let mut seen = shell.clone();
    let count = (0..graph.size() as u32)
        .filter(|atom| !seat.group.contains(atom) && is_carbonyl(graph, *atom))
        .count();
    for distance in 0..=4 {
        let found: Vec<u32> = shell
            .iter()
            .copied()
            .filter(|&atom| is_carbonyl(graph, atom))
            .collect();
        match found[..] {
            [carbonyl] => {
                return Some(Place::FromCarbonyl {
                    distance,
                    carbonyl: frame.source(side, carbonyl),
                    only: count == 1,
                });
            }
            [] => {}
            _ => return None,
        }
        let mut next = Vec::new();
        for &atom in shell
            .iter()
            .filter(|&&atom| is_saturated_carbon(graph, atom))
        {
            for to in graph.neighbours(atom) {
                if graph.is_carbon(to) && !seat.group.contains(&to) && !seen.contains(&to) {
                    seen.push(to);
                    next.push(to);
                }
            }
        }
        shell = next;
    }
    None
}

/// Six mobile bonds, five carbons and a nitrogen, no other ring.
fn on_pyridine(frame: &Frame, side: usize, seat: &Seat<'_>) -> Option<Place> {
    let graph = &frame.graphs[side];
    let ring = graph.mobile_six_ring(seat.atom)?;
    let nitrogen = |&&atom: &&u32| graph.atom(atom).element == Element::NITROGEN;
    let mut found = ring.iter().filter(nitrogen);
    let (Some(&atom), None) = (found.next(), found.next()) else {
        return None;
    };
    let others = ring.iter().filter(|&&other| other != atom);
    let plain = others.clone().all(|&other| graph.is_carbon(other))
        && ring.iter().all(|&atom| graph.ring_bonds(atom) == 2);
    let at = ring.iter().position(|&other| other == atom)?;
    (plain && at > 0).then(|| Place::OnPyridine {
        distance: at.min(6 - at) as u8,
        nitrogen: frame.source(side, atom),
    })
}

/// Primary to quaternary, for saturated carbons that bear something by a heteroatom.
fn on_carbon(graph: &Graph, seat: &Seat<'_>) -> Option<Place> {
    let hetero = graph
        .neighbours(seat.atom)
        .any(|to| seat.group.contains(&to) && !graph.is_carbon(to));
    let carbons = graph
        .neighbours(seat.atom)
        .filter(|&to| graph.is_carbon(to) && !seat.group.contains(&to));
    let degree = carbons.count() as u8;
    let saturated = graph.is_carbon(seat.atom)
        && graph
            .near(seat.atom)
            .iter()
            .all(|&(to, order)| order == 1 || order != MOBILE && seat.group.contains(&to));
    (hetero && saturated && degree > 0).then_some(Place::OnCarbon { degree })
}
