//! The least distance by trying every map, and random small isomers to try it on.

use super::{Distance, Side};

/// The least distance over all maps that keep the elements and map as many atoms as these allow; (iv) is that of the best
/// of them.
pub(super) fn least_distance(a: &Side, b: &Side) -> Distance {
    let table = |side: &Side| {
        let atoms = side.elements.len();
        let mut table = vec![vec![0_u8; atoms]; atoms];
        for &(first, second, class) in &side.bonds {
            table[first as usize][second as usize] = class;
            table[second as usize][first as usize] = class;
        }
        table
    };
    let tables = [table(a), table(b)];
    let count = |side: &Side, element| side.elements.iter().filter(|&&e| e == element).count();
    // How many atoms of each element may stay unmapped on the first side.
    let mut spare: Vec<usize> = (0..=u8::MAX)
        .map(|element| count(a, element).saturating_sub(count(b, element)))
        .collect();
    let mut least = None;
    extend(a, b, &tables, &mut Vec::new(), &mut spare, &mut least);
    least.unwrap_or_default()
}

/// Lays the next atom of the first side in every way.
fn extend(
    a: &Side,
    b: &Side,
    tables: &[Vec<Vec<u8>>; 2],
    image: &mut Vec<Option<usize>>,
    spare: &mut [usize],
    least: &mut Option<Distance>,
) {
    let Some(&element) = a.elements.get(image.len()) else {
        let distance = distance(a, b, tables, image);
        *least = Some(least.map_or(distance, |least| least.min(distance)));
        return;
    };
    for to in 0..b.elements.len() {
        if b.elements[to] == element && !image.contains(&Some(to)) {
            image.push(Some(to));
            extend(a, b, tables, image, spare, least);
            image.pop();
        }
    }
    if spare[usize::from(element)] > 0 {
        spare[usize::from(element)] -= 1;
        image.push(None);
        extend(a, b, tables, image, spare, least);
        image.pop();
        spare[usize::from(element)] += 1;
    }
}

fn distance(
    a: &Side,
    b: &Side,
    [left, right]: &[Vec<Vec<u8>>; 2],
    image: &[Option<usize>],
) -> Distance {
    let mut distance = Distance::default();
    let mut kept = 0;
    for (atom, to) in image.iter().enumerate() {
        let Some(to) = *to else { continue };
        distance.hydrogens += u32::from(a.hydrogens[atom].abs_diff(b.hydrogens[to]));
        distance.marks += u32::from(a.marks[atom] != b.marks[to]);
        for (other, far) in image.iter().enumerate().take(atom) {
            let Some(far) = *far else { continue };
            let (own, others) = (left[atom][other], right[to][far]);
            kept += u32::from(own != 0 && others != 0);
            distance.orders += u32::from(own != 0 && others != 0 && own != others);
        }
    }
    distance.bonds = (a.bonds.len() + b.bonds.len()) as u32 - 2 * kept;
    distance
}

/// Numbers that look random and are the same in every run (xorshift; Marsaglia, J. Stat. Softw. 8 (14), 2003).
pub(super) struct Numbers(u64);

impl Numbers {
    pub(super) fn new(seed: u64) -> Self {
        Self(super::symmetry::mix(seed, 1) | 1)
    }

    /// A number below `end`.
    pub(super) fn below(&mut self, end: usize) -> usize {
        self.0 ^= self.0 << 13;
        self.0 ^= self.0 >> 7;
        self.0 ^= self.0 << 17;
        ((self.0 >> 33) % end as u64) as usize
    }

    /// The numbers below `end` in some order.
    pub(super) fn order(&mut self, end: usize) -> Vec<usize> {
        let mut order: Vec<usize> = (0..end).collect();
        for index in (1..end).rev() {
            order.swap(index, self.below(index + 1));
        }
        order
    }
}

/// Two graphs on the same elements with the same number of hydrogens in all. Valences are not minded.
pub(super) fn isomers(numbers: &mut Numbers, atoms: usize) -> (Side, Side) {
    let elements: Vec<u8> = (0..atoms)
        .map(|_| [6, 6, 6, 7, 8][numbers.below(5)])
        .collect();
    let hydrogens: Vec<u8> = (0..atoms).map(|_| numbers.below(4) as u8).collect();
    (
        side(numbers, &elements, &hydrogens),
        side(numbers, &elements, &hydrogens),
    )
}

/// Two graphs that share most of their elements: each lacks some atoms that the other has.
pub(super) fn relatives(numbers: &mut Numbers, atoms: usize) -> (Side, Side) {
    let mut one = || {
        let elements: Vec<u8> = (0..1 + numbers.below(atoms))
            .map(|_| [6, 6, 6, 7, 8, 17][numbers.below(6)])
            .collect();
        let hydrogens: Vec<u8> = elements.iter().map(|_| numbers.below(4) as u8).collect();
        side(numbers, &elements, &hydrogens)
    };
    (one(), one())
}

/// A random tree with some more bonds, or with one bond less; elements and hydrogens shuffled.
fn side(numbers: &mut Numbers, elements: &[u8], hydrogens: &[u8]) -> Side {
    let atoms = elements.len();
    let mut side = Side {
        elements: numbers
            .order(atoms)
            .into_iter()
            .map(|atom| elements[atom])
            .collect(),
        hydrogens: numbers
            .order(atoms)
            .into_iter()
            .map(|atom| hydrogens[atom])
            .collect(),
        marks: (0..atoms)
            .map(|_| u32::from(numbers.below(5) == 0))
            .collect(),
        ..Side::default()
    };
    let more = numbers.below(4);
    for second in 1..atoms {
        side.bonds
            .push((numbers.below(second) as u32, second as u32, class(numbers)));
    }
    for _ in 0..more {
        let (first, second) = (numbers.below(atoms) as u32, numbers.below(atoms) as u32);
        let known = side
            .bonds
            .iter()
            .any(|&(a, b, _)| (a, b) == (first, second) || (b, a) == (first, second));
        if first != second && !known {
            side.bonds.push((first, second, class(numbers)));
        }
    }
    if more == 3 && !side.bonds.is_empty() {
        side.bonds.swap_remove(0);
    }
    side
}

fn class(numbers: &mut Numbers) -> u8 {
    [1, 1, 1, 2, 3, 5][numbers.below(6)]
}

/// The same side with its atoms in another order.
pub(super) fn renumbered(numbers: &mut Numbers, side: &Side) -> Side {
    let order = numbers.order(side.elements.len());
    let mut place = vec![0; order.len()];
    for (new, &old) in (0..).zip(&order) {
        place[old] = new;
    }
    let bonds = side.bonds.iter();
    Side {
        elements: order.iter().map(|&old| side.elements[old]).collect(),
        hydrogens: order.iter().map(|&old| side.hydrogens[old]).collect(),
        marks: order.iter().map(|&old| side.marks[old]).collect(),
        bonds: bonds
            .map(|&(first, second, class)| (place[second as usize], place[first as usize], class))
            .collect(),
        ..Side::default()
    }
}
