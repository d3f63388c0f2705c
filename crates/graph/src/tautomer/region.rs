//! Regions of mobile hydrogen, as perfect matchings.
//!
//! Each atom is split into vertices, one for every π bond or mobile hydrogen it has room for. Pools of
//! further vertices stand for the hydrogens, for negative charges, and for lone pairs that are not
//! lent. For given pools the tautomers of a region are exactly the perfect matchings of that graph, so
//! a region is settled by its σ skeleton, its sites and the sizes of its pools, whichever tautomer was
//! drawn.

use crate::{
    Limits, OrderError,
    matching::{Matching, NONE},
    skeleton::Skeleton,
};

use super::{
    room::{Drawing, Room, pi},
    rules,
};

/// The vertices beside those of atoms, one run of them for each region.
#[derive(Debug, Clone, Copy, Default)]
pub(super) struct Pools {
    pub(super) hydrogens: u32,
    pub(super) negative: u32,
    pub(super) idle: u32,
    /// Lone pairs that are lent and charges that might cancel.
    spare: u32,
    /// First vertex: hydrogens, then negative charges, then idle lone pairs, then the two probes.
    first: u32,
}

impl Pools {
    pub(super) fn hydrogen(&self) -> std::ops::Range<u32> {
        self.first..self.first + self.hydrogens
    }

    pub(super) fn minus(&self) -> std::ops::Range<u32> {
        let from = self.first + self.hydrogens;
        from..from + self.negative
    }

    pub(super) fn unlent(&self) -> std::ops::Range<u32> {
        let from = self.first + self.hydrogens + self.negative;
        from..from + self.idle + self.spare
    }

    /// Places for lone pairs that are lent as drawn and need not be.
    fn spares(&self) -> std::ops::Range<u32> {
        let end = self.unlent().end;
        end - self.spare..end
    }

    /// A further hydrogen, looking for a site.
    fn guest(&self) -> u32 {
        self.first + self.hydrogens + self.negative + self.idle + self.spare
    }

    /// A place looking for one of the hydrogens.
    fn host(&self) -> u32 {
        self.guest() + 1
    }
}

/// The regions of one molecule. All vectors are scratch that is reused.
#[derive(Debug, Default)]
pub(super) struct Regions {
    /// Per atom: its region, [`NONE`] for atoms outside.
    pub(super) region: Vec<u32>,
    pub(super) pools: Vec<Pools>,
    /// Per region: whether a hydrogen can move.
    pub(super) mobile: Vec<bool>,
    /// Per atom: its first vertex.
    pub(super) first: Vec<u32>,
    /// Per atom: whether it has a vertex more for a lone pair that it may lend.
    pub(super) lending: Vec<bool>,
    /// Per bond: whether a π bond may be there.
    pub(super) shifts: Vec<bool>,
    /// Per region: whether it stays as drawn.
    frozen: Vec<bool>,
    queue: Vec<u32>,
}

impl Regions {
    /// Loads the regions that the sites at hand make.
    pub(super) fn load(
        &mut self,
        skeleton: &Skeleton,
        drawing: &Drawing,
        rooms: &[Room],
        matching: &mut Matching,
    ) {
        self.divide(skeleton, drawing, rooms);
        self.connect(skeleton, drawing, rooms, matching);
    }

    /// Finds the sites: heteroatoms, then carbons that exchange a hydrogen with sites found before in
    /// some tautomer, until there are no more. The matching holds what is drawn afterwards.
    ///
    /// Where all hydrogens of a region stay on sites, the outcome does not depend on the tautomer that came in. Say B is a tautomer of A by the sites
    /// of A. Those of B are among them. On the sites of A that B lacks, all tautomers of B have as many
    /// hydrogens together, or else one of them would exchange hydrogen with a site of B and be one. But
    /// the first of them that A found did exchange hydrogen with such sites.
    ///
    /// Whether charges cancelled instead: then the matching is to be drawn, and the regions found anew.
    pub(super) fn find(
        &mut self,
        skeleton: &Skeleton,
        drawing: &Drawing,
        rooms: &mut [Room],
        cancelling: bool,
        (matching, limits): (&mut Matching, &Limits),
    ) -> Result<bool, OrderError> {
        self.load(skeleton, drawing, rooms, matching);
        if cancelling && self.cancel(matching) {
            return Ok(true);
        }
        loop {
            self.load(skeleton, drawing, rooms, matching);
            let grown = self.grow(skeleton, drawing, rooms, matching);
            if matching.is_exhausted() {
                return Err(OrderError::StepLimit {
                    limit: limits.order_steps,
                });
            }
            if !grown {
                return Ok(false);
            }
        }
    }

