//! The order against all permutations, on small graphs with units.

use std::collections::BTreeSet;

use super::*;
use crate::Polyhedron;

/// Marsaglia's xorshift: cases that repeat.
struct Numbers(u64);

impl Numbers {
    fn new(seed: u64) -> Self {
        Self(seed.wrapping_mul(0x9e37_79b9_7f4a_7c15) | 1)
    }

    fn below(&mut self, bound: u32) -> u32 {
        self.0 ^= self.0 << 13;
        self.0 ^= self.0 >> 7;
        self.0 ^= self.0 << 17;
        ((self.0 >> 16) % u64::from(bound)) as u32
    }

    fn permutation(&mut self, length: u32) -> Vec<u32> {
        let mut image: Vec<u32> = (0..length).collect();
        for at in (1..length).rev() {
            image.swap(at as usize, self.below(at + 1) as usize);
        }
        image
    }
}

/// A graph as lists, to be renumbered and reflected.
#[derive(Debug, Clone, Default)]
struct Sketch {
    colours: Vec<u64>,
    edges: Vec<(u32, u32, u8)>,
    units: Vec<Unit>,
    placed: Vec<Placed>,
}

impl Sketch {
    fn bare(colours: &[u64], edges: &[(u32, u32, u8)]) -> Self {
        Self {
            colours: colours.to_vec(),
            edges: edges.to_vec(),
            ..Self::default()
        }
    }

    fn graph(&self) -> Coloured {
        let mut graph = Coloured::default();
        graph.load(self.colours.iter().copied(), self.edges.iter().copied());
        graph.units.clone_from(&self.units);
        graph.placed.clone_from(&self.placed);
        graph
    }

    fn renumbered(&self, image: &[u32]) -> Self {
        let name = |v: u32| image.get(v as usize).copied().unwrap_or(v);
        let mut colours = self.colours.clone();
        for (vertex, &colour) in self.colours.iter().enumerate() {
            colours[image[vertex] as usize] = colour;
        }
        let edges = self.edges.iter();
        let units = self.units.iter().map(|unit| Unit {
            centres: unit.centres.map(name),
            ligands: unit.ligands.map(name),
            ..*unit
        });
        let placed = self.placed.iter().map(|placed| Placed {
            centre: name(placed.centre),
            polyhedron: placed.polyhedron,
            ligands: placed.ligands.iter().map(|&v| name(v)).collect(),
        });
        Self {
            colours,
            edges: edges.map(|&(a, b, c)| (name(a), name(b), c)).collect(),
            units: units.collect(),
            placed: placed.collect(),
        }
    }

    fn label(&self) -> Labelling {
        label(&mut self.graph(), &mut Labeller::default())
    }

    /// The labelling without parts.
    fn label_in_one(&self) -> Labelling {
        let mut labeller = Labeller::default();
        labeller.level.nested = level::MOST_NESTED;
        label(&mut self.graph(), &mut labeller)
    }

    /// The certificate that an order gives.
    fn written(&self, order: &[u32]) -> Vec<u64> {
        let (mut pos, mut words) = (Vec::new(), Vec::new());
        write_certificate(&self.graph(), order, &mut pos, &mut words);
        words
    }

    fn neighbours(&self, vertex: u32) -> Vec<u32> {
        let ends = self.edges.iter().flat_map(|&(a, b, _)| [(a, b), (b, a)]);
        ends.filter(|&(a, _)| a == vertex).map(|(_, b)| b).collect()
    }

    /// A graph of degree four at the most, with units wherever one fits, some left out.
    fn random(numbers: &mut Numbers, vertices: u32, density: u32) -> Self {
        let mut sketch = Self {
            colours: (0..vertices)
                .map(|_| u64::from(numbers.below(8) / 7))
                .collect(),
            ..Self::default()
        };
        for a in 0..vertices {
            for b in 0..a {
                let room = [a, b].iter().all(|&v| sketch.neighbours(v).len() < 4);
                if room && numbers.below(10) < density {
                    sketch.edges.push((a, b, (numbers.below(12) / 11) as u8));
                }
            }
        }
        sketch.add_units(numbers);
        sketch
    }

