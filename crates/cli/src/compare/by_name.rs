//! Pairs by the names of records.

use std::{collections::HashMap, io};

use molkin_formats::source::{Parser, RecordOutcome};

use crate::input::Input;

use super::{Comparison, verdicts::Side};

/// Compares records of the same name, in the order of A. Records without a name, with a name that
/// is not alone on its side, or without a partner are listed, and the run is trouble: which of them
/// belong together is not for a program to guess.
///
/// Both inputs are held in memory.
pub(super) fn compare(
    comparison: &mut Comparison<'_>,
    mut a: Input,
    mut b: Input,
) -> io::Result<()> {
    let mut parser = Parser::new(comparison.reading);
    let mut sides = [&mut a, &mut b].map(|input| Records::read(input, &mut parser));
    comparison.broke_off(&a)?;
    comparison.broke_off(&b)?;
    let [left, right] = &sides;
    let places: Vec<(usize, usize)> = left.pairs(right).collect();
    let lists = [left.list(right), right.list(left)];
    let verdicts = comparison.verdicts([a.name(), b.name()]);
    let pairs = places.into_iter().filter_map(|(at, to)| {
        let [left, right] = &mut sides;
        Some([left.take(at)?, right.take(to)?].map(Side::Read))
    });
    comparison.pairs(&verdicts, pairs)?;
    for message in lists.into_iter().flatten() {
        comparison.report.trouble(message)?;
    }
    Ok(())
}

/// All records of an input.
struct Records {
    source: String,
    /// Taken out as they are compared.
    records: Vec<Option<Box<RecordOutcome>>>,
    names: Vec<String>,
    /// The places of each name, in order.
    places: HashMap<String, Vec<usize>>,
}

impl Records {
    fn read(input: &mut Input, parser: &mut Parser) -> Self {
        let mut side = Self {
            source: input.name().to_owned(),
            records: Vec::new(),
            names: Vec::new(),
            places: HashMap::new(),
        };
        for raw in input {
            let outcome = parser.parse(raw);
            let place = side.records.len();
            side.places
                .entry(outcome.name.clone())
                .or_default()
                .push(place);
            side.names.push(outcome.name.clone());
            side.records.push(Some(Box::new(outcome)));
        }
        side
    }

    fn take(&mut self, place: usize) -> Option<Box<RecordOutcome>> {
        self.records.get_mut(place)?.take()
    }

    fn places(&self, name: &str) -> &[usize] {
        self.places.get(name).map_or(&[], Vec::as_slice)
    }

    /// The places of records whose name both sides have once.
    fn pairs<'s>(&'s self, other: &'s Self) -> impl Iterator<Item = (usize, usize)> + 's {
        self.names.iter().filter_map(|name| {
            match (name.as_str(), self.places(name), other.places(name)) {
                ("", _, _) => None,
                (_, &[here], &[there]) => Some((here, there)),
                _ => None,
            }
        })
    }

    /// Why each of the other records is not compared, in their order; a repeated name is told of
    /// once.
    fn list(&self, other: &Self) -> Vec<String> {
        let reason = |(place, name): (usize, &String)| {
            let here = self.places(name);
            let record = format!("not compared: {}, record {}", self.source, place + 1);
            match (name.as_str(), here, other.places(name)) {
                ("", _, _) => Some(format!("{record}: it has no name")),
                (_, [_], [_]) => None,
                (_, [_], []) => Some(format!("{record}: {} has no {name:?}", other.source)),
                (_, [_], _) => Some(format!(
                    "{record}: {} has {name:?} more than once",
                    other.source
                )),
                (_, [first, ..], _) if *first == place => Some(self.repeated(name, here)),
                _ => None,
            }
        };
        self.names.iter().enumerate().filter_map(reason).collect()
    }

    fn repeated(&self, name: &str, places: &[usize]) -> String {
        let numbers: Vec<String> = places.iter().map(|place| (place + 1).to_string()).collect();
        let numbers = numbers.join(", ");
        format!(
            "not compared: {}, records {numbers}: all are named {name:?}",
            self.source
        )
    }
}
