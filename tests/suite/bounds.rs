//! Inputs made to exhaust memory or time: each ends in a clear error, early, within the limits.

use std::{
    cell::Cell,
    io::{BufRead, BufReader, Cursor, Read, Write, repeat},
    rc::Rc,
    time::{Duration, Instant},
};

use flate2::{Compression, bufread::MultiGzDecoder, write::GzEncoder};
use molkin_formats::{
    ReadError, Record, molfile, sdf, smiles,
    source::{Format, ReadOptions, Records},
    table::{self, Delimiter},
};
use molkin_graph::{Limits, Orderer};
use rstest::rstest;

const GIGABYTE: u64 = 1 << 30;

/// Counts the bytes that a reader takes.
struct Counted<R> {
    source: R,
    taken: Rc<Cell<u64>>,
}

impl<R: Read> Counted<R> {
    fn new(source: R) -> (Self, Rc<Cell<u64>>) {
        let taken = Rc::new(Cell::new(0));
        let counted = Self {
            source,
            taken: Rc::clone(&taken),
        };
        (counted, taken)
    }
}

impl<R: Read> Read for Counted<R> {
    fn read(&mut self, buffer: &mut [u8]) -> std::io::Result<usize> {
        let read = self.source.read(buffer)?;
        self.taken.set(self.taken.get() + read as u64);
        Ok(read)
    }
}

/// Limits small enough that what honours them is quick.
fn small() -> Limits {
    Limits {
        line_bytes: 1_000,
        record_bytes: 10_000,
        atoms: 50,
        ..Limits::default()
    }
}

fn code(outcome: &Result<Record, ReadError>) -> &'static str {
    match outcome {
        Ok(_) => "read",
        Err(error) => error.code(),
    }
}

fn smiles_options(limits: Limits) -> smiles::ReadOptions {
    smiles::ReadOptions {
        limits,
        ..smiles::ReadOptions::default()
    }
}

fn molfile_options(limits: Limits) -> molfile::ReadOptions {
    molfile::ReadOptions {
        limits,
        ..molfile::ReadOptions::default()
    }
}

fn table_options(limits: Limits) -> table::ReadOptions {
    table::ReadOptions {
        smiles: smiles_options(limits),
        ..table::ReadOptions::default()
    }
}

/// All that becomes of a stream, as codes.
fn outcomes(source: impl BufRead, format: Format, limits: Limits) -> Vec<&'static str> {
    match format {
        Format::Smiles => smiles::Records::new(source, smiles_options(limits))
            .map(|outcome| code(&outcome))
            .collect(),
        Format::Csv => table::Records::new(source, Delimiter::Detected, &table_options(limits))
            .unwrap()
            .map(|outcome| code(&outcome))
            .collect(),
        _ => sdf::Records::new(source, molfile_options(limits))
            .map(|outcome| code(&outcome))
            .collect(),
    }
}

/// A line of a gigabyte is passed over without being kept, and what follows is read.
#[rstest]
#[case::branches(Format::Smiles, b'(', "", "\nC\n", &["line-too-long", "read"])]
#[case::atoms(Format::Smiles, b'C', "O\n", "", &["read", "line-too-long"])]
#[case::title(Format::Sdf, b'x', "", "\n$$$$\n", &["line-too-long"])]
#[case::table(Format::Csv, b'C', "smiles,n\n", "\nC,1\n", &["line-too-long", "read"])]
#[case::quoted(Format::Csv, b'"', "smiles,n\n", "\nC,1\n", &["line-too-long", "read"])]
fn a_line_of_a_gigabyte(
    #[case] format: Format,
    #[case] byte: u8,
    #[case] before: &str,
    #[case] after: &str,
    #[case] expected: &[&str],
) {
    let source = before
        .as_bytes()
        .chain(repeat(byte).take(GIGABYTE))
        .chain(after.as_bytes());
    let source = BufReader::with_capacity(1 << 16, source);
    assert_eq!(outcomes(source, format, Limits::default()), expected);
}

