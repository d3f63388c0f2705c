//! Pairs by the place of records in their sources.

use std::io;

use molkin_relate::parallel::Work;

use crate::input::Input;

use super::{Comparison, verdicts::Side};

/// Compares record by record; or, where one input holds a single record and the other more, that
/// one with each of the others. Records are read as they are needed.
pub(super) fn compare(
    comparison: &mut Comparison<'_>,
    mut a: Input,
    mut b: Input,
) -> io::Result<()> {
    match [a.look_ahead(2), b.look_ahead(2)] {
        [0, _] | [_, 0] => without_records(comparison, [a, b]),
        [1, 2] if a.failure().is_none() => one_against_many(comparison, a, b, false),
        [2, 1] if b.failure().is_none() => one_against_many(comparison, b, a, true),
        _ => in_step(comparison, a, b),
    }
}

fn without_records(comparison: &mut Comparison<'_>, inputs: [Input; 2]) -> io::Result<()> {
    for mut input in inputs {
        if !comparison.broke_off(&input)? && input.look_ahead(1) == 0 {
            let name = match input.name() {
                "" => "the empty argument",
                name => name,
            };
            let message = format!("{name} holds no records: nothing to compare");
            comparison.report.trouble(message)?;
        }
    }
    Ok(())
}

fn one_against_many(
    comparison: &mut Comparison<'_>,
    mut one: Input,
    mut many: Input,
    swapped: bool,
) -> io::Result<()> {
    let Some(record) = one.next() else {
        return Ok(());
    };
    let names = ordered([one.name(), many.name()], swapped).map(str::to_owned);
    let verdicts = comparison.verdicts(names.each_ref().map(String::as_str));
    let ready = verdicts.scratch().ready(one.name(), Side::raw(record));
    let progress = comparison.report.progress().clone();
    let pairs = std::iter::from_fn(|| {
        let record = many.next()?;
        progress.reach(one.bytes_taken() + many.bytes_taken());
        Some(ordered([Side::Ready(&ready), Side::raw(record)], swapped))
    });
    comparison.pairs(&verdicts, pairs)?;
    comparison.broke_off(&many).map(|_| ())
}

fn ordered<T>([one, other]: [T; 2], swapped: bool) -> [T; 2] {
    if swapped { [other, one] } else { [one, other] }
}

fn in_step(comparison: &mut Comparison<'_>, mut a: Input, mut b: Input) -> io::Result<()> {
    let names = [a.name().to_owned(), b.name().to_owned()];
    let verdicts = comparison.verdicts(names.each_ref().map(String::as_str));
    let progress = comparison.report.progress().clone();
    let mut last = (None, None);
    let pairs = std::iter::from_fn(|| {
        progress.reach(a.bytes_taken() + b.bytes_taken());
        match (a.next(), b.next()) {
            (Some(left), Some(right)) => Some([Side::raw(left), Side::raw(right)]),
            ends => {
                last = ends;
                None
            }
        }
    });
    comparison.pairs(&verdicts, pairs)?;
    match last {
        (Some(left), _) => left_over(comparison, left.index(), a, b),
        (_, Some(right)) => left_over(comparison, right.index(), b, a),
        (None, None) => {
            comparison.broke_off(&a)?;
            comparison.broke_off(&b).map(|_| ())
        }
    }
}

/// Reports the records of `long` from `first` on, which have no partner.
fn left_over(
    comparison: &mut Comparison<'_>,
    first: u64,
    mut long: Input,
    short: Input,
) -> io::Result<()> {
    comparison.broke_off(&short)?;
    let last = long.by_ref().last().map_or(first, |record| record.index());
    let which = if first == last {
        format!("record {first} of {} has", long.name())
    } else {
        format!("records {first} to {last} of {} have", long.name())
    };
    let message = format!(
        "{which} no partner: {} ends after record {}",
        short.name(),
        first - 1
    );
    comparison.report.trouble(message)?;
    comparison.broke_off(&long).map(|_| ())
}
