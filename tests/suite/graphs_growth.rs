//! Families in which a symmetric piece with marks is repeated: the work grows like a polynomial.

use molkin_formats::smiles;
use molkin_graph::{Limits, Molecule, Orderer};
use molkin_tests::{Numbers, renumbered};
use rstest::rstest;

fn inositols(count: usize) -> String {
    let one = "O[C@H]1[C@H](O)[C@@H](O)[C@H](O)[C@@H](O)[C@@H]1O";
    let other = "O[C@H]1[C@@H](O)[C@@H](O)[C@H](O)[C@@H](O)[C@@H]1O";
    let records = (0..count).map(|at| if at % 2 == 0 { one } else { other });
    records.collect::<Vec<_>>().join(".")
}

/// A chain whose atoms each bear a 1,4-cyclohexylene arm, cis and trans in turn.
fn arms(count: usize) -> String {
    let arms = (0..count).map(|at| {
        let cis = if at % 3 == 0 { "@@" } else { "@" };
        format!("C([C@H]1CC[C{cis}H](C)CC1)")
    });
    format!("N{}O", arms.collect::<String>())
}

/// A tree in which each branch point is marked and bears two branches and a fluorine. The branches
/// of the outermost points differ in one mark, so all marks count.
fn dendrimer(generations: usize) -> String {
    fn branch(left: usize, flip: bool) -> String {
        if left == 0 {
            return format!("[C{}H](Cl)Br", if flip { "@" } else { "@@" });
        }
        let [a, b] = [true, false].map(|flip| branch(left - 1, flip));
        format!("[C{}](F)({a}){b}", if flip { "@" } else { "@@" })
    }
    format!("N{}", branch(generations, true))
}

/// A ring of carbons that each bear one oxygen, all on one side but one.
fn polyol(size: usize) -> String {
    let inner = "[C@H](O)".repeat(size - 3);
    format!("O[C@H]1[C@@H](O){inner}[C@@H]1O")
}

/// The least limit, to one part in eight, within which a molecule is ordered.
fn steps(molecule: &Molecule) -> u64 {
    let fits = |steps: u64| {
        let limits = Limits {
            order_steps: steps,
            ..Limits::default()
        };
        Orderer::new(limits).order(molecule).is_ok()
    };
    let (mut low, mut high) = (1, 64);
    while !fits(high) {
        assert!(high < Limits::default().order_steps, "step limit");
        (low, high) = (high, high * 2);
    }
    while high - low > high / 8 {
        let middle = low.midpoint(high);
        if fits(middle) {
            high = middle;
        } else {
            low = middle;
        }
    }
    high
}

/// Steps by size. `power` bounds the growth between the first size and the last: steps grow less
/// than the atoms to that power. A renumbered copy has the same key.
#[rstest]
#[case::inositols(inositols as fn(usize) -> String, [4, 16, 40], [16, 40, 160], 2.4)]
#[case::arms(arms as fn(usize) -> String, [4, 8, 16], [16, 160, 320], 2.4)]
#[case::dendrimers(dendrimer as fn(usize) -> String, [3, 4, 5], [5, 7, 9], 2.4)]
#[case::polyols(polyol as fn(usize) -> String, [6, 12, 24], [12, 30, 60], 3.4)]
fn work_grows_like_a_polynomial(
    #[case] family: fn(usize) -> String,
    #[case] sample: [usize; 3],
    #[case] all: [usize; 3],
    #[case] power: f64,
) {
    let sizes = if std::env::var_os("MOLKIN_FULL").is_some() {
        all
    } else {
        sample
    };
    let mut numbers = Numbers::new(61);
    let mut rows = Vec::new();
    for size in sizes {
        let molecule = smiles::parse(&family(size)).unwrap();
        let copy = renumbered(&molecule, &mut numbers);
        let mut orderer = Orderer::new(Limits::default());
        let [own, other] = [&molecule, &copy].map(|m| orderer.order(m).unwrap());
        assert_eq!(own.compound_key(), other.compound_key(), "{size}");
        rows.push((size, molecule.atom_count(), steps(&molecule)));
    }
    eprintln!("size, atoms, steps: {rows:?}");
    let [(_, few, least), .., (_, many, most)] = rows[..] else {
        panic!("no rows");
    };
    let grown = (most as f64 / least as f64).ln() / (many as f64 / few as f64).ln();
    assert!(
        grown < power,
        "grows like the atoms to the power of {grown}"
    );
}
