//! From cells to a sample.

use std::{
    path::{Component, Path, PathBuf},
    sync::Arc,
};

use molkin_formats::{
    ReadError, Record, smiles,
    source::{self, Format, ReadOptions, RecordOutcome},
    table,
};
use molkin_graph::{Limits, Orderer};
use molkin_relate::{
    samples::{Adduct, Composition, Measurement, Sample, Tolerance, parse_number},
    wire::{Error, Prepared},
};

use super::{
    cells::{Cells, Column},
    held::{Held, Named},
};

/// What cells are read with.
pub(super) struct Reader {
    /// The name of the tray.
    pub(super) source: String,
    /// The folder that names of files count from.
    pub(super) folder: PathBuf,
    pub(super) held: Option<Held>,
    pub(super) reading: ReadOptions,
    pub(super) adduct: Option<Adduct>,
    pub(super) tolerance: Tolerance,
}

/// What a thread keeps.
pub(super) struct Scratch {
    smiles: smiles::Reader,
    orderer: Orderer,
}

impl Scratch {
    pub(super) fn new(reader: &Reader) -> Self {
        Self {
            smiles: smiles::Reader::new(reader.reading.smiles),
            orderer: Orderer::new(Limits::default()),
        }
    }
}

impl Reader {
    /// The sample of a row. What cannot be read is among its faults, or in its structures.
    pub(super) fn sample(&self, scratch: &mut Scratch, cells: Cells) -> Sample {
        let mut faults: Vec<Error> = cells.fault.iter().map(Error::from).collect();
        let mut keep = |outcome: Result<Option<Arc<Prepared>>, Error>| {
            outcome.unwrap_or_else(|error| {
                faults.push(error);
                None
            })
        };
        let label = keep(self.structure(scratch, &cells, Column::Label));
        let received = keep(self.structure(scratch, &cells, Column::Received));
        let measurement = self.measurement(&cells).unwrap_or_else(|error| {
            faults.push(error);
            None
        });
        let formula = match cells.text(Column::Formula) {
            "" => None,
            text => Composition::parse(text)
                .map_err(|error| faults.push(fault(&cells, "formula", error)))
                .ok(),
        };
        Sample {
            line: cells.line,
            id: cells.text(Column::Id).to_owned(),
            plate: cells.text(Column::Plate).to_owned(),
            well: cells.text(Column::Well).to_owned(),
            label,
            received,
            measurement,
            formula,
            remark: cells.text(Column::Remark).to_owned(),
            faults,
        }
    }

    /// A held record of that name, the first record of a file, a molfile or a SMILES.
    fn structure(
        &self,
        scratch: &mut Scratch,
        cells: &Cells,
        column: Column,
    ) -> Result<Option<Arc<Prepared>>, Error> {
        let text = cells.text(column);
        if text.is_empty() {
            return Ok(None);
        }
        match self.held.as_ref().and_then(|held| held.get(text)) {
            Some(Named::One(prepared)) => return Ok(Some(Arc::clone(prepared))),
            Some(Named::Several) => {
                let message = format!("several held records have the name {text:?}");
                return Err(fault(cells, "name-repeated", message));
            }
            None => {}
        }
        if let Some(path) = self.file(text) {
            return self.first_of(scratch, cells, text, &path).map(Some);
        }
        let result = table::parse_field(
            cells.whole(column),
            cells.line,
            &mut scratch.smiles,
            &self.reading.molfile,
        );
        if let (Err(error), Some(_)) = (&result, &self.held) {
            let message =
                format!("no held record has the name {text:?}, and it is no SMILES: {error}");
            return Err(fault(cells, "not-held", message));
        }
        Ok(Some(self.prepared(scratch, cells, &self.source, result)))
    }

    fn prepared(
        &self,
        scratch: &mut Scratch,
        cells: &Cells,
        source: &str,
        result: Result<Record, ReadError>,
    ) -> Arc<Prepared> {
        let name = result.as_ref().map(|record| record.name.clone());
        let outcome = RecordOutcome {
            index: cells.record,
            name: name.unwrap_or_default(),
            result,
        };
        Arc::new(Prepared::new(&mut scratch.orderer, source, outcome))
    }

    /// The file that a cell names: of a known extension, in the folder of the tray or below. A tray comes
    /// from elsewhere; it has no business in other folders.
    fn file(&self, text: &str) -> Option<PathBuf> {
        let name = text.strip_prefix("file:").unwrap_or(text);
        Format::of_name(name)?;
        let path = Path::new(name);
        let below = path
            .components()
            .all(|part| matches!(part, Component::Normal(_)));
        let path = below.then(|| self.folder.join(path))?;
        path.is_file().then_some(path)
    }

    fn first_of(
        &self,
        scratch: &mut Scratch,
        cells: &Cells,
        text: &str,
        path: &Path,
    ) -> Result<Arc<Prepared>, Error> {
        let failed = |error: source::SourceError| fault(cells, "file", error);
        let mut records = source::Records::open(path, self.reading.clone()).map_err(failed)?;
        let first = records.next().transpose().map_err(failed)?;
        let outcome =
            first.ok_or_else(|| fault(cells, "file", format!("{text} holds no record")))?;
        Ok(Arc::new(Prepared::new(&mut scratch.orderer, text, outcome)))
    }

    fn measurement(&self, cells: &Cells) -> Result<Option<Measurement>, Error> {
        let text = cells.text(Column::Mz);
        if text.is_empty() {
            return Ok(None);
        }
        let mz = parse_number(text)
            .filter(|mz| *mz > 0.0)
            .ok_or_else(|| fault(cells, "mz", format!("{text:?} is no m/z")))?;
        let adduct = match cells.text(Column::Adduct) {
            "" => self.adduct.clone(),
            text => Some(
                text.parse()
                    .map_err(|error| fault(cells, "adduct", error))?,
            ),
        };
        let tolerance = match cells.text(Column::Tolerance) {
            "" => self.tolerance,
            text => text
                .parse()
                .map_err(|error| fault(cells, "tolerance", error))?,
        };
        Ok(Some(Measurement {
            mz,
            adduct,
            tolerance,
        }))
    }
}

/// What is wrong with a cell.
fn fault(cells: &Cells, code: &str, message: impl ToString) -> Error {
    Error {
        line: Some(cells.line),
        ..Error::without_place(code, message.to_string())
    }
}
