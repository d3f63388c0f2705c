//! Counter-ions and solvents: the tables of this folder, and those of a user.

use std::{
    collections::HashMap,
    sync::{Arc, OnceLock},
};

use molkin_formats::smiles;
use molkin_graph::{Key, Limits, Orderer};
use thiserror::Error;

use crate::{
    Structure,
    forms::{FormError, charge},
};

/// What a listed substance is in a salt or solvate. The order is that in which substances are parents
/// where a record holds nothing but listed ones: benzoic acid of sodium benzoate.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord, Hash)]
pub enum Kind {
    /// An organic acid.
    Acid,
    /// An organic base.
    Base,
    /// An organic ion that has no proton to give.
    Quaternary,
    /// An inorganic acid.
    MineralAcid,
    /// An inorganic base.
    MineralBase,
    /// A metal ion.
    Metal,
    /// A solvent.
    Solvent,
}

impl Kind {
    const ALL: [Self; 7] = [
        Self::Acid,
        Self::Base,
        Self::Quaternary,
        Self::MineralAcid,
        Self::MineralBase,
        Self::Metal,
        Self::Solvent,
    ];

    /// The word of the tables.
    pub fn as_str(self) -> &'static str {
        match self {
            Self::Acid => "acid",
            Self::Base => "base",
            Self::Quaternary => "quaternary",
            Self::MineralAcid => "mineral-acid",
            Self::MineralBase => "mineral-base",
            Self::Metal => "metal",
            Self::Solvent => "solvent",
        }
    }

    /// Which kinds are parents before which others: organic ones, inorganic ones, solvents.
    pub(super) fn rank(self) -> u8 {
        match self {
            Self::Acid | Self::Base | Self::Quaternary => 0,
            Self::MineralAcid | Self::MineralBase | Self::Metal => 1,
            Self::Solvent => 2,
        }
    }
}

/// A listed substance.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct Listed {
    /// The word for a salt or solvate with it: `hydrochloride`, `sodium`, `hydrate`.
    pub salt: String,
    /// Its name beside a parent that is an ion itself: `chloride`.
    pub ion: String,
    /// What it is.
    pub kind: Kind,
    key: Key,
}

/// Why a table of counter-ions cannot be used.
#[derive(Debug, Clone, PartialEq, Eq, Error)]
#[error("line {line}: {message}")]
pub struct CounterIonsError {
    line: usize,
    message: String,
}

/// The counter-ions and solvents that are known. Protonation, isotopes and stereo of a component do not
/// matter for whether it is listed.
///
/// # Examples
/// ```
/// use molkin_relate::CounterIons;
///
/// let known = CounterIons::standard();
/// let more = known.extended("salt\tstructure\tkind\nvanadate\tO[V](=O)(O)O\tmineral-acid\n")?;
/// assert_eq!(more.len(), known.len() + 1);
/// # Ok::<(), molkin_relate::CounterIonsError>(())
/// ```
#[derive(Debug, Clone, Default)]
pub struct CounterIons {
    listed: Vec<Listed>,
    /// Places in the list by the key of the constitution, protons settled.
    by_constitution: HashMap<Key, Vec<usize>>,
}

const COUNTER_IONS: &str = include_str!("counter_ions.tsv");
const SOLVENTS: &str = include_str!("solvents.tsv");

impl CounterIons {
    /// The tables of the library.
    pub fn standard() -> Arc<Self> {
        static STANDARD: OnceLock<Arc<CounterIons>> = OnceLock::new();
        let load = || {
            let mut own = Self::default();
            // A test reads every row of both, so that nothing can be missing here.
            for table in [COUNTER_IONS, SOLVENTS] {
                let _ = own.read(table);
            }
            Arc::new(own)
        };
        STANDARD.get_or_init(load).clone()
    }

    /// These and those of a table of tab-separated values with the columns `salt`, `structure` (a
    /// SMILES) and `kind`, and if it likes `ion` and `example`, the same as it is drawn in salts; others are
    /// passed over.
    ///
    /// # Errors
    /// [`CounterIonsError`] for a row that cannot be used.
    pub fn extended(&self, table: &str) -> Result<Self, CounterIonsError> {
        let mut own = self.clone();
        own.read(table)?;
        Ok(own)
    }

