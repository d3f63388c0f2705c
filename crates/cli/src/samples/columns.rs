//! Which column of a tray holds what.

use molkin_formats::table::{Sheet, SheetRow};
use thiserror::Error;

use crate::args::TrayColumns;

use super::cells::{Cells, Column};

/// Usual titles, in lower case without blanks, `-` and `_`; the first choice first.
const USUAL: [(Column, &[&str]); Column::COUNT] = [
    (
        Column::Label,
        &[
            "label",
            "labelsmiles",
            "labelstructure",
            "labelled",
            "ordered",
            "orderedsmiles",
            "orderedstructure",
            "expected",
            "expectedsmiles",
            "expectedstructure",
            "labelname",
            "compound",
        ],
    ),
    (
        Column::Received,
        &[
            "received",
            "receivedsmiles",
            "receivedstructure",
            "arrived",
            "came",
            "delivered",
            "deliveredsmiles",
            "supplied",
            "suppliedsmiles",
            "vendorsmiles",
            "vendorstructure",
            "isomericsmiles",
            "smiles",
            "canonicalsmiles",
            "molfile",
            "molblock",
            "structure",
            "molecule",
        ],
    ),
    (
        Column::Id,
        &[
            "id",
            "sampleid",
            "sample",
            "sampleno",
            "samplenumber",
            "code",
            "vial",
            "vialid",
            "barcode",
            "name",
            "number",
        ],
    ),
    (
        Column::Plate,
        &[
            "plate",
            "plateid",
            "platename",
            "tray",
            "trayid",
            "rack",
            "rackid",
            "box",
        ],
    ),
    (
        Column::Well,
        &[
            "well",
            "wellid",
            "position",
            "pos",
            "place",
            "location",
            "coordinate",
        ],
    ),
    (
        Column::Mz,
        &[
            "mz",
            "m/z",
            "measuredmz",
            "measuredm/z",
            "observedmz",
            "observedm/z",
            "foundmz",
            "foundm/z",
            "ms",
            "mass",
            "measuredmass",
            "observedmass",
            "foundmass",
        ],
    ),
    (
        Column::Adduct,
        &["adduct", "ion", "ionform", "iontype", "species"],
    ),
    (
        Column::Tolerance,
        &[
            "tolerance",
            "tol",
            "ppm",
            "toleranceppm",
            "tolerance(ppm)",
            "accuracy",
            "within",
        ],
    ),
    (
        Column::Formula,
        &[
            "measuredformula",
            "foundformula",
            "observedformula",
            "formula",
            "molecularformula",
            "elementalcomposition",
        ],
    ),
    (
        Column::Remark,
        &["remark", "remarks", "comment", "comments", "note", "notes"],
    ),
];

/// Where each cell stands.
#[derive(Debug, Clone, Copy)]
pub(super) struct Columns {
    places: [Option<usize>; Column::COUNT],
}

/// Why the columns have no meaning.
#[derive(Debug, Error)]
pub(super) enum ColumnError {
    /// The column that was asked for is not there.
    #[error("there is no column {wanted:?}; there are: {}", listed(titles))]
    NoSuchColumn {
        /// The title asked for.
        wanted: String,
        /// The titles.
        titles: Vec<String>,
    },
    /// No column is known to hold what labels say.
    #[error(
        "no column is known to hold what labels say (--label names it); there are: {}",
        listed(titles)
    )]
    NoLabels {
        /// The titles.
        titles: Vec<String>,
    },
    /// There is nothing to hold the labels against.
    #[error(
        "no column is known to hold what came, a measured m/z or a formula (--received, --mz and --formula name them); there are: {}",
        listed(titles)
    )]
    NothingElse {
        /// The titles.
        titles: Vec<String>,
    },
}

fn listed(titles: &[String]) -> String {
    const SHOWN: usize = 20;
    let mut list: Vec<String> = titles
        .iter()
        .take(SHOWN)
        .map(|t| format!("{t:?}"))
        .collect();
    if titles.len() > SHOWN {
        list.push(format!("and {} more", titles.len() - SHOWN));
    }
    list.join(", ")
}

