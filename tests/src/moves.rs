//! Reads findings on what moved against the two records and the map, by code of its own: fragments by
//! walking, names by the keys of structures built for them, rings and places by shortest paths.

mod names;
mod places;
mod walk;

use std::collections::BTreeSet;

use molkin_relate::{
    Explanation, Structure,
    findings::{Change, Finding, Link, Moved, RingChange, Shift, Substituent},
    functional_groups,
};

use molkin_graph::{Element, Formula, Limits};

use self::walk::Walk;

pub use self::names::SubstituentNames;

/// The two records, the map, and the names of substituents.
pub struct Readings<'s> {
    walks: [Walk<'s>; 2],
    map: Vec<(u32, u32)>,
    names: &'s SubstituentNames,
}

impl<'s> Readings<'s> {
    /// For the findings of an explanation.
    pub fn new(
        [a, b]: [&'s Structure; 2],
        explanation: &Explanation,
        names: &'s SubstituentNames,
    ) -> Self {
        Self {
            walks: [Walk::new(a), Walk::new(b)],
            map: explanation.atom_map.clone(),
            names,
        }
    }

    /// Whether each bond that differs is in one finding, and every finding is true.
    ///
    /// # Errors
    /// The first clause that is not.
    pub fn check(&self, explanation: &Explanation) -> Result<(), String> {
        self.covered(explanation)?;
        for finding in &explanation.findings {
            self.finding(finding)
                .map_err(|fault| format!("{fault}: {finding:?}"))?;
        }
        Ok(())
    }

    fn covered(&self, explanation: &Explanation) -> Result<(), String> {
        let bonds = explanation.bonds.as_ref().ok_or("no bonds")?;
        let findings = &explanation.findings;
        for (side, all) in [&bonds.only_in_a, &bonds.only_in_b].into_iter().enumerate() {
            let told = findings.iter().flat_map(|finding| &finding.only_in[side]);
            let mut told: Vec<(u32, u32)> = told.copied().collect();
            told.sort_unstable();
            require(&told == all, "bonds are not told once each")?;
        }
        let told = findings.iter().flat_map(|finding| &finding.order_changed);
        let mut told: Vec<_> = told.map(|&[old, new]| (old, new)).collect();
        told.sort_unstable();
        require(told == bonds.order_changed, "orders are not told once each")
    }

    fn image(&self, atom: u32) -> Option<u32> {
        let pair = self.map.iter().find(|pair| pair.0 == atom);
        pair.map(|pair| pair.1)
    }

    /// Atoms of A in the numbers of B, sorted.
    fn images(&self, atoms: &[u32]) -> Vec<u32> {
        let mut images: Vec<u32> = atoms.iter().filter_map(|&atom| self.image(atom)).collect();
        images.sort_unstable();
        images
    }

    fn finding(&self, finding: &Finding) -> Result<(), String> {
        match &finding.change {
            Change::Moved(moved) => self.moved(moved, finding),
            Change::Exchanged(both) => {
                let seats = both
                    .each_ref()
                    .map(|moved| moved.seats.each_ref().map(|s| s.atom));
                let crossed = self.image(seats[0][0]) == Some(seats[1][1])
                    && self.image(seats[1][0]) == Some(seats[0][1]);
                require(crossed, "not exchanged")?;
                both.iter().try_for_each(|moved| self.moved(moved, finding))
            }
            Change::Rehung(moved) => {
                let [from, to] = &moved.seats;
                require(self.image(from.atom) == Some(to.atom), "another seat")?;
                require(self.image(from.through) != Some(to.through), "hangs alike")?;
                self.same_atoms(moved)?;
                self.moved(moved, finding)
            }
            Change::Chain { chain, within } => {
                let [from, to] = &chain.seats;
                require(self.image(from.atom) == Some(to.atom), "another seat")?;
                self.same_atoms(chain)?;
                self.hangs(chain)?;
                self.moved(within, finding)
            }
            Change::Divided {
                centre,
                chains,
                within,
            } => {
                require(self.image(centre[0]) == Some(centre[1]), "another centre")?;
                for side in 0..2 {
                    for chain in &chains[side] {
                        self.bears(side, centre[side], chain)?;
                    }
                }
                self.moved(within, finding)
            }
            Change::Link(link) => self.link(link, finding),
            Change::Turned { name, bonds } => self.turned(name, bonds, finding),
            Change::Swapped { atoms, beside, .. } => self.swapped(atoms, beside),
            Change::Ring(ring) => self.ring(ring, finding),
            Change::Delocalised { side, .. } => self.delocalised(*side, finding),
            Change::Shifted(shifts) => self.shifted(shifts),
            Change::Hydrogen { from, to, count } => self.hydrogen(from, to, *count),
            Change::Groups(groups) => groups.iter().enumerate().try_for_each(|(side, groups)| {
                groups
                    .iter()
                    .try_for_each(|group| self.has_group(side, group.name, &group.atoms))
            }),
            Change::Rest => Ok(()),
        }
    }

    fn same_atoms(&self, moved: &Moved) -> Result<(), String> {
        let [a, b] = &moved.groups;
        require(self.images(&a.atoms) == b.atoms, "other atoms")
    }

    /// A named substituent on an atom.
    fn bears(&self, side: usize, seat: u32, group: &Substituent) -> Result<(), String> {
        let walk = &self.walks[side];
        let through = walk.near(seat).find(|&to| {
            walk.beyond(seat, to)
                .is_some_and(|atoms| atoms == group.atoms)
        });
        let through = through.ok_or("no such chain")?;
        let name = self.names.of(walk.structure, &group.atoms, through, seat);
        require(name.as_deref() == group.name, "another name")
    }

    /// A substituent that hangs where it is said to, under its name, and at the place that is told.
    fn hangs(&self, moved: &Moved) -> Result<(), String> {
        for (side, (group, seat)) in moved.groups.iter().zip(&moved.seats).enumerate() {
            let walk = &self.walks[side];
            let beyond = walk.beyond(seat.atom, seat.through);
            require(beyond == Some(group.atoms.clone()), "another fragment")?;
            require(
                walk.formula(&group.atoms) == group.formula,
                "another formula",
            )?;
            let name = self
                .names
                .of(walk.structure, &group.atoms, seat.through, seat.atom);
            // What is written depends on the drawing where the bond is mobile, or a charge is separated.
            let mobile = walk.order((seat.through, seat.atom)) == Some(None);
            let unnamed = (mobile || group.atoms.len() == 1) && group.name.is_none();
            require(unnamed || name.as_deref() == group.name, "another name")?;
            if let Some(place) = &seat.place {
                places::check(walk, self.names, group, seat, place)?;
            }
        }
        Ok(())
    }

    /// A substituent whose bond to its seat is one that only this record has, on both sides.
    fn moved(&self, moved: &Moved, finding: &Finding) -> Result<(), String> {
        self.hangs(moved)?;
        for (side, seat) in moved.seats.iter().enumerate() {
            let bond = sorted(seat.atom, seat.through);
            require(
                finding.only_in[side].contains(&bond),
                "the bond differs not",
            )?;
        }
        let [from, to] = &moved.seats;
        let alike = [
            self.image(from.through) == Some(to.through),
            self.image(from.atom) == Some(to.atom),
        ];
        let linked = self
            .kept_piece(from.through)
            .contains(&self.source(to.through));
        require(
            alike != [true, true] && (alike != [false, false] || linked),
            "no common atom",
        )
    }

    fn source(&self, image: u32) -> u32 {
        let pair = self.map.iter().find(|pair| pair.1 == image);
        pair.map_or(u32::MAX, |pair| pair.0)
    }

    /// Atoms of A that bonds of both records link to this one.
    fn kept_piece(&self, start: u32) -> BTreeSet<u32> {
        self.walks[0].reach(start, |a, b| {
            let images = self.image(a).zip(self.image(b));
            images.is_some_and(|(x, y)| self.walks[1].has_bond(x, y))
        })
    }

    fn link(&self, link: &Link, finding: &Finding) -> Result<(), String> {
        let piece: Vec<u32> = self
            .kept_piece(link.groups[0].atoms[0])
            .into_iter()
            .collect();
        require(piece == link.groups[0].atoms, "no piece of its own")?;
        require(self.images(&piece) == link.groups[1].atoms, "another piece")?;
        let mut told = [0, 1].map(|side| {
            let ends = link.ends[side].iter();
            ends.map(|&(a, b)| sorted(a, b)).collect::<Vec<_>>()
        });
        for side in 0..2 {
            let group = &link.groups[side];
            require(
                self.walks[side].formula(&group.atoms) == group.formula,
                "another formula",
            )?;
            for &(inside, outside) in &link.ends[side] {
                let parted = group.atoms.contains(&inside) && !group.atoms.contains(&outside);
                require(parted, "an end that is none")?;
            }
            told[1 - side].extend(link.joined[side]);
        }
        told.iter_mut().for_each(|bonds| bonds.sort_unstable());
        require(told == finding.only_in, "bonds that no end has")
    }

    fn has_group(&self, side: usize, name: &str, atoms: &[u32]) -> Result<(), String> {
        let limits = Limits::default();
        let found = functional_groups(self.walks[side].structure, &limits);
        let groups = found.map_err(|error| error.to_string())?;
        let holds = groups.iter().any(|group| {
            group.name == Some(name) && atoms.iter().all(|atom| group.atoms.contains(atom))
        });
        require(holds, "no such group")
    }

    fn turned(
        &self,
        name: &str,
        bonds: &[[(u32, u32); 2]; 2],
        finding: &Finding,
    ) -> Result<(), String> {
        for (side, bonds) in bonds.iter().enumerate() {
            let [(x, p), (y, q)] = *bonds;
            let mut own = vec![sorted(x, p), sorted(y, q)];
            own.sort_unstable();
            require(own == finding.only_in[side], "other bonds")?;
            self.has_group(side, name, &[x, y])?;
        }
        let [[(x, p), (y, q)], [(x2, p2), (y2, q2)]] = *bonds;
        let images = [x, y, p, q].map(|atom| self.image(atom));
        require(images == [x2, y2, q2, p2].map(Some), "not turned round")
    }

    fn swapped(&self, atoms: &[[u32; 2]; 2], beside: &[[u32; 2]; 2]) -> Result<(), String> {
        for side in 0..2 {
            let ([x, y], [p, q]) = (atoms[side], beside[side]);
            let walk = &self.walks[side];
            let row = [(p, x), (x, y), (y, q)];
            require(row.iter().all(|&(a, b)| walk.has_bond(a, b)), "no such row")?;
        }
        let images = |pair: [u32; 2]| pair.map(|atom| self.image(atom));
        let [p, q] = beside[1];
        require(images(atoms[0]) == atoms[1].map(Some), "other atoms")?;
        require(images(beside[0]) == [q, p].map(Some), "other neighbours")
    }

    fn ring(&self, ring: &RingChange, finding: &Finding) -> Result<(), String> {
        for side in 0..2 {
            let Some((a, b)) = ring.bonds[side] else {
                require(finding.only_in[side].is_empty(), "a bond is not told")?;
                continue;
            };
            require(finding.only_in[side] == [sorted(a, b)], "another bond")?;
            let size = self.walks[side].ring_size(a, b);
            require(
                size == ring.rings[side].as_ref().map(Vec::len),
                "another size",
            )?;
            let Some(atoms) = &ring.rings[side] else {
                continue;
            };
            let steps = atoms.iter().zip(atoms.iter().cycle().skip(1));
            let mut steps = steps.map(|(&x, &y)| self.walks[side].has_bond(x, y));
            require(steps.all(|bonded| bonded), "no ring")?;
        }
        if let [Some(a), Some(b)] = &ring.rings {
            let gone = a
                .iter()
                .filter(|&&atom| self.image(atom).is_none_or(|image| !b.contains(&image)));
            require(gone.eq(&ring.alone[0]), "others left the ring")?;
        }
        Ok(())
    }

    fn delocalised(&self, side: usize, finding: &Finding) -> Result<(), String> {
        for bonds in &finding.order_changed {
            let orders = [0, 1].map(|at: usize| self.walks[at].order(bonds[at]));
            let fits = orders[side] == Some(None) && orders[1 - side].flatten().is_some();
            require(fits, "mobile elsewhere")?;
        }
        Ok(())
    }

    fn shifted(&self, shifts: &[Shift]) -> Result<(), String> {
        shifts.iter().try_for_each(|shift| {
            let orders = [0, 1].map(|side: usize| self.walks[side].order(shift.bonds[side]));
            require(orders == shift.orders.map(Some), "other orders")
        })
    }

    /// More hydrogens than the bonds that differ leave, where they come from; fewer where they go.
    fn hydrogen(&self, from: &[u32; 2], to: &[u32; 2], count: u8) -> Result<(), String> {
        let free = |atoms: &[u32; 2]| {
            let spare = |side: usize| {
                let walk = &self.walks[side];
                let bonds = walk.near(atoms[side]).filter(|&other| {
                    let pair = if side == 0 {
                        self.image(other)
                    } else {
                        Some(self.source(other))
                    };
                    !pair.is_some_and(|pair| self.walks[1 - side].has_bond(atoms[1 - side], pair))
                });
                let orders = bonds.map(|other| {
                    let order = walk.order((atoms[side], other)).flatten();
                    i32::from(order.unwrap_or(1))
                });
                i32::from(walk.hydrogens(atoms[side])) + orders.sum::<i32>()
            };
            spare(1) - spare(0)
        };
        let mapped = self.image(from[0]) == Some(from[1]) && self.image(to[0]) == Some(to[1]);
        let count = i32::from(count);
        require(
            mapped && free(from) <= -count && free(to) >= count,
            "hydrogens stay",
        )
    }
}

fn sorted(a: u32, b: u32) -> (u32, u32) {
    (a.min(b), a.max(b))
}

fn require(holds: bool, fault: &str) -> Result<(), String> {
    if holds { Ok(()) } else { Err(fault.to_owned()) }
}

/// The formula of some atoms of a record with their hydrogens, charges left out.
fn formula_of(walk: &Walk<'_>, atoms: &[u32]) -> Formula {
    let counts = atoms.iter().flat_map(|&atom| {
        let element = walk.element(atom).map(|element| (element, 1));
        let hydrogens = (Element::HYDROGEN, u32::from(walk.hydrogens(atom)));
        element.into_iter().chain([hydrogens])
    });
    Formula::new(counts, 0)
}