    /// How many substances are listed.
    pub fn len(&self) -> usize {
        self.listed.len()
    }

    /// Whether nothing is listed.
    pub fn is_empty(&self) -> bool {
        self.listed.is_empty()
    }

    /// What a component is, by its keys once its protons are settled.
    pub(super) fn find(&self, constitution: Key, compound: Key) -> Option<&Listed> {
        let places = self.by_constitution.get(&constitution)?;
        let rows = || places.iter().filter_map(|&at| self.listed.get(at));
        // Maleate and fumarate have one constitution; the last row of it stands for both.
        let exact = rows().find(|listed| listed.key == compound);
        exact.or_else(|| rows().last())
    }

    fn read(&mut self, table: &str) -> Result<(), CounterIonsError> {
        let mut lines = (1..).zip(table.lines());
        let (_, header) = lines.next().unwrap_or((1, ""));
        let columns: Vec<&str> = header.split('\t').collect();
        let place = |name: &str| columns.iter().position(|column| *column == name);
        let needed = |name: &str| {
            place(name).ok_or_else(|| CounterIonsError {
                line: 1,
                message: format!("there is no column '{name}'"),
            })
        };
        let (salt, structure, kind) = (needed("salt")?, needed("structure")?, needed("kind")?);
        let (ion, example) = (place("ion").unwrap_or(salt), place("example"));
        let mut orderer = Orderer::new(Limits::default());
        for (line, text) in lines.filter(|(_, text)| !text.trim().is_empty()) {
            let cells: Vec<&str> = text.split('\t').map(str::trim).collect();
            let cell = |at: usize| cells.get(at).copied().unwrap_or("");
            let wrong = |message: String| CounterIonsError { line, message };
            let kind = Kind::ALL.into_iter().find(|k| k.as_str() == cell(kind));
            let kind = kind.ok_or_else(|| {
                wrong("the kind is none of acid, base, quaternary, mineral-acid, mineral-base, metal and solvent".to_owned())
            })?;
            let (constitution, key) = keys(&mut orderer, cell(structure)).map_err(wrong)?;
            let mut constitutions = vec![constitution];
            // An anion may get its proton at another place: thiocyanate that of isothiocyanic acid.
            if let Some(example) = example.map(cell).filter(|text| !text.is_empty()) {
                constitutions.push(keys(&mut orderer, example).map_err(wrong)?.0);
                constitutions.dedup();
            }
            for constitution in constitutions {
                let places = self.by_constitution.entry(constitution).or_default();
                places.push(self.listed.len());
            }
            self.listed.push(Listed {
                salt: cell(salt).to_owned(),
                ion: cell(ion).to_owned(),
                kind,
                key,
            });
        }
        Ok(())
    }
}

/// Keys of a SMILES of one component with its protons settled.
fn keys(orderer: &mut Orderer, text: &str) -> Result<(Key, Key), String> {
    let molecule = smiles::parse(text).map_err(|error| format!("{text}: {error}"))?;
    if !molecule.is_connected() {
        return Err(format!("{text} is not one component"));
    }
    let structure = Structure::new(orderer, molecule).map_err(|error| error.to_string())?;
    settled_keys(orderer, &structure).map_err(|error| error.to_string())
}

/// Keys of constitution and compound once protons are settled.
pub(super) fn settled_keys(
    orderer: &mut Orderer,
    structure: &Structure,
) -> Result<(Key, Key), FormError> {
    let settled = charge::normalise(orderer, structure)?;
    Ok(match settled {
        None => {
            let canonical = structure.canonical();
            (canonical.constitution_key(), canonical.compound_key())
        }
        Some(outcome) => {
            let settled = Structure::new(orderer, outcome.revised.molecule)?;
            let canonical = settled.canonical();
            (canonical.constitution_key(), canonical.compound_key())
        }
    })
}

#[cfg(test)]
pub(super) fn rows() -> impl Iterator<Item = Vec<&'static str>> {
    let tables = [COUNTER_IONS, SOLVENTS].into_iter();
    tables
        .flat_map(|table| table.lines().skip(1))
        .map(|line| line.split('\t').collect())
}
