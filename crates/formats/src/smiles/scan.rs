//! Reads the text from left to right into [`Syntax`].
//!
//! The first byte of a token says what it is. An explicit stack holds the open branches, so depth
//! costs memory in step with the bytes read and never call depth.

mod bracket;
mod branch;
mod ring;

use molkin_graph::{BondOrder, Element};

use super::{
    remarks::{Extent, Fault, Remarks},
    rings::Rings,
    syntax::{AtomSyntax, AtomToken, BondKind, BondSymbol, NONE, Slope, Syntax},
    token,
};
use crate::ReadErrorKind;

/// An open branch.
#[derive(Debug, Clone, Copy)]
struct Branch {
    /// The atom it sits on.
    atom: u32,
    /// Atoms read before it.
    atoms: u32,
    offset: usize,
}

/// What has been read last, a bond symbol aside.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
enum Last {
    Nothing,
    /// An atom or one of its ring labels.
    Atom,
    BranchOpened,
    BranchClosed,
    Dot,
}

/// Storage that outlives a record.
#[derive(Debug, Default)]
pub(super) struct Scratch {
    pub(super) syntax: Syntax,
    branches: Vec<Branch>,
    rings: Rings,
}

/// Reads a text up to its end or the first white space, and returns how many bytes that is.
pub(super) fn scan(
    text: &[u8],
    atom_limit: usize,
    scratch: &mut Scratch,
    remarks: &mut Remarks,
) -> Result<usize, Fault> {
    scratch.syntax.clear();
    scratch.branches.clear();
    scratch.rings.clear();
    let Scratch {
        syntax,
        branches,
        rings,
    } = scratch;
    let mut scanner = Scanner {
        text,
        at: 0,
        atom_limit,
        previous: NONE,
        last: Last::Nothing,
        pending: None,
        syntax,
        branches,
        rings,
        remarks,
    };
    scanner.run()?;
    scanner.finish()?;
    Ok(scanner.at)
}

struct Scanner<'a> {
    text: &'a [u8],
    at: usize,
    atom_limit: usize,
    /// The atom that the next one is bonded to.
    previous: u32,
    last: Last,
    /// A bond symbol that still lacks its second end, and where it stands.
    pending: Option<(BondSymbol, usize)>,
    syntax: &'a mut Syntax,
    branches: &'a mut Vec<Branch>,
    rings: &'a mut Rings,
    remarks: &'a mut Remarks,
}

/// What may follow at the start of a token.
const UNIT: &str = "an atom, a bond, a ring label, a branch or a dot";

