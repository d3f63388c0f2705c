//! From text to structures, keys and verdicts.

use molkin_formats::smiles;
use molkin_graph::{Canonical, Key, Limits, Molecule, Orderer};
use molkin_relate::{Structure, Verdict, relate};

/// A reader and an orderer with their scratch. Errors are messages.
#[derive(Debug)]
pub struct Comparer {
    reader: smiles::Reader,
    orderer: Orderer,
}

impl Default for Comparer {
    fn default() -> Self {
        Self::new(Limits::default())
    }
}

impl Comparer {
    /// A comparer with the given limits.
    pub fn new(limits: Limits) -> Self {
        Self {
            reader: smiles::Reader::default(),
            orderer: Orderer::new(limits),
        }
    }

    /// Reads a SMILES.
    ///
    /// # Errors
    /// The reader's message, with the SMILES.
    pub fn molecule(&mut self, text: &str) -> Result<Molecule, String> {
        let record = self.reader.read(text, 1);
        record
            .map(|record| record.molecule)
            .map_err(|error| format!("{text}: {error}"))
    }

    /// The canonical view of a molecule.
    ///
    /// # Errors
    /// The orderer's message.
    pub fn order(&mut self, molecule: &Molecule) -> Result<Canonical, String> {
        self.orderer
            .order(molecule)
            .map_err(|error| error.to_string())
    }

    /// The canonical view of a SMILES.
    ///
    /// # Errors
    /// The message of the reader or the orderer, with the SMILES.
    pub fn canonical(&mut self, text: &str) -> Result<Canonical, String> {
        let molecule = self.molecule(text)?;
        self.order(&molecule)
            .map_err(|error| format!("{text}: {error}"))
    }

    /// The compound key of a molecule.
    ///
    /// # Errors
    /// The orderer's message.
    pub fn key(&mut self, molecule: &Molecule) -> Result<Key, String> {
        self.order(molecule)
            .map(|canonical| canonical.compound_key())
    }

    /// One side of a comparison from a SMILES.
    ///
    /// # Errors
    /// The message of the reader or the orderer, with the SMILES.
    pub fn structure(&mut self, text: &str) -> Result<Structure, String> {
        let molecule = self.molecule(text)?;
        self.prepare(molecule)
            .map_err(|error| format!("{text}: {error}"))
    }

    /// One side of a comparison.
    ///
    /// # Errors
    /// The message of the orderer.
    pub fn prepare(&mut self, molecule: Molecule) -> Result<Structure, String> {
        Structure::new(&mut self.orderer, molecule).map_err(|error| error.to_string())
    }

    /// How two structures are related.
    ///
    /// # Errors
    /// The message of the orderer.
    pub fn relate(&mut self, a: &Structure, b: &Structure) -> Result<Verdict, String> {
        relate(&mut self.orderer, a, b).map_err(|error| error.to_string())
    }
}