/// A record of many lines is given up at the limit; its lines are passed over one by one.
#[rstest]
#[case::sdf(Format::Sdf, "\n\n\n", "1 2 3\n", "\n$$$$\n", &["record-too-long"])]
#[case::continued(Format::Sdf, "\n\n\n  0  0  0     0  0            999 V3000\n", "M  V30 -\n", "$$$$\n", &["record-too-long"])]
#[case::data(Format::Sdf, "\n\n\n  0  0  0     0  0            999 V2000\nM  END\n> <a>\n", "value\n", "\n$$$$\n", &["record-too-long"])]
fn a_record_without_end(
    #[case] format: Format,
    #[case] before: &str,
    #[case] line: &str,
    #[case] after: &str,
    #[case] expected: &[&str],
) {
    let text = [before, &line.repeat(50_000), after].concat();
    assert_eq!(outcomes(text.as_bytes(), format, small()), expected);
}

/// The second record is not read before the first is handed out.
#[rstest]
#[case::smiles(Format::Smiles, "C\n")]
#[case::sdf(
    Format::Sdf,
    "\n\n\n  0  0  0     0  0            999 V2000\nM  END\n$$$$\n"
)]
#[case::table(Format::Csv, "smiles,n\nC,1\n")]
fn no_more_is_read_than_is_asked_for(#[case] format: Format, #[case] first: &str) {
    let endless = first.as_bytes().chain(repeat(b'C').take(GIGABYTE));
    let (counted, taken) = Counted::new(endless);
    let source = BufReader::with_capacity(256, counted);
    let outcome = match format {
        Format::Smiles => smiles::Records::new(source, smiles_options(small())).next(),
        Format::Csv => {
            let options = table_options(small());
            let mut records = table::Records::new(source, Delimiter::Detected, &options).unwrap();
            records.next()
        }
        _ => sdf::Records::new(source, molfile_options(small())).next(),
    };
    assert!(outcome.unwrap().is_ok());
    assert!(taken.get() <= 512, "{} bytes taken", taken.get());
}

/// Numbers that claim much must not cost much.
#[rstest]
#[case::most_that_fits("999999  0     0  0            999 V2000")]
#[case::atoms_alone("999  0  0     0  0            999 V2000")]
#[case::bonds_alone("  0999  0     0  0            999 V2000")]
#[case::negative(" -1 -1  0     0  0            999 V2000")]
#[case::atoms_v3000(
    "  0  0  0     0  0            999 V3000\nM  V30 BEGIN CTAB\nM  V30 COUNTS 999999999 0 0 0 0\nM  V30 BEGIN ATOM\nM  V30 END ATOM\nM  V30 END CTAB"
)]
#[case::bonds_v3000(
    "  0  0  0     0  0            999 V3000\nM  V30 BEGIN CTAB\nM  V30 COUNTS 0 999999999 0 0 0\nM  V30 BEGIN ATOM\nM  V30 END ATOM\nM  V30 END CTAB"
)]
#[case::beyond_v3000(
    "  0  0  0     0  0            999 V3000\nM  V30 BEGIN CTAB\nM  V30 COUNTS 99999999999999999999 0 0 0 0\nM  V30 BEGIN ATOM\nM  V30 END ATOM\nM  V30 END CTAB"
)]
fn counts_beyond_the_file(#[case] counts: &str) {
    let started = Instant::now();
    let text = format!("\n\n\n{counts}\nM  END\n");
    let error = molfile::parse(text.as_bytes()).unwrap_err();
    assert!(error.span().line >= 4, "{error}");
    assert!(started.elapsed() < Duration::from_millis(100));
}

/// A molfile of one atom and one bond line, as they are given.
fn molfile_of(atom: &str, bond: &str, rest: &str) -> String {
    format!(
        "\n\n\n  2  1  0     0  0            999 V2000\n{atom}\n    1.0000    0.0000    0.0000 C\n{bond}\n{rest}M  END\n"
    )
}

const ATOM: &str = "    0.0000    0.0000    0.0000 C";
const BOND: &str = "  1  2  1  0";

