//! The findings as types. Whatever has two sides is a pair: A's first.

use super::{place::Place, substituent::Substituent};

/// Two atoms joined by a bond, in the numbers of one record from 0, lower first.
pub(super) type Ends = (u32, u32);

/// One difference and the bonds that it accounts for.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct Finding {
    /// What differs.
    pub change: Change,
    /// Bonds of A that B lacks, and of B that A lacks.
    pub only_in: [Vec<Ends>; 2],
    /// Bonds that both have in different order: in A and in B.
    pub order_changed: Vec<[Ends; 2]>,
}

/// What differs.
#[derive(Debug, Clone, PartialEq, Eq)]
pub enum Change {
    /// A substituent sits on another atom.
    Moved(Moved),
    /// Two substituents sit where the other was.
    Exchanged([Moved; 2]),
    /// A substituent hangs on the same atom by another of its own atoms.
    Rehung(Moved),
    /// A saturated chain branches elsewhere. It has a name in both records.
    Chain {
        /// The chain with its seat.
        chain: Moved,
        /// What moved within the chain.
        within: Moved,
    },
    /// The saturated chains on one atom that is not of their kind share their atoms otherwise: ethyl and
    /// propyl, methyl and butyl. All have names.
    Divided {
        /// The atom in A and in B.
        centre: [u32; 2],
        /// The chains on it.
        chains: [Vec<Substituent>; 2],
        /// What moved from one chain to another.
        within: Moved,
    },
    /// A piece joins two others, in both records or in one: it stands between other atoms, or it was put
    /// into a bond.
    Link(Link),
    /// A functional group between two parts of the record is the other way round.
    Turned {
        /// The name of the group.
        name: &'static str,
        /// Its two bonds to the rest, in A and in B: the group's atom, the atom of the rest.
        bonds: [[(u32, u32); 2]; 2],
    },
    /// Two neighbours in a ring or a chain have changed places.
    Swapped {
        /// The two, in A and in B.
        atoms: [[u32; 2]; 2],
        /// What stands on either side of them: next to the first atom, next to the second.
        beside: [[u32; 2]; 2],
        /// Whether a ring holds them in both.
        in_ring: bool,
    },
    /// A ring has another size, or is open in one record.
    Ring(RingChange),
    /// Bonds that are mobile in one record only.
    Delocalised {
        /// 0 if they are mobile in A, 1 in B.
        side: usize,
        /// The atoms, in A and in B.
        atoms: [Vec<u32>; 2],
        /// Whether all the atoms lie on one ring, in the order of the ring.
        ring: bool,
    },
    /// Multiple bonds sit elsewhere, or a bond has another order.
    Shifted(Vec<Shift>),
    /// Hydrogens sit on another atom.
    Hydrogen {
        /// Where they are in A and not in B; that atom in both records.
        from: [u32; 2],
        /// Where they are in B.
        to: [u32; 2],
        /// How many.
        count: u8,
    },
    /// Functional groups that have become others of the same atoms.
    Groups([Vec<GroupHere>; 2]),
    /// What no other finding accounts for.
    Rest,
}

/// A substituent in both records.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct Moved {
    /// What moved, as each record has it; they differ where more changed within.
    pub groups: [Substituent; 2],
    /// Where it sits.
    pub seats: [Seat; 2],
}

/// Where a substituent sits.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct Seat {
    /// The atom that bears it.
    pub atom: u32,
    /// The atom of the substituent that is bonded to it.
    pub through: u32,
    /// What the trade calls the place, where a term holds.
    pub place: Option<Place>,
}

/// A piece that joins two atoms in one record or in both.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct Link {
    /// The piece, as each record has it.
    pub groups: [Substituent; 2],
    /// Its bonds, one or two in each record: the atom of the piece, the atom outside.
    pub ends: [Vec<Ends>; 2],
    /// Where the two atoms that it joins in A are bonded to each other in B: that bond of B; and the
    /// other way round.
    pub joined: [Option<Ends>; 2],
}

