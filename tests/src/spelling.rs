//! Random spellings: a SMILES writer that shares nothing with the library's own.

use std::collections::{BTreeMap, BTreeSet};

use molkin_graph::{CanonicalForm, Element, FormStereo, Ligand, Shape};

use crate::Numbers;

/// A SMILES of the form that starts at a random atom and takes branches, ring labels and brackets
/// at random; `None` where the form has marked axes or coordination centres, bonds that are no
/// electron pairs, or marked double bonds whose `/` and `\` would mark others as well.
///
/// Recursive: for molecules of ordinary size.
pub fn random_spelling(form: &CanonicalForm, numbers: &mut Numbers) -> Option<String> {
    let mut speller = Speller::new(form, numbers)?;
    let mut starts = numbers.order(form.atoms.len());
    let mut text = String::new();
    while let Some(start) = starts.pop() {
        if speller.seen.contains(&start) {
            continue;
        }
        if !text.is_empty() {
            text.push('.');
        }
        speller.explore(start, None, numbers);
        speller.write(start, None, numbers, &mut text);
    }
    Some(text)
}

struct Speller<'f> {
    form: &'f CanonicalForm,
    neighbours: Vec<Vec<u32>>,
    orders: BTreeMap<(u32, u32), u8>,
    centres: BTreeMap<u32, &'f FormStereo>,
    /// Whether the second atom is above the first, both ways.
    slopes: BTreeMap<(u32, u32), bool>,
    seen: BTreeSet<u32>,
    children: Vec<Vec<u32>>,
    rings: Vec<Vec<u32>>,
    labels: BTreeMap<(u32, u32), usize>,
}

impl<'f> Speller<'f> {
    fn new(form: &'f CanonicalForm, numbers: &mut Numbers) -> Option<Self> {
        let mut neighbours = vec![Vec::new(); form.atoms.len()];
        let mut orders = BTreeMap::new();
        for &(a, b, order) in &form.bonds {
            for (from, to) in [(a, b), (b, a)] {
                neighbours[from as usize].push(to);
                orders.insert((from, to), order);
            }
        }
        let pairs_only = form.bonds.iter().all(|bond| (1..=4).contains(&bond.2));
        if !pairs_only || !form.coordination.is_empty() {
            return None;
        }
        let mut centres = BTreeMap::new();
        for mark in &form.stereo {
            match mark.shape {
                Shape::Tetrahedral => centres.insert(mark.centres[0], mark),
                Shape::DoubleBond => continue,
                Shape::Axis => return None,
            };
        }
        Some(Self {
            form,
            children: vec![Vec::new(); neighbours.len()],
            rings: vec![Vec::new(); neighbours.len()],
            slopes: slopes(form, &orders, numbers)?,
            neighbours,
            orders,
            centres,
            seen: BTreeSet::new(),
            labels: BTreeMap::new(),
        })
    }

    /// A random depth-first tree; the other bonds close rings.
    fn explore(&mut self, atom: u32, parent: Option<u32>, numbers: &mut Numbers) {
        self.seen.insert(atom);
        let mut neighbours = self.neighbours[atom as usize].clone();
        numbers.shuffle(&mut neighbours);
        for next in neighbours {
            if Some(next) == parent || self.rings[atom as usize].contains(&next) {
                continue;
            }
            if self.seen.contains(&next) {
                self.rings[atom as usize].push(next);
                self.rings[next as usize].push(atom);
            } else {
                self.children[atom as usize].push(next);
                self.explore(next, Some(atom), numbers);
            }
        }
    }

    fn write(&mut self, atom: u32, parent: Option<u32>, numbers: &mut Numbers, text: &mut String) {
        let mut rings = std::mem::take(&mut self.rings[atom as usize]);
        numbers.shuffle(&mut rings);
        let children = std::mem::take(&mut self.children[atom as usize]);
        let hidden = [Ligand::Hydrogen, Ligand::LonePair];
        let hidden = self.centres.get(&atom).into_iter().flat_map(|mark| {
            mark.ligands
                .into_iter()
                .filter(|ligand| hidden.contains(ligand))
        });
        let written: Vec<Ligand> = parent
            .map(Ligand::Atom)
            .into_iter()
            .chain(hidden)
            .chain(rings.iter().chain(&children).map(|&to| Ligand::Atom(to)))
            .collect();
        let tag = self.centres.get(&atom).map(|mark| tag(mark, &written));
        *text += &self.atom(atom, tag.unwrap_or_default(), numbers);
        let mut closed = Vec::new();
        for to in rings {
            let opened = self.labels.get(&(to, atom)).copied();
            let label = opened.unwrap_or_else(|| self.free_label(&closed, numbers));
            if opened.is_some() {
                self.labels.remove(&(to, atom));
                closed.push(label);
            } else {
                self.labels.insert((atom, to), label);
            }
            // Both ends may say the order; the first one must not be left to chance.
            if opened.is_none() || numbers.coin() {
                *text += self.bond(atom, to);
            }
            *text += &match label {
                0..10 if numbers.coin() => label.to_string(),
                _ => format!("%{label:02}"),
            };
        }
        for (at, &child) in children.iter().enumerate() {
            let branch = at + 1 < children.len();
            *text += if branch { "(" } else { "" };
            *text += self.bond(atom, child);
            self.write(child, Some(atom), numbers, text);
            *text += if branch { ")" } else { "" };
        }
    }

