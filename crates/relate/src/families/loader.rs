//! Structures of records that are needed again.

use std::{collections::HashMap, io, rc::Rc};

use molkin_formats::source::{Parser, RawRecord, ReadOptions};
use molkin_graph::{Limits, Orderer};

use crate::Structure;

use super::kept::Kept;

/// The most structures that are held at once.
const HELD: usize = 256;

/// Reads kept records again; owns the scratch. One per thread.
pub(super) struct Loader<'k> {
    kept: &'k Kept,
    parser: Parser,
    orderer: Orderer,
    held: HashMap<u64, Rc<Structure>>,
}

impl<'k> Loader<'k> {
    pub(super) fn new(kept: &'k Kept, options: &ReadOptions, limits: Limits) -> Self {
        Self {
            kept,
            parser: Parser::new(options),
            orderer: Orderer::new(limits),
            held: HashMap::new(),
        }
    }

    pub(super) fn orderer(&mut self) -> &mut Orderer {
        &mut self.orderer
    }

    /// The structure of a record that was read before.
    pub(super) fn read(&mut self, record: u64) -> io::Result<Structure> {
        let entry = self.kept.get(record)?;
        let raw = RawRecord::from_kept(1, &entry.structure);
        let read = self.parser.parse(raw).result.map_err(io::Error::other)?;
        Structure::new(&mut self.orderer, read.molecule).map_err(io::Error::other)
    }

    /// As [`Loader::read`], and holds it for the next time.
    pub(super) fn hold(&mut self, record: u64) -> io::Result<Rc<Structure>> {
        if let Some(structure) = self.held.get(&record) {
            return Ok(Rc::clone(structure));
        }
        let structure = Rc::new(self.read(record)?);
        if self.held.len() >= HELD {
            self.held.clear();
        }
        self.held.insert(record, Rc::clone(&structure));
        Ok(structure)
    }

    /// Lets go of everything that is held.
    pub(super) fn clear(&mut self) {
        self.held.clear();
    }
}
