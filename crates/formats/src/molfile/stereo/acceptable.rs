//! Which arrangements of wedges say something definite (IUPAC 2006, ST-1.1 and ST-1.2).
//!
//! Preferred, acceptable and readable drawings pass, ambiguous and wrong ones do not. A sign could
//! be computed for most of those too, but not the one that every chemist would read.

use thiserror::Error;

use crate::molfile::stereo::vector::Vector;

/// One bond of a centre as drawn there.
#[derive(Debug, Clone, Copy)]
pub(super) struct Stroke {
    /// Degrees, anticlockwise.
    pub(super) angle: f64,
    /// The unit vector in the plane.
    pub(super) flat: Vector,
    /// 1 for a wedge, −1 for a hashed one, 0 for a plain bond.
    pub(super) height: i8,
}

/// Why wedges say nothing definite.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Error)]
pub(super) enum Unclear {
    #[error("two plain bonds are in line and the third is between them (T-shaped, ST-1.2.12)")]
    TShape,
    #[error("all bonds are on one side of the atom (ST-1.1.4, ST-1.2.3)")]
    HalfPlane,
    #[error("wedged and hashed bonds contradict each other (ST-1.2.10)")]
    Contradictory,
    #[error("bonds lie on each other or have no length")]
    Overlap,
    #[error("this combination of wedges has no one reading (ST-1.1.9 to ST-1.1.20)")]
    Ambiguous,
    #[error("the bonds as drawn span no volume")]
    Flat,
}

impl Unclear {
    pub(super) fn code(self) -> &'static str {
        match self {
            Self::TShape => "wedges-t-shaped",
            Self::HalfPlane => "wedges-one-sided",
            Self::Contradictory => "wedges-contradictory",
            Self::Overlap => "bonds-overlap",
            Self::Ambiguous => "wedges-ambiguous",
            Self::Flat => "wedges-flat",
        }
    }
}

/// Bonds that leave free a little more than half of the plane are not yet on one side.
const SLACK: f64 = 5.0;
/// Two bonds this far from a straight line are drawn as one.
const STRAIGHT: f64 = 2.5;
/// Bonds closer than this lie on each other.
const OVERLAP: f64 = 2.0;

/// Checks the bonds of a centre; `ring_bonds` of them are in rings.
pub(super) fn check(strokes: &[Stroke], ring_bonds: usize) -> Result<(), Unclear> {
    let mut around = strokes.to_vec();
    around.sort_by(|a, b| a.angle.total_cmp(&b.angle));
    let smallest = gaps(around.iter()).fold(360.0, f64::min);
    if smallest < OVERLAP {
        return Err(Unclear::Overlap);
    }
    match around[..] {
        [a, b, c] => check_three(&[a, b, c], ring_bonds),
        _ => check_four(&around, ring_bonds >= 2),
    }
}

/// Three drawn bonds, in the order of their angles.
fn check_three(around: &[Stroke; 3], ring_bonds: usize) -> Result<(), Unclear> {
    let marked: Vec<&Stroke> = around.iter().filter(|stroke| stroke.height != 0).collect();
    let opposed = marked
        .iter()
        .any(|stroke| stroke.height != marked[0].height);
    match marked[..] {
        [_] => return check_single(around, ring_bonds),
        // Wedge and hash beside each other show the same two faces (ST-1.2.2).
        [a, b] if opposed && between(a, b) > 90.0 => return Err(Unclear::Contradictory),
        [_, _, _] if opposed => return Err(Unclear::Contradictory),
        _ => {}
    }
    if is_one_sided(around.iter()) && ring_bonds < 3 {
        Err(Unclear::HalfPlane)
    } else {
        Ok(())
    }
}

