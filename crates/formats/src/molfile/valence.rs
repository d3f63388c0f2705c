//! The valences from which a molfile's unwritten hydrogens follow.
//!
//! The format leaves hydrogens out and lets the reader add them. By which valences was never part
//! of the format's own description but of the guide beside it, and the guide of 30 May 2014 changed
//! them. A file cannot say which of the two tables its writer had in mind.

use molkin_graph::Element;

/// Which table of valences gives the hydrogens that a molfile does not write.
///
/// The tables differ for the metals of the main groups, for Ge, Sb, Bi and Po (the later one gives
/// them no hydrogens), and for nitrogen above three and bromine above one bond. Every atom for
/// which it matters gets a note with the code `valence-table-dependent`.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Default)]
#[non_exhaustive]
pub enum ValenceTable {
    /// The table in use before 2014, with one exception: a neutral atom of groups 1 and 2, Al, Ga,
    /// In or Tl without any bond is the bare metal, not its hydride.
    #[default]
    Early,
    /// The table of the guide of 2014 and later.
    Late,
}

impl ValenceTable {
    /// The one of the two that this is not.
    pub(super) fn other(self) -> Self {
        match self {
            Self::Early => Self::Late,
            Self::Late => Self::Early,
        }
    }
}

/// What decides the hydrogens of an atom whose valence the record does not state.
#[derive(Debug, Clone, Copy)]
pub(super) struct Bonding {
    pub(super) element: Element,
    pub(super) charge: i8,
    /// Bonding electron pairs to atoms, a pair for the aromatic system not included.
    pub(super) pairs: u32,
    /// Unpaired and otherwise unavailable electrons of a radical.
    pub(super) open: u32,
    /// Whether the atom has aromatic bonds.
    pub(super) aromatic: bool,
}

impl Bonding {
    /// The hydrogens by a table: the smallest valence that suffices less what is used; none where
    /// no valence suffices.
    ///
    /// An aromatic atom keeps to its lowest valence and gives one more place to the aromatic system
    /// where it has one to give, as a bare aromatic symbol does in SMILES.
    pub(super) fn hydrogens(&self, table: ValenceTable) -> u8 {
        let used = self.pairs.saturating_add(self.open);
        let valences = self.valences(table);
        let free = if self.aromatic {
            let lowest = valences.first().copied().unwrap_or(0);
            u32::from(lowest).saturating_sub(used.saturating_add(1))
        } else {
            let bare =
                table == ValenceTable::Early && used == 0 && is_metal(self.element, self.charge);
            let enough = valences
                .iter()
                .map(|&valence| u32::from(valence))
                .find(|&v| v >= used);
            enough.filter(|_| !bare).map_or(0, |valence| valence - used)
        };
        u8::try_from(free).unwrap_or(0)
    }

    /// Whether the smallest valence that suffices leaves room for a double bond in the aromatic
    /// system, `hydrogens` being fixed.
    pub(super) fn takes_double_bond(&self, table: ValenceTable, hydrogens: u8) -> bool {
        let used = self
            .pairs
            .saturating_add(self.open)
            .saturating_add(u32::from(hydrogens));
        let enough = self
            .valences(table)
            .iter()
            .map(|&valence| u32::from(valence))
            .find(|&v| v >= used);
        enough.is_some_and(|valence| valence > used)
    }

    fn valences(&self, table: ValenceTable) -> &'static [u8] {
        match table {
            ValenceTable::Early => early(self.element, self.charge),
            ValenceTable::Late => late(self.element, self.charge),
        }
    }
}

/// Neutral atoms that stand for the bare metal when they have no bond.
fn is_metal(element: Element, charge: i8) -> bool {
    let place = (element.group(), element.period());
    charge == 0 && matches!(place, (Some(1 | 2), 2..) | (Some(13), 3..))
}

