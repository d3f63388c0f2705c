//! Atoms, bonds and substituents by name.

use crate::{
    Structure,
    findings::{Link, Moved, Substituent},
};

/// The two records whose atoms are named.
pub(super) struct Names<'s>(pub(super) [&'s Structure; 2]);

impl Names<'_> {
    /// `C3`.
    pub(super) fn atom(&self, side: usize, atom: u32) -> String {
        let molecule = self.0[side].molecule();
        let symbol = molecule.atom(atom).map_or("", |atom| atom.element.symbol());
        format!("{symbol}{}", molecule.number(atom))
    }

    /// `C3–O4`, with the sign of the order in the normal form.
    pub(super) fn bond(&self, side: usize, (a, b): (u32, u32)) -> String {
        let sign = match self.order(side, (a, b)) {
            Some(Some(2)) => "=",
            Some(Some(3)) => "≡",
            Some(None) => ":",
            _ => "–",
        };
        format!("{}{sign}{}", self.atom(side, a), self.atom(side, b))
    }

    /// `C1–O2–C3`, whatever the orders.
    pub(super) fn path(&self, side: usize, atoms: &[u32]) -> String {
        let atoms: Vec<String> = atoms.iter().map(|&atom| self.atom(side, atom)).collect();
        atoms.join("–")
    }

    /// The order of a bond, where there is one.
    fn order(&self, side: usize, (a, b): (u32, u32)) -> Option<Option<u8>> {
        let form = self.0[side].canonical().normal_form();
        let bond = form.bonds.iter().find(|bond| {
            let ends = [bond.a, bond.b].map(|end| form.atoms[end as usize].source);
            ends == [a, b] || ends == [b, a]
        });
        bond.map(|bond| bond.order)
    }

    /// `methyl group`, `chlorine`, `group C7H6NO2`.
    pub(super) fn group(&self, side: usize, group: &Substituent) -> String {
        match group.name {
            Some(name) => name.to_owned(),
            None if group.atoms.len() == 1 => {
                let atom = self.0[side].molecule().atom(group.atoms[0]);
                format!("{} atom", atom.map_or("", |atom| atom.element.symbol()))
            }
            None => format!("group {}", group.formula),
        }
    }

    /// `oxygen O3`, `carbonyl group C7`, `group C2H5N (C3…N5)`: what joins two others, in A.
    pub(super) fn linking(&self, link: &Link) -> String {
        let group = self.group(0, &link.groups[0]);
        let mut ends: Vec<u32> = link.ends[0].iter().map(|&(inside, _)| inside).collect();
        ends.dedup();
        let ends: Vec<String> = ends.iter().map(|&atom| self.atom(0, atom)).collect();
        match (link.groups[0].name, ends.as_slice()) {
            (Some(_), [atom]) => format!("{group} {atom}"),
            _ => format!("{group} ({})", ends.join("…")),
        }
    }

    /// ` (bonded through C5)`, for a group that is told by its formula.
    pub(super) fn through(&self, side: usize, moved: &Moved) -> String {
        let group = &moved.groups[side];
        if group.name.is_some() || group.atoms.len() == 1 {
            return String::new();
        }
        let through = self.atom(side, moved.seats[side].through);
        format!(" (bonded through {through})")
    }
}

/// `single`, `double`; a mobile bond has no order.
pub(super) fn order(order: Option<u8>) -> &'static str {
    match order {
        Some(0) => "hydrogen",
        Some(1) => "single",
        Some(2) => "double",
        Some(3) => "triple",
        Some(4) => "quadruple",
        Some(6) => "coordination",
        _ => "mobile",
    }
}

/// `a methyl group`, `an ethyl group`.
pub(super) fn with_article(noun: &str) -> String {
    // Vowels that sound as "you" take "a".
    let vowel = noun.starts_with(['a', 'e', 'i', 'o']) || noun.starts_with("un");
    let article = if vowel { "an" } else { "a" };
    format!("{article} {noun}")
}

/// The first letter as at the start of a sentence.
pub(super) fn capitalised(text: &str) -> String {
    let mut letters = text.chars();
    match letters.next() {
        Some(first) => first.to_uppercase().collect::<String>() + letters.as_str(),
        None => String::new(),
    }
}
