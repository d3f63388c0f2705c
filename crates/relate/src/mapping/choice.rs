//! Chooses among equally distant maps: none of this decides how distant they are.

use super::{goal::Incumbent, grow::Grower, meter::Meter, polish::around, problem::Problem};

/// What each way may spend, whatever is left of the budget: a sixtieth of the usual one.
const TIDY_STEPS: usize = 50_000;

/// Looks for a map of the same distance that is better otherwise.
pub(super) fn choose(
    problem: &Problem,
    grower: &Grower<'_>,
    incumbent: &mut Incumbent,
    meter: &mut Meter<'_>,
) {
    anchor(problem, grower, incumbent, meter);
    tidy(problem, incumbent, meter);
    turn(problem, incumbent, meter);
}

/// Offers maps grown from each pair of atoms in equal functional groups.
fn anchor(
    problem: &Problem,
    grower: &Grower<'_>,
    incumbent: &mut Incumbent,
    meter: &mut Meter<'_>,
) {
    if incumbent.distance.bonds == 0 {
        return;
    }
    let mut steps = 0;
    let atoms = problem.left.atoms();
    let grouped = (0..atoms as u32).filter(|&atom| problem.left.group(atom) > 0);
    for left in grouped {
        let class = problem
            .classes
            .iter()
            .find(|class| class.left.contains(&left));
        for &right in class.into_iter().flat_map(|class| &class.right) {
            let laid = incumbent.map[left as usize] == right;
            if laid || problem.left.group(left) != problem.right.group(right) {
                continue;
            }
            if steps > TIDY_STEPS {
                return meter.spend(steps);
            }
            steps += 1 + atoms;
            incumbent.offer(problem, &grower.around_pair(left, right));
        }
    }
    meter.spend(steps);
}

/// Exchanges images as long as the distance stays and the map becomes better otherwise, or the meter ends.
///
/// Only single exchanges are tried, so a better one of equally distant maps may be missed.
fn tidy(problem: &Problem, incumbent: &mut Incumbent, meter: &mut Meter<'_>) {
    let mut steps = 0;
    let mut improved = incumbent.distance.bonds > 0;
    while improved && steps < TIDY_STEPS {
        improved = false;
        for class in &problem.classes {
            for (index, &first) in class.left.iter().enumerate() {
                steps += index * (4 + problem.left.degree(first)) / 16;
                for &second in &class.left[..index] {
                    let mut map = std::mem::take(&mut incumbent.map);
                    let before = around(problem, &map, first) + around(problem, &map, second);
                    map.swap(first as usize, second as usize);
                    let after = around(problem, &map, first) + around(problem, &map, second);
                    let swapped = (after <= before).then(|| map.clone());
                    map.swap(first as usize, second as usize);
                    incumbent.map = map;
                    if let Some(map) = swapped {
                        steps += 1 + map.len() / 8;
                        incumbent.offer(problem, &map);
                        improved |= incumbent.map == map;
                    }
                }
            }
        }
    }
    meter.spend(steps);
}

/// Turns the map by symmetries of either side as long as that makes it better. The distance does not change by it, but the
/// stereo elements that are kept may.
///
/// Only one symmetry at a time is tried.
fn turn(problem: &Problem, incumbent: &mut Incumbent, meter: &mut Meter<'_>) {
    if problem.left.stereo.is_empty() || problem.right.stereo.is_empty() {
        return;
    }
    let mut steps = 0;
    let mut improved = true;
    while improved && steps < TIDY_STEPS {
        improved = false;
        for symmetry in &problem.left.symmetries {
            let mut map = incumbent.map.clone();
            for &(from, to) in symmetry {
                map[from as usize] = incumbent.map[to as usize];
            }
            incumbent.offer(problem, &map);
            improved |= incumbent.map == map;
        }
        for symmetry in &problem.right.symmetries {
            let turned = |&image: &u32| {
                let place = symmetry.binary_search_by_key(&image, |pair| pair.0);
                place.map_or(image, |place| symmetry[place].1)
            };
            let map: Vec<u32> = incumbent.map.iter().map(turned).collect();
            incumbent.offer(problem, &map);
            improved |= incumbent.map == map;
        }
        let tried = problem.left.symmetries.len() + problem.right.symmetries.len();
        steps += tried * (1 + incumbent.map.len() / 8);
    }
    meter.spend(steps);
}
