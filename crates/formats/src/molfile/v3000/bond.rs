//! Bond lines.

use crate::{
    Note, ReadErrorKind,
    molfile::{
        block::Fault,
        bond_type,
        drawing::{BondKind, BondMark, DrawnBond},
        field::Field,
        v3000::{
            line::Entry,
            numbers::Numbers,
            word::{Word, Words},
        },
    },
};

/// What a bond line says.
#[derive(Debug)]
pub(super) struct BondLine {
    pub(super) bond: DrawnBond,
    /// The atoms that the bond's placeholder stands for.
    pub(super) targets: Option<Vec<u32>>,
    /// Whether it has a key that the format does not.
    pub(super) unknown: bool,
}

/// Reads a bond line behind its number.
pub(super) fn read(
    entry: &Entry<'_>,
    mut words: Words<'_>,
    atoms: &Numbers,
    notes: &mut Vec<Note>,
) -> Result<BondLine, Fault> {
    let kind = bond_type::read(words.demand("the bond type")?.value())?;
    let first = words.demand("the number of an atom")?.value();
    let second = words.demand("the number of an atom")?.value();
    let ends = [atoms.place(first)?, atoms.place(second)?];
    if ends[0] == ends[1] {
        return Err(second.fault(ReadErrorKind::SelfBond { atom: ends[0] }));
    }
    let mut details = Details::default();
    for word in words {
        details.read(&word?)?;
    }
    if let Some(field) = details.topology {
        let what = "a ring or chain condition for searching";
        notes.push(bond_type::note(
            "query-field-ignored",
            ends,
            field.span(),
            what,
        ));
    }
    let targets = match details.endpoints {
        Some(list) => Some(targets(list, &details, kind, atoms)?),
        None => None,
    };
    let bond = DrawnBond {
        span: entry.span(),
        ends,
        kind,
        mark: mark(kind, ends, details.configuration, notes)?,
    };
    let unknown = details.unknown;
    Ok(BondLine {
        bond,
        targets,
        unknown,
    })
}

/// What the keys say.
#[derive(Debug, Default)]
struct Details<'e> {
    configuration: Option<Field<'e>>,
    topology: Option<Field<'e>>,
    endpoints: Option<Word<'e>>,
    attachment: Option<Field<'e>>,
    unknown: bool,
}

impl<'e> Details<'e> {
    fn read(&mut self, word: &Word<'e>) -> Result<(), Fault> {
        let value = word.value();
        match word.key() {
            b"CFG" => self.configuration = Some(value),
            b"TOPO" => self.topology = Some(value).filter(|value| value.text() != b"0"),
            b"ENDPTS" => self.endpoints = Some(*word),
            b"ATTACH" => self.attachment = Some(value),
            // How the bond is drawn, what a reaction does to it and what a search asks of it.
            b"DISP" | b"RXCTR" | b"STBOX" => {}
            _ => self.unknown = true,
        }
        Ok(())
    }
}

fn mark(
    kind: BondKind,
    ends: [u32; 2],
    configuration: Option<Field<'_>>,
    notes: &mut Vec<Note>,
) -> Result<BondMark, Fault> {
    let Some(field) = configuration else {
        return Ok(BondMark::Plain);
    };
    let single = matches!(
        kind,
        BondKind::Single | BondKind::Aromatic | BondKind::Coordination
    );
    let mark = match field.stated("the bond configuration", 0, 3)? {
        0 => BondMark::Plain,
        1 if single => BondMark::Up,
        2 if single || kind == BondKind::Double => BondMark::Either,
        3 if single => BondMark::Down,
        _ => {
            let what = "a configuration that its type cannot have";
            notes.push(bond_type::note(
                "stereo-bond-ignored",
                ends,
                field.span(),
                what,
            ));
            BondMark::Plain
        }
    };
    Ok(mark)
}

/// The atoms that a bond to several atoms ends at.
fn targets(
    list: Word<'_>,
    details: &Details<'_>,
    kind: BondKind,
    atoms: &Numbers,
) -> Result<Vec<u32>, Fault> {
    let field = list.value();
    let attachment = details
        .attachment
        .ok_or_else(|| field.fault(ReadErrorKind::MissingField { what: "ATTACH" }))?;
    match attachment.text() {
        b"ALL" if kind == BondKind::Coordination => {}
        b"ALL" => {
            let what = "a bond to several atoms that is no coordination bond";
            return Err(field.fault(ReadErrorKind::Unsupported { what }));
        }
        b"ANY" => {
            let what = "a bond to any of several atoms";
            return Err(attachment.fault(ReadErrorKind::Query { what }));
        }
        _ => {
            let expected = "ALL or ANY";
            return Err(attachment.fault(ReadErrorKind::Malformed { expected }));
        }
    }
    list.list()?.map(|field| atoms.place(field)).collect()
}
