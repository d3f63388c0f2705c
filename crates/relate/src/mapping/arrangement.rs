//! Marked stereo elements under a map. They do not count in the distance; they help to choose among equal maps.

/// What sits at one position of a stereo element.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord)]
pub enum Arm {
    /// An atom of the side.
    Atom(u32),
    /// A hydrogen, with its mass number or 0.
    Hydrogen(u16),
    /// A lone pair.
    LonePair,
}

/// A marked stereo element of one side.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord)]
pub struct Arrangement {
    /// The centre twice, or the two ends.
    pub centres: [u32; 2],
    /// What sits about it, in the order that the parity refers to; those of the first end come first.
    pub arms: [Arm; 4],
    /// One of the two arrangements.
    pub odd: bool,
}

impl Arrangement {
    /// Whether a map takes this element with all its arms to the other, and both say the same.
    fn is_kept(&self, other: &Self, image: impl Fn(u32) -> u32) -> bool {
        let [first, second] = self.centres.map(&image);
        let arms = match (
            other.centres == [first, second],
            other.centres == [second, first],
        ) {
            (true, _) => self.arms,
            (false, true) => [self.arms[2], self.arms[3], self.arms[0], self.arms[1]],
            (false, false) => return false,
        };
        let one_centre = first == second;
        let mut order = [0; 4];
        for (at, (slot, arm)) in order.iter_mut().zip(arms).enumerate() {
            let arm = match arm {
                Arm::Atom(atom) => Arm::Atom(image(atom)),
                other => other,
            };
            // Both ends of a double bond may have a hydrogen.
            let mut own_end = (0..4).filter(|place| one_centre || place / 2 == at / 2);
            let Some(place) = own_end.find(|&place| other.arms[place] == arm) else {
                return false;
            };
            *slot = place;
        }
        let exchanged = (0..4).flat_map(|i| (0..i).map(move |j| (i, j)));
        let odd = exchanged.filter(|&(i, j)| order[i] < order[j]).count() % 2 == 1;
        (self.odd ^ odd) == other.odd
    }
}

/// How many elements of both sides a map does not keep.
pub(super) fn disturbed(left: &[Arrangement], right: &[Arrangement], map: &[u32]) -> u32 {
    let image = |atom: u32| map[atom as usize];
    let kept = |own: &&Arrangement| right.iter().any(|other| own.is_kept(other, image));
    let kept = left.iter().filter(kept).count();
    (left.len() + right.len() - 2 * kept) as u32
}
