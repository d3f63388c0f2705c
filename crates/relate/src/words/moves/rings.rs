//! Rings that differ, in words.

use crate::findings::RingChange;

use super::{
    listed,
    names::{Names, with_article},
};

pub(super) fn sentence(names: &Names<'_>, change: &RingChange) -> String {
    let bonds = [0, 1].map(|side| change.bonds[side].map(|bond| names.bond(side, bond)));
    let [a, b] = bonds.map(|bond| bond.unwrap_or_default());
    let sizes = change
        .rings
        .each_ref()
        .map(|ring| ring.as_ref().map(|ring| size(ring.len())));
    match sizes {
        [Some(one), Some(other)] if one == other => {
            let ring = with_article(&one);
            format!("{} ring is closed by {a} in A, by {b} in B", capital(&ring))
        }
        [Some(one), Some(other)] => {
            let ring = with_article(&one);
            let less = difference(names, change);
            format!(
                "{} ring of A is {other} in B{less}: it is closed by {a} in A, by {b} in B",
                capital(&ring)
            )
        }
        [Some(one), None] => open(names, change, 0, &one),
        [None, Some(one)] => open(names, change, 1, &one),
        [None, None] => format!("{a} of A is {b} in B"),
    }
}

/// ", without C2 of A", ", with C5 of B in it".
fn difference(names: &Names<'_>, change: &RingChange) -> String {
    let [left, joined] = [0, 1].map(|side| {
        let atoms = change.alone[side].iter();
        listed(
            &atoms
                .map(|&atom| names.atom(side, atom))
                .collect::<Vec<_>>(),
        )
    });
    match (left.is_empty(), joined.is_empty()) {
        (false, true) => format!(", without {left} of A"),
        (true, false) => format!(", with {joined} of B in it"),
        _ => String::new(),
    }
}

/// A ring that one record has, open in the other.
fn open(names: &Names<'_>, change: &RingChange, side: usize, size: &str) -> String {
    let other = 1 - side;
    let records = ["A", "B"];
    let (here, there) = (records[side], records[other]);
    let closing = change.bonds[side].map_or_else(String::new, |bond| names.bond(side, bond));
    let elsewhere = match (change.bonds[other], change.images[side]) {
        (Some(bond), _) => format!("there is {} instead", names.bond(other, bond)),
        (None, Some((x, y))) => {
            let [x, y] = [x, y].map(|atom| names.atom(other, atom));
            format!("{x} and {y} are not bonded")
        }
        (None, None) => "it is open".to_owned(),
    };
    format!("The {size} ring closed by {closing} in {here} is open in {there}: {elsewhere}")
}

fn size(atoms: usize) -> String {
    const WORDS: [&str; 10] = [
        "three", "four", "five", "six", "seven", "eight", "nine", "ten", "eleven", "twelve",
    ];
    match atoms.checked_sub(3).and_then(|at| WORDS.get(at)) {
        Some(word) => format!("{word}-membered"),
        None => format!("{atoms}-membered"),
    }
}

fn capital(text: &str) -> String {
    super::names::capitalised(text)
}
