//! Branches and dots.

use super::{Branch, Last, Scanner};
use crate::{
    ReadErrorKind,
    smiles::{
        remarks::{Extent, Fault},
        syntax::NONE,
    },
};

impl Scanner<'_> {
    pub(super) fn open_branch(&mut self) -> Result<(), Fault> {
        self.refuse_pending()?;
        if !matches!(self.last, Last::Atom | Last::BranchClosed) {
            return Err(Fault::new(ReadErrorKind::BranchWithoutAtom, self.at, 1));
        }
        let atom = self.previous;
        self.syntax.atoms[atom as usize].branched = true;
        let atoms = self.syntax.atoms.len() as u32;
        self.branches.push(Branch {
            atom,
            atoms,
            offset: self.at,
        });
        self.last = Last::BranchOpened;
        self.at += 1;
        Ok(())
    }

    pub(super) fn close_branch(&mut self) -> Result<(), Fault> {
        self.refuse_pending()?;
        let Some(branch) = self.branches.pop() else {
            return Err(Fault::new(ReadErrorKind::BranchNotOpened, self.at, 1));
        };
        if branch.atoms as usize == self.syntax.atoms.len() {
            let width = self.at + 1 - branch.offset;
            return Err(Fault::new(ReadErrorKind::EmptyBranch, branch.offset, width));
        }
        if self.last == Last::Dot {
            self.odd_dot(self.at - 1)?;
        }
        self.previous = branch.atom;
        self.last = Last::BranchClosed;
        self.at += 1;
        Ok(())
    }

    pub(super) fn dot(&mut self) -> Result<(), Fault> {
        self.refuse_pending()?;
        if matches!(self.last, Last::Nothing | Last::Dot) {
            self.odd_dot(self.at)?;
        }
        self.previous = NONE;
        self.last = Last::Dot;
        self.at += 1;
        Ok(())
    }

    /// A dot at the start, at the end, or beside another one.
    pub(super) fn odd_dot(&mut self, at: usize) -> Result<(), Fault> {
        let text = "the dot separates nothing";
        let last = self.syntax.atoms.len().checked_sub(1);
        let last = last.map(|atom| atom as u32);
        self.remarks
            .note("misplaced-dot", last.as_slice(), Extent::new(at, 1), text)
    }
}
