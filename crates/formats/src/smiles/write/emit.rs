//! The characters.

use super::{
    atom,
    layout::{LAST_LABEL, Layout, RingEnd},
    slopes::{Carrier, Slopes},
    structure::{Arc, Structure},
    tags::Tags,
};

/// Writes the text from left to right.
pub(super) struct Emitter<'a> {
    pub(super) structure: &'a Structure<'a>,
    pub(super) layout: &'a Layout,
    /// Per atom: the hydrogens that are written as atoms.
    pub(super) shown: &'a [u8],
    pub(super) tags: &'a Tags,
    pub(super) slopes: &'a mut Slopes,
    /// Scratch.
    pub(super) steps: &'a mut Vec<Step>,
    pub(super) text: &'a mut String,
}

/// What remains to be written.
#[derive(Debug)]
pub(super) enum Step {
    Atom(u32),
    /// A bond and the atom that it leads to.
    Bond(Arc),
    Open,
    Close,
}

impl Emitter<'_> {
    pub(super) fn emit(&mut self) {
        let layout = self.layout;
        self.steps.clear();
        for (at, &root) in layout.roots().iter().enumerate() {
            if at > 0 {
                self.text.push('.');
            }
            self.steps.push(Step::Atom(root));
            while let Some(step) = self.steps.pop() {
                match step {
                    Step::Open => self.text.push('('),
                    Step::Close => self.text.push(')'),
                    Step::Bond(arc) => {
                        self.bond(arc);
                        self.atom(arc.to);
                    }
                    Step::Atom(atom) => self.atom(atom),
                }
            }
        }
    }

    /// Writes an atom with its labels and hydrogens, and leaves its branches to be written.
    fn atom(&mut self, atom: u32) {
        let form = self.structure.atom(atom);
        let shown = self.shown[atom as usize];
        let counted = form.hydrogens.saturating_sub(shown);
        let orders = self.structure.arcs(atom).iter();
        let order_sum = orders.map(|arc| u32::from(arc.order)).sum::<u32>() + u32::from(shown);
        atom::write(self.text, form, counted, order_sum, self.tags.of(atom));
        let layout = self.layout;
        for end in layout.rings(atom) {
            self.ring_end(end);
        }
        let children = layout.children(atom);
        for at in 0..shown {
            let ends_chain = at + 1 == shown && children.is_empty();
            self.hydrogen(atom, at == 0, !ends_chain);
        }
        if let Some((&chain, branches)) = children.split_last() {
            self.steps.push(Step::Bond(chain));
            for &branch in branches.iter().rev() {
                self.steps
                    .extend([Step::Close, Step::Bond(branch), Step::Open]);
            }
        }
    }

    /// Writes the bond symbol where a label opens, and the label.
    fn ring_end(&mut self, end: &RingEnd) {
        if end.opens {
            self.bond(end.arc);
        }
        match end.label {
            0..10 => {}
            10..=LAST_LABEL => self.text.push('%'),
            _ => self.text.push_str("%("),
        }
        atom::push_number(self.text, end.label);
        if end.label > LAST_LABEL {
            self.text.push(')');
        }
    }

    /// Writes one hydrogen as an atom; only the first one of an atom can have a slope.
    fn hydrogen(&mut self, host: u32, first: bool, branch: bool) {
        if branch {
            self.text.push('(');
        }
        if first {
            let slope = self.slopes.glyph(Carrier::Hydrogen(host));
            self.text.extend(slope);
        }
        self.text.push_str("[H]");
        if branch {
            self.text.push(')');
        }
    }

    fn bond(&mut self, arc: Arc) {
        let symbol = match arc.order {
            2 => Some('='),
            3 => Some('#'),
            4 => Some('$'),
            _ => self.slopes.glyph(Carrier::Bond(arc.bond)),
        };
        self.text.extend(symbol);
    }
}