/// The table before 2014: by row, and by group less charge.
fn early(element: Element, charge: i8) -> &'static [u8] {
    let (Some(group), period) = (element.group(), element.period()) else {
        return &[];
    };
    match (group, charge) {
        (1, 0) => return &[1],
        (2, 0) => return &[2],
        (2, 1) => return &[1],
        _ => {}
    }
    if !(13..=17).contains(&group) || period > 6 {
        return &[];
    }
    match (i16::from(group) - 10 - i16::from(charge), period) {
        (1, 6) if element.number() == 81 => &[],
        (1, _) => &[1],
        (2, 2 | 3) => &[2],
        (3, 6) if element.number() == 81 => &[1, 3],
        (3, _) => &[3],
        (4, 2..=4) => &[4],
        (4, _) => &[2, 4],
        (5, _) => &[3, 5],
        (6, 2) => &[2],
        (6, _) => &[2, 4, 6],
        (7, 2) => &[1],
        (7, _) => &[1, 3, 5, 7],
        _ => &[],
    }
}

/// The table of 2014: an ion has the valences of the neutral element with as many electrons, if no
/// element on the way there is without valences and the row is not left.
fn late(element: Element, charge: i8) -> &'static [u8] {
    if (element.number(), charge) == (13, -1) {
        return &[4];
    }
    let shift = charge.unsigned_abs();
    let step: i16 = if charge > 0 { -1 } else { 1 };
    let mut number = i16::from(element.number());
    let mut valences = late_neutral(number);
    for _ in 0..shift {
        number += step;
        let there = u8::try_from(number).ok().and_then(Element::from_number);
        if valences.is_none() || there.is_none_or(|there| there.period() != element.period()) {
            return &[];
        }
        valences = late_neutral(number);
    }
    valences.unwrap_or(&[])
}

/// The valences of a neutral element in the table of 2014; `None` where it has no entry.
fn late_neutral(number: i16) -> Option<&'static [u8]> {
    Some(match number {
        1 | 9 => &[1],
        5 => &[3],
        6 | 14 => &[4],
        7 => &[3],
        8 => &[2],
        15 | 33 => &[3, 5],
        16 | 34 | 52 => &[2, 4, 6],
        17 | 53 | 85 => &[1, 3, 5, 7],
        35 => &[1],
        2 | 10 | 18 | 36 | 54 | 86 => &[0],
        _ => return None,
    })
}

#[cfg(test)]
mod tests {
    use rstest::rstest;

    use super::*;

    fn bonding(symbol: &str, charge: i8, pairs: u32) -> Bonding {
        let element = Element::from_symbol(symbol).unwrap();
        Bonding {
            element,
            charge,
            pairs,
            open: 0,
            aromatic: false,
        }
    }