/// A ring that differs.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct RingChange {
    /// The smallest ring that the differing bond closes in A and in B, from one end of that bond to the
    /// other; `None` where it closes none or there is no such bond.
    pub rings: [Option<Vec<u32>>; 2],
    /// Atoms of the ring of the one that are not in the ring of the other, where both have one.
    pub alone: [Vec<u32>; 2],
    /// The differing bond, the atom that both sides share first; `None` where one side has none.
    pub bonds: [Option<(u32, u32)>; 2],
    /// Where those atoms lie in the other record.
    pub images: [Option<(u32, u32)>; 2],
}

/// A bond of another order.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct Shift {
    /// The bond in A and in B.
    pub bonds: [Ends; 2],
    /// Its order in A and in B; `None` for a mobile bond.
    pub orders: [Option<u8>; 2],
}

/// A functional group of one record.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct GroupHere {
    /// Its name.
    pub name: &'static str,
    /// Its atoms.
    pub atoms: Vec<u32>,
}

impl Finding {
    /// A finding that accounts for no bond.
    pub(super) fn without_bonds(change: Change) -> Self {
        Self {
            change,
            only_in: [Vec::new(), Vec::new()],
            order_changed: Vec::new(),
        }
    }

    pub(super) fn is_rest(&self) -> bool {
        matches!(self.change, Change::Rest)
    }

    /// The same finding with the records exchanged.
    #[must_use]
    pub fn mirrored(self) -> Self {
        let [a, b] = self.only_in;
        let bonds = self.order_changed.into_iter();
        let mut order_changed: Vec<[Ends; 2]> = bonds.map(|[a, b]| [b, a]).collect();
        order_changed.sort_unstable();
        Self {
            change: self.change.mirrored(),
            only_in: [b, a],
            order_changed,
        }
    }
}

fn turned<T>([a, b]: [T; 2]) -> [T; 2] {
    [b, a]
}

impl Moved {
    fn mirrored(self) -> Self {
        Self {
            groups: turned(self.groups),
            seats: turned(self.seats),
        }
    }
}

impl Change {
    fn mirrored(self) -> Self {
        match self {
            Self::Moved(moved) => Self::Moved(moved.mirrored()),
            Self::Exchanged(both) => Self::Exchanged(both.map(Moved::mirrored)),
            Self::Rehung(moved) => Self::Rehung(moved.mirrored()),
            Self::Chain { chain, within } => Self::Chain {
                chain: chain.mirrored(),
                within: within.mirrored(),
            },
            Self::Divided {
                centre,
                chains,
                within,
            } => Self::Divided {
                centre: turned(centre),
                chains: turned(chains),
                within: within.mirrored(),
            },
            Self::Link(link) => Self::Link(Link {
                groups: turned(link.groups),
                ends: turned(link.ends),
                joined: turned(link.joined),
            }),
            Self::Turned { name, bonds } => Self::Turned {
                name,
                bonds: turned(bonds),
            },
            Self::Swapped {
                atoms,
                beside,
                in_ring,
            } => Self::Swapped {
                atoms: turned(atoms),
                beside: turned(beside),
                in_ring,
            },
            Self::Ring(ring) => Self::Ring(RingChange {
                rings: turned(ring.rings),
                alone: turned(ring.alone),
                bonds: turned(ring.bonds),
                images: turned(ring.images),
            }),
            Self::Delocalised { side, atoms, ring } => Self::Delocalised {
                side: 1 - side,
                atoms: turned(atoms),
                ring,
            },
            Self::Shifted(shifts) => {
                let shifts = shifts.into_iter().map(|shift| Shift {
                    bonds: turned(shift.bonds),
                    orders: turned(shift.orders),
                });
                let mut shifts: Vec<Shift> = shifts.collect();
                shifts.sort_by_key(|shift| (shift.orders[1], shift.bonds));
                Self::Shifted(shifts)
            }
            Self::Hydrogen { from, to, count } => Self::Hydrogen {
                from: turned(to),
                to: turned(from),
                count,
            },
            Self::Groups(groups) => Self::Groups(turned(groups)),
            Self::Rest => Self::Rest,
        }
    }