    fn add_units(&mut self, numbers: &mut Numbers) {
        const HYDROGEN: u32 = u32::MAX - 8;
        for vertex in 0..self.colours.len() as u32 {
            let mut ligands = self.neighbours(vertex);
            if ligands.len() == 4 && numbers.below(6) == 0 {
                self.placed.push(Placed {
                    centre: vertex,
                    polyhedron: Polyhedron::SquarePlanar,
                    ligands: ligands.clone(),
                });
                continue;
            }
            if ligands.len() == 3 {
                ligands.push(HYDROGEN);
            }
            if let [a, b, c, d] = ligands[..]
                && numbers.below(3) > 0
            {
                self.units.push(Unit {
                    centres: [vertex; 2],
                    ligands: [a, b, c, d],
                    odd: numbers.below(2) == 1,
                    colour: 0,
                });
            }
        }
        for (a, b, _) in self.edges.clone() {
            let ends = [(a, b), (b, a)].map(|(end, other)| {
                let mut own: Vec<u32> = self.neighbours(end);
                own.retain(|&v| v != other);
                own.push(HYDROGEN);
                own
            });
            let fits = ends.iter().all(|own| (2..=3).contains(&own.len()));
            if fits && numbers.below(3) > 0 {
                self.units.push(Unit {
                    centres: [a, b],
                    ligands: [ends[0][0], ends[0][1], ends[1][0], ends[1][1]],
                    odd: numbers.below(2) == 1,
                    colour: 1,
                });
            }
        }
    }
}

fn label(graph: &mut Coloured, labeller: &mut Labeller) -> Labelling {
    let mut labelling = Labelling::default();
    let mut steps = 0;
    let outcome = labeller.label(graph, &Limits::default(), &mut steps, &mut labelling);
    assert_eq!(outcome, Ok(()));
    labelling
}

fn permutations(length: u32) -> Vec<Vec<u32>> {
    let mut all = vec![Vec::new()];
    for _ in 0..length {
        let longer = |part: Vec<u32>| {
            let free = (0..length)
                .filter(|v| !part.contains(v))
                .collect::<Vec<_>>();
            free.into_iter()
                .map(move |v| [part.clone(), vec![v]].concat())
        };
        all = all.into_iter().flat_map(longer).collect();
    }
    all
}

/// The number of elements of the group that permutations generate.
fn group_order(generators: &Generators, vertices: u32) -> usize {
    let identity: Vec<u32> = (0..vertices).collect();
    let mut group = BTreeSet::from([identity.clone()]);
    let mut waiting = vec![identity];
    while let Some(element) = waiting.pop() {
        for generator in generators.iter() {
            let product: Vec<u32> = element.iter().map(|&v| generator.image(v)).collect();
            if group.insert(product.clone()) {
                waiting.push(product);
            }
        }
    }
    group.len()
}

/// Random graphs of up to seven vertices with units: a renumbered copy has the same certificate, the
/// generators generate exactly the permutations that keep the graph, and of graphs with equal
/// certificates one is a renumbering of the other.
#[test]
fn small_graphs_with_units_against_all_permutations() {
    let mut numbers = Numbers::new(7);
    let all: Vec<_> = (0..=7).map(permutations).collect();
    let mut symmetric = 0;
    for case in 0..1_500 {
        let vertices = 3 + case % 5;
        let density = 3 + numbers.below(5);
        let sketch = Sketch::random(&mut numbers, vertices, density);
        let own = sketch.label();
        assert_eq!(own.certificate, sketch.written(&own.order));
        let copy = sketch.renumbered(&numbers.permutation(vertices));
        assert_eq!(own.certificate, copy.label().certificate, "{sketch:?}");

        let identity = sketch.written(&all[vertices as usize][0]);
        let keeps = |order: &&Vec<u32>| sketch.written(order) == identity;
        let kept = all[vertices as usize].iter().filter(keeps).count();
        assert_eq!(group_order(&own.generators, vertices), kept, "{sketch:?}");
        symmetric += usize::from(kept > 1);
        let in_one = [&sketch, &copy].map(Sketch::label_in_one);
        assert_eq!(in_one[0].certificate, in_one[1].certificate, "{sketch:?}");
        assert_eq!(group_order(&in_one[0].generators, vertices), kept);

        let mut other = sketch.clone();
        for unit in &mut other.units {
            unit.odd ^= numbers.below(2) == 1;
        }
        let isomorphic = all[vertices as usize]
            .iter()
            .any(|order| other.written(order) == identity);
        let equal = other.label().certificate == own.certificate;
        assert_eq!(equal, isomorphic, "{sketch:?}\n{other:?}");
    }
    assert!(symmetric > 500, "{symmetric}");
}

