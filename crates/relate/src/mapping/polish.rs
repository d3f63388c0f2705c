//! Makes a map better by exchanging the images of two atoms, as long as that helps.

use super::{meter::Meter, problem::Problem};

/// A distance, or a change in it, as one number: hydrogens and marks of 20 bits each, orders of 10 and bonds above.
///
/// Around two atoms no part comes near its bits, so numbers compare as distances do.
pub(super) type Packed = i64;

const BOND: Packed = 1 << 50;
const ORDER: Packed = 1 << 40;
const HYDROGEN: Packed = 1 << 20;

/// Exchanges images until no exchange brings the map nearer, or the meter ends.
pub(super) fn polish(problem: &Problem, map: &mut [u32], meter: &mut Meter<'_>) {
    let mut costs: Vec<Packed> = (0..map.len() as u32)
        .map(|atom| around(problem, map, atom))
        .collect();
    let mut improved = true;
    while improved && !meter.ended() {
        improved = false;
        for class in &problem.classes {
            for (index, &first) in class.left.iter().enumerate() {
                for &second in &class.left[..index] {
                    // A bond between the two is counted from both, before and after alike.
                    let before = costs[first as usize] + costs[second as usize];
                    map.swap(first as usize, second as usize);
                    if around(problem, map, first) + around(problem, map, second) < before {
                        improved = true;
                        renew(problem, map, [first, second], &mut costs);
                    } else {
                        map.swap(first as usize, second as usize);
                    }
                }
                meter.spend(1 + index * (4 + problem.left.degree(first)) / 16);
                if meter.ended() {
                    return;
                }
            }
        }
    }
}

/// Computes the costs of two atoms and of their neighbours anew.
fn renew(problem: &Problem, map: &[u32], atoms: [u32; 2], costs: &mut [Packed]) {
    for atom in atoms {
        costs[atom as usize] = around(problem, map, atom);
        for near in problem.left.neighbours(atom) {
            costs[near.atom as usize] = around(problem, map, near.atom);
        }
    }
}

/// What one atom and its bonds add to the distance, apart from a constant.
pub(super) fn around(problem: &Problem, map: &[u32], atom: u32) -> Packed {
    let image = map[atom as usize];
    let (hydrogens, mark) = problem.atom_cost(atom, image);
    let mut cost = HYDROGEN * Packed::from(hydrogens) + Packed::from(mark);
    for near in problem.left.neighbours(atom) {
        if let Some(class) = problem.right.class_between(image, map[near.atom as usize]) {
            cost += if class == near.class {
                -2 * BOND
            } else {
                ORDER - 2 * BOND
            };
        }
    }
    cost
}
