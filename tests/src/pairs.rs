//! Pairs with a known verdict, from fixtures and from docs/definitions.md.

use molkin_graph::{GroupKind, StereoGroup};
use molkin_relate::{Relation, Verdict};

use crate::{Table, read_text, workspace};

/// What a source says about a pair.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct Expected {
    /// The relation.
    pub relation: String,
    /// The kind, for stereo relations.
    pub kind: Option<String>,
    /// Whether something is left open, where the source says.
    pub open: Option<bool>,
}

impl Expected {
    /// From the words of a table; `-` stands for what is not said.
    ///
    /// # Panics
    /// If a word is none of those the tables may hold.
    pub fn of_words(relation: &str, kind: &str, open: &str) -> Self {
        const RELATIONS: [&str; 4] = ["not-isomers", "constitutional", "stereo", "identical"];
        assert!(RELATIONS.contains(&relation), "no relation: {relation:?}");
        let open = match open {
            "yes" => Some(true),
            "no" => Some(false),
            "-" => None,
            other => panic!("open is yes, no or -: {other:?}"),
        };
        let kind = (kind != "-").then(|| kind.to_owned());
        assert_eq!(
            kind.is_some(),
            relation == "stereo",
            "stereo relations have a kind, the others none yet"
        );
        Self {
            relation: relation.to_owned(),
            kind,
            open,
        }
    }

    /// Whether a verdict is the expected one.
    pub fn holds(&self, verdict: &Verdict) -> bool {
        verdict.relation.as_str() == self.relation
            && verdict.relation.kind() == self.kind.as_deref()
            && self.open.is_none_or(|open| open == verdict.open)
            && (verdict.relation == Relation::Identical || !verdict.open)
    }
}

/// A pair of SMILES with its verdict.
#[derive(Debug, Clone)]
pub struct Pair {
    /// The name of the pair in its source.
    pub name: String,
    /// One structure.
    pub a: String,
    /// The other.
    pub b: String,
    /// How they are related.
    pub expected: Expected,
}

/// The pairs of one file of `fixtures/pairs`, whose name is a relation or a stereo kind.
///
/// # Panics
/// If the file does not hold what it should; a pair without a source is refused.
pub fn fixture_pairs(file: &str) -> Vec<Pair> {
    let (relation, kind) = match file {
        "identical" | "constitutional" | "not-isomers" => (file, "-"),
        kind => ("stereo", kind),
    };
    let table = Table::read(&workspace(&format!("fixtures/pairs/{file}.tsv")));
    table
        .columns(["name", "a", "b", "open", "source"])
        .map(|[name, a, b, open, source]| {
            assert!(!source.trim().is_empty(), "{name} states no source");
            Pair {
                name: name.to_owned(),
                a: a.to_owned(),
                b: b.to_owned(),
                expected: Expected::of_words(relation, kind, open),
            }
        })
        .collect()
}

/// The pairs on docs/definitions.md: the rows of every table with the header
/// `pair, A, B, relation, kind, open, why`.
///
/// # Panics
/// If a row of such a table has another form.
pub fn definition_pairs() -> Vec<Pair> {
    const HEADER: [&str; 7] = ["pair", "A", "B", "relation", "kind", "open", "why"];
    let page = read_text(&workspace("docs/definitions.md"));
    let mut pairs = Vec::new();
    let mut inside = false;
    for line in page.lines() {
        let Some(cells) = cells(line) else {
            inside = false;
            continue;
        };
        if cells == HEADER {
            inside = true;
        } else if inside && !cells.iter().all(|cell| is_rule(cell)) {
            let [name, a, b, relation, kind, open, why] = cells[..] else {
                panic!("seven cells are expected: {line}");
            };
            assert!(!why.is_empty(), "{name} states no reason");
            let code = |cell: &str| {
                let code = cell.strip_prefix('`').and_then(|c| c.strip_suffix('`'));
                code.unwrap_or_else(|| panic!("code is expected: {line}"))
                    .to_owned()
            };
            pairs.push(Pair {
                name: name.to_owned(),
                a: code(a),
                b: code(b),
                expected: Expected::of_words(relation, kind, open),
            });
        }
    }
    pairs
}

/// Pairs with stereo groups on docs/definitions.md: the rows of every table with the header
/// `pair, A, groups of A, B, groups of B, relation, kind, open, why`.
///
/// # Panics
/// If a row of such a table has another form.
pub fn grouped_pairs() -> Vec<(Pair, [Vec<StereoGroup>; 2])> {
    let page = read_text(&workspace("docs/definitions.md"));
    let rows = page.lines().filter_map(cells).filter(|row| row.len() == 9);
    let rows = rows.filter(|row| row[0] != "pair" && !is_rule(row[0]));
    rows.map(|row| {
        let code = |cell: &str| cell.trim_matches('`').to_owned();
        let pair = Pair {
            name: row[0].to_owned(),
            a: code(row[1]),
            b: code(row[3]),
            expected: Expected::of_words(row[5], row[6], row[7]),
        };
        (pair, [stereo_groups(row[2]), stereo_groups(row[4])])
    })
    .collect()
}

/// `AND 2 4, OR 5`: atoms from 1.
fn stereo_groups(text: &str) -> Vec<StereoGroup> {
    let group = |text: &str| {
        let (kind, atoms) = text.trim().split_once(' ').unwrap();
        let atoms = atoms
            .split(' ')
            .map(|atom| atom.parse::<u32>().unwrap() - 1);
        StereoGroup {
            kind: match kind {
                "AND" => GroupKind::And,
                "OR" => GroupKind::Or,
                "REL" => GroupKind::Relative,
                other => panic!("no kind of group: {other}"),
            },
            atoms: atoms.collect(),
        }
    };
    let groups = text.split(',').filter(|_| text != "-");
    groups.map(group).collect()
}

fn cells(line: &str) -> Option<Vec<&str>> {
    let row = line.trim().strip_prefix('|')?.strip_suffix('|')?;
    Some(row.split('|').map(str::trim).collect())
}

fn is_rule(cell: &str) -> bool {
    !cell.is_empty() && cell.chars().all(|c| matches!(c, '-' | ':'))
}
