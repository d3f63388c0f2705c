//! From pairs of records to what is written about them.

use std::{
    borrow::Cow,
    io::{self, Write},
};

use molkin_formats::source::{Parser, RawRecord, ReadOptions, RecordOutcome};
use molkin_graph::Limits;
use molkin_relate::{
    Axes, Normaliser,
    parallel::Work,
    wire::{self, Pair, Prepared},
};

use crate::{
    args::Format,
    forms::Forms,
    output::{
        Style,
        text::{self, Extent},
    },
};

use super::tally::Outcome;

/// One side of a pair, worked up as far as it had to be.
pub(super) enum Side<'p> {
    /// Not parsed.
    Raw(Box<RawRecord>),
    /// Parsed.
    Read(Box<RecordOutcome>),
    /// Ready, for many pairs.
    Ready(&'p Prepared),
}

impl Side<'_> {
    pub(super) fn raw(record: RawRecord) -> Self {
        Self::Raw(Box::new(record))
    }
}

/// What came of a pair.
pub(super) struct Verdict {
    pub(super) outcome: Outcome,
    /// Text for standard output.
    pub(super) text: io::Result<Vec<u8>>,
}

/// How pairs are compared.
pub(super) struct Verdicts<'v> {
    pub(super) sources: [&'v str; 2],
    pub(super) reading: &'v ReadOptions,
    pub(super) forms: Forms,
    pub(super) limits: Limits,
    pub(super) brief: bool,
    pub(super) extent: Extent,
    pub(super) format: Format,
    pub(super) style: Style,
}

/// What a thread keeps from one pair to the next.
pub(super) struct Scratch {
    parser: Parser,
    normaliser: Normaliser,
    overlook: Axes,
}

impl Scratch {
    /// Makes a record of a source ready.
    pub(super) fn ready<'p>(&mut self, source: &str, side: Side<'p>) -> Cow<'p, Prepared> {
        let outcome = match side {
            Side::Ready(prepared) => return Cow::Borrowed(prepared),
            Side::Read(outcome) => *outcome,
            Side::Raw(raw) => self.parser.parse(*raw),
        };
        let prepared = Prepared::new(self.normaliser.orderer(), source, outcome);
        Cow::Owned(if self.overlook.is_empty() {
            prepared
        } else {
            prepared.overlooking(&mut self.normaliser, self.overlook)
        })
    }
}

impl Verdicts<'_> {
    fn text(&self, pair: &Pair, sides: [&Prepared; 2]) -> io::Result<Vec<u8>> {
        let mut text = Vec::new();
        match self.format {
            Format::Text => {
                text::pair::write(&mut text, self.style, self.extent, pair, sides)?;
                writeln!(text)?;
            }
            Format::Json | Format::Jsonl => serde_json::to_writer(&mut text, pair)?,
        }
        Ok(text)
    }
}

impl<'v> Work for Verdicts<'v> {
    type Item = Option<[Side<'v>; 2]>;
    type Output = Option<Verdict>;
    type Scratch = Scratch;

    fn scratch(&self) -> Scratch {
        Scratch {
            parser: Parser::new(self.reading),
            normaliser: self.forms.normaliser(self.limits),
            overlook: self.forms.overlook,
        }
    }

    fn run(
        &self,
        scratch: &mut Scratch,
        pair: &mut Option<[Side<'v>; 2]>,
        verdict: &mut Option<Verdict>,
    ) {
        let Some([a, b]) = pair.take() else { return };
        let [source_a, source_b] = self.sources;
        let a = scratch.ready(source_a, a);
        let b = scratch.ready(source_b, b);
        let sides = [&*a, &*b];
        let pair = wire::compare_by(&mut scratch.normaliser, &self.limits, sides, self.brief);
        *verdict = Some(Verdict {
            outcome: Outcome::of(&pair),
            text: self.text(&pair, sides),
        });
    }

    fn bytes(pair: &Option<[Side<'v>; 2]>) -> usize {
        let bytes = pair.iter().flatten().map(|side| match side {
            Side::Raw(raw) => raw.bytes(),
            Side::Read(_) | Side::Ready(_) => 0,
        });
        bytes.sum()
    }
}