/// One wedge and two plain bonds. What counts is the angle between the plain ones on the side where
/// the wedge is not.
///
/// Where it exceeds half a turn the wedge is between the plain bonds, and says the contrary of the
/// same wedge outside; that is clear only at a ring fusion or bridgehead, whose fourth ligand
/// points out of the ring system (ST-1.2.3). A wedge beside both plain bonds says the same however
/// far they are turned, but is accepted in rings only (ST-1.2.4).
fn check_single(around: &[Stroke; 3], ring_bonds: usize) -> Result<(), Unclear> {
    let at = around
        .iter()
        .position(|stroke| stroke.height != 0)
        .unwrap_or(0);
    let [next, last] = [around[(at + 1) % 3].angle, around[(at + 2) % 3].angle];
    let free = (last - next).rem_euclid(360.0);
    if (free - 180.0).abs() < STRAIGHT {
        Err(Unclear::TShape)
    } else if free > 180.0 && ring_bonds < 3 || is_one_sided(around.iter()) && ring_bonds < 2 {
        Err(Unclear::HalfPlane)
    } else {
        Ok(())
    }
}

/// Four drawn bonds, in the order of their angles. In rings, three bonds on one side are common and
/// clear.
fn check_four(around: &[Stroke], in_ring: bool) -> Result<(), Unclear> {
    let heights: Vec<i8> = around.iter().map(|stroke| stroke.height).collect();
    let count = |height: i8| heights.iter().filter(|&&other| other == height).count();
    let alternate = heights.len() == 4 && heights[0] == heights[2] && heights[1] == heights[3];
    let plain = || around.iter().filter(|stroke| stroke.height == 0);
    // The bonds of a kind of which there are three.
    let three = |height: i8| around.iter().filter(move |stroke| stroke.height == height);
    if is_one_sided(around.iter()) && !in_ring {
        return Err(Unclear::HalfPlane);
    }
    let clear = match (count(0), count(1), count(-1)) {
        // Seen along the one wedge the plain bonds have an order, wherever they are (ST-1.1.2).
        (3, ..) | (1, 2, 1) | (1, 1, 2) => true,
        (2, 1, 1) => {
            let straight = match plain().collect::<Vec<_>>()[..] {
                [a, b] => between(a, b) > 180.0 - STRAIGHT,
                _ => true,
            };
            // Plain bonds side by side, and so wedge and hash (ST-1.1.1); else ST-1.1.10.
            let apart = heights[0] == 0 && heights[2] == 0 || heights[1] == 0 && heights[3] == 0;
            !straight && !apart
        }
        (2, ..) | (0, 2, 2) => alternate,
        (1, 3, 0) | (0, 3, 1) => is_threefold(three(1)),
        (1, 0, 3) | (0, 1, 3) => is_threefold(three(-1)),
        _ => false,
    };
    if clear {
        Ok(())
    } else {
        Err(Unclear::Ambiguous)
    }
}

/// The angles from each bond to the next, round the atom.
fn gaps<'a>(around: impl Iterator<Item = &'a Stroke> + Clone) -> impl Iterator<Item = f64> {
    let first = around.clone().next().map(|stroke| stroke.angle + 360.0);
    let next = around
        .clone()
        .skip(1)
        .map(|stroke| stroke.angle)
        .chain(first);
    around.zip(next).map(|(stroke, next)| next - stroke.angle)
}

fn is_one_sided<'a>(around: impl Iterator<Item = &'a Stroke> + Clone) -> bool {
    gaps(around).any(|gap| gap > 180.0 + SLACK)
}

/// Whether three bonds are spread about evenly (ST-1.1.5).
fn is_threefold<'a>(around: impl Iterator<Item = &'a Stroke> + Clone) -> bool {
    gaps(around).all(|gap| gap <= 150.0)
}

/// The angle between two bonds, at most 180.
fn between(a: &Stroke, b: &Stroke) -> f64 {
    let apart = (a.angle - b.angle).abs();
    apart.min(360.0 - apart)
}

#[cfg(test)]
mod tests {
    use rstest::rstest;

    use super::*;

    fn verdict(bonds: &[(f64, i8)], ring_bonds: usize) -> Result<(), Unclear> {
        let stroke = |&(angle, height): &(f64, i8)| {
            let (sine, cosine) = angle.to_radians().sin_cos();
            Stroke {
                angle,
                flat: Vector([cosine, sine, 0.0]),
                height,
            }
        };
        check(&bonds.iter().map(stroke).collect::<Vec<_>>(), ring_bonds)
    }