impl Scanner<'_> {
    fn run(&mut self) -> Result<(), Fault> {
        while let Some(&byte) = self.text.get(self.at) {
            if let Some((element, aromatic, width)) = bare_symbol(byte, self.text.get(self.at + 1))
            {
                self.atom(AtomToken::bare(element, aromatic), width)?;
                continue;
            }
            match byte {
                b'[' => self.bracket()?,
                b'(' => self.open_branch()?,
                b')' => self.close_branch()?,
                b'0'..=b'9' | b'%' => self.ring_label()?,
                b'-' | b'=' | b'#' | b'$' | b':' | b'/' | b'\\' => self.bond(byte)?,
                b'.' => self.dot()?,
                b' ' | b'\t' | b'\r' | b'\n' => break,
                _ => return Err(self.stray()),
            }
        }
        Ok(())
    }

    /// A byte that starts no token.
    fn stray(&self) -> Fault {
        let rest = &self.text[self.at..];
        if rest.starts_with(b"<-") {
            let kind = ReadErrorKind::Unsupported {
                what: "an arrow for a coordinate bond",
            };
            return Fault::new(kind, self.at, 2);
        }
        let (kind, width) = token::unexpected(rest, UNIT);
        Fault::new(kind, self.at, width)
    }

    /// Adds an atom whose text is `width` bytes from here, and its bond to the previous one.
    #[inline]
    fn atom(&mut self, atom: AtomToken, width: usize) -> Result<(), Fault> {
        let offset = self.at;
        if self.syntax.atoms.len() >= self.atom_limit {
            let kind = ReadErrorKind::TooManyAtoms {
                limit: self.atom_limit,
            };
            return Err(Fault::new(kind, offset, width));
        }
        let previous = self.previous;
        let place = (offset as u32, width as u32);
        let index = self
            .syntax
            .push_atom(AtomSyntax::new(atom, previous != NONE, place));
        if previous != NONE {
            match self.pending.take() {
                None => {
                    let kind = self.syntax.elided_kind(previous, index);
                    self.syntax
                        .link(previous, index, kind, Slope::Unmarked, place);
                }
                Some((symbol, at)) => {
                    let kind = self.bond_kind(symbol, [previous, index], at)?;
                    let slope = match symbol {
                        BondSymbol::Directional { up } => Slope::above(up),
                        _ => Slope::Unmarked,
                    };
                    self.syntax
                        .link(previous, index, kind, slope, (at as u32, 1));
                }
            }
        }
        self.previous = index;
        self.last = Last::Atom;
        self.at = offset + width;
        Ok(())
    }

    fn bond_kind(
        &mut self,
        symbol: BondSymbol,
        ends: [u32; 2],
        at: usize,
    ) -> Result<BondKind, Fault> {
        let Some(kind) = self.syntax.bond_kind(symbol, ends[0], ends[1]) else {
            let kind = ReadErrorKind::AromaticBondOutsideAromatic;
            return Err(Fault::new(kind, at, 1));
        };
        let plain = |&atom: &u32| !self.syntax.atoms[atom as usize].may_be_aromatic();
        if symbol == BondSymbol::Aromatic && ends.iter().any(plain) {
            let text = "an aromatic bond is written at an atom without an aromatic symbol";
            let extent = Extent::new(at, 1);
            self.remarks
                .note("aromatic-bond-outside-aromatic", &ends, extent, text)?;
        }
        Ok(kind)
    }

    /// The fault behind a token that nom refused. A bracket in which the text ends is one that
    /// was never closed.
    fn refused(&self, error: nom::Err<token::Refusal<'_>>, bracket: Option<usize>) -> Fault {
        let (nom::Err::Error(refusal) | nom::Err::Failure(refusal)) = error else {
            // Complete parsers never ask for more input; the fault is then that the text ends.
            let kind = ReadErrorKind::UnexpectedEnd { expected: UNIT };
            return Fault::new(kind, self.text.len(), 0);
        };
        let at = self.text.len() - refusal.rest.len();
        let ends = matches!(
            refusal.kind,
            ReadErrorKind::UnexpectedEnd { .. }
                | ReadErrorKind::Unexpected {
                    found: ' ' | '\t' | '\r' | '\n',
                    ..
                }
        );
        match bracket {
            Some(start) if ends => Fault::new(ReadErrorKind::BracketNotClosed, start, at - start),
            _ => Fault::new(refusal.kind, at, refusal.width),
        }
    }

    fn bond(&mut self, byte: u8) -> Result<(), Fault> {
        if byte == b'-' && self.text.get(self.at + 1) == Some(&b'>') {
            let kind = ReadErrorKind::Unsupported {
                what: "an arrow for a coordinate bond",
            };
            return Err(Fault::new(kind, self.at, 2));
        }
        if self.pending.is_some() {
            let expected = "an atom or a ring label";
            let kind = ReadErrorKind::Unexpected {
                found: char::from(byte),
                expected,
            };
            return Err(Fault::new(kind, self.at, 1));
        }
        if self.previous == NONE {
            return Err(Fault::new(ReadErrorKind::MisplacedBond, self.at, 1));
        }
        let symbol = match byte {
            b'=' => BondSymbol::Order(BondOrder::Double),
            b'#' => BondSymbol::Order(BondOrder::Triple),
            b'$' => BondSymbol::Order(BondOrder::Quadruple),
            b':' => BondSymbol::Aromatic,
            b'/' => BondSymbol::Directional { up: true },
            b'\\' => BondSymbol::Directional { up: false },
            _ => BondSymbol::Order(BondOrder::Single),
        };
        self.pending = Some((symbol, self.at));
        self.at += 1;
        Ok(())
    }

    /// A bond symbol must not be followed by anything but an atom or a ring label.
    fn refuse_pending(&self) -> Result<(), Fault> {
        match self.pending {
            Some((_, at)) => Err(Fault::new(ReadErrorKind::MisplacedBond, at, 1)),
            None => Ok(()),
        }
    }

    /// What must not be left open at the end.
    fn finish(&mut self) -> Result<(), Fault> {
        self.refuse_pending()?;
        if let Some(branch) = self.branches.last() {
            return Err(Fault::new(ReadErrorKind::BranchNotClosed, branch.offset, 1));
        }
        if self.last == Last::Dot {
            self.odd_dot(self.at - 1)?;
        }
        match self.rings.first_open() {
            Some((label, end)) => Err(Fault::new(
                ReadErrorKind::RingNotClosed { label },
                end.offset,
                end.width,
            )),
            None => Ok(()),
        }
    }
}

/// An atom of the organic subset or a wildcard: element, whether aromatic, and bytes.
#[inline]
fn bare_symbol(byte: u8, next: Option<&u8>) -> Option<(Element, bool, usize)> {
    Some(match byte {
        b'C' if next == Some(&b'l') => (Element::CHLORINE, false, 2),
        b'C' => (Element::CARBON, false, 1),
        b'c' => (Element::CARBON, true, 1),
        b'N' => (Element::NITROGEN, false, 1),
        b'n' => (Element::NITROGEN, true, 1),
        b'O' => (Element::OXYGEN, false, 1),
        b'o' => (Element::OXYGEN, true, 1),
        b'S' => (Element::SULFUR, false, 1),
        b's' => (Element::SULFUR, true, 1),
        b'F' => (Element::FLUORINE, false, 1),
        b'B' if next == Some(&b'r') => (Element::BROMINE, false, 2),
        b'B' => (Element::BORON, false, 1),
        b'b' => (Element::BORON, true, 1),
        b'P' => (Element::PHOSPHORUS, false, 1),
        b'p' => (Element::PHOSPHORUS, true, 1),
        b'I' => (Element::IODINE, false, 1),
        b'*' => (Element::WILDCARD, false, 1),
        _ => return None,
    })
}