#[rstest]
#[case::plain(ATOM, BOND, "", "read")]
#[case::not_a_number("       NaN    0.0000    0.0000 C", BOND, "", "bad-number")]
#[case::infinite("       inf    0.0000    0.0000 C", BOND, "", "bad-number")]
#[case::huge("     1e308     1e308     1e308 C", BOND, "", "number-out-of-range")]
#[case::overflow("     1e999    0.0000    0.0000 C", BOND, "", "number-out-of-range")]
#[case::atom_zero(ATOM, "  0  2  1  0", "", "no-such-atom")]
#[case::atom_beyond(ATOM, "  1  3  1  0", "", "no-such-atom")]
#[case::atom_negative(ATOM, " -1  2  1  0", "", "number-out-of-range")]
#[case::charge_at_zero(ATOM, BOND, "M  CHG  1   0   1\n", "no-such-atom")]
#[case::charge_beyond(ATOM, BOND, "M  CHG  1   3   1\n", "no-such-atom")]
#[case::more_charges_than_given(ATOM, BOND, "M  CHG  8   1   1\n", "missing-field")]
#[case::skip_past_the_end(ATOM, BOND, "S  SKP999\n", "unexpected-end")]
fn fields_out_of_range(
    #[case] atom: &str,
    #[case] bond: &str,
    #[case] rest: &str,
    #[case] expected: &str,
) {
    let outcome = molfile::parse(molfile_of(atom, bond, rest).as_bytes());
    let found = code(&outcome);
    assert_eq!(found, expected, "{outcome:?}");
}

#[rstest]
#[case::plain("1 C 0 0 0 0", "1 1 1 2", "read")]
#[case::not_a_number("1 C NaN 0 0 0", "1 1 1 2", "bad-number")]
#[case::huge("1 C 1e308 0 0 0", "1 1 1 2", "number-out-of-range")]
#[case::atom_zero("1 C 0 0 0 0", "1 1 0 2", "no-such-atom")]
#[case::atom_beyond("1 C 0 0 0 0", "1 1 1 3", "no-such-atom")]
#[case::atom_far_beyond("1 C 0 0 0 0", "1 1 1 4294967297", "number-out-of-range")]
#[case::index_far_beyond("18446744073709551617 C 0 0 0 0", "1 1 1 2", "number-out-of-range")]
#[case::charge_far_beyond("1 C 0 0 0 0 CHG=99999999999", "1 1 1 2", "number-out-of-range")]
#[case::list_without_end("1 C 0 0 0 0 ATTCHORD=(999999999 1", "1 1 1 2", "malformed")]
fn fields_out_of_range_in_version_3000(
    #[case] atom: &str,
    #[case] bond: &str,
    #[case] expected: &str,
) {
    let lines = [
        "BEGIN CTAB",
        "COUNTS 2 1 0 0 0",
        "BEGIN ATOM",
        atom,
        "2 C 1 0 0 0",
        "END ATOM",
        "BEGIN BOND",
        bond,
        "END BOND",
        "END CTAB",
    ];
    let block: String = lines
        .iter()
        .map(|line| format!("M  V30 {line}\n"))
        .collect();
    let text = format!("\n\n\n  0  0  0     0  0            999 V3000\n{block}M  END\n");
    let outcome = molfile::parse(text.as_bytes());
    assert_eq!(code(&outcome), expected, "{outcome:?}");
}

/// Ring labels, brackets, dots and branches by the million, up to the limits of line and atoms.
#[rstest]
#[case::rings_of_one_atom("C1", "11", 500_000, "self-bond")]
#[case::openings("C", "%10%11%12%13%14%15%16%17%18%19", 30_000, "self-bond")]
#[case::dots("C", ".", 1_000_000, "read")]
#[case::brackets("", "[", 1_000_000, "unexpected-character")]
#[case::digits("[", "9", 1_000_000, "number-out-of-range")]
#[case::charges("[C", "+", 1_000_000, "number-out-of-range")]
#[case::closings("C", ")", 1_000_000, "branch-not-opened")]
#[case::bonds("C", "=", 1_000_000, "unexpected-character")]
fn repeated_symbols(
    #[case] before: &str,
    #[case] symbol: &str,
    #[case] times: usize,
    #[case] expected: &str,
) {
    let text = [before, &symbol.repeat(times)].concat();
    let outcome = smiles::Reader::default().read(&text, 1);
    assert_eq!(
        code(&outcome),
        expected,
        "{:?}",
        outcome.err().map(|error| error.to_string())
    );
}

