//! `/` and `\`: which bonds carry them, and which way each leans.
//!
//! A marked unit needs a slope at both of its ends; a unit without a mark must not have one at both.
//! A bond between two units says something about either, so the choices hang together:
//! [`super::search`] makes them, and [`Forest`] keeps which slopes are equal and which opposite.

use molkin_graph::Shape;

use super::{
    Lost,
    forest::Forest,
    layout::Layout,
    rows::Row,
    search::Search,
    structure::Structure,
    units::{self, Unit},
};

/// What can carry a slope.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub(super) enum Carrier {
    /// A single bond of the form.
    Bond(u32),
    /// The bond to a hydrogen of this atom, which is then written as an atom.
    Hydrogen(u32),
}

/// The slopes of a text.
#[derive(Debug, Default)]
pub(super) struct Slopes {
    /// How many bonds the form has: hydrogens are numbered behind them.
    bonds: usize,
    /// Per carrier; empty where nothing is marked.
    raised: Vec<bool>,
    /// Over carriers and then units: which slopes are equal. An even one is `/`.
    forest: Forest,
    /// Per root: the first slope of the set has been met, and whether even ones are `\`.
    turned: Vec<Option<bool>>,
}

impl Slopes {
    /// Chooses the bonds. What cannot be had is lost.
    pub(super) fn solve(
        structure: &Structure,
        layout: &Layout,
        rows: &[Row],
        lost: &mut Vec<Lost>,
    ) -> Self {
        let units = units::units(structure, layout, rows, lost);
        if units.iter().all(|unit| unit.mark.is_none()) {
            return Self::default();
        }
        let bonds = structure.form.bonds.len();
        let carriers = bonds + structure.len();
        let mut slopes = Self {
            bonds,
            raised: vec![false; carriers],
            forest: Forest::new(carriers + units.len()),
            turned: vec![None; carriers + units.len()],
        };
        let mut search = Search::new(structure, layout, &mut slopes, units);
        search.run();
        let centres = |unit: &Unit| {
            let [a, b] = [unit.ends[0].atom, unit.ends[1].atom];
            [a.min(b), a.max(b)]
        };
        lost.extend(search.given_up().map(|unit| Lost::Arrangement {
            shape: Shape::DoubleBond,
            centres: centres(unit),
        }));
        slopes
    }

    /// Counts the hydrogens that carry slopes among those written as atoms.
    pub(super) fn show_hydrogens(&self, structure: &Structure, shown: &mut [u8]) {
        if self.raised.is_empty() {
            return;
        }
        for (atom, shown) in (0..structure.len() as u32).zip(shown) {
            if self.is_raised(Carrier::Hydrogen(atom)) {
                *shown = (*shown).max(1);
            }
        }
    }

    /// The glyph of a bond, to be asked for in text order: of each set of slopes that depend on each
    /// other the first one is `/`.
    pub(super) fn glyph(&mut self, carrier: Carrier) -> Option<char> {
        if !self.is_raised(carrier) {
            return None;
        }
        let (root, odd) = self.forest.root(self.number(carrier) as u32);
        let turned = *self.turned[root as usize].get_or_insert(odd);
        Some(if turned == odd { '/' } else { '\\' })
    }

    pub(super) fn is_raised(&self, carrier: Carrier) -> bool {
        self.raised.get(self.number(carrier)) == Some(&true)
    }

    /// The number of a carrier, in `raised` and in the forest.
    pub(super) fn number(&self, carrier: Carrier) -> usize {
        match carrier {
            Carrier::Bond(bond) => bond as usize,
            Carrier::Hydrogen(atom) => self.bonds + atom as usize,
        }
    }

    /// Gives a carrier a slope, or takes it away. Unions are the caller's.
    pub(super) fn set_raised(&mut self, carrier: Carrier, raised: bool) {
        let number = self.number(carrier);
        self.raised[number] = raised;
    }

    /// The equalities between slopes.
    pub(super) fn forest(&mut self) -> &mut Forest {
        &mut self.forest
    }

    /// The number of a unit in the forest.
    pub(super) fn number_of_unit(&self, unit: usize) -> u32 {
        (self.raised.len() + unit) as u32
    }
}
