//! What moved, a sentence for each finding. Nothing is said here that the finding does not hold.

mod names;
mod places;
mod rings;

use std::collections::BTreeMap;

use crate::{
    BondDifference, Structure,
    findings::{Change, Finding, GroupHere, Link, Moved, Shift, Substituent},
};

use self::names::Names;
use super::{counted, listed};

/// The sentence of a finding.
pub(crate) fn sentence(structures: [&Structure; 2], finding: &Finding) -> String {
    let names = Names(structures);
    let sentence = match &finding.change {
        Change::Moved(moved) => substituent(&names, moved),
        Change::Exchanged(both) => exchanged(&names, both),
        Change::Rehung(moved) => rehung(&names, moved),
        Change::Chain { chain, within } => chain_changed(&names, chain, within),
        Change::Divided { centre, chains, .. } => divided(&names, centre, chains),
        Change::Link(link) => linked(&names, link),
        Change::Turned { name, bonds } => {
            let sides = [0, 1].map(|side| {
                let bonds = bonds[side].map(|(a, b)| names.bond(side, (a, b)));
                listed(&bonds)
            });
            let [a, b] = sides;
            format!("The {name} is the other way round: {a} in A, {b} in B")
        }
        Change::Swapped {
            atoms,
            beside,
            in_ring,
        } => {
            let [[x, y], [_, _]] = *atoms;
            let place = if *in_ring { " in the ring" } else { "" };
            let way = |side: usize, order: [u32; 4]| names.path(side, &order);
            let in_a = way(0, [beside[0][0], x, y, beside[0][1]]);
            let in_b = way(1, [beside[1][1], atoms[1][1], atoms[1][0], beside[1][0]]);
            let [x, y] = [x, y].map(|atom| names.atom(0, atom));
            format!("{x} and {y} of A have changed places{place}: {in_a} in A, {in_b} in B")
        }
        Change::Ring(ring) => rings::sentence(&names, ring),
        Change::Delocalised { side, atoms, ring } => delocalised(&names, *side, atoms, *ring),
        Change::Shifted(shifts) => shifted(&names, shifts),
        Change::Hydrogen { from, to, count } => {
            let (from, to) = (names.atom(0, from[0]), names.atom(1, to[1]));
            match count {
                1 => format!("A hydrogen on {from} of A is on {to} of B"),
                n => format!("{n} hydrogens on {from} of A are on {to} of B"),
            }
        }
        Change::Groups(groups) => groups_changed(&names, groups),
        Change::Rest => rest(&names, finding),
    };
    sentence + "."
}

/// A sentence as it goes on behind a colon: "The" and "A" small, an atom as it is.
pub(crate) fn within(sentence: &str) -> String {
    for (article, small) in [("The ", "the "), ("A ", "a "), ("An ", "an ")] {
        if let Some(rest) = sentence.strip_prefix(article) {
            return format!("{small}{rest}");
        }
    }
    sentence.to_owned()
}

/// "The rest, 20 of 21 bonds, is the same."
pub(crate) fn same(bonds: &BondDifference) -> String {
    let alike = bonds.kept - bonds.order_changed.len();
    let (all, others) = (
        bonds.kept + bonds.only_in_a.len(),
        bonds.kept + bonds.only_in_b.len(),
    );
    let counted = counted(all, "bond");
    match (bonds.kept == all && all == others, all == others) {
        (true, _) if alike == all => format!("All {counted} are the same."),
        (true, _) => {
            format!("The same atoms are bonded in both, {alike} of {counted} in the same order.")
        }
        (_, true) => format!("The rest, {alike} of {counted}, is the same."),
        _ => format!("The rest, {alike} of {all} bonds of A and {others} of B, is the same."),
    }
}

fn substituent(names: &Names<'_>, moved: &Moved) -> String {
    let [from, to] = &moved.seats;
    let [there, here] = places::pair(names, moved);
    let (from, to) = (names.atom(0, from.atom), names.atom(1, to.atom));
    let [group, other] = [0, 1].map(|side| names.group(side, &moved.groups[side]));
    if group == other {
        let through = names.through(0, moved);
        format!("The {group}{through} on {from} of A{there} is on {to} of B{here}")
    } else {
        let other = names::with_article(&other);
        format!("The {group} on {from} of A{there} is {other} on {to} of B{here}")
    }
}

fn linked(names: &Names<'_>, link: &Link) -> String {
    let ends = |side: usize| {
        let ends = link.ends[side].iter();
        let ends: Vec<String> = ends.map(|&(_, atom)| names.atom(side, atom)).collect();
        match ends.len() {
            1 => format!("on {}", ends[0]),
            _ => format!("between {}", listed(&ends)),
        }
    };
    let [from, to] = [ends(0), ends(1)];
    let [group, other] = [0, 1].map(|side| names.group(side, &link.groups[side]));
    let one_end = link.ends[0].len() == 1;
    let what = match (group == other, one_end) {
        (true, _) => format!("The {} is {from} in A, {to} in B", names.linking(link)),
        (_, true) => format!(
            "The {group} {from} of A is {} {to} in B",
            names::with_article(&other)
        ),
        _ => format!(
            "The {} {from} of A is {} {to} in B",
            names.linking(link),
            names::with_article(&other)
        ),
    };
    let joined = [1, 0].map(|side| {
        let (x, y) = link.joined[side]?;
        let [x, y] = [x, y].map(|atom| names.atom(1 - side, atom));
        let record = ["A", "B"][1 - side];
        Some(format!(
            "; {x} and {y} of {record} are bonded to each other"
        ))
    });
    what + &joined.into_iter().flatten().collect::<String>()
}

