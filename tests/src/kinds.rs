//! Pairs with a known kind, from fixtures/pairs/kinds.tsv and from docs/definitions.md.

use crate::{Table, read_text, workspace};

/// A pair of SMILES with its kinds.
#[derive(Debug, Clone)]
pub struct KindPair {
    /// The name of the pair in its source.
    pub name: String,
    /// One structure.
    pub a: String,
    /// The other.
    pub b: String,
    /// All kinds that hold, by precedence.
    pub aspects: Vec<String>,
}

impl KindPair {
    /// From the cells of a table.
    ///
    /// # Panics
    /// If the kind is not the first of the aspects, or no source is stated.
    fn of_cells([name, a, b, kind, aspects, source]: [&str; 6]) -> Self {
        assert!(!source.trim().is_empty(), "{name} states no source");
        let aspects: Vec<String> = aspects.split(' ').map(str::to_owned).collect();
        assert_eq!(kind, aspects[0], "{name}: the kind is the first aspect");
        Self {
            name: name.to_owned(),
            a: a.to_owned(),
            b: b.to_owned(),
            aspects,
        }
    }
}

/// The pairs of `fixtures/pairs/kinds.tsv`.
///
/// # Panics
/// If the file does not hold what it should.
pub fn fixture_kinds() -> Vec<KindPair> {
    let table = Table::read(&workspace("fixtures/pairs/kinds.tsv"));
    let rows = table.columns(["name", "a", "b", "kind", "aspects", "source"]);
    rows.map(KindPair::of_cells).collect()
}

/// The pairs with kinds on docs/definitions.md: the rows of every table with the header
/// `pair, A, B, kind, aspects, why`.
///
/// # Panics
/// If a row of such a table has another form.
pub fn definition_kinds() -> Vec<KindPair> {
    let page = read_text(&workspace("docs/definitions.md"));
    let header = "| pair | A | B | kind | aspects | why |";
    let tables = page.split(header).skip(1);
    let rows = tables.flat_map(|table| {
        table
            .lines()
            .skip(2)
            .take_while(|line| line.starts_with('|'))
    });
    rows.map(|row| {
        let cells: Vec<&str> = row
            .trim_matches('|')
            .split('|')
            .map(|c| c.trim().trim_matches('`'))
            .collect();
        let cells = cells
            .try_into()
            .unwrap_or_else(|_| panic!("six cells are expected: {row}"));
        KindPair::of_cells(cells)
    })
    .collect()
}
