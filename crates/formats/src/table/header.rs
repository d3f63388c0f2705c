//! The first row: what separates the fields, and what the columns hold.

use super::{Columns, HeaderError};

/// Titles of structure columns, as [`plain`] writes them, the first choice first: what states the
/// stereo comes before what may have lost it, and a statement of the format before a word that may
/// mean anything.
const STRUCTURES: [&str; 10] = [
    "isomericsmiles",
    "smiles",
    "canonicalsmiles",
    "smi",
    "molfile",
    "molblock",
    "structure",
    "molecule",
    "mol",
    "compoundstructure",
];

/// Titles of name columns.
const NAMES: [&str; 13] = [
    "name",
    "title",
    "compoundname",
    "id",
    "identifier",
    "compoundid",
    "code",
    "compound",
    "sample",
    "sampleid",
    "moleculename",
    "catalognumber",
    "number",
];

/// The delimiters that are looked for.
const DELIMITERS: [u8; 4] = [b',', b';', b'\t', b'|'];

/// The columns of a table and their meaning.
#[derive(Debug, Default)]
pub(super) struct Header {
    pub(super) titles: Vec<String>,
    pub(super) structure: usize,
    pub(super) name: Option<usize>,
}

impl Header {
    /// The meaning of columns with these titles.
    pub(super) fn new(titles: Vec<String>, columns: &Columns) -> Result<Self, HeaderError> {
        let asked = |wanted: &Option<String>| match wanted {
            None => Ok(None),
            Some(wanted) => match find(&titles, wanted) {
                Some(place) => Ok(Some(place)),
                None => Err(HeaderError::NoSuchColumn {
                    wanted: wanted.clone(),
                    columns: titles.clone(),
                }),
            },
        };
        let structure = asked(&columns.structure)?;
        let name = asked(&columns.name)?;
        let Some(structure) =
            structure.or_else(|| usual(&titles, &STRUCTURES, |place| Some(place) == name))
        else {
            return Err(HeaderError::NoStructures { columns: titles });
        };
        let name = name.or_else(|| usual(&titles, &NAMES, |place| place == structure));
        Ok(Self {
            titles,
            structure,
            name,
        })
    }
}

/// The column of this title: as written, or else whatever its case.
pub(super) fn find(titles: &[String], wanted: &str) -> Option<usize> {
    let wanted = wanted.trim();
    let exact = titles.iter().position(|title| title == wanted);
    exact.or_else(|| {
        let wanted = wanted.to_lowercase();
        titles
            .iter()
            .position(|title| title.to_lowercase() == wanted)
    })
}

/// The first column with the first of the usual titles that there is; those that are taken have their
/// meaning.
pub(super) fn usual(
    titles: &[String],
    usual: &[&str],
    taken: impl Fn(usize) -> bool,
) -> Option<usize> {
    let plain: Vec<String> = titles.iter().map(|title| plain(title)).collect();
    usual.iter().find_map(|usual| {
        let mut places = plain.iter().enumerate();
        let found = places.find(|(place, title)| title == usual && !taken(*place));
        found.map(|(place, _)| place)
    })
}

/// A title in lower case, without blanks, `-` and `_`.
fn plain(title: &str) -> String {
    let letters = title.chars().filter(|letter| !" -_".contains(*letter));
    letters.flat_map(char::to_lowercase).collect()
}

/// What separates the fields of a header line; see [`super::Delimiter::Detected`].
pub(super) fn delimiter(line: &[u8]) -> u8 {
    let mut counts = [0_usize; DELIMITERS.len()];
    let mut quoted = false;
    for byte in line {
        if *byte == b'"' {
            quoted = !quoted;
        } else if !quoted
            && let Some(place) = DELIMITERS.iter().position(|delimiter| delimiter == byte)
        {
            counts[place] += 1;
        }
    }
    let most = counts.iter().max().copied().unwrap_or_default();
    let place = counts.iter().position(|&count| count == most);
    place.map_or(b',', |place| DELIMITERS[place])
}

/// Whether a line looks like the header of a table: it has several columns, and one is known to
/// hold structures.
pub(crate) fn is_header(line: &[u8]) -> bool {
    let delimiter = delimiter(line);
    let mut titles = line.split(|&byte| byte == delimiter);
    let known = |title: &[u8]| {
        let title = title.trim_ascii();
        let title = title.strip_prefix(b"\"").unwrap_or(title);
        let title = title.strip_suffix(b"\"").unwrap_or(title);
        std::str::from_utf8(title).is_ok_and(|title| STRUCTURES.contains(&plain(title).as_str()))
    };
    line.contains(&delimiter) && titles.any(known)
}

#[cfg(test)]
mod tests {
    use rstest::rstest;

    use super::*;

    fn header(line: &str, columns: &Columns) -> Result<(usize, Option<usize>), HeaderError> {
        let titles = line.split(',').map(str::to_owned).collect();
        Header::new(titles, columns).map(|header| (header.structure, header.name))
    }

    #[rstest]
    #[case("SMILES,Name", 0, Some(1))]
    #[case("id,canonical_smiles,Isomeric SMILES", 2, Some(0))]
    #[case("Structure,smiles", 1, None)]
    #[case("Molecule,Compound-ID,title", 0, Some(2))]
    #[case("price,MOL,MOL", 1, None)]
    #[case("smiles,molecule", 0, None)]
    #[case("molfile,smiles", 1, None)]
    #[case("mol,Mol Block", 1, None)]
    fn columns_by_usual_titles(
        #[case] line: &str,
        #[case] structure: usize,
        #[case] name: Option<usize>,
    ) {
        assert_eq!(header(line, &Columns::default()), Ok((structure, name)));
    }

    #[test]
    fn columns_asked_for() {
        let columns = |structure: &str, name: &str| Columns {
            structure: Some(structure.to_owned()),
            name: Some(name.to_owned()),
        };
        let line = "name,smiles,Drawn,drawn,LOT";
        assert_eq!(header(line, &columns("drawn", "lot")), Ok((3, Some(4))));
        assert_eq!(header(line, &columns("DRAWN", "name")), Ok((2, Some(0))));
        let only = Columns {
            name: Some("smiles".to_owned()),
            ..Columns::default()
        };
        // The column of the names is not taken for the structures too.
        let error = header("smiles,lot", &only).unwrap_err();
        assert_eq!(
            error.to_string(),
            r#"no column is known to hold structures; there are: "smiles", "lot""#
        );
        let error = header(line, &columns("gone", "name")).unwrap_err();
        assert!(
            error
                .to_string()
                .starts_with(r#"there is no column "gone"; there are: "name""#)
        );
    }

    #[rstest]
    #[case("a,b;c;d", b';')]
    #[case("a\tb", b'\t')]
    #[case("a|b|c,d", b'|')]
    #[case("a,b;c", b',')]
    #[case("\"a;b;c\",d", b',')]
    #[case("smiles", b',')]
    #[case("", b',')]
    fn delimiters(#[case] line: &str, #[case] expected: u8) {
        assert_eq!(delimiter(line.as_bytes()), expected);
    }

    #[rstest]
    #[case("id,smiles", true)]
    #[case("\"Canonical SMILES\"\t\"id\"", true)]
    #[case("smiles", false)]
    #[case("smiles name", false)]
    #[case("CCO\tstructure", true)]
    #[case("CCO,1", false)]
    fn headers(#[case] line: &str, #[case] expected: bool) {
        assert_eq!(is_header(line.as_bytes()), expected);
    }
}