impl Columns {
    /// Columns as they are named, the others by their titles.
    pub(super) fn find(sheet: &Sheet, named: &TrayColumns) -> Result<Self, ColumnError> {
        let mut places = [None; Column::COUNT];
        for (column, _) in USUAL {
            if let Some(wanted) = title(named, column) {
                let place = sheet
                    .column(wanted)
                    .ok_or_else(|| ColumnError::NoSuchColumn {
                        wanted: wanted.clone(),
                        titles: sheet.titles.clone(),
                    })?;
                places[column as usize] = Some(place);
            }
        }
        for (column, usual) in USUAL {
            if places[column as usize].is_none() {
                let taken = |place| places.contains(&Some(place));
                places[column as usize] = sheet.usual_column(usual, taken);
            }
        }
        let has = |column: Column| places[column as usize].is_some();
        let titles = || sheet.titles.clone();
        if !has(Column::Label) {
            return Err(ColumnError::NoLabels { titles: titles() });
        }
        if !has(Column::Received) && !has(Column::Mz) && !has(Column::Formula) {
            return Err(ColumnError::NothingElse { titles: titles() });
        }
        Ok(Self { places })
    }

    /// The cells of a row.
    pub(super) fn cells(self, record: u64, mut row: SheetRow) -> Cells {
        let texts = self.places.map(|place| {
            let text = place.and_then(|place| row.fields.get_mut(place));
            text.map(std::mem::take).unwrap_or_default()
        });
        Cells {
            record,
            line: row.line,
            fault: row.fault,
            texts,
        }
    }
}

fn title(named: &TrayColumns, column: Column) -> Option<&String> {
    let title = match column {
        Column::Id => &named.id,
        Column::Plate => &named.plate,
        Column::Well => &named.well,
        Column::Label => &named.label,
        Column::Received => &named.received,
        Column::Mz => &named.mz,
        Column::Adduct => &named.adduct,
        Column::Tolerance => &named.tolerance,
        Column::Formula => &named.formula,
        Column::Remark => &named.remark,
    };
    title.as_ref()
}

#[cfg(test)]
mod tests {
    use molkin_formats::table::Delimiter;
    use molkin_graph::Limits;
    use rstest::rstest;

    use super::*;

    fn sheet(titles: &str) -> Sheet {
        Sheet::read(titles.as_bytes(), Delimiter::Detected, &Limits::default()).unwrap()
    }

    fn none() -> TrayColumns {
        TrayColumns {
            id: None,
            plate: None,
            well: None,
            label: None,
            received: None,
            mz: None,
            adduct: None,
            tolerance: None,
            formula: None,
            remark: None,
        }
    }

    #[rstest]
    #[case(
        "Sample ID;Well;Label;Received;m/z;Adduct",
        "label 2 received 3 id 0 well 1 mz 4 adduct 5"
    )]
    #[case("code\tordered\tSMILES\tComment", "label 1 received 2 id 0 remark 3")]
    #[case(
        "plate,position,expected SMILES,Mass,tolerance (ppm)",
        "label 2 plate 0 well 1 mz 3 tolerance 4"
    )]
    fn by_title(#[case] titles: &str, #[case] expected: &str) {
        let columns = Columns::find(&sheet(titles), &none()).unwrap();
        let found = USUAL.iter().filter_map(|(column, _)| {
            let place = columns.places[*column as usize]?;
            Some(format!("{} {place}", format!("{column:?}").to_lowercase()))
        });
        assert_eq!(found.collect::<Vec<_>>().join(" "), expected);
    }

    #[test]
    fn named_columns_come_first() {
        let named = TrayColumns {
            label: Some("what we ordered".to_owned()),
            received: Some("LABEL".to_owned()),
            ..none()
        };
        let columns = Columns::find(&sheet("label,What we ordered"), &named).unwrap();
        assert_eq!(columns.places[Column::Label as usize], Some(1));
        assert_eq!(columns.places[Column::Received as usize], Some(0));
        assert_eq!(columns.places[Column::Id as usize], None);
    }

    #[rstest]
    #[case(
        "id,smiles",
        "no column is known to hold what labels say (--label names it)"
    )]
    #[case("id,label", "no column is known to hold what came")]
    fn what_is_missing(#[case] titles: &str, #[case] expected: &str) {
        let error = Columns::find(&sheet(titles), &none())
            .unwrap_err()
            .to_string();
        assert!(error.starts_with(expected), "{error}");
    }
}