    /// Divides the atoms with room into regions.
    fn divide(&mut self, skeleton: &Skeleton, drawing: &Drawing, rooms: &[Room]) {
        self.shifts.clear();
        let bonds = (0..).zip(&drawing.orders);
        self.shifts.extend(bonds.map(|(bond, &order)| {
            matches!(order, 1..=3) && (pi(order) > 0 || rules::may_shift(skeleton, bond))
        }));
        self.lending.clear();
        self.lending.resize(skeleton.len(), false);
        if rooms.iter().any(|room| room.positive) {
            self.spread(skeleton, |atom| {
                rooms[atom as usize].vertices > 0 || rooms[atom as usize].lends
            });
            let mut charged = vec![false; self.pools.len()];
            for (room, &region) in rooms.iter().zip(&self.region) {
                if region != NONE {
                    charged[region as usize] |= room.positive;
                }
            }
            for (atom, room) in rooms.iter().enumerate() {
                let region = self.region[atom];
                self.lending[atom] = region != NONE && room.lends && charged[region as usize];
            }
        }
        let lending = std::mem::take(&mut self.lending);
        self.spread(skeleton, |atom| {
            rooms[atom as usize].vertices > 0 || lending[atom as usize]
        });
        self.lending = lending;
    }

    /// Numbers the connected pieces of the atoms that are in.
    fn spread(&mut self, skeleton: &Skeleton, is_in: impl Fn(u32) -> bool) {
        self.region.clear();
        self.region.resize(skeleton.len(), NONE);
        self.pools.clear();
        for start in 0..skeleton.len() as u32 {
            if self.region[start as usize] != NONE || !is_in(start) {
                continue;
            }
            let region = self.pools.len() as u32;
            self.pools.push(Pools::default());
            self.region[start as usize] = region;
            self.queue.push(start);
            while let Some(atom) = self.queue.pop() {
                for &(to, bond) in skeleton.arcs(atom) {
                    let known = self.region[to as usize] != NONE;
                    if !known && self.shifts[bond as usize] && is_in(to) {
                        self.region[to as usize] = region;
                        self.queue.push(to);
                    }
                }
            }
        }
    }

    /// Whether an atom is in a region that need not stay as drawn.
    pub(super) fn is_drawn(&self, atom: u32) -> bool {
        let region = self.region[atom as usize];
        region != NONE && !self.frozen[region as usize]
    }

    /// Charge beyond that of lent lone pairs, and hydrogens, of an atom's region.
    pub(super) fn totals(&self, atom: u32) -> (i16, u16) {
        let region = self.region[atom as usize];
        let pools = self.pools.get(region as usize).copied().unwrap_or_default();
        (
            pools.negative as i16 - pools.idle as i16,
            pools.hydrogens as u16,
        )
    }

    /// The vertices of an atom.
    pub(super) fn vertices(&self, rooms: &[Room], atom: u32) -> std::ops::Range<u32> {
        let at = atom as usize;
        let first = self.first[at];
        first..first + u32::from(rooms[at].vertices) + u32::from(self.lending[at])
    }

    /// Builds the graph, and in it the matching that is drawn.
    fn connect(
        &mut self,
        skeleton: &Skeleton,
        drawing: &Drawing,
        rooms: &[Room],
        matching: &mut Matching,
    ) {
        let mut next = 0;
        self.first.clear();
        for (room, &lending) in rooms.iter().zip(&self.lending) {
            self.first.push(next);
            next += u32::from(room.vertices) + u32::from(lending);
        }
        self.count(skeleton, drawing, rooms);
        for pools in &mut self.pools {
            pools.first = next;
            next = pools.host() + 1;
        }
        matching.reset(next as usize);
        (0..next).for_each(|vertex| matching.set_group(vertex, NONE));
        for atom in 0..skeleton.len() as u32 {
            for vertex in self.vertices(rooms, atom) {
                matching.set_group(vertex, atom);
            }
        }
        for (bond, shifts) in skeleton.bonds.iter().zip(&self.shifts) {
            if *shifts && self.region[bond.a as usize] != NONE {
                for x in self.vertices(rooms, bond.a) {
                    for y in self.vertices(rooms, bond.b) {
                        matching.add_edge(x, y);
                    }
                }
            }
        }
        for atom in 0..skeleton.len() as u32 {
            if self.region[atom as usize] != NONE {
                self.connect_pools(rooms, matching, atom);
            }
        }
        for pools in &self.pools {
            let host = pools.host();
            pools.hydrogen().for_each(|y| matching.add_edge(host, y));
        }
        matching.connect();
        for pools in &self.pools {
            matching.set_removed(pools.guest(), true);
            matching.set_removed(pools.host(), true);
            for vertex in pools.spares() {
                matching.set_removed(vertex, true);
            }
        }
        self.place(skeleton, drawing, rooms, matching);
        self.freeze(skeleton, rooms, matching);
    }