    /// The most telling first.
    pub(super) fn rank(&self) -> u8 {
        match self {
            Self::Turned { .. } => 0,
            Self::Exchanged(_) => 1,
            Self::Chain { .. } | Self::Divided { .. } | Self::Rehung(_) => 2,
            Self::Moved(_) | Self::Link(_) => 3,
            Self::Swapped { .. } => 4,
            Self::Ring(_) => 5,
            Self::Hydrogen { .. } => 6,
            Self::Shifted(_) => 7,
            Self::Delocalised { .. } => 8,
            Self::Groups(_) => 9,
            Self::Rest => 10,
        }
    }

    /// A stable name in kebab-case.
    pub fn as_str(&self) -> &'static str {
        match self {
            Self::Moved(_) => "substituent-moved",
            Self::Exchanged(_) => "substituents-exchanged",
            Self::Rehung(_) => "attachment-moved",
            Self::Chain { .. } => "chain-branches-elsewhere",
            Self::Divided { .. } => "chains-divided-otherwise",
            Self::Link(_) => "link-moved",
            Self::Turned { .. } => "group-turned",
            Self::Swapped { .. } => "neighbours-swapped",
            Self::Ring(ring) => ring.as_str(),
            Self::Delocalised { .. } => "delocalised",
            Self::Shifted(_) => "bond-order",
            Self::Hydrogen { .. } => "hydrogen-moved",
            Self::Groups(_) => "group-changed",
            Self::Rest => "rest",
        }
    }
}

impl Change {
    /// The atoms of one record that it is about, sorted: of a substituent its own.
    pub fn atoms(&self, side: usize) -> Vec<u32> {
        let mut atoms: Vec<u32> = match self {
            Self::Moved(moved) | Self::Rehung(moved) | Self::Chain { chain: moved, .. } => {
                moved.groups[side].atoms.clone()
            }
            Self::Exchanged(both) => {
                let groups = both.iter().flat_map(|moved| &moved.groups[side].atoms);
                groups.copied().collect()
            }
            Self::Divided { chains, .. } => {
                let chains = chains[side].iter();
                chains.flat_map(|chain| chain.atoms.clone()).collect()
            }
            Self::Link(link) => link.groups[side].atoms.clone(),
            Self::Turned { bonds, .. } => {
                let ends = bonds[side].iter().flat_map(|&(a, b)| [a, b]);
                ends.collect()
            }
            Self::Swapped { atoms, .. } => atoms[side].to_vec(),
            Self::Ring(ring) => match (&ring.rings[side], ring.bonds[side]) {
                (Some(ring), _) => ring.clone(),
                (None, Some((a, b))) => vec![a, b],
                (None, None) => ring.images[1 - side]
                    .iter()
                    .flat_map(|&(a, b)| [a, b])
                    .collect(),
            },
            Self::Delocalised { atoms, .. } => atoms[side].clone(),
            Self::Shifted(shifts) => {
                let ends = shifts.iter().map(|shift| shift.bonds[side]);
                ends.flat_map(|(a, b)| [a, b]).collect()
            }
            Self::Hydrogen { from, to, .. } => vec![from[side], to[side]],
            Self::Groups(groups) => {
                let groups = groups[side].iter();
                groups.flat_map(|group| group.atoms.clone()).collect()
            }
            Self::Rest => Vec::new(),
        };
        atoms.sort_unstable();
        atoms.dedup();
        atoms
    }
}

impl RingChange {
    /// A stable name in kebab-case.
    pub fn as_str(&self) -> &'static str {
        match &self.rings {
            [Some(a), Some(b)] if a.len() < b.len() => "ring-grew",
            [Some(a), Some(b)] if a.len() > b.len() => "ring-shrank",
            [Some(_), Some(_)] => "ring-closed-elsewhere",
            [Some(_), None] => "ring-opened",
            _ => "ring-closed",
        }
    }
}
