//! The graph that the search orders: coloured vertices, classed edges, oriented units.

use crate::Polyhedron;

use super::{Labelling, partition::Partition, parts::Parts};

/// Bits that the count of one edge class takes in a refinement key, so there is room for seven
/// classes and a vertex may have at most 511 neighbours.
pub(super) const COUNT_BITS: u32 = 9;

/// A unit whose orientation the order has to respect: four ligands in order and which of the two
/// arrangements they have. Ligands from `vertices` upwards are not vertices (a hydrogen, a lone
/// pair); they rank above all vertices and among each other by number.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub(crate) struct Unit {
    /// The centre twice, or the two ends, each with two ligands.
    pub(crate) centres: [u32; 2],
    pub(crate) ligands: [u32; 4],
    pub(crate) odd: bool,
    /// Kind and marking, part of the unit's colour.
    pub(crate) colour: u32,
}

impl Unit {
    /// All that the unit is about; some may be no vertices.
    pub(super) fn vertices(&self) -> impl Iterator<Item = u32> {
        self.centres.into_iter().chain(self.ligands)
    }

    /// What it links. Its orientation may depend on the order within cells, and if not, which end
    /// belongs to which is still part of the structure.
    pub(super) fn link(&self, partition: &Partition, vertices: u32) -> Link {
        let rank = |v: u32| partition.rank(v, vertices);
        if ranked_parity(self, rank).is_none() {
            return Link::All;
        }
        let is_open = |v: u32| v < vertices && partition.is_open(v);
        let [a, b] = self.centres;
        // Two ends that make up a cell belong to each other whatever their order.
        let whole_cell = |cell| cell == rank(b) && partition.len[cell as usize] == 2;
        if a != b && is_open(a) && is_open(b) && !whole_cell(rank(a)) {
            Link::Ends
        } else {
            Link::Nothing
        }
    }

    /// Renames all that the unit is about.
    fn renamed(&self, name: impl Fn(u32) -> u32) -> Self {
        Self {
            centres: self.centres.map(&name),
            ligands: self.ligands.map(&name),
            ..*self
        }
    }
}

/// The open vertices that a unit links under a partition: no automorphism moves one without the others.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub(super) enum Link {
    /// All that it is about.
    All,
    /// Its two ends.
    Ends,
    /// None.
    Nothing,
}

/// A centre with its ligands placed on a polyhedron: vertices, or numbers above all vertices.
#[derive(Debug, Clone, PartialEq, Eq)]
pub(crate) struct Placed {
    pub(crate) centre: u32,
    pub(crate) polyhedron: Polyhedron,
    pub(crate) ligands: Vec<u32>,
}

impl Placed {
    /// The centre and the ligands; some may be no vertices.
    pub(super) fn vertices(&self) -> impl Iterator<Item = u32> + '_ {
        std::iter::once(self.centre).chain(self.ligands.iter().copied())
    }

    /// The least sequence of ranks that rotation can bring about: invariant, and complete once all
    /// ligands have ranks of their own.
    pub(super) fn ranks(&self, rank: impl Fn(u32) -> u32) -> Vec<u32> {
        let ranks: Vec<u32> = self.ligands.iter().map(|&ligand| rank(ligand)).collect();
        self.polyhedron.least(&ranks)
    }
}

/// A coloured graph in compressed form. Colours are arbitrary words and part of the certificate.
#[derive(Debug, Default, Clone)]
pub(crate) struct Coloured {
    pub(super) colours: Vec<u64>,
    start: Vec<u32>,
    arcs: Vec<(u32, u8)>,
    pub(crate) units: Vec<Unit>,
    pub(crate) placed: Vec<Placed>,
    /// Below this lie the numbers that stand for vertices outside of a part, if this is one.
    outside: u32,
    root: Partition,
    knows_root: bool,
    /// The labelling without units and placed centres.
    plain: Labelling,
    knows_plain: bool,
}

impl Coloured {
    /// Loads vertices and edges; edge classes are below seven.
    pub(crate) fn load(
        &mut self,
        colours: impl Iterator<Item = u64>,
        edges: impl Iterator<Item = (u32, u32, u8)> + Clone,
    ) {
        self.load_vertices(colours);
        self.start.clear();
        self.start.resize(self.colours.len() + 1, 0);
        let mut sum = 0;
        for (a, b, _) in edges.clone() {
            self.start[a as usize] += 1;
            self.start[b as usize] += 1;
            sum += 2;
        }
        self.arcs.clear();
        self.arcs.resize(sum, (0, 0));
        let mut total = 0;
        for slot in &mut self.start {
            total += *slot;
            *slot = total;
        }
        for (a, b, class) in edges {
            for (from, to) in [(a, b), (b, a)] {
                self.start[from as usize] -= 1;
                self.arcs[self.start[from as usize] as usize] = (to, class);
            }
        }
    }

    /// Loads vertices, and for each its neighbours with the classes of the edges. Every edge has to
    /// come from both of its ends.
    pub(crate) fn load_arcs<A: Iterator<Item = (u32, u8)>>(
        &mut self,
        colours: impl Iterator<Item = u64>,
        arcs: impl Fn(u32) -> A,
    ) {
        self.load_vertices(colours);
        self.start.clear();
        self.arcs.clear();
        for vertex in 0..self.colours.len() as u32 {
            self.start.push(self.arcs.len() as u32);
            self.arcs.extend(arcs(vertex));
        }
        self.start.push(self.arcs.len() as u32);
    }

    fn load_vertices(&mut self, colours: impl Iterator<Item = u64>) {
        self.forget();
        self.units.clear();
        self.placed.clear();
        self.colours.clear();
        self.colours.extend(colours);
        self.outside = self.colours.len() as u32;
    }

