//! Saturated chains that branch elsewhere, or share their atoms otherwise: butyl and isobutyl, ethyl and
//! propyl against methyl and butyl.

use super::{
    changes::{Change, Moved, Seat},
    frame::{Frame, Graph},
    place::is_carbonyl,
    substituent::Substituent,
    transfer::Transfer,
};

/// A saturated chain on an atom that is not of its kind.
struct Chain {
    through: u32,
    atoms: Vec<u32>,
}

/// Says one substituent that moved by itself; within chains that have names in both, the chains are
/// what differs.
pub(super) fn alone(frame: &Frame, transfer: &Transfer) -> Change {
    let moved = transfer.tell(frame);
    if transfer.seats[0] == transfer.seats[1] {
        return Change::Rehung(moved);
    }
    let seats = 0..frame.graphs[0].size() as u32;
    let chains: Vec<(u32, [Vec<Chain>; 2])> = seats
        .map(|seat| {
            (
                seat,
                [0, 1].map(|side| chains_on(&frame.graphs[side], seat)),
            )
        })
        .filter(|(_, chains)| chains.iter().all(|chains| hold(chains, transfer)))
        .collect();
    let told = chains.iter().find_map(|(seat, chains)| {
        one_chain(frame, *seat, chains, transfer)
            .map(|chain| Change::Chain {
                chain,
                within: moved.clone(),
            })
            .or_else(|| divided(frame, *seat, chains, &moved))
    });
    told.unwrap_or(Change::Moved(moved))
}

/// Whether all that differs lies in some chains.
fn hold(chains: &[Chain], transfer: &Transfer) -> bool {
    let mut ends = transfer.through.iter().chain(&transfer.seats);
    ends.all(|end| chains.iter().any(|chain| chain.atoms.contains(end)))
}

/// The saturated chains on an atom; none on an atom of such a chain.
fn chains_on(graph: &Graph, seat: u32) -> Vec<Chain> {
    let is_saturated =
        |atom: u32| graph.is_carbon(atom) && graph.near(atom).iter().all(|&(_, order)| order == 1);
    if is_saturated(seat) && graph.ring_bonds(seat) == 0 {
        return Vec::new();
    }
    let chains = graph.neighbours(seat).filter_map(|through| {
        let atoms = graph.beyond(seat, through)?;
        let is_chain = atoms.iter().all(|&atom| is_saturated(atom));
        is_chain.then_some(Chain { through, atoms })
    });
    chains.collect()
}

/// The chain that holds all that differs, if it has another name in the other record.
fn one_chain(
    frame: &Frame,
    seat: u32,
    chains: &[Vec<Chain>; 2],
    transfer: &Transfer,
) -> Option<Moved> {
    let [first, second] = chains.each_ref().map(|chains| {
        let mut chains = chains.iter();
        chains.find(|chain| hold(std::slice::from_ref(*chain), transfer))
    });
    let pair = [first?, second?];
    let groups = [0, 1].map(|side| named(frame, side, pair[side]));
    let [first, second] = &groups;
    let differ = first.name.is_some() && second.name.is_some() && first.name != second.name;
    let seats = [0, 1].map(|side| Seat {
        atom: frame.source(side, seat),
        through: frame.source(side, pair[side].through),
        place: None,
    });
    (differ && pair[0].atoms == pair[1].atoms).then_some(Moved { groups, seats })
}

/// Several chains on a heteroatom outside rings or on a carbonyl carbon, of the same atoms in both.
fn divided(frame: &Frame, seat: u32, chains: &[Vec<Chain>; 2], moved: &Moved) -> Option<Change> {
    let [first, second] = &frame.graphs;
    let is_centre = |graph: &Graph| {
        (!graph.is_carbon(seat) || is_carbonyl(graph, seat)) && graph.ring_bonds(seat) == 0
    };
    let all = chains.each_ref().map(|chains| {
        let atoms = chains.iter().flat_map(|chain| chain.atoms.iter().copied());
        let mut atoms: Vec<u32> = atoms.collect();
        atoms.sort_unstable();
        atoms
    });
    let groups = [0, 1].map(|side| {
        let chains = chains[side].iter();
        chains
            .map(|chain| named(frame, side, chain))
            .collect::<Vec<_>>()
    });
    let several = groups.iter().all(|groups| groups.len() > 1);
    let named = groups.iter().flatten().all(|group| group.name.is_some());
    let fits = is_centre(first) && is_centre(second) && all[0] == all[1] && several && named;
    fits.then(|| Change::Divided {
        centre: [0, 1].map(|side| frame.source(side, seat)),
        chains: groups,
        within: moved.clone(),
    })
}

fn named(frame: &Frame, side: usize, chain: &Chain) -> Substituent {
    Substituent::of(frame, side, &chain.atoms, chain.through, 1)
}