/// Rings closed by the hundred thousand: as many as fit a line.
#[test]
fn rings_by_the_hundred_thousand() {
    let text = "C1CC1".repeat(60_000);
    let record = smiles::Reader::default().read(&text, 1).unwrap();
    assert_eq!(record.molecule.bonds().count(), 239_999);
}

/// Every limit of the readers is honoured where it is set, and a byte or an atom less is read.
#[test]
fn limits_are_those_that_were_set() {
    let mut reader = smiles::Reader::new(smiles_options(small()));
    assert_eq!(code(&reader.read("C".repeat(50), 1)), "read");
    assert_eq!(code(&reader.read("C".repeat(51), 1)), "too-many-atoms");
    let padded = |length: usize| format!("C{}", " ".repeat(length - 1));
    assert_eq!(code(&reader.read(padded(1_000), 1)), "read");
    assert_eq!(code(&reader.read(padded(1_001), 1)), "line-too-long");

    let drawing = |atoms: usize| {
        let lines = format!("{ATOM}\n").repeat(atoms);
        format!("\n\n\n{atoms:3}  0  0     0  0            999 V2000\n{lines}M  END\n")
    };
    let options = molfile_options(small());
    let parse = |text: &str, options: &molfile::ReadOptions| {
        code(&molfile::parse_with(text.as_bytes(), options))
    };
    assert_eq!(parse(&drawing(50), &options), "read");
    assert_eq!(parse(&drawing(51), &options), "too-many-atoms");
    let text = drawing(20);
    let exactly = |record_bytes| {
        molfile_options(Limits {
            record_bytes,
            ..small()
        })
    };
    assert_eq!(parse(&text, &exactly(text.len())), "read");
    assert_eq!(parse(&text, &exactly(text.len() - 1)), "record-too-long");

    let mut orderer = Orderer::new(Limits {
        order_steps: 10,
        ..Limits::default()
    });
    let cubane = smiles::parse("C12C3C4C1C5C4C3C25").unwrap();
    assert!(orderer.order(&cubane).is_err());
}

/// A gigabyte of one line, some megabytes when compressed, takes no more memory than the limit.
#[test]
fn compressed_gigabytes() {
    let pack = |text: &[u8]| {
        let mut encoder = GzEncoder::new(Vec::new(), Compression::fast());
        encoder.write_all(text).unwrap();
        encoder.finish().unwrap()
    };
    // Streams in a row are one file.
    let mut packed = pack(&vec![b'('; 1 << 25]).repeat(32);
    packed.extend(pack(b"\nC\n"));
    assert!(packed.len() < 8 << 20, "{}", packed.len());
    for (format, expected) in [
        (Format::Smiles, &["line-too-long", "read"][..]),
        (Format::Sdf, &["line-too-long"][..]),
    ] {
        let source = BufReader::new(MultiGzDecoder::new(Cursor::new(&packed)));
        assert_eq!(outcomes(source, format, Limits::default()), expected);
    }
}

/// A damaged stream ends in an error of the source, after the records before it.
#[test]
fn a_compressed_stream_cut_off() {
    let mut encoder = GzEncoder::new(Vec::new(), Compression::fast());
    for number in 0..10_000 {
        writeln!(encoder, "{}O {number}", "C".repeat(number % 17)).unwrap();
    }
    let packed = encoder.finish().unwrap();
    let cut = packed[..packed.len() / 2].to_vec();
    let source = BufReader::new(MultiGzDecoder::new(Cursor::new(cut)));
    let outcomes: Vec<_> =
        Records::new("cut", source, Format::Smiles, ReadOptions::default()).collect();
    let good = outcomes.iter().filter(|outcome| outcome.is_ok()).count();
    assert!(
        good > 1_000 && good == outcomes.len() - 1,
        "{good} of {}",
        outcomes.len()
    );
}