    /// Loads a part of a graph, coloured by the cells of a partition. Vertex `i` of the part is
    /// `vertices[i]`, and `local` is filled with the inverse. Whatever units need from outside of
    /// the part is in a cell of its own, and gets a number above all vertices that says which.
    pub(super) fn load_part(
        &mut self,
        graph: &Self,
        partition: &Partition,
        parts: &Parts,
        part: u32,
        local: &mut Vec<u32>,
    ) {
        let vertices = &parts.vertices[parts.parts[part as usize].range()];
        local.resize(graph.len().max(local.len()), 0);
        for (at, &vertex) in (0..).zip(vertices) {
            local[vertex as usize] = at;
        }
        let inside = |v: u32| vertices.get(local[v as usize] as usize) == Some(&v);
        self.colours.clear();
        self.start.clear();
        self.arcs.clear();
        for &vertex in vertices {
            self.colours.push(partition.cell[vertex as usize].into());
            self.start.push(self.arcs.len() as u32);
            let arcs = graph.arcs(vertex).iter();
            let own = arcs.filter(|&&(to, _)| inside(to));
            self.arcs
                .extend(own.map(|&(to, class)| (local[to as usize], class)));
        }
        self.start.push(self.arcs.len() as u32);
        let all = graph.len() as u32;
        self.outside = graph.outside + all;
        let name = |v: u32| match v {
            v if v >= all => v,
            v if inside(v) => local[v as usize],
            v => graph.outside + partition.cell[v as usize],
        };
        // The numbers from outside rank otherwise than in the whole; the parity takes that up.
        let before = |v: u32| match v {
            v if v < all && inside(v) => (partition.cell[v as usize], local[v as usize]),
            v => (partition.rank(v, all), 0),
        };
        self.units.clear();
        for index in Parts::entries(&parts.units, part) {
            let unit = &graph.units[index as usize];
            let mut own = unit.renamed(name);
            own.odd ^= ranked_parity(unit, before) != ranked_parity(&own, |v| v);
            self.units.push(own);
        }
        self.placed.clear();
        for index in Parts::entries(&parts.placed, part) {
            let placed = &graph.placed[index as usize];
            self.placed.push(Placed {
                centre: name(placed.centre),
                polyhedron: placed.polyhedron,
                ligands: placed.ligands.iter().map(|&v| name(v)).collect(),
            });
        }
    }

    /// The colours, to be changed.
    pub(crate) fn colours_mut(&mut self) -> &mut [u64] {
        self.forget();
        &mut self.colours
    }

    /// Forgets what was kept about colours and edges.
    fn forget(&mut self) {
        self.knows_root = false;
        self.knows_plain = false;
    }

    /// The equitable partition that colours and edges alone give, once it was found. The same graph is
    /// ordered under changing units and placed centres, and all these refinements start with it.
    pub(super) fn root(&self) -> Option<&Partition> {
        self.knows_root.then_some(&self.root)
    }

    pub(super) fn keep_root(&mut self, partition: &Partition) {
        self.root.clone_from(partition);
        self.knows_root = true;
    }

    /// Keeps the labelling without units and placed centres, for labellings under units that leave the
    /// order as it is. Where the whole graph was searched, units may lead to another order.
    pub(crate) fn keep_plain(&mut self, labelling: &Labelling) {
        self.knows_plain = !labelling.searched && self.placed.is_empty();
        if self.knows_plain {
            self.plain.clone_from(labelling);
        }
    }

    /// The labelling without units, if that with them, whose root is `partition`, differs from it in
    /// nothing but the words on units. It does not where the units split no cell and link no vertices:
    /// then the same parts are ordered and sorted, none of them with a unit.
    pub(super) fn plain_under(&self, partition: &Partition) -> Option<&Labelling> {
        let links = |unit: &Unit| unit.link(partition, self.len() as u32) != Link::Nothing;
        let alike = self.knows_plain
            && self.placed.is_empty()
            && self.knows_root
            && partition.cells == self.root.cells
            && !self.units.iter().any(links);
        alike.then_some(&self.plain)
    }

    /// The number of vertices.
    pub(crate) fn len(&self) -> usize {
        self.colours.len()
    }

    /// Neighbours with edge classes.
    pub(crate) fn arcs(&self, vertex: u32) -> &[(u32, u8)] {
        let at = vertex as usize;
        &self.arcs[self.start[at] as usize..self.start[at + 1] as usize]
    }

    /// Whether some vertex has more neighbours than refinement keys can count.
    pub(crate) fn exceeds_degree(&self) -> bool {
        self.arcs.len() >= 1 << COUNT_BITS
            && self
                .start
                .windows(2)
                .any(|pair| pair[1] - pair[0] >= 1 << COUNT_BITS)
    }
}

/// The parity of a unit when its ligands are put in the order of `rank`, and its centres in that
/// order too: `None` while two of its ligands share a rank.
pub(crate) fn ranked_parity<R: Ord + Copy>(unit: &Unit, rank: impl Fn(u32) -> R) -> Option<bool> {
    let mut ranks = unit.ligands.map(&rank);
    let mut odd = unit.odd;
    // Exchanging the two ends moves two ligands past two others, which is even, so only the order
    // within each end matters for a double bond or an axis.
    let pairs: &[(usize, usize)] = if unit.centres[0] == unit.centres[1] {
        &[(0, 1), (2, 3), (0, 2), (1, 3), (1, 2)]
    } else {
        &[(0, 1), (2, 3)]
    };
    for &(i, j) in pairs {
        if ranks[i] == ranks[j] {
            return None;
        }
        if ranks[i] > ranks[j] {
            ranks.swap(i, j);
            odd = !odd;
        }
    }
    Some(odd)
}
