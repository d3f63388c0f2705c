//! The tautomer axis: where mobile hydrogens sit.

use molkin_graph::{Limits, Orderer};

use crate::Structure;

use super::{FormError, Outcome};

/// Brings mobile hydrogens to where every tautomer of the record has them.
pub(super) fn normalise(
    _orderer: &mut Orderer,
    _limits: &Limits,
    _structure: &Structure,
    _ring_chain: bool,
) -> Result<Option<Outcome>, FormError> {
    Ok(None)
}
