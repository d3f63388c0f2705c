//! Functional groups, after P. Ertl, J. Cheminform. 2017, 9:36.
//!
//! Heteroatoms, atoms of multiple bonds outside aromatic rings, acetal carbons and small rings with a
//! heteroatom are marked; what is connected among the marked is one group. They are looked for on the
//! normal form, so that no group depends on the mesomer that was drawn. docs/definitions.md says what
//! makes two groups the same; `groups/names.tsv` holds their names.

pub(crate) mod aromatic;
mod marks;
mod names;

use molkin_graph::{GraphError, GraphOrderer, Limits};

use crate::{Structure, constitution::Constitution};

pub(crate) use marks::Marked;

/// A functional group of a record.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct FunctionalGroup {
    /// Its atoms, without its environment, from 0 in input order.
    pub atoms: Vec<u32>,
    /// What the trade calls it, where the table has it.
    pub name: Option<&'static str>,
    /// Equal exactly for groups that are the same, in whichever record.
    pub certificate: Vec<u64>,
}

/// The functional groups of a record, by their lowest atom.
///
/// # Errors
/// [`GraphError::Order`]: a group so symmetric that its order takes more steps than the limit.
///
/// # Examples
/// ```
/// use molkin_formats::smiles;
/// use molkin_graph::{Limits, Orderer};
/// use molkin_relate::{Structure, functional_groups};
///
/// let limits = Limits::default();
/// let mut orderer = Orderer::new(limits);
/// let paracetamol = Structure::new(&mut orderer, smiles::parse("CC(=O)Nc1ccc(O)cc1")?)?;
/// let groups = functional_groups(&paracetamol, &limits)?;
/// let names: Vec<_> = groups.iter().filter_map(|group| group.name).collect();
/// assert_eq!(names, ["secondary amide", "phenol"]);
/// # Ok::<(), Box<dyn std::error::Error>>(())
/// ```
pub fn functional_groups(
    structure: &Structure,
    limits: &Limits,
) -> Result<Vec<FunctionalGroup>, GraphError> {
    let constitution = Constitution::of(structure);
    let marked = Marked::of(&constitution);
    let mut orderer = GraphOrderer::new(*limits);
    let mut groups = Vec::new();
    for positions in marked.groups() {
        let (colours, edges) = marked.graph(&positions);
        let certificate = orderer.order(&colours, &edges)?.certificate.to_vec();
        let atoms = positions.iter();
        let mut atoms: Vec<u32> = atoms.map(|&at| constitution.atom(at).source).collect();
        atoms.sort_unstable();
        groups.push(FunctionalGroup {
            atoms,
            name: names::of(&certificate),
            certificate,
        });
    }
    groups.sort_unstable_by(|one, other| one.atoms.cmp(&other.atoms));
    Ok(groups)
}