    #[rstest]
    #[case::st_1_1_1(&[(30.0, 0), (150.0, 0), (250.0, 1), (290.0, -1)])]
    #[case::st_1_1_2(&[(90.0, 0), (210.0, 0), (330.0, 0), (45.0, 1)])]
    #[case::plain_ones_opposite_to_the_wedge(&[(0.0, 1), (120.0, 0), (180.0, 0), (240.0, 0)])]
    #[case::st_1_1_3(&[(0.0, 1), (90.0, 0), (180.0, 1), (270.0, 0)])]
    #[case::st_1_1_3_hashed(&[(0.0, 1), (90.0, -1), (180.0, 1), (270.0, -1)])]
    #[case::st_1_1_5(&[(90.0, 1), (210.0, 1), (330.0, 1), (30.0, 0)])]
    #[case::st_1_1_7(&[(0.0, 0), (90.0, 1), (180.0, 1), (270.0, -1)])]
    #[case::st_1_2_1(&[(90.0, 1), (210.0, 0), (330.0, 0)])]
    #[case::st_1_2_2(&[(0.0, 1), (60.0, -1), (210.0, 0)])]
    #[case::st_1_2_5(&[(0.0, 1), (120.0, 1), (240.0, 0)])]
    #[case::st_1_2_6(&[(0.0, -1), (120.0, -1), (240.0, -1)])]
    fn definite(#[case] bonds: &[(f64, i8)]) {
        assert_eq!(verdict(bonds, 0), Ok(()));
    }

    #[rstest]
    #[case::st_1_1_9(&[(0.0, 1), (90.0, 1), (180.0, 1), (270.0, 0)], Unclear::Ambiguous)]
    #[case::st_1_1_10(&[(0.0, 0), (90.0, 1), (180.0, 0), (270.0, -1)], Unclear::Ambiguous)]
    #[case::plain_in_line(&[(0.0, 0), (180.0, 0), (60.0, 1), (120.0, -1)], Unclear::Ambiguous)]
    #[case::two_beside_two(&[(0.0, 1), (90.0, 1), (180.0, 0), (270.0, 0)], Unclear::Ambiguous)]
    #[case::all_alike(&[(0.0, 1), (90.0, 1), (180.0, 1), (270.0, 1)], Unclear::Ambiguous)]
    #[case::gap(&[(0.0, 0), (40.0, 0), (80.0, 1), (120.0, -1)], Unclear::HalfPlane)]
    #[case::st_1_2_3(&[(0.0, 1), (60.0, 0), (-60.0, 0)], Unclear::HalfPlane)]
    #[case::st_1_2_4(&[(0.0, 1), (60.0, 0), (120.0, 0)], Unclear::HalfPlane)]
    #[case::st_1_2_10(&[(0.0, 1), (120.0, -1), (240.0, 0)], Unclear::Contradictory)]
    #[case::st_1_2_12(&[(90.0, 1), (0.0, 0), (180.0, 0)], Unclear::TShape)]
    #[case::nearly_t(&[(90.0, 1), (1.0, 0), (179.0, 0)], Unclear::TShape)]
    #[case::overlap(&[(0.0, 1), (1.0, 0), (180.0, 0)], Unclear::Overlap)]
    #[case::overlap_across_the_cut(&[(180.0, 1), (-179.0, 0), (0.0, 0)], Unclear::Overlap)]
    fn unclear(#[case] bonds: &[(f64, i8)], #[case] expected: Unclear) {
        assert_eq!(verdict(bonds, 0), Err(expected));
    }

    /// In rings the same drawings are clear.
    #[rstest]
    #[case::bridgehead(&[(0.0, 1), (60.0, 0), (-60.0, 0)], 3)]
    #[case::wedge_beside_ring_bonds(&[(0.0, 1), (60.0, 0), (120.0, 0)], 2)]
    #[case::gap(&[(0.0, 0), (40.0, 0), (80.0, 1), (120.0, -1)], 2)]
    fn definite_in_rings(#[case] bonds: &[(f64, i8)], #[case] ring_bonds: usize) {
        assert_eq!(verdict(bonds, ring_bonds), Ok(()));
    }
}
