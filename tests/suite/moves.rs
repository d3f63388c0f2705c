//! What moved, in findings: every clause is read against the records and the map (`molkin_tests::Readings`),
//! and the share of pairs of which all is told by groups and the atoms that bear them is a committed number.

use molkin_graph::Limits;
use molkin_relate::{
    Explanation, Relation, Structure, explain,
    findings::{Change, Finding},
};
use molkin_tests::{
    Comparer, Readings, SubstituentNames, Table, Tally, is_full_run, read_text, shared, workspace,
};
use rstest::rstest;

#[test]
fn every_name_of_the_table_is_of_one_substituent() {
    assert!(SubstituentNames::read().count() >= 250);
}

/// The findings on a pair, each read against the records; and those of the pair the other way round.
fn told(
    comparer: &mut Comparer,
    names: &SubstituentNames,
    pair: [&str; 2],
) -> Result<Explanation, String> {
    let [a, b] = pair.map(|text| comparer.structure(text));
    let (a, b) = (a?, b?);
    let verdict = comparer.relate(&a, &b)?;
    if verdict.relation != Relation::Constitutional {
        return Err("not constitutional isomers".to_owned());
    }
    let limits = Limits::default();
    let found = explain(&a, &b, verdict.relation, &limits);
    if !found.findings.is_empty() {
        Readings::new([&a, &b], &found, names).check(&found)?;
    }
    mirrored(&a, &b, &found)?;
    Ok(found)
}

/// The findings of (b, a) are those of (a, b) with the sides exchanged.
fn mirrored(a: &Structure, b: &Structure, found: &Explanation) -> Result<(), String> {
    let back = explain(b, a, Relation::Constitutional, &Limits::default());
    let swapped = |finding: &Finding| {
        let [own, other] = finding.only_in.clone();
        (finding.change.atoms(0), finding.change.atoms(1), own, other)
    };
    let there = found.findings.iter().map(swapped);
    let here = back.findings.iter().map(swapped);
    let here = here.map(|(a, b, own, other)| (b, a, other, own));
    if there.eq(here) {
        Ok(())
    } else {
        Err(format!(
            "not mirrored: {:?} {:?}",
            found.findings, back.findings
        ))
    }
}

/// Whether a finding names what moved and the atoms that bear it in both.
fn names_both_ends(finding: &Finding) -> bool {
    matches!(
        finding.change,
        Change::Moved(_)
            | Change::Exchanged(_)
            | Change::Rehung(_)
            | Change::Chain { .. }
            | Change::Divided { .. }
            | Change::Link(_)
            | Change::Turned { .. }
    )
}

/// One to three substituents of a drug-sized structure stand elsewhere: all bonds that differ belong to
/// findings that name a group and the atoms that bear it, but for the rows listed with a reason.
#[test]
fn moved_substituents_are_named_with_both_atoms() {
    let Some(folder) = shared("relations") else {
        return;
    };
    let [a, b] = ["moved_a.smi", "moved_b.smi"].map(|file| read_text(&folder.join(file)));
    let table = Table::read(&workspace("fixtures/moves/moved.tsv"));
    let judged: Vec<&str> = table.columns(["row"]).map(|[row]| row).collect();
    let names = SubstituentNames::read();
    let mut comparer = Comparer::default();
    let mut tally = Tally::new("moved, every clause");
    let mut told_by_groups = 0;
    for (row, (a, b)) in (1..).zip(a.lines().zip(b.lines())) {
        let pair = [a, b].map(|line| line.split('\t').next().unwrap());
        let outcome = told(&mut comparer, &names, pair);
        let outcome = outcome.map_err(|fault| format!("{row}: {fault}\n    {a}\n    {b}"));
        let Some(found) = tally.value(outcome) else {
            continue;
        };
        let ends = found
            .findings
            .iter()
            .filter(|finding| names_both_ends(finding));
        let named: usize = ends.map(|finding| finding.only_in[0].len()).sum();
        let bonds = found.bonds.unwrap_or_default();
        let all = named == bonds.only_in_a.len() && named == bonds.only_in_b.len();
        told_by_groups += usize::from(all);
        let is_judged = judged.contains(&row.to_string().as_str());
        assert!(
            all != is_judged,
            "{row}: by groups: {all}, judged: {is_judged}"
        );
    }
    tally.finish(600);
    assert!(told_by_groups >= 599, "{told_by_groups} of 600");
}

/// Arbitrary isomers: whatever is told is true.
#[rstest]
#[case::common("common_", 1, 300)]
#[case::constitutional("", 6, 1000)]
fn what_is_told_is_true(#[case] prefix: &str, #[case] every: usize, #[case] pairs: usize) {
    let Some(folder) = shared("relations") else {
        return;
    };
    let [a, b, truth] = ["a.smi", "b.smi", "truth.tsv"]
        .map(|file| read_text(&folder.join(format!("{prefix}{file}"))));
    let rows = a.lines().zip(b.lines()).zip(truth.lines());
    let rows = rows.filter(|(_, row)| !prefix.is_empty() || row.contains("\tconstitutional"));
    let sampled = if is_full_run() { 1 } else { 10 };
    let names = SubstituentNames::read();
    let mut comparer = Comparer::default();
    let mut tally = Tally::new("arbitrary isomers, every clause");
    for ((a, b), row) in rows.step_by(every).take(pairs).step_by(sampled) {
        let pair = [a, b].map(|line| line.split('\t').next().unwrap());
        let outcome = told(&mut comparer, &names, pair);
        tally.value(outcome.map_err(|fault| format!("{row}: {fault}\n    {a}\n    {b}")));
    }
    tally.finish(pairs / sampled);
}
