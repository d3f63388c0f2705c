//! Records of different formula: what one has more than the other, and where.

use molkin_graph::Formula;

use crate::{BondDifference, Explanation, Kind, LeftOver, Structure, explain::surplus};

use super::{analysis::only_protons_moved, counted, listed, places::Places, unrelated};

/// Up to so many pieces are named one by one.
const MOST_PIECES: usize = 3;

const ALIKE: &str = "all else is bonded alike";

pub(super) fn summary(
    [a, b]: [&Structure; 2],
    kind: Option<Kind>,
    substances: Option<&str>,
    explained: Option<&Explanation>,
) -> String {
    let (left, right) = (a.formula(), b.formula());
    if let Some(substances) = substances {
        return format!("Not isomers, but one compound: {substances} ({left} and {right}).");
    }
    let verdict = verdict(a, b, kind);
    let found = explained.and_then(|explained| Some((explained, explained.bonds.as_ref()?)));
    let Some((explained, bonds)) = found.filter(|_| a.formula() != b.formula()) else {
        return verdict;
    };
    let mut sentences = vec![verdict];
    let formulae = [a.formula(), b.formula()];
    let pieces = Pieces {
        places: Places([a, b]),
        explained,
    };
    let pieces = pieces.in_words();
    if only_protons_moved(formulae, explained) {
        sentences.push(match pieces {
            None => protons(formulae),
            Some(pieces) if explained.hydrogens.is_empty() => format!("{pieces}; {ALIKE}."),
            Some(pieces) => format!("{pieces}; all else agrees but for protons."),
        });
        return sentences.join(" ");
    }
    sentences.extend(surplus_in_words(formulae));
    if bonds.unrelated == Some(true) {
        sentences.push(unrelated(bonds));
        return sentences.join(" ");
    }
    let certain = if bonds.minimal {
        ""
    } else {
        "One way to see it, not proved the least: "
    };
    let further = further(explained, bonds);
    match (pieces, further) {
        (None, None) => {}
        (None, Some(further)) => sentences.push(capital(format!("{certain}{further}."))),
        (Some(pieces), None) => {
            sentences.push(capital(format!("{certain}{pieces}; {ALIKE}.")));
        }
        (Some(pieces), Some(further)) => {
            sentences.push(capital(format!("{certain}{pieces}; besides, {further}.")));
        }
    }
    sentences.join(" ")
}

fn verdict(a: &Structure, b: &Structure, kind: Option<Kind>) -> String {
    let (left, right) = (a.formula(), b.formula());
    if kind == Some(Kind::Homologues) {
        format!(
            "Not isomers but homologues: the same functional groups, and formulae that differ by CH2 units ({left} and {right})."
        )
    } else if left != right {
        let same_atoms = left.iter().eq(right.iter());
        let why = if same_atoms {
            "the net charge differs"
        } else {
            "the molecular formulae differ"
        };
        format!("Not isomers: {why} ({left} and {right}).")
    } else {
        format!("Not isomers: the same elements ({left}), but a different isotopic composition.")
    }
}

/// "A has one proton more; all else is bonded alike."
fn protons([a, b]: [&Formula; 2]) -> String {
    let more = a.charge() - b.charge();
    let side = if more > 0 { "A" } else { "B" };
    let protons = counted(more.unsigned_abs() as usize, "proton");
    format!("{side} has {protons} more; {ALIKE}.")
}

/// "B has CH2 more."
fn surplus_in_words([a, b]: [&Formula; 2]) -> Option<String> {
    let [of_a, of_b] = surplus(a, b);
    let is_some = |formula: &Formula| formula.iter().next().is_some();
    match (is_some(&of_a), is_some(&of_b)) {
        (true, true) => Some(format!("A has {of_a} where B has {of_b}.")),
        (true, false) => Some(format!("A has {of_a} more.")),
        (false, true) => Some(format!("B has {of_b} more.")),
        (false, false) => None,
    }
}

