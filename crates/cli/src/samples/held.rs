//! Held structures by name.

use std::{collections::HashMap, ffi::OsStr, sync::Arc};

use molkin_formats::source::{Parser, ReadOptions};
use molkin_graph::{Limits, Orderer};
use molkin_relate::wire::Prepared;

use crate::input::Input;

/// The structures of a file by name.
pub(super) struct Held {
    records: HashMap<String, Named>,
}

/// What a name stands for.
#[derive(Clone)]
pub(super) enum Named {
    /// One record.
    One(Arc<Prepared>),
    /// Several: nobody knows which is meant.
    Several,
}

impl Held {
    /// Reads the file.
    pub(super) fn read(file: &OsStr, reading: &ReadOptions) -> Result<Self, String> {
        let mut input = Input::open(file, reading.clone()).map_err(|error| error.to_string())?;
        let mut parser = Parser::new(reading);
        let mut orderer = Orderer::new(Limits::default());
        let source = input.name().to_owned();
        let mut records: HashMap<String, Named> = HashMap::new();
        for raw in input.by_ref() {
            let prepared = Prepared::new(&mut orderer, &source, parser.parse(raw));
            let name = prepared.input().name.trim().to_owned();
            if name.is_empty() {
                continue;
            }
            records
                .entry(name)
                .and_modify(|named| *named = Named::Several)
                .or_insert_with(|| Named::One(Arc::new(prepared)));
        }
        match input.failure() {
            Some(failure) => Err(failure.to_string()),
            None => Ok(Self { records }),
        }
    }

    /// What a name stands for.
    pub(super) fn get(&self, name: &str) -> Option<&Named> {
        self.records.get(name)
    }
}