    /// Hydrogens by the early and the late table. Rows of formats both tables list.
    #[rstest]
    #[case::methane("C", 0, 0, 4, 4)]
    #[case::ethyne_end("C", 0, 3, 1, 1)]
    #[case::carbon_with_five_bonds("C", 0, 5, 0, 0)]
    #[case::ammonium("N", 1, 0, 4, 4)]
    #[case::amide_anion("N", -1, 1, 1, 1)]
    #[case::nitrogen_four("N", 0, 4, 1, 0)]
    #[case::nitro("N", 0, 5, 0, 0)]
    #[case::hydroxide("O", -1, 0, 1, 1)]
    #[case::oxide("O", -2, 0, 0, 0)]
    #[case::nitride("N", -3, 0, 0, 0)]
    #[case::oxonium("O", 1, 2, 1, 1)]
    #[case::sulfoxide("S", 0, 4, 0, 0)]
    #[case::sulfinic_acid_hydrogen("S", 0, 3, 1, 1)]
    #[case::sulfonium("S", 1, 3, 0, 0)]
    #[case::phosphine_oxide("P", 0, 4, 1, 1)]
    #[case::perchloric("Cl", 0, 7, 0, 0)]
    #[case::bromite("Br", 0, 2, 1, 0)]
    #[case::iodane("I", 0, 2, 1, 1)]
    #[case::borohydride("B", -1, 0, 4, 4)]
    #[case::sodium("Na", 0, 0, 0, 0)]
    #[case::sodium_bonded("Na", 0, 1, 0, 0)]
    #[case::calcium_half("Ca", 0, 1, 1, 0)]
    #[case::magnesium_cation("Mg", 1, 0, 1, 0)]
    #[case::aluminium("Al", 0, 0, 0, 0)]
    #[case::alane("Al", 0, 2, 1, 0)]
    #[case::alanate("Al", -1, 0, 4, 4)]
    #[case::stannane("Sn", 0, 0, 2, 0)]
    #[case::stannane_three("Sn", 0, 3, 1, 0)]
    #[case::lead("Pb", 0, 4, 0, 0)]
    #[case::thallium_two("Tl", 0, 2, 1, 0)]
    #[case::proton("H", 1, 0, 0, 0)]
    #[case::hydrogen("H", 0, 0, 1, 1)]
    #[case::hydride("H", -1, 0, 0, 0)]
    #[case::iron("Fe", 0, 0, 0, 0)]
    #[case::argon("Ar", 0, 0, 0, 0)]
    #[case::telluride("Te", 0, 1, 1, 1)]
    #[case::antimony("Sb", 0, 2, 1, 0)]
    fn hydrogens_by_table(
        #[case] symbol: &str,
        #[case] charge: i8,
        #[case] pairs: u32,
        #[case] by_early: u8,
        #[case] by_late: u8,
    ) {
        let bonding = bonding(symbol, charge, pairs);
        assert_eq!(bonding.hydrogens(ValenceTable::Early), by_early, "early");
        assert_eq!(bonding.hydrogens(ValenceTable::Late), by_late, "late");
    }

    #[rstest]
    #[case::doublet(1, 3)]
    #[case::carbene(2, 2)]
    fn radical_electrons_take_valence(#[case] open: u32, #[case] expected: u8) {
        let radical = Bonding {
            open,
            ..bonding("C", 0, 0)
        };
        assert_eq!(radical.hydrogens(ValenceTable::Early), expected);
    }

    /// Hydrogens of an aromatic atom, and whether it takes a double bond.
    #[rstest]
    #[case::benzene("C", 0, 2, 1, true)]
    #[case::fusion("C", 0, 3, 0, true)]
    #[case::quinone_type("C", 0, 4, 0, false)]
    #[case::aryl_cation("C", 1, 2, 0, true)]
    #[case::pyridine("N", 0, 2, 0, true)]
    #[case::methylpyrrole("N", 0, 3, 0, false)]
    #[case::pyridinium("N", 1, 2, 1, true)]
    #[case::oxide("N", 1, 3, 0, true)]
    #[case::five_valent_oxide("N", 0, 4, 0, true)]
    #[case::pyrrolide("N", -1, 2, 0, false)]
    #[case::furan("O", 0, 2, 0, false)]
    #[case::pyrylium("O", 1, 2, 0, true)]
    #[case::thiophene("S", 0, 2, 0, false)]
    #[case::thiophene_oxide("S", 0, 4, 0, false)]
    #[case::borabenzene("B", 0, 2, 0, true)]
    #[case::boryl("B", 0, 3, 0, false)]
    fn aromatic_atoms(
        #[case] symbol: &str,
        #[case] charge: i8,
        #[case] pairs: u32,
        #[case] hydrogens: u8,
        #[case] double: bool,
    ) {
        let atom = Bonding {
            aromatic: true,
            ..bonding(symbol, charge, pairs)
        };
        assert_eq!(atom.hydrogens(ValenceTable::Early), hydrogens);
        assert_eq!(
            atom.takes_double_bond(ValenceTable::Early, hydrogens),
            double
        );
    }
}
