//! Substituents that hang on another atom: one bond lost, one gained, an atom in common.

use super::{
    changes::{Change, Finding, Moved, Seat},
    frame::{Bond, Frame, bond},
    ledger::Ledger,
    place::{self, places},
    substituent::Substituent,
};

/// A substituent that may be said to have moved, on one side and on the other.
struct Transfer {
    /// Its atom that is bonded to the rest.
    through: [u32; 2],
    /// The atom that bears it.
    seats: [u32; 2],
    /// Its atoms, sorted.
    atoms: [Vec<u32>; 2],
}

impl Transfer {
    /// The lost and the gained bond.
    fn bonds(&self) -> [Bond; 2] {
        [0, 1].map(|side| bond(self.seats[side], self.through[side]))
    }

    /// Of two ways to see it the one that moves less is taken, and best something that stays whole and
    /// hangs by the same atom, or on the same atom.
    fn cost(&self) -> (bool, bool, usize, [u32; 2], [u32; 2]) {
        let [first, second] = &self.atoms;
        let size = first.len().max(second.len());
        let apart = self.through[0] != self.through[1] && self.seats[0] != self.seats[1];
        (first != second, apart, size, self.through, self.seats)
    }

    fn tell(&self, frame: &Frame) -> Moved {
        let groups = [0, 1].map(|side| {
            let (seat, through) = (self.seats[side], self.through[side]);
            let order = frame.graphs[side].order(seat, through).unwrap_or(1);
            Substituent::of(frame, side, &self.atoms[side], through, order)
        });
        let seats = [0, 1].map(|side| place::Seat {
            atom: self.seats[side],
            group: &self.atoms[side],
            name: groups[side].name,
        });
        let [first, second] = places(frame, [&seats[0], &seats[1]]);
        let seat = |side: usize, place| Seat {
            atom: frame.source(side, self.seats[side]),
            through: frame.source(side, self.through[side]),
            place,
        };
        Moved {
            seats: [seat(0, first), seat(1, second)],
            groups,
        }
    }
}

/// Takes substituents that moved out of the ledger: the smallest first.
pub(super) fn moved(frame: &Frame, ledger: &mut Ledger) -> Vec<Finding> {
    let pieces = frame.pieces();
    let mut transfers = Vec::new();
    for lost in ledger.only_in(0) {
        for gained in ledger.only_in(1) {
            transfers.extend(between(frame, &pieces, lost, gained));
        }
    }
    transfers.sort_by_cached_key(Transfer::cost);
    let mut taken: Vec<Transfer> = Vec::new();
    for transfer in transfers {
        let own = transfer.bonds();
        let is_free = |other: &Transfer| {
            let others = other.bonds();
            own[0] != others[0] && own[1] != others[1]
        };
        if taken.iter().all(is_free) {
            taken.push(transfer);
        }
    }
    let mut found = Vec::new();
    while !taken.is_empty() {
        let first = taken.remove(0);
        let is_counterpart = |other: &Transfer| {
            let [from, to] = first.seats;
            from != to && other.seats == [to, from]
        };
        let partner = taken.iter().position(is_counterpart);
        let partner = partner.map(|at| taken.remove(at));
        let mut lost_and_gained = first.bonds().map(|bond| vec![bond]);
        for (list, bond) in lost_and_gained
            .iter_mut()
            .zip(partner.iter().flat_map(Transfer::bonds))
        {
            list.push(bond);
        }
        let change = match partner {
            Some(partner) => Change::Exchanged([first.tell(frame), partner.tell(frame)]),
            None => alone(frame, &first),
        };
        found.push(ledger.settle(frame, change, lost_and_gained, &[]));
    }
    found
}

/// The substituents that may be said to hang on the lost bond in the one and on the gained bond in the
/// other: by the same atom, on the same atom, or by two atoms that kept bonds link.
fn between(frame: &Frame, pieces: &[u32], lost: Bond, gained: Bond) -> Vec<Transfer> {
    let ends = |(a, b): Bond| [(a, b), (b, a)];
    let ways = ends(lost)
        .into_iter()
        .flat_map(|one| ends(gained).map(|other| [one, other]));
    let transfers = ways.filter_map(|[(f, u), (g, v)]| {
        let atoms = [frame.graphs[0].beyond(u, f)?, frame.graphs[1].beyond(v, g)?];
        let holds_itself = atoms[0].contains(&v) || atoms[1].contains(&u);
        let same = pieces[f as usize] == pieces[g as usize];
        let fits = if u == v { atoms[0] == atoms[1] } else { same };
        (fits && !holds_itself).then_some(Transfer {
            through: [f, g],
            seats: [u, v],
            atoms,
        })
    });
    transfers.collect()
}

/// One substituent by itself; within a chain that has a name in both, the chain is what differs.
fn alone(frame: &Frame, transfer: &Transfer) -> Change {
    let moved = transfer.tell(frame);
    if transfer.seats[0] == transfer.seats[1] {
        return Change::Rehung(moved);
    }
    match chain_around(frame, transfer) {
        Some(chain) => Change::Chain {
            chain,
            within: moved,
        },
        None => Change::Moved(moved),
    }
}

/// The smallest saturated chain with a name in both records that holds a substituent and both its
/// seats, and hangs on one atom in both.
fn chain_around(frame: &Frame, transfer: &Transfer) -> Option<Moved> {
    let size = frame.graphs[0].size() as u32;
    let mut best: Option<(usize, u32, Moved)> = None;
    for seat in 0..size {
        for (through, atoms) in chains_on(frame, seat, transfer) {
            if best
                .as_ref()
                .is_some_and(|best| (best.0, best.1) <= (atoms.len(), seat))
            {
                continue;
            }
            let groups = [0, 1].map(|side| Substituent::of(frame, side, &atoms, through[side], 1));
            let names = [groups[0].name, groups[1].name];
            if names.contains(&None) || names[0] == names[1] {
                continue;
            }
            let seats = [0, 1].map(|side| Seat {
                atom: frame.source(side, seat),
                through: frame.source(side, through[side]),
                place: None,
            });
            best = Some((atoms.len(), seat, Moved { groups, seats }));
        }
    }
    best.map(|(.., chain)| chain)
}

/// Alkyl chains on an atom, the same atoms in both, that hold what differs.
fn chains_on(frame: &Frame, seat: u32, transfer: &Transfer) -> Vec<([u32; 2], Vec<u32>)> {
    let [first, second] = &frame.graphs;
    let mut found = Vec::new();
    // Where the seat is of the chain's own kind, the chain does not end there.
    let saturated = first.near(seat).iter().all(|&(_, order)| order == 1);
    if first.is_carbon(seat) && saturated && first.ring_bonds(seat) == 0 {
        return found;
    }
    for through in first.neighbours(seat) {
        let Some(atoms) = first.beyond(seat, through) else {
            continue;
        };
        let is_chain = atoms.iter().all(|&atom| {
            let saturated = |side: usize| {
                let near = frame.graphs[side].near(atom);
                near.iter().all(|&(_, order)| order == 1)
            };
            first.is_carbon(atom) && saturated(0) && saturated(1)
        });
        let mut ends = transfer.through.iter().chain(&transfer.seats);
        let held = ends.all(|end| atoms.contains(end));
        if !is_chain || !held {
            continue;
        }
        let theirs = second.neighbours(seat);
        for to in theirs.filter(|to| atoms.contains(to)) {
            if second.beyond(seat, to).as_ref() == Some(&atoms) {
                found.push(([through, to], atoms.clone()));
            }
        }
    }
    found
}