/// One graph under changing units, as claims label it: what was kept about colours and edges makes no
/// difference. Some of these units leave the order as it is without them, and some change it.
#[test]
fn what_is_kept_about_a_graph_makes_no_difference() {
    let mut numbers = Numbers::new(13);
    let (mut alike, mut otherwise) = (0, 0);
    for case in 0..1_500 {
        let density = 3 + numbers.below(5);
        let sketch = Sketch::random(&mut numbers, 3 + case % 9, density);
        let mut labeller = Labeller::default();
        let mut graph = sketch.graph();
        let units = std::mem::take(&mut graph.units);
        let plain = label(&mut graph, &mut labeller);
        graph.keep_plain(&plain);
        graph.units = units;
        let own = label(&mut graph, &mut labeller);
        let fresh = sketch.label();
        assert_eq!(own.order, fresh.order, "{sketch:?}");
        assert_eq!(own.rank, fresh.rank, "{sketch:?}");
        assert_eq!(own.certificate, fresh.certificate, "{sketch:?}");
        let moved = |own: &Labelling| -> Vec<Vec<(u32, u32)>> {
            let generators = own.generators.iter();
            generators.map(|g| g.moved().to_vec()).collect()
        };
        assert_eq!(moved(&own), moved(&fresh), "{sketch:?}");
        let kept = graph.plain_under(&labeller.level.partition).is_some();
        alike += usize::from(kept && !graph.units.is_empty());
        otherwise += usize::from(!kept);
    }
    assert!(alike > 100 && otherwise > 100, "{alike} {otherwise}");
}

/// Larger graphs made of copies of small ones: all renumberings agree, and every generator keeps
/// the graph.
#[test]
fn copies_of_graphs_with_units_under_renumbering() {
    let mut numbers = Numbers::new(11);
    for case in 0..400 {
        let size = 3 + case % 6;
        let piece = Sketch::random(&mut numbers, size, 5);
        let hub = numbers.below(2) == 1;
        let copies = 2 + case % 4;
        let mut sketch = Sketch::default();
        for copy in 0..copies {
            let shift: Vec<u32> = (0..size).map(|v| v + copy * size).collect();
            let mut own = piece.clone();
            if let Some(unit) = own.units.first_mut() {
                unit.odd ^= numbers.below(3) == 0;
            }
            let name = |v: u32| shift.get(v as usize).copied().unwrap_or(v);
            sketch.colours.extend(&own.colours);
            let edges = own.edges.iter();
            sketch
                .edges
                .extend(edges.map(|&(a, b, c)| (name(a), name(b), c)));
            sketch.units.extend(own.units.iter().map(|unit| Unit {
                centres: unit.centres.map(name),
                ligands: unit.ligands.map(name),
                ..*unit
            }));
            sketch.placed.extend(own.placed.iter().map(|placed| Placed {
                centre: name(placed.centre),
                polyhedron: placed.polyhedron,
                ligands: placed.ligands.iter().map(|&v| name(v)).collect(),
            }));
        }
        if hub {
            let centre = sketch.colours.len() as u32;
            sketch.colours.push(5);
            sketch
                .edges
                .extend((0..copies).map(|copy| (centre, copy * size, 0)));
        }
        let own = sketch.label();
        let identity: Vec<u32> = (0..sketch.colours.len() as u32).collect();
        let as_given = sketch.written(&identity);
        for generator in own.generators.iter() {
            let order: Vec<u32> = identity.iter().map(|&v| generator.image(v)).collect();
            assert_eq!(sketch.written(&order), as_given, "{sketch:?}");
        }
        for _ in 0..5 {
            let image = numbers.permutation(identity.len() as u32);
            let copy = sketch.renumbered(&image);
            assert_eq!(own.certificate, copy.label().certificate, "{sketch:?}");
        }
    }
}

