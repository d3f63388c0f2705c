//! Stereo elements by the atoms of both records: `C3 (R in A, S in B)`.

use molkin_graph::Label;

use crate::{StereoDifference, Structure};

/// The two records whose atoms are named.
pub(super) struct Places<'s>(pub(super) [&'s Structure; 2]);

impl Places<'_> {
    /// Where an element is in both, with its labels: once where the atoms have the same names.
    pub(super) fn of_pair(&self, a: &[u32], b: &[u32], labels: [Option<Label>; 2]) -> String {
        let [in_a, in_b] = [self.place(0, a), self.place(1, b)];
        let labels = labels.map(|label| label.map(Label::as_str));
        if in_a != in_b {
            let aside = |label: Option<&str>| label.map_or(String::new(), |l| format!(" ({l})"));
            return format!(
                "{in_a} in A{}, {in_b} in B{}",
                aside(labels[0]),
                aside(labels[1])
            );
        }
        match labels {
            [Some(left), Some(right)] => format!("{in_a} ({left} in A, {right} in B)"),
            [Some(one), None] | [None, Some(one)] => format!("{in_a} ({one})"),
            [None, None] => in_a,
        }
    }

    /// Where an element is in one of them.
    pub(super) fn on_side(&self, side: usize, difference: &StereoDifference) -> String {
        self.place(side, [&difference.a, &difference.b][side])
    }

    /// An atom of one of them.
    pub(super) fn of_atom(&self, side: usize, atom: u32) -> String {
        self.place(side, &[atom])
    }

    /// `C3`, `C3=C4`, or `C3…C6` for ends that no bond joins.
    fn place(&self, side: usize, atoms: &[u32]) -> String {
        let molecule = self.0[side].molecule();
        let name = |atom: u32| {
            let symbol = molecule.atom(atom).map_or("", |atom| atom.element.symbol());
            format!("{symbol}{}", molecule.number(atom))
        };
        match *atoms {
            [a, b] if a != b => {
                let joins = |&(x, y, _): &(u32, u32, _)| (x, y) == (a, b) || (y, x) == (a, b);
                let sign = if molecule.bonds().any(|bond| joins(&bond)) {
                    "="
                } else {
                    "…"
                };
                format!("{}{sign}{}", name(a), name(b))
            }
            [a, ..] => name(a),
            [] => String::new(),
        }
    }
}
