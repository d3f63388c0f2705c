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
    pub(super) text: &'a mut String,
}

impl Emitter<'_> {
    pub(super) fn emit(&mut self) {
        let layout = self.layout;
        for (word, rings) in layout.words() {
            for _ in 0..word.closes {
                self.text.push(')');
            }
            if word.opens {
                self.text.push('(');
            }
            match layout.parent(word.atom) {
                Some(arc) => self.bond(arc),
                None if self.text.is_empty() => {}
                None => self.text.push('.'),
            }
            self.atom(word.atom, rings);
        }
    }

    /// Writes an atom with its labels and hydrogens.
    fn atom(&mut self, atom: u32, rings: &[RingEnd]) {
        let form = self.structure.atom(atom);
        let shown = self.shown[atom as usize];
        let counted = form.hydrogens.saturating_sub(shown);
        let order_sum = self.layout.order_sum(atom) + u32::from(shown);
        atom::write(self.text, form, counted, order_sum, self.tags.of(atom));
        for end in rings {
            self.ring_end(end);
        }
        for at in 0..shown {
            let ends_chain = at + 1 == shown && self.layout.children(atom).next().is_none();
            self.hydrogen(atom, at == 0, !ends_chain);
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
        match arc.order {
            2 => self.text.push('='),
            3 => self.text.push('#'),
            4 => self.text.push('$'),
            _ => {
                if let Some(slope) = self.slopes.glyph(Carrier::Bond(arc.bond)) {
                    self.text.push(slope);
                }
            }
        }
    }
}