/// Bonds that differ though neither end is left over, and no piece stands between the two.
fn further(explained: &Explanation, bonds: &BondDifference) -> Option<String> {
    let outside = |side: usize, list: &[(u32, u32)]| {
        let left_over = |atom: u32| {
            let mut pieces = explained.left_over[side].iter();
            pieces.any(|piece| piece.atoms.binary_search(&atom).is_ok())
        };
        let bridged = |bond: (u32, u32)| {
            let mut pieces = explained.left_over[1 - side].iter();
            pieces.any(|piece| closed(explained, 1 - side, piece) == Some(bond))
        };
        let counts = |&&(x, y): &&(u32, u32)| !left_over(x) && !left_over(y) && !bridged((x, y));
        list.iter().filter(counts).count()
    };
    let counts = [
        (outside(0, &bonds.only_in_a), "only in A"),
        (outside(1, &bonds.only_in_b), "only in B"),
        (bonds.order_changed.len(), "of different order"),
    ];
    let parts = counts.into_iter().filter(|&(count, _)| count > 0);
    let parts: Vec<String> = parts
        .map(|(count, how)| format!("{} {how}", counted(count, "bond")))
        .collect();
    (!parts.is_empty()).then(|| listed(&parts))
}

/// The bond of the other record in whose place a piece stands between two atoms.
fn closed(explained: &Explanation, side: usize, piece: &LeftOver) -> Option<(u32, u32)> {
    let [first, second] = *piece.on else {
        return None;
    };
    let image = |atom| partner(explained, side, atom);
    let (x, y) = (image(first)?, image(second)?);
    let bond = (x.min(y), x.max(y));
    let bonds = explained.bonds.as_ref()?;
    [&bonds.only_in_b, &bonds.only_in_a][side]
        .contains(&bond)
        .then_some(bond)
}

/// The atom of the other record that an atom of one is laid on.
fn partner(explained: &Explanation, side: usize, atom: u32) -> Option<u32> {
    let mut map = explained.atom_map.iter().map(|&(a, b)| [a, b]);
    let pair = map.find(|pair| pair[side] == atom)?;
    Some(pair[1 - side])
}

/// Left-over pieces and the atoms that bear them.
struct Pieces<'s> {
    places: Places<'s>,
    explained: &'s Explanation,
}

impl Pieces<'_> {
    /// "chlorine on C5 of A, bromine on C5 of B".
    fn in_words(&self) -> Option<String> {
        let [a, b] = &self.explained.left_over;
        match a.len() + b.len() {
            0 => return None,
            1..=MOST_PIECES => {}
            _ => {
                let [a, b] = [a, b].map(|pieces| counted(pieces.len(), "piece"));
                return Some(format!("{a} of A and {b} of B have no partner"));
            }
        }
        let named = |side: usize| {
            let pieces = self.explained.left_over[side].iter();
            pieces.map(move |piece| self.piece(side, piece))
        };
        let words: Vec<String> = named(0).chain(named(1)).collect();
        Some(words.join(", "))
    }

    fn piece(&self, side: usize, piece: &LeftOver) -> String {
        let of = ["A", "B"][side];
        let what = match piece.name {
            Some(name) => name.to_owned(),
            None => piece.formula.to_string(),
        };
        match piece.on.as_slice() {
            [] => format!("{what} as a component of {of}"),
            [on] => {
                let place = self.places.of_atom(side, *on);
                format!("{what} on {place} of {of}{}", self.elsewhere(side, *on))
            }
            many => {
                let places = many.iter().map(|&on| self.places.of_atom(side, on));
                let places: Vec<String> = places.collect();
                let instead = closed(self.explained, side, piece).map(|(x, y)| {
                    let ends = [x, y].map(|atom| self.places.of_atom(1 - side, atom));
                    format!(" ({} in {})", ends.join("–"), ["B", "A"][side])
                });
                let instead = instead.unwrap_or_default();
                format!("{what} between {} of {of}{instead}", listed(&places))
            }
        }
    }

    /// Where the other record has nothing instead, its atom is worth a word.
    fn elsewhere(&self, side: usize, atom: u32) -> String {
        let other = 1 - side;
        if !self.explained.left_over[other].is_empty() {
            return String::new();
        }
        let partner = partner(self.explained, side, atom);
        partner.map_or_else(String::new, |partner| {
            format!(
                " ({} in {})",
                self.places.of_atom(other, partner),
                ["A", "B"][other]
            )
        })
    }
}

fn capital(text: String) -> String {
    let mut characters = text.chars();
    let first = characters.next().map(|first| first.to_ascii_uppercase());
    first.into_iter().chain(characters).collect()
}

#[cfg(test)]
mod tests {
    use molkin_formats::smiles;
    use molkin_graph::{Limits, Orderer};
    use rstest::rstest;

    use super::super::{analysis, summary as whole_summary};
    use crate::{Structure, explain, kinds, relate};