fn exchanged(names: &Names<'_>, [one, other]: &[Moved; 2]) -> String {
    let on = |side: usize, moved: &Moved| {
        let group = names.group(side, &moved.groups[side]);
        format!(
            "the {group} on {}",
            names.atom(side, moved.seats[side].atom)
        )
    };
    let (first, second) = (on(0, one), on(0, other));
    let first = names::capitalised(&first);
    format!(
        "{first} and {second} of A have exchanged places: in B {} and {}",
        on(1, one),
        on(1, other)
    )
}

fn rehung(names: &Names<'_>, moved: &Moved) -> String {
    let [old, new] = [0, 1].map(|side| names.group(side, &moved.groups[side]));
    let [on, there] = [0, 1].map(|side| names.atom(side, moved.seats[side].atom));
    let [by, other] = [0, 1].map(|side| names.atom(side, moved.seats[side].through));
    if old == new {
        return format!(
            "The {old} on {on} of A and {there} of B is bonded through {by} in A, through {other} in B"
        );
    }
    let new = names::with_article(&new);
    format!(
        "The {old} on {on} of A is {new} on {there} of B, bonded through {other} instead of {by} of A"
    )
}

fn chain_changed(names: &Names<'_>, chain: &Moved, within: &Moved) -> String {
    let [old, new] = [0, 1].map(|side| names.group(side, &chain.groups[side]));
    let [on, there] = [0, 1].map(|side| names.atom(side, chain.seats[side].atom));
    let new = names::with_article(&new);
    let group = names.group(0, &within.groups[0]);
    let [from, to] = [0, 1].map(|side| names.atom(side, within.seats[side].atom));
    format!(
        "The {old} on {on} of A is {new} on {there} of B: the {group} on {from} of A is on {to} of B"
    )
}

fn divided(names: &Names<'_>, centre: &[u32; 2], chains: &[Vec<Substituent>; 2]) -> String {
    let [a, b] = [0, 1].map(|side| {
        let mut counts: BTreeMap<String, usize> = BTreeMap::new();
        for chain in &chains[side] {
            *counts.entry(names.group(side, chain)).or_default() += 1;
        }
        let words = counts.into_iter().map(|(name, count)| match count {
            1 => names::with_article(&name),
            2 => format!("two {name}s"),
            3 => format!("three {name}s"),
            n => format!("{n} {name}s"),
        });
        listed(&words.collect::<Vec<String>>())
    });
    let [centre, image] = [0, 1].map(|side| names.atom(side, centre[side]));
    format!("{centre} of A bears {a}, {image} of B {b}")
}

fn delocalised(names: &Names<'_>, side: usize, atoms: &[Vec<u32>; 2], ring: bool) -> String {
    let record = ["A", "B"][side];
    let members: Vec<String> = atoms[side]
        .iter()
        .map(|&atom| names.atom(side, atom))
        .collect();
    let one = members.len() == 2;
    let members = listed(&members);
    if one {
        return format!("The bond between {members} is mobile in {record} only");
    }
    if ring && atoms[side].len() == 6 {
        format!("The six-membered ring of {members} is aromatic in {record} only")
    } else {
        format!("The bonds between {members} are mobile in {record} only")
    }
}

fn shifted(names: &Names<'_>, shifts: &[Shift]) -> String {
    if let [from, to] = shifts {
        let ends = [from.orders[0], from.orders[1], to.orders[0], to.orders[1]];
        match ends {
            [Some(order), Some(1), Some(1), Some(other)] if order == other && order > 1 => {
                let word = names::order(Some(order));
                let (old, new) = (names.bond(0, from.bonds[0]), names.bond(1, to.bonds[1]));
                return format!("The {word} bond {old} of A is {new} in B");
            }
            _ => {}
        }
    }
    let parts = shifts.iter().map(|shift| {
        let (old, new) = (names.bond(0, shift.bonds[0]), names.bond(1, shift.bonds[1]));
        let [before, after] = shift.orders.map(names::order);
        format!("the {before} bond {old} of A is {after} in B ({new})")
    });
    let parts: Vec<String> = parts.collect();
    names::capitalised(&listed(&parts))
}

fn groups_changed(names: &Names<'_>, groups: &[Vec<GroupHere>; 2]) -> String {
    let side = |side: usize, article: fn(&str) -> String| {
        let words = groups[side].iter().map(|group| {
            let atoms = group.atoms.iter().map(|&atom| names.atom(side, atom));
            let atoms: Vec<String> = atoms.collect();
            format!("{} ({})", article(group.name), atoms.join(", "))
        });
        listed(&words.collect::<Vec<String>>())
    };
    let old = names::capitalised(&side(0, |name| format!("the {name}")));
    let new = side(1, names::with_article);
    let verb = if groups[0].len() == 1 { "is" } else { "are" };
    format!("{old} of A {verb} {new} in B")
}

fn rest(names: &Names<'_>, finding: &Finding) -> String {
    let mut parts = Vec::new();
    for (side, bonds) in finding.only_in.iter().enumerate() {
        let bonds: Vec<String> = bonds.iter().map(|&bond| names.bond(side, bond)).collect();
        if !bonds.is_empty() {
            parts.push(format!("only {} has {}", ["A", "B"][side], listed(&bonds)));
        }
    }
    for &[in_a, in_b] in &finding.order_changed {
        parts.push(format!(
            "{} of A is {} in B",
            names.bond(0, in_a),
            names.bond(1, in_b)
        ));
    }
    names::capitalised(&parts.join("; "))
}
