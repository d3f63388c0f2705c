//! Pairs with the axes on which they differ, from fixtures/pairs/forms.tsv and from docs/definitions.md.

use crate::{Table, read_text, workspace};

/// A pair of SMILES with the decision of a registrar.
#[derive(Debug, Clone)]
pub struct FormPair {
    /// The name of the pair in its source.
    pub name: String,
    /// One structure.
    pub a: String,
    /// The other.
    pub b: String,
    /// How they are related.
    pub relation: String,
    /// The kind; `None` for identical records.
    pub kind: Option<String>,
    /// The axes apart from which they are the same; `None` where no axes make them so.
    pub apart: Option<String>,
}

impl FormPair {
    /// From the cells of a table: axes with blanks between, `-` for none, `null` where there are none.
    ///
    /// # Panics
    /// If no source is stated.
    fn of_cells([name, a, b, relation, kind, apart, source]: [&str; 7]) -> Self {
        assert!(!source.trim().is_empty(), "{name} states no source");
        Self {
            name: name.to_owned(),
            a: a.to_owned(),
            b: b.to_owned(),
            relation: relation.to_owned(),
            kind: (kind != "-").then(|| kind.to_owned()),
            apart: match apart {
                "null" => None,
                "-" => Some(String::new()),
                axes => Some(axes.replace(' ', ",")),
            },
        }
    }
}

/// The pairs of `fixtures/pairs/forms.tsv`.
///
/// # Panics
/// If the file does not hold what it should.
pub fn fixture_forms() -> Vec<FormPair> {
    let table = Table::read(&workspace("fixtures/pairs/forms.tsv"));
    let rows = table.columns(["name", "a", "b", "relation", "kind", "apart", "source"]);
    rows.map(FormPair::of_cells).collect()
}

/// The pairs on docs/definitions.md: the rows of every table with the header
/// `pair, A, B, relation, kind, apart, why`.
///
/// # Panics
/// If a row of such a table has another form.
pub fn definition_forms() -> Vec<FormPair> {
    let page = read_text(&workspace("docs/definitions.md"));
    let header = "| pair | A | B | relation | kind | apart | why |";
    let tables = page.split(header).skip(1);
    let rows = tables.flat_map(|table| {
        let rows = table.lines().skip(2);
        rows.take_while(|line| line.starts_with('|'))
    });
    rows.map(|row| {
        let cells = row.trim_matches('|').split('|');
        let cells: Vec<&str> = cells.map(|c| c.trim().trim_matches('`')).collect();
        let cells = cells
            .try_into()
            .unwrap_or_else(|_| panic!("seven cells are expected: {row}"));
        FormPair::of_cells(cells)
    })
    .collect()
}