    fn connect_pools(&self, rooms: &[Room], matching: &mut Matching, atom: u32) {
        let room = &rooms[atom as usize];
        let pools = &self.pools[self.region[atom as usize] as usize];
        let vertices = self.vertices(rooms, atom);
        if room.site {
            for x in vertices.clone() {
                for y in pools.hydrogen().chain([pools.guest()]) {
                    matching.add_edge(x, y);
                }
                if room.hetero {
                    pools.minus().for_each(|y| matching.add_edge(x, y));
                }
            }
        }
        if self.lending[atom as usize] {
            let own = vertices.end - 1;
            pools.unlent().for_each(|y| matching.add_edge(own, y));
        }
        if room.pair {
            let base = vertices.start + u32::from(room.vertices);
            matching.add_edge(base - 2, base - 1);
        }
    }

    /// Counts hydrogens, negative charges and idle lone pairs of each region.
    fn count(&mut self, skeleton: &Skeleton, drawing: &Drawing, rooms: &[Room]) {
        for (atom, room) in (0..).zip(rooms) {
            let region = self.region[atom as usize];
            if region == NONE {
                continue;
            }
            let hydrogens = mobile_hydrogens(skeleton, drawing, rooms, atom);
            let pools = &mut self.pools[region as usize];
            pools.hydrogens += hydrogens;
            pools.negative += u32::from(room.negative);
            pools.idle += u32::from(self.lending[atom as usize] && !room.positive);
            pools.spare += u32::from(self.lending[atom as usize] && room.positive);
        }
        for pools in &mut self.pools {
            pools.spare = pools.spare.min(pools.negative);
        }
        for region in &mut self.pools {
            region.first = 0;
        }
    }

    /// Puts what is drawn into the matching.
    fn place(
        &self,
        skeleton: &Skeleton,
        drawing: &Drawing,
        rooms: &[Room],
        matching: &mut Matching,
    ) {
        let free = |matching: &Matching, atom: u32| {
            let mut vertices = self.vertices(rooms, atom);
            vertices.find(|&v| matching.mate(v) == NONE)
        };
        let mut next: Vec<[u32; 3]> = self
            .pools
            .iter()
            .map(|p| [p.hydrogen().start, p.minus().start, p.unlent().start])
            .collect();
        let mut take = |region: u32, pool: usize| {
            let slot = &mut next[region as usize][pool];
            *slot += 1;
            *slot - 1
        };
        for atom in 0..skeleton.len() as u32 {
            let region = self.region[atom as usize];
            if region == NONE {
                continue;
            }
            let room = &rooms[atom as usize];
            if self.lending[atom as usize] && !room.positive {
                matching.join(self.vertices(rooms, atom).end - 1, take(region, 2));
            }
            let hydrogens = mobile_hydrogens(skeleton, drawing, rooms, atom);
            let tokens = (0..hydrogens).map(|_| 0).chain(room.negative.then_some(1));
            for pool in tokens {
                if let Some(vertex) = free(matching, atom) {
                    matching.join(vertex, take(region, pool));
                }
            }
        }
        for ((bond, &order), &shifts) in
            skeleton.bonds.iter().zip(&drawing.orders).zip(&self.shifts)
        {
            for _ in 0..pi(order) {
                if shifts
                    && self.region[bond.a as usize] != NONE
                    && let (Some(x), Some(y)) = (free(matching, bond.a), free(matching, bond.b))
                {
                    matching.join(x, y);
                }
            }
        }
        for atom in 0..skeleton.len() as u32 {
            if rooms[atom as usize].pair {
                let end = self.first[atom as usize] + u32::from(rooms[atom as usize].vertices);
                if [end - 2, end - 1].iter().all(|&v| matching.mate(v) == NONE) {
                    matching.join(end - 2, end - 1);
                }
            }
        }
        matching.keep_changes();
    }

    /// Whether positive and negative charges of a region cancel in some mesomer; if so it has fewer
    /// afterwards, and the matching is that.
    fn cancel(&self, matching: &mut Matching) -> bool {
        let regions = self.pools.iter().zip(&self.frozen);
        regions.filter(|(_, frozen)| !**frozen).any(|(pools, _)| {
            let (Some(spare), Some(minus)) = (pools.spares().next(), pools.minus().next()) else {
                return false;
            };
            // Hydrogens stay: a zwitterion is no tautomer of its neutral form.
            let hydrogens = pools.hydrogen();
            let held: Vec<u32> = hydrogens.flat_map(|v| [v, matching.mate(v)]).collect();
            let exposed = matching.part(minus);
            matching.set_removed(minus, true);
            matching.set_removed(spare, false);
            held.iter().for_each(|&v| matching.set_removed(v, true));
            let cancels = matching.augment(exposed);
            held.iter().for_each(|&v| matching.set_removed(v, false));
            if !cancels {
                matching.undo_to(0);
                matching.set_removed(minus, false);
                matching.set_removed(spare, true);
            }
            cancels
        })
    }

