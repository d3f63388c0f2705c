//! Ring labels.

use molkin_graph::BondOrder;

use super::{Last, Scanner};
use crate::{
    ReadErrorKind,
    smiles::{
        remarks::{Extent, Fault},
        rings::RingEnd,
        syntax::{BondSymbol, Slope},
        token,
    },
};

impl Scanner<'_> {
    pub(super) fn ring_label(&mut self) -> Result<(), Fault> {
        let rest = &self.text[self.at..];
        let (after, label) = token::ring_label(rest).map_err(|error| self.refused(error, None))?;
        let (offset, width) = (self.at, rest.len() - after.len());
        if !matches!(self.last, Last::Atom | Last::BranchClosed) {
            return Err(Fault::new(
                ReadErrorKind::RingLabelWithoutAtom,
                offset,
                width,
            ));
        }
        let extent = Extent::new(offset, width);
        if self.syntax.atoms[self.previous as usize].branched {
            let text = "a ring label after a branch is read in text order";
            self.remarks
                .note("ring-label-after-branch", &[self.previous], extent, text)?;
        }
        if rest.starts_with(b"%0") {
            let text = "a ring label is written with a leading zero";
            self.remarks
                .note_allowed("ring-label-leading-zero", &[self.previous], extent, text);
        }
        let symbol = self
            .pending
            .take()
            .map_or(BondSymbol::Elided, |(symbol, _)| symbol);
        let place = self.syntax.reserve_place(self.previous);
        let here = RingEnd {
            atom: self.previous,
            symbol,
            place,
            offset,
            width,
        };
        match self.rings.take(label) {
            None => self.rings.open(label, here),
            Some(first) => self.close_ring(label, first, here)?,
        }
        self.at += width;
        Ok(())
    }

    fn close_ring(&mut self, label: u8, first: RingEnd, here: RingEnd) -> Result<(), Fault> {
        let fault = |kind| {
            Fault::new(kind, here.offset, here.width).with_related(first.offset, first.width)
        };
        if first.atom == here.atom {
            return Err(fault(ReadErrorKind::SelfBond { atom: here.atom }));
        }
        let (symbol, slope) = merge(first.symbol, here.symbol)
            .ok_or_else(|| fault(ReadErrorKind::RingOrderConflict { label }))?;
        let ends = [first.atom, here.atom];
        let kind = self.bond_kind(symbol, ends, here.offset)?;
        let place = (here.offset as u32, here.width as u32);
        self.syntax
            .link_places(ends, [first.place, here.place], kind, slope, place);
        Ok(())
    }
}

/// What the symbols at the two ends of a ring bond say together; `None` where their orders differ.
///
/// A slope is written as seen from the atom that the label stands at, so the same slope looks
/// opposite at the two ends (OpenSMILES, double bonds in rings).
fn merge(first: BondSymbol, second: BondSymbol) -> Option<(BondSymbol, Slope)> {
    use BondSymbol::{Directional, Elided, Order};
    const SINGLE: BondSymbol = Order(BondOrder::Single);
    Some(match (first, second) {
        (Directional { up }, Directional { up: other }) if up == other => {
            (SINGLE, Slope::Contradictory)
        }
        (Directional { up }, Directional { .. } | Elided | SINGLE) => (SINGLE, Slope::above(up)),
        (Elided | SINGLE, Directional { up }) => (SINGLE, Slope::above(!up)),
        (Elided, symbol) | (symbol, Elided) => (symbol, Slope::Unmarked),
        (first, second) if first == second => (first, Slope::Unmarked),
        _ => return None,
    })
}
