//! Which compounds of one constitution may be the same.

use std::io;

use super::compounds::Compound;

/// The most pairs that are compared in one constitution.
pub(super) const MOST_PAIRS: u32 = 100_000;

/// Whether two compounds may be the same.
pub(super) enum Meeting {
    /// Some sample of one is a sample of the other.
    Meet,
    /// None is.
    Apart,
    /// That was not found within the limits.
    Unknown,
}

/// Compounds linked by pairs that may be the same.
pub(super) struct Links {
    /// For each compound, the one that stands for all linked with it.
    of: Vec<usize>,
    /// Whether all pairs were decided.
    pub(super) complete: bool,
}

impl Links {
    /// Links compounds. Two that stand for one sample each are different, so only pairs with an open one
    /// are compared, and of these not those that are linked already: the outcome does not depend on the
    /// order.
    pub(super) fn find(
        compounds: &[Compound],
        most_pairs: u32,
        mut meeting: impl FnMut(&Compound, &Compound) -> io::Result<Meeting>,
    ) -> io::Result<Self> {
        let mut links = Self {
            of: (0..compounds.len()).collect(),
            complete: true,
        };
        let mut pairs = 0;
        for (a, compound) in compounds.iter().enumerate().filter(|(_, a)| a.is_open()) {
            for (b, other) in compounds.iter().enumerate() {
                if links.stands_for(a) == links.stands_for(b) {
                    continue;
                }
                pairs += 1;
                if pairs > most_pairs {
                    links.complete = false;
                    return Ok(links);
                }
                match meeting(compound, other)? {
                    Meeting::Meet => links.join(a, b),
                    Meeting::Apart => {}
                    Meeting::Unknown => links.complete = false,
                }
            }
        }
        Ok(links)
    }

    /// Groups of compounds in which some two records may be the same: several compounds, or one that is
    /// open and has several records.
    pub(super) fn groups(&mut self, compounds: &[Compound]) -> Vec<Vec<usize>> {
        let mut groups = vec![Vec::new(); compounds.len()];
        for compound in 0..compounds.len() {
            groups[self.stands_for(compound)].push(compound);
        }
        let several = |group: &Vec<usize>| match group[..] {
            [] => false,
            [only] => compounds[only].is_open() && compounds[only].members.len() > 1,
            _ => true,
        };
        groups.into_iter().filter(several).collect()
    }

    fn stands_for(&mut self, mut compound: usize) -> usize {
        while self.of[compound] != compound {
            self.of[compound] = self.of[self.of[compound]];
            compound = self.of[compound];
        }
        compound
    }

    fn join(&mut self, a: usize, b: usize) {
        let (a, b) = (self.stands_for(a), self.stands_for(b));
        self.of[a.max(b)] = a.min(b);
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    fn compounds(open: &[bool]) -> Vec<Compound> {
        let compound = |(record, &open)| Compound {
            members: vec![(record, open)],
        };
        (0..).zip(open).map(compound).collect()
    }

    fn groups(open: &[bool], most_pairs: u32) -> (Vec<Vec<usize>>, bool) {
        let compounds = compounds(open);
        // Open ones may be the same as their neighbours.
        let meeting = |a: &Compound, b: &Compound| {
            Ok(match a.first().abs_diff(b.first()) {
                1 => Meeting::Meet,
                _ => Meeting::Apart,
            })
        };
        let mut links = Links::find(&compounds, most_pairs, meeting).unwrap();
        (links.groups(&compounds), links.complete)
    }

    #[test]
    fn linked_through_open_ones() {
        let open = [false, true, false, false, true, true];
        let expected = vec![vec![0, 1, 2], vec![3, 4, 5]];
        assert_eq!(groups(&open, MOST_PAIRS), (expected, true));
        assert_eq!(groups(&[false; 4], MOST_PAIRS), (vec![], true));
    }

    #[test]
    fn a_bound_that_is_reached_is_told() {
        let (found, complete) = groups(&[true, true, false, false], 2);
        assert_eq!((found, complete), (vec![vec![0, 1]], false));
    }
}
