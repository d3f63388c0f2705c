//! Random trays: what was planted is found, and nothing else.

mod planted;
mod pool;

use std::collections::{BTreeMap, BTreeSet};

use molkin_graph::Limits;
use molkin_relate::samples::{Hypothesis, Judge, Judgement, Sample, causes};
use molkin_tests::{Tally, is_full_run};

use planted::{Fault, Planted, Setting, Sort, plant};
use pool::Pool;

/// What became of a planted fault.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord)]
enum Outcome {
    /// Its samples are flagged, and its cause comes first.
    Found,
    /// Its samples are flagged, and its cause, or one that explains as much, is listed among others.
    Listed,
    /// The one sample of it that the records show to be wrong is flagged; that others hold the same they
    /// do not show.
    Flagged,
    /// The records say nothing of it: stereoisomers by mass, or nothing known of its samples.
    Silent,
    /// Neither.
    Missed,
}

struct Judged {
    tray: Vec<(Sample, Judgement)>,
    hypotheses: Vec<Hypothesis>,
}

fn judge(judge: &mut Judge, samples: Vec<Sample>) -> Judged {
    let tray: Vec<(Sample, Judgement)> = samples
        .into_iter()
        .map(|sample| {
            let judgement = judge.judge(&sample);
            (sample, judgement)
        })
        .collect();
    let hypotheses = causes(&tray);
    Judged { tray, hypotheses }
}

fn outcome(planted: &Planted, fault: &Fault, judged: &Judged) -> Outcome {
    let seen = fault.samples.iter().copied();
    let seen: BTreeSet<usize> = seen.filter(|at| planted.detectable.contains(at)).collect();
    if seen.is_empty() {
        return Outcome::Silent;
    }
    let verdict = |at: &usize| judged.tray[*at].1.verdict;
    if !seen.iter().all(|at| verdict(at).is_flagged()) {
        return Outcome::Missed;
    }
    if fault.sort == Sort::SeveralLabels && seen.len() == 1 {
        return Outcome::Flagged;
    }
    let Some(cause) = fault.sort.cause() else {
        // The verdict says it. Where there is a structure it is the right one.
        let expected = fault.sort.verdict();
        let has_structure = |at: &usize| judged.tray[*at].0.received.is_some();
        let right = |at: &usize| {
            !has_structure(at) || expected.is_none_or(|expected| expected == verdict(at))
        };
        return match seen.iter().all(right) {
            true => Outcome::Found,
            false => Outcome::Missed,
        };
    };
    let covers = |hypothesis: &Hypothesis| {
        let all = hypothesis.explains.iter().chain(&hypothesis.involves);
        seen.is_subset(&all.copied().collect())
    };
    let own = judged.hypotheses.iter().enumerate();
    let own = own.filter(|(_, h)| h.cause == cause && covers(h));
    let first = own.min_by_key(|(number, _)| *number);
    let explained = |at: &usize| {
        judged
            .hypotheses
            .iter()
            .any(|h| h.explains.contains(at) || h.involves.contains(at))
    };
    match first {
        Some((number, h))
            if !h.is_ambiguous && h.alternatives.iter().all(|&other| other > number) =>
        {
            Outcome::Found
        }
        Some(_) => Outcome::Listed,
        None if seen.iter().all(explained) => Outcome::Listed,
        None => Outcome::Missed,
    }
}

#[test]
fn planted_faults_are_found_and_sound_samples_left_alone() {
    let Some(pool) = Pool::new() else { return };
    let trays: u64 = if is_full_run() { 1_000 } else { 140 };
    let mut judges = Judge::new(Limits::default(), true);
    let mut tally = Tally::new("planted faults");
    let mut alarms = Tally::new("sound samples");
    let mut table: BTreeMap<(usize, Sort), BTreeMap<Outcome, usize>> = BTreeMap::new();
    let (mut hypotheses, mut idle) = (0, 0);
    for seed in 0..trays {
        let setting = (seed as usize) % Setting::ALL.len();
        let sort = Sort::ALL[(seed as usize / Setting::ALL.len()) % Sort::ALL.len()];
        let mut planted = plant(&pool, Setting::ALL[setting], sort, seed);
        let judged = judge(&mut judges, std::mem::take(&mut planted.samples));
        for fault in &planted.faults {
            let outcome = outcome(&planted, fault, &judged);
            let row = table.entry((setting, fault.sort)).or_default();
            *row.entry(outcome).or_default() += 1;
            tally.case(outcome != Outcome::Missed, || {
                let verdicts: Vec<_> = fault
                    .samples
                    .iter()
                    .map(|&at| (at, judged.tray[at].1.verdict, &judged.tray[at].1.sentence))
                    .collect();
                format!(
                    "{seed} {:?} {fault:?} {verdicts:?} {:#?}",
                    Setting::ALL[setting],
                    judged.hypotheses
                )
            });
        }
        hypotheses += judged.hypotheses.len();
        let caused = planted
            .faults
            .iter()
            .filter(|fault| fault.sort.cause().is_some());
        let caused: BTreeSet<usize> = caused.flat_map(|fault| fault.samples.clone()).collect();
        let is_idle = |h: &&Hypothesis| h.explains.iter().all(|at| !caused.contains(at));
        idle += judged.hypotheses.iter().filter(is_idle).count();
        for &at in &planted.sound {
            let (_, judgement) = &judged.tray[at];
            alarms.case(!judgement.verdict.is_flagged(), || {
                format!("{seed}: {at} {judgement:?}")
            });
        }
    }
    for ((setting, sort), row) in table {
        eprintln!("{:?} {sort:?}: {row:?}", Setting::ALL[setting]);
    }
    eprintln!(
        "hypotheses: {hypotheses}, {idle} of them on faults that have no cause across the tray"
    );
    tally.finish(trays as usize);
    alarms.finish(trays as usize * 8);
}
