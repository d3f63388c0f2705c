//! Atoms and bonds of a record in words: `C6`, `C6=O7`.

use std::collections::HashMap;

use molkin_relate::Structure;

/// Names for the atoms and bonds of one record; atoms count from 1.
pub(super) struct Labels<'s> {
    structure: &'s Structure,
    /// By atoms from 0, the lower one first.
    signs: HashMap<[u32; 2], &'static str>,
}

/// Stands between the atoms of a mobile bond.
pub(super) const MOBILE: &str = ":";

impl<'s> Labels<'s> {
    pub(super) fn new(structure: &'s Structure) -> Self {
        let form = structure.canonical().normal_form();
        let source = |at: u32| form.atoms.get(at as usize).map(|atom| atom.source);
        let entry = |bond: &molkin_graph::NormalBond| {
            let (a, b) = (source(bond.a)?, source(bond.b)?);
            let sign = match bond.order {
                None => MOBILE,
                Some(1) => "–",
                Some(2) => "=",
                Some(3) => "≡",
                Some(_) => "≣",
            };
            Some(([a.min(b), a.max(b)], sign))
        };
        let signs = form.bonds.iter().filter_map(entry).collect();
        Self { structure, signs }
    }

    /// Element symbol and number.
    pub(super) fn atom(&self, number: u32) -> String {
        let atom = number
            .checked_sub(1)
            .and_then(|index| self.structure.molecule().atom(index));
        match atom {
            Some(atom) => format!("{}{number}", atom.element.symbol()),
            None => number.to_string(),
        }
    }

    /// Both atoms with the sign of the bond's order between them.
    pub(super) fn bond(&self, [a, b]: [u32; 2]) -> String {
        let key = [a.min(b).saturating_sub(1), a.max(b).saturating_sub(1)];
        let sign = self.signs.get(&key).copied().unwrap_or("–");
        format!("{}{sign}{}", self.atom(a), self.atom(b))
    }

    /// One atom, or both ends of a bond or axis.
    pub(super) fn element(&self, atoms: &[u32]) -> String {
        match *atoms {
            [a, b] if self.bonded(a, b) => self.bond([a, b]),
            _ => self.list(atoms),
        }
    }

    /// Whether an atom, or the ends of a bond or axis, are stereogenic.
    pub(super) fn is_stereogenic(&self, atoms: &[u32]) -> bool {
        let molecule = self.structure.molecule();
        let named = |centre: &u32| atoms.contains(&molecule.number(*centre));
        let elements = self.structure.canonical().stereo_elements();
        elements
            .iter()
            .any(|element| element.centres.iter().all(named))
    }

    /// A chain of bonded atoms.
    pub(super) fn chain(&self, atoms: &[u32]) -> String {
        let names: Vec<String> = atoms.iter().map(|&atom| self.atom(atom)).collect();
        names.join("–")
    }

    fn list(&self, atoms: &[u32]) -> String {
        let names: Vec<String> = atoms.iter().map(|&atom| self.atom(atom)).collect();
        names.join("…")
    }

    fn bonded(&self, a: u32, b: u32) -> bool {
        let key = [a.min(b).saturating_sub(1), a.max(b).saturating_sub(1)];
        self.signs.contains_key(&key)
    }
}