    /// A label that is not in use, nor was at this atom.
    fn free_label(&self, closed: &[usize], numbers: &mut Numbers) -> usize {
        let taken: BTreeSet<usize> = self.labels.values().chain(closed).copied().collect();
        let free: Vec<usize> = (0..100).filter(|label| !taken.contains(label)).collect();
        free[numbers.below(free.len().min(12))]
    }

    fn bond(&self, from: u32, to: u32) -> &'static str {
        match (self.orders[&(from, to)], self.slopes.get(&(from, to))) {
            (1, None) => "",
            (1, Some(true)) => "/",
            (1, Some(false)) => "\\",
            (2, _) => "=",
            (3, _) => "#",
            _ => "$",
        }
    }

    fn atom(&self, index: u32, tag: &str, numbers: &mut Numbers) -> String {
        let atom = &self.form.atoms[index as usize];
        let bonds = self.neighbours[index as usize].iter();
        let orders: u8 = bonds.map(|&to| self.orders[&(index, to)]).sum();
        let usual = match atom.element {
            Element::CARBON => 4,
            Element::NITROGEN => 3,
            Element::OXYGEN => 2,
            Element::FLUORINE => 1,
            _ => u8::MAX,
        };
        let plain = atom.isotope.is_none() && atom.charge == 0 && tag.is_empty();
        let symbol = atom.element.symbol();
        if plain && orders.saturating_add(atom.hydrogens) == usual && numbers.below(4) > 0 {
            return symbol.to_owned();
        }
        let isotope = atom
            .isotope
            .map(|mass| mass.to_string())
            .unwrap_or_default();
        let hydrogens = match atom.hydrogens {
            0 => String::new(),
            1 => "H".to_owned(),
            count => format!("H{count}"),
        };
        let charge = match atom.charge {
            0 => String::new(),
            charge => format!("{charge:+}"),
        };
        format!("[{isotope}{symbol}{tag}{hydrogens}{charge}]")
    }
}

/// `@` or `@@` for ligands in the order in which they are written.
fn tag(mark: &FormStereo, written: &[Ligand]) -> &'static str {
    let places = mark
        .ligands
        .map(|ligand| written.iter().position(|other| *other == ligand));
    let pairs = (0..4).flat_map(|b| (0..b).map(move |a| (a, b)));
    let inversions = pairs.filter(|&(a, b)| places[a] > places[b]).count();
    if mark.parity.is_odd() ^ (inversions % 2 == 1) {
        "@@"
    } else {
        "@"
    }
}

/// For each bond, given by its end and ligand, the bonds tied to it, and whether its ligand is above
/// its end exactly when theirs is.
type Ties = BTreeMap<(u32, u32), Vec<((u32, u32), bool)>>;

/// Directions of the single bonds at marked double bonds.
fn slopes(
    form: &CanonicalForm,
    orders: &BTreeMap<(u32, u32), u8>,
    numbers: &mut Numbers,
) -> Option<BTreeMap<(u32, u32), bool>> {
    let mut ties = Ties::new();
    let mut marked = BTreeSet::new();
    for mark in form
        .stereo
        .iter()
        .filter(|mark| mark.shape == Shape::DoubleBond)
    {
        let [a, b] = mark.centres;
        orders.get(&(a, b)).filter(|&&order| order == 2)?;
        marked.extend([(a, b), (b, a)]);
        let bonds: Vec<((u32, u32), bool)> = (0..4)
            .filter_map(|at| match mark.ligands[at] {
                // The second ligand of an end is on the other side than the first.
                Ligand::Atom(ligand) => Some(((mark.centres[at / 2], ligand), at % 2 == 1)),
                _ => None,
            })
            .collect();
        let both_ends = [a, b]
            .iter()
            .all(|end| bonds.iter().any(|(bond, _)| bond.0 == *end));
        if !both_ends || bonds.iter().any(|(bond, _)| orders[bond] != 1) {
            return None;
        }
        let far = |bond: (u32, u32)| bond.0 == b;
        for &(x, second_x) in &bonds {
            for &(y, second_y) in &bonds {
                let across = (far(x) != far(y)) && mark.parity.is_odd();
                ties.entry(x)
                    .or_default()
                    .push((y, !(second_x ^ second_y ^ across)));
            }
        }
    }
    let slopes = solve(&ties, numbers)?;
    let sloping: BTreeSet<u32> = slopes.keys().map(|&(from, _)| from).collect();
    let stray = orders.iter().any(|(&(a, b), &order)| {
        order == 2 && sloping.contains(&a) && sloping.contains(&b) && !marked.contains(&(a, b))
    });
    (!stray).then_some(slopes)
}

fn solve(ties: &Ties, numbers: &mut Numbers) -> Option<BTreeMap<(u32, u32), bool>> {
    let mut slopes: BTreeMap<(u32, u32), bool> = BTreeMap::new();
    for &start in ties.keys() {
        let mut waiting = vec![];
        if !slopes.contains_key(&start) {
            waiting.push((start, numbers.coin()));
        }
        while let Some((bond, up)) = waiting.pop() {
            match slopes.get(&bond) {
                Some(&known) if known == up => continue,
                Some(_) => return None,
                None => {}
            }
            let back = (bond.1, bond.0);
            slopes.insert(bond, up);
            slopes.insert(back, !up);
            for (from, up) in [(bond, up), (back, !up)] {
                let tied = ties.get(&from).into_iter().flatten();
                waiting.extend(tied.map(|&(other, alike)| (other, up == alike)));
            }
        }
    }
    Some(slopes)
}