    /// The summary without the verdict, and what analysis tells apart.
    fn told(a: &str, b: &str) -> [String; 2] {
        let limits = Limits::default();
        let mut orderer = Orderer::new(limits);
        let [a, b] =
            [a, b].map(|text| Structure::new(&mut orderer, smiles::parse(text).unwrap()).unwrap());
        let verdict = relate(&mut orderer, &a, &b).unwrap();
        let kinds = kinds(verdict.relation, [&a, &b], None, &limits).unwrap();
        let kind = kinds.first().copied();
        let explained = explain(&a, &b, verdict.relation, &limits);
        let summary = whole_summary([&a, &b], &verdict, kind, None, Some(&explained));
        let (_, further) = summary.split_once(['.', ':']).unwrap();
        let further = further
            .split_once("). ")
            .map_or(further, |(_, further)| further);
        let analysis = analysis([&a, &b], &verdict, kind, &explained);
        [further.trim().to_owned(), analysis.unwrap_or_default()]
    }

    #[rstest]
    #[case::methyl(
        "Cc1ccccc1",
        "c1ccccc1",
        "A has CH2 more. Methyl group on C2 of A (C1 in B); all else is bonded alike."
    )]
    #[case::halogen(
        "CCCCCl",
        "BrCCCC",
        "A has Cl where B has Br. Chlorine on C4 of A, bromine on C2 of B; all else is bonded alike."
    )]
    #[case::ring_of_one_more(
        "C1CCCCCCCCC1",
        "C1CCCCCCCC1",
        "A has CH2 more. CH2 between C2 and C10 of A (C1–C2 in B); all else is bonded alike."
    )]
    #[case::oxidation("CC(O)C", "CC(C)=O", "A has H2 more. One bond of different order.")]
    #[case::oxide(
        "CS(C)=O",
        "CSC",
        "A has O more. O on S2 of A (S2 in B); all else is bonded alike."
    )]
    #[case::salt(
        "CC(=O)O",
        "CC(=O)[O-].[Na+]",
        "Na+ as a component of B; all else agrees but for protons."
    )]
    #[case::solvate("CCN.O", "NCC", "H2O as a component of A; all else is bonded alike.")]
    #[case::proton(
        "CC(=O)O",
        "CC(=O)[O-]",
        "A has one proton more; all else is bonded alike."
    )]
    #[case::unrelated(
        "CCCCCCCC",
        "OC1OC(CO)C(O)C(O)C1O",
        "A has C2H6 where B has O6. They are unrelated in structure: however the atoms are laid on each other, at least 9 of their 19 bonds belong to one only."
    )]
    fn differences(#[case] a: &str, #[case] b: &str, #[case] expected: &str) {
        assert_eq!(told(a, b)[0], expected);
    }

    /// Each with a word that its sentence must have, and one that it must not.
    #[rstest]
    #[case::enantiomers(
        "C[C@H](N)C(=O)O",
        "C[C@@H](N)C(=O)O",
        "only a chiral method",
        "Mass tells"
    )]
    #[case::diastereomers("C/C=C/C", "C/C=C\\C", "achiral chromatography", "chiral method")]
    #[case::constitutional("CCCO", "CC(C)O", "Mass alone cannot", "chiral method")]
    #[case::isotopomers("[2H]CCO", "CCO[2H]", "fragments", "chromatography")]
    #[case::isotopologues("[2H]C", "C", "differ in mass", "chiral")]
    #[case::open("CC(O)CC", "CCC(C)O", "leave stereo open", "cannot")]
    #[case::undetermined("C[C@H](O)CC", "CCC(C)O", "leave stereo open", "cannot")]
    #[case::salt("CC(=O)O", "CC(=O)[O-].[Na+]", "counter-ion", "Mass")]
    #[case::proton("CC(=O)O", "CC(=O)[O-]", "charge states", "Mass")]
    #[case::nominal("CCCC", "CC(C)=O", "Equal nominal mass", "Mass tells")]
    #[case::mass(
        "CO",
        "CCO",
        "Mass tells them apart (monoisotopic 32.0262 and 46.0419)",
        "chiral"
    )]
    fn analyses(#[case] a: &str, #[case] b: &str, #[case] has: &str, #[case] lacks: &str) {
        let analysis = &told(a, b)[1];
        assert!(
            analysis.contains(has) && !analysis.contains(lacks),
            "{analysis}"
        );
    }

    #[test]
    fn the_same_compound_needs_no_analysis() {
        assert_eq!(told("CCO", "OCC")[1], "");
    }
}
