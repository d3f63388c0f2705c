//! Makes a map better by exchanging the images of two atoms, as long as that helps.

use super::{meter::Meter, problem::Problem};

/// The parts of a distance, or of a change in it, in order of weight.
type Parts = [i64; 4];

/// Exchanges images until no exchange brings the map nearer, or the meter ends.
pub(super) fn polish(problem: &Problem, map: &mut [u32], meter: &mut Meter<'_>) {
    let mut improved = true;
    while improved && !meter.ended() {
        improved = false;
        for class in &problem.classes {
            for (index, &first) in class.left.iter().enumerate() {
                for &second in &class.left[..index] {
                    if exchange(problem, map, first, second) {
                        improved = true;
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

/// Exchanges the images of two atoms if that brings the map nearer.
fn exchange(problem: &Problem, map: &mut [u32], first: u32, second: u32) -> bool {
    // A bond between the two is counted from both, before and after alike.
    let before = add(around(problem, map, first), around(problem, map, second));
    map.swap(first as usize, second as usize);
    let after = add(around(problem, map, first), around(problem, map, second));
    let nearer = after < before;
    if !nearer {
        map.swap(first as usize, second as usize);
    }
    nearer
}

/// What one atom and its bonds add to the distance, apart from a constant.
fn around(problem: &Problem, map: &[u32], atom: u32) -> Parts {
    let image = map[atom as usize];
    let (hydrogens, mark) = problem.atom_cost(atom, image);
    let mut parts = [0, 0, i64::from(hydrogens), i64::from(mark)];
    for near in problem.left.neighbours(atom) {
        if let Some(class) = problem.right.class_between(image, map[near.atom as usize]) {
            parts[0] -= 2;
            parts[1] += i64::from(class != near.class);
        }
    }
    parts
}

fn add(first: Parts, second: Parts) -> Parts {
    std::array::from_fn(|part| first[part] + second[part])
}