/// All graphs of five vertices: equal certificates exactly for isomorphic ones. OEIS A000088
/// gives 34 graphs on five vertices.
#[test]
fn graphs_of_five_vertices() {
    let pairs: Vec<(u32, u32)> = (0..5)
        .flat_map(|a| (a + 1..5).map(move |b| (a, b)))
        .collect();
    let mut certificates = BTreeSet::new();
    for mask in 0u32..1 << pairs.len() {
        let edges: Vec<_> = pairs
            .iter()
            .enumerate()
            .filter(|(i, _)| mask >> i & 1 == 1)
            .map(|(_, &(a, b))| (a, b, 0))
            .collect();
        certificates.insert(Sketch::bare(&[0; 5], &edges).label().certificate);
    }
    assert_eq!(certificates.len(), 34);
}

/// The Petersen graph: 120 automorphisms (from memory: the symmetric group on five letters) act on
/// ten equivalent vertices; no numbering matters.
#[test]
fn petersen_graph() {
    let mut edges = Vec::new();
    for i in 0..5 {
        edges.extend([
            (i, (i + 1) % 5, 0),
            (i, i + 5, 0),
            (i + 5, (i + 2) % 5 + 5, 0),
        ]);
    }
    let sketch = Sketch::bare(&[0; 10], &edges);
    let reference = sketch.label();
    assert_eq!(group_order(&reference.generators, 10), 120);
    let mut numbers = Numbers::new(1);
    for _ in 1..200 {
        let copy = sketch.renumbered(&numbers.permutation(10)).label();
        assert_eq!(copy.certificate, reference.certificate);
    }
}

/// Vertices with the same neighbours: settled without a search, in steps that grow like the edges.
#[test]
fn twins_cost_no_search() {
    for (few, many) in [(4, 245), (4, 500), (1, 500), (30, 480)] {
        let edges: Vec<_> = (0..few)
            .flat_map(|a| (few..few + many).map(move |b| (a, b, 0)))
            .collect();
        let colours = vec![0; (few + many) as usize];
        let mut graph = Sketch::bare(&colours, &edges).graph();
        let (mut steps, mut labelling) = (0, Labelling::default());
        let outcome =
            Labeller::default().label(&mut graph, &Limits::default(), &mut steps, &mut labelling);
        assert_eq!(outcome, Ok(()));
        // Twins of one kind, neighbours of one kind: each is exchanged with the next.
        assert_eq!(labelling.generators.iter().len() as u32, few + many - 2);
        assert!(steps < 20 * edges.len() as u64, "{steps} steps");
    }
}

/// One labeller for graphs of all sizes, one after the other: nothing stays behind.
#[test]
fn scratch_is_reset() {
    let mut numbers = Numbers::new(3);
    let mut labeller = Labeller::default();
    for case in 0..300 {
        let vertices = 1 + (case * 7) % 20;
        let sketch = Sketch::random(&mut numbers, vertices, 3);
        let limit = Limits {
            order_steps: u64::from(numbers.below(200)),
            ..Limits::default()
        };
        // May end anywhere.
        let (mut steps, mut labelling) = (0, Labelling::default());
        let _ = labeller.label(&mut sketch.graph(), &limit, &mut steps, &mut labelling);
        let reused = label(&mut sketch.graph(), &mut labeller);
        assert_eq!(reused.certificate, sketch.label().certificate);
    }
}
