//! Substituents that hang on another atom: one bond lost, one gained, an atom in common.

use super::{
    chains,
    changes::{Change, Finding, Moved, Seat},
    frame::{Bond, Frame, bond},
    ledger::Ledger,
    place::{self, places},
    substituent::Substituent,
};

/// A substituent that may be said to have moved, on one side and on the other.
pub(super) struct Transfer {
    /// Its atom that is bonded to the rest.
    pub(super) through: [u32; 2],
    /// The atom that bears it.
    pub(super) seats: [u32; 2],
    /// Its atoms, sorted.
    atoms: [Vec<u32>; 2],
}

impl Transfer {
    /// The lost and the gained bond.
    fn bonds(&self) -> [Bond; 2] {
        [0, 1].map(|side| bond(self.seats[side], self.through[side]))
    }

    /// Of two ways to see it the one is taken that moves something whole, by the same atom or on the same
    /// atom, that has a name, and less of it.
    fn cost(&self, frame: &Frame) -> (bool, bool, bool, usize, [u32; 2], [u32; 2]) {
        let [first, second] = &self.atoms;
        let size = first.len().max(second.len());
        let apart = self.through[0] != self.through[1] && self.seats[0] != self.seats[1];
        let nameless = self.groups(frame).iter().any(|group| group.name.is_none());
        (
            first != second,
            apart,
            nameless,
            size,
            self.through,
            self.seats,
        )
    }

    fn groups(&self, frame: &Frame) -> [Substituent; 2] {
        [0, 1].map(|side| {
            let (seat, through) = (self.seats[side], self.through[side]);
            let order = frame.graphs[side].order(seat, through).unwrap_or(1);
            Substituent::of(frame, side, &self.atoms[side], through, order)
        })
    }

    pub(super) fn tell(&self, frame: &Frame) -> Moved {
        let groups = self.groups(frame);
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
    transfers.sort_by_cached_key(|transfer| transfer.cost(frame));
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
            None => chains::alone(frame, &first),
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