    /// Finds the regions that stay as drawn: those beside charges or open valences beyond the model, and
    /// those with something drawn that has no place in it.
    fn freeze(&mut self, skeleton: &Skeleton, rooms: &[Room], matching: &Matching) {
        self.frozen.clear();
        self.frozen.resize(self.pools.len(), false);
        for atom in 0..skeleton.len() as u32 {
            let region = self.region[atom as usize];
            if region == NONE {
                continue;
            }
            let mut vertices = self.vertices(rooms, atom);
            let loose = vertices.any(|v| matching.mate(v) == NONE);
            let mut arcs = skeleton.arcs(atom).iter();
            if loose || arcs.any(|&(to, _)| rooms[to as usize].opaque) {
                self.frozen[region as usize] = true;
            }
        }
        for (pools, frozen) in self.pools.iter().zip(&mut self.frozen) {
            let mut all = pools.first..pools.spares().start;
            *frozen |= all.any(|v| matching.mate(v) == NONE);
        }
    }

    /// Turns carbons into sites that exchange a hydrogen with a site; whether there were any.
    fn grow(
        &mut self,
        skeleton: &Skeleton,
        drawing: &Drawing,
        rooms: &mut [Room],
        matching: &mut Matching,
    ) -> bool {
        let mut grown = Vec::new();
        self.mobile.clear();
        self.mobile.resize(self.pools.len(), false);
        let mut members = vec![Vec::new(); self.pools.len()];
        for (atom, &region) in (0..).zip(&self.region) {
            if region != NONE {
                members[region as usize].push(atom);
            }
        }
        for (region, atoms) in members.iter().enumerate() {
            let sites = atoms.iter().any(|&a| rooms[a as usize].site);
            if self.frozen[region] || !sites || atoms.len() < 2 {
                continue;
            }
            let pools = self.pools[region];
            if pools.hydrogens > 0 {
                // Whichever place can be freed while a hydrogen goes elsewhere can take one.
                matching.set_removed(pools.host(), false);
                matching.explore(pools.host());
                matching.set_removed(pools.host(), true);
                for &atom in atoms {
                    let outer = self.vertices(rooms, atom).any(|v| {
                        matching.is_outer(v) && !pools.hydrogen().contains(&matching.mate(v))
                    });
                    let room = &rooms[atom as usize];
                    self.mobile[region] |= outer && room.site;
                    if outer && room.candidate && !room.site {
                        grown.push(atom);
                    }
                }
            }
            // A carbon beside a place that can be freed by a hydrogen more can give it one.
            matching.set_removed(pools.guest(), false);
            matching.explore(pools.guest());
            matching.set_removed(pools.guest(), true);
            for &atom in atoms {
                if !self.vertices(rooms, atom).any(|v| matching.is_outer(v)) {
                    continue;
                }
                for &(to, bond) in skeleton.arcs(atom) {
                    let room = &rooms[to as usize];
                    let gives = room.candidate && !room.site && room.vertices == 0;
                    if gives
                        && self.shifts[bond as usize]
                        && natural_hydrogens(skeleton, drawing, to) > 0
                        && !grown.contains(&to)
                    {
                        grown.push(to);
                    }
                }
            }
        }
        for &atom in &grown {
            let room = &mut rooms[atom as usize];
            room.site = true;
            room.vertices = 1;
        }
        !grown.is_empty()
    }
}

/// Hydrogens of no stated mass.
pub(super) fn natural_hydrogens(skeleton: &Skeleton, drawing: &Drawing, atom: u32) -> u32 {
    let record = &skeleton.atoms[atom as usize];
    let labelled = [0, 4, 8].map(|shift| u32::from(record.labelled >> shift & 15));
    u32::from(drawing.hydrogens[atom as usize]).saturating_sub(labelled.iter().sum())
}

/// The mobile hydrogens that are drawn on an atom: all of a heteroatom's, one of a carbon's if it has
/// no π bond.
pub(super) fn mobile_hydrogens(
    skeleton: &Skeleton,
    drawing: &Drawing,
    rooms: &[Room],
    atom: u32,
) -> u32 {
    let room = &rooms[atom as usize];
    if !room.site {
        return 0;
    }
    if room.hetero {
        return natural_hydrogens(skeleton, drawing, atom);
    }
    let arcs = skeleton.arcs(atom).iter();
    let bonds: u8 = arcs
        .map(|&(_, bond)| pi(drawing.orders[bond as usize]))
        .sum();
    u32::from(bonds == 0)
}
