//! Long, deep and broken texts: an error or a result for each, in time linear in the text.

use rstest::rstest;

use super::{ReadOptions, Reader};
use molkin_graph::Limits;

const MANY: usize = 1_000_000;

fn read_all(text: &[u8]) -> Result<usize, &'static str> {
    let limits = Limits {
        line_bytes: 16 << 20,
        atoms: 2_000_000,
        ..Limits::default()
    };
    let mut reader = Reader::new(ReadOptions {
        limits,
        ..ReadOptions::default()
    });
    match reader.read(text, 1) {
        Ok(record) => Ok(record.molecule.atom_count()),
        Err(error) => Err(error.code()),
    }
}

#[rstest]
#[case::parentheses("(".repeat(MANY), Err("branch-without-atom"))]
#[case::closing(")".repeat(MANY), Err("branch-not-opened"))]
#[case::open_branches("C(".repeat(MANY), Err("branch-not-closed"))]
#[case::deep_branches(format!("{}{}", "C(".repeat(MANY / 2), "C)".repeat(MANY / 2)), Ok(MANY))]
#[case::deep_and_closed(format!("{}C{}", "C(".repeat(MANY / 2), ")".repeat(MANY / 2)), Ok(MANY / 2 + 1))]
#[case::brackets("[".repeat(MANY), Err("unexpected-character"))]
#[case::ring_labels(format!("C{}", "1".repeat(MANY)), Err("self-bond"))]
#[case::ring_openings("C1".repeat(MANY / 2), Err("duplicate-bond"))]
#[case::percents("%".repeat(MANY), Err("unexpected-character"))]
#[case::percent("C%".to_owned(), Err("unexpected-end"))]
#[case::dots(".".repeat(MANY), Ok(0))]
#[case::bonds("=".repeat(MANY), Err("misplaced-bond"))]
#[case::chain("C".repeat(MANY), Ok(MANY))]
#[case::star(format!("C{}", "(C)".repeat(MANY / 4)), Ok(MANY / 4 + 1))]
#[case::cumulene(format!("F/C={}C/F", "C=".repeat(MANY / 2 - 1)), Ok(MANY / 2 + 3))]
#[case::cumulene_with_tags(format!("FC{}=CF", "=[C@]".repeat(200_001)), Ok(200_005))]
#[case::wildcards(format!("*1{}1", "*".repeat(MANY)), Ok(MANY + 1))]
#[case::slopes(format!("F{}/F", "/C=C".repeat(MANY / 4)), Ok(MANY / 2 + 2))]
#[case::digits(format!("[{}C]", "9".repeat(MANY)), Err("number-out-of-range"))]
#[case::class(format!("[C:{}]", "9".repeat(MANY)), Ok(1))]
#[case::signs(format!("[C{}]", "+".repeat(MANY)), Err("number-out-of-range"))]
#[case::letters(format!("[{}]", "c".repeat(MANY)), Err("not-aromatic"))]
fn long_texts(#[case] text: String, #[case] expected: Result<usize, &str>) {
    assert_eq!(read_all(text.as_bytes()), expected);
}

#[test]
fn limits_hold() {
    let options = ReadOptions {
        limits: Limits {
            line_bytes: 8,
            atoms: 4,
            ..Limits::default()
        },
        ..ReadOptions::default()
    };
    let mut reader = Reader::new(options);
    let code = |result: Result<crate::Record, crate::ReadError>| {
        result.map(|_| ()).map_err(|error| error.code())
    };
    assert_eq!(code(reader.read("CCCC x", 1)), Ok(()));
    assert_eq!(code(reader.read("CCCCC", 1)), Err("too-many-atoms"));
    assert_eq!(code(reader.read("CCCC name", 1)), Err("line-too-long"));
}

#[test]
fn every_text_of_three_symbols_gives_a_result_or_an_error() {
    // One symbol for each branch of the reader.
    const SYMBOLS: [&str; 24] = [
        "C", "c", "n", "Cl", "*", "[", "]", "(", ")", "1", "%", "%12", "-", "=", ":", "/", "\\",
        ".", "@", "[C@H]", "[nH+]", " ", "|", "\u{e9}",
    ];
    for first in SYMBOLS {
        for second in SYMBOLS {
            for third in SYMBOLS {
                let text = format!("{first}{second}{third}");
                let spans = match Reader::default().read(&text, 1) {
                    Ok(record) => record.notes.iter().filter_map(|note| note.span).collect(),
                    Err(error) => {
                        assert!(!error.render().to_string().is_empty());
                        vec![error.span()]
                    }
                };
                for span in spans {
                    let end = (span.column - 1 + span.width) as usize;
                    assert!(end <= text.len(), "{text:?}: {span:?}");
                }
            }
        }
    }
}

#[test]
fn bytes_that_are_no_text_give_an_error() {
    for byte in 0x80..=0xff {
        let text = [b'C', byte, b'C'];
        assert_eq!(read_all(&text), Err("unexpected-character"));
    }
}

#[test]
fn cut_off_texts_give_a_result_or_an_error() {
    let text = "O=C(/C=C/c1ccc(O)c(%12)c1)[C@@H]([13NH3+:7])C%12.[Cl-]";
    for end in 0..text.len() {
        let _ = read_all(&text.as_bytes()[..end]);
        let _ = read_all(&text.as_bytes()[end..]);
    }
}
