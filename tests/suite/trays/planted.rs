//! Trays with faults in known places.

use std::{collections::HashSet, sync::Arc};

use molkin_relate::{
    samples::{Cause, Measurement, Sample, Tolerance, Verdict, Well},
    wire::Prepared,
};
use molkin_tests::Numbers;

use super::pool::Pool;

/// Rows and columns of a plate.
const ROWS: usize = 8;
const COLUMNS: usize = 12;

/// What trays of a sort are like.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub(super) enum Setting {
    /// Both structures of every sample.
    Structures,
    /// One fault on top of another, or beside it.
    TwoFaults,
    /// A fifth of what came has no structure.
    Missing,
    /// The same, and every sample is measured.
    MissingMeasured,
    /// No structure of what came, only masses.
    MassOnly,
    /// All compounds have one formula.
    Isomers,
    /// Labels that occur two or three times.
    Duplicates,
}

impl Setting {
    pub(super) const ALL: [Self; 7] = [
        Self::Structures,
        Self::TwoFaults,
        Self::Missing,
        Self::MissingMeasured,
        Self::MassOnly,
        Self::Isomers,
        Self::Duplicates,
    ];
}

/// A sort of fault.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord)]
pub(super) enum Sort {
    Swap,
    Cycle,
    Shift,
    Neighbour,
    SeveralLabels,
    Isomer,
    Mirror,
    Form,
    Foreign,
    Mass,
}

impl Sort {
    pub(super) const ALL: [Self; 10] = [
        Self::Swap,
        Self::Cycle,
        Self::Shift,
        Self::Neighbour,
        Self::SeveralLabels,
        Self::Isomer,
        Self::Mirror,
        Self::Form,
        Self::Foreign,
        Self::Mass,
    ];

    /// The cause that tells it, where more than the verdict on its sample is to be found.
    pub(super) fn cause(self) -> Option<Cause> {
        match self {
            Self::Swap => Some(Cause::Swap),
            Self::Cycle => Some(Cause::Cycle),
            Self::Shift => Some(Cause::Shift),
            Self::Neighbour => Some(Cause::Neighbour),
            Self::SeveralLabels => Some(Cause::OneStructureSeveralLabels),
            _ => None,
        }
    }

    /// The verdict that it leads to by structures.
    pub(super) fn verdict(self) -> Option<Verdict> {
        match self {
            Self::Isomer => Some(Verdict::Isomer),
            Self::Mirror => Some(Verdict::StereoDiffers),
            Self::Form => Some(Verdict::AgreesButForm),
            _ => None,
        }
    }
}

/// What is in a vial.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub(super) enum Held {
    Compound(usize),
    Mirror(usize),
    Salt(usize),
}

impl Held {
    fn compound(self) -> usize {
        match self {
            Self::Compound(at) | Self::Mirror(at) | Self::Salt(at) => at,
        }
    }
}

/// A fault that was planted.
#[derive(Debug)]
pub(super) struct Fault {
    pub(super) sort: Sort,
    pub(super) samples: Vec<usize>,
}

/// A tray.
pub(super) struct Planted {
    pub(super) samples: Vec<Sample>,
    pub(super) faults: Vec<Fault>,
    /// Samples whose records show that something is wrong.
    pub(super) detectable: HashSet<usize>,
    /// Samples that were left alone.
    pub(super) sound: HashSet<usize>,
}

struct Maker<'p> {
    pool: &'p Pool,
    numbers: Numbers,
    labels: Vec<usize>,
    held: Vec<Held>,
    /// What is added to measured m/z.
    off: Vec<f64>,
    taken: HashSet<usize>,
    faults: Vec<Fault>,
}

/// The tray of a seed.
pub(super) fn plant(pool: &Pool, setting: Setting, sort: Sort, seed: u64) -> Planted {
    let mut numbers = Numbers::new(seed);
    let labels = labels(pool, setting, &mut numbers);
    let mut maker = Maker {
        held: labels.iter().map(|&label| Held::Compound(label)).collect(),
        off: vec![0.0; labels.len()],
        taken: HashSet::new(),
        faults: Vec::new(),
        pool,
        numbers,
        labels,
    };
    maker.add(sort);
    if setting == Setting::TwoFaults {
        match maker.numbers.coin() {
            true => {
                let other = Sort::ALL[maker.numbers.below(Sort::ALL.len())];
                maker.add(other);
            }
            false => maker.spoil(),
        }
    }
    maker.finish(setting)
}

fn labels(pool: &Pool, setting: Setting, numbers: &mut Numbers) -> Vec<usize> {
    if setting == Setting::Isomers {
        let large = pool.isomers.iter().filter(|list| list.len() >= 9);
        let large: Vec<&Vec<usize>> = large.collect();
        let mut list = large[numbers.below(large.len())].clone();
        numbers.shuffle(&mut list);
        // Some isomers stay off the tray.
        list.truncate((list.len() - 2).min(ROWS * COLUMNS));
        return list;
    }
    let order = numbers.order(pool.compounds.len());
    let mut list: Vec<usize> = order.into_iter().map(|at| at as usize).collect();
    list.truncate(ROWS * COLUMNS);
    if setting == Setting::Duplicates {
        for _ in 0..12 {
            let (from, to) = (numbers.below(list.len()), numbers.below(list.len()));
            list[to] = list[from];
        }
    }
    list
}

impl Maker<'_> {
    /// So many samples that nothing was done to yet, of different compounds.
    fn choose(&mut self, count: usize) -> Vec<usize> {
        let mut chosen: Vec<usize> = Vec::new();
        let order = self.numbers.order(self.labels.len());
        for sample in order.into_iter().map(|at| at as usize) {
            let fresh = !self.taken.contains(&sample);
            let label = self.labels[sample];
            if chosen.len() < count && fresh && chosen.iter().all(|&c| self.labels[c] != label) {
                chosen.push(sample);
            }
        }
        chosen
    }

    fn plant(&mut self, sort: Sort, samples: Vec<usize>) {
        self.taken.extend(&samples);
        self.faults.push(Fault { sort, samples });
    }

    /// A compound that is on no label.
    fn foreign(&mut self) -> usize {
        loop {
            let at = self.numbers.below(self.pool.compounds.len());
            if !self.labels.contains(&at) {
                return at;
            }
        }
    }

    fn add(&mut self, sort: Sort) {
        match sort {
            Sort::Swap => {
                let samples = self.choose(2);
                self.rotate(Sort::Swap, samples);
            }
            Sort::Cycle => {
                let length = 3 + self.numbers.below(4);
                let samples = self.choose(length);
                self.rotate(Sort::Cycle, samples);
            }
            Sort::Shift => self.shift(),
            Sort::Neighbour => {
                let chosen = self.choose(self.labels.len());
                let beside =
                    |&sample: &usize| sample % COLUMNS > 0 && !self.taken.contains(&(sample - 1));
                let chosen = chosen.into_iter().find(beside);
                let Some(sample) = chosen.filter(|&s| self.labels[s] != self.labels[s - 1]) else {
                    return;
                };
                self.held[sample] = Held::Compound(self.labels[sample - 1]);
                self.taken.insert(sample - 1);
                self.plant(sort, vec![sample]);
            }
            Sort::SeveralLabels => {
                let samples = self.choose(3);
                let foreign = Held::Compound(self.foreign());
                samples
                    .iter()
                    .for_each(|&sample| self.held[sample] = foreign);
                self.plant(sort, samples);
            }
            Sort::Isomer | Sort::Mirror | Sort::Form | Sort::Foreign | Sort::Mass => {
                self.single(sort);
            }
        }
    }

    /// Each of the samples gets what the one before held.
    fn rotate(&mut self, sort: Sort, samples: Vec<usize>) {
        let mut held: Vec<Held> = samples.iter().map(|&sample| self.held[sample]).collect();
        held.rotate_right(1);
        for (&sample, held) in samples.iter().zip(held) {
            self.held[sample] = held;
        }
        self.plant(sort, samples);
    }

    fn shift(&mut self) {
        let count = self.labels.len();
        let row = self.numbers.below(count.div_ceil(COLUMNS));
        let line: Vec<usize> = match self.numbers.coin() && count == ROWS * COLUMNS {
            true => {
                let column = self.numbers.below(COLUMNS);
                (0..ROWS).map(|row| row * COLUMNS + column).collect()
            }
            false => (row * COLUMNS..count.min((row + 1) * COLUMNS)).collect(),
        };
        let fresh = line.iter().all(|sample| !self.taken.contains(sample));
        if line.len() < 5 || !fresh {
            return;
        }
        let mut line = line;
        if self.numbers.coin() {
            line.reverse();
        }
        // All along, or from some place on.
        let start = if self.numbers.coin() {
            0
        } else {
            self.numbers.below(line.len() - 4)
        };
        let line = line.split_off(start);
        let first = line[0];
        let foreign = Held::Compound(self.foreign());
        let goes_round = self.numbers.coin();
        self.rotate(Sort::Shift, line);
        if !goes_round {
            self.held[first] = foreign;
        }
    }

    fn single(&mut self, sort: Sort) {
        let samples = self.choose(self.labels.len());
        for sample in samples {
            let label = self.labels[sample];
            let compound = &self.pool.compounds[label];
            let isomer = compound.formula.and_then(|formula| {
                let list = &self.pool.isomers[formula];
                list.iter()
                    .copied()
                    .find(|other| !self.labels.contains(other))
            });
            let held = match sort {
                Sort::Isomer => isomer.map(Held::Compound),
                Sort::Mirror => compound.mirror.as_ref().map(|_| Held::Mirror(label)),
                Sort::Form => Some(Held::Salt(label)),
                Sort::Foreign => Some(Held::Compound(self.foreign())),
                _ => Some(Held::Compound(label)),
            };
            if let Some(held) = held {
                self.held[sample] = held;
                if sort == Sort::Mass {
                    self.off[sample] = 5.0 + self.numbers.below(90) as f64;
                }
                return self.plant(sort, vec![sample]);
            }
        }
    }

    /// Puts another compound, or its mirror image, in the place of one that is in the wrong vial already.
    fn spoil(&mut self) {
        let samples = self.faults.iter().flat_map(|fault| fault.samples.clone());
        let samples: Vec<usize> = samples.collect();
        if samples.len() < 2 {
            return self.add(Sort::Foreign);
        }
        let sample = samples[self.numbers.below(samples.len())];
        for fault in &mut self.faults {
            // It has no part in what the others still have in common.
            if fault.sort == Sort::SeveralLabels {
                fault.samples.retain(|&other| other != sample);
            }
        }
        let held = self.held[sample].compound();
        self.held[sample] = match self.pool.compounds[held].mirror {
            Some(_) => Held::Mirror(held),
            None => Held::Compound(self.foreign()),
        };
    }

    fn record(&self, held: Held) -> Arc<Prepared> {
        let compound = &self.pool.compounds[held.compound()];
        let record = match held {
            Held::Compound(_) => Some(&compound.record),
            Held::Mirror(_) => compound.mirror.as_ref(),
            Held::Salt(_) => Some(&compound.salt),
        };
        Arc::clone(record.unwrap())
    }

    fn finish(mut self, setting: Setting) -> Planted {
        let mut samples = Vec::new();
        let (mut detectable, mut sound) = (HashSet::new(), HashSet::new());
        let measured_all = matches!(setting, Setting::MassOnly | Setting::MissingMeasured);
        for at in 0..self.labels.len() {
            let missing = match setting {
                Setting::Missing | Setting::MissingMeasured => self.numbers.below(5) == 0,
                Setting::MassOnly => true,
                _ => false,
            };
            let measured = measured_all || self.off[at] > 0.0 || self.numbers.below(4) == 0;
            let measured = measured && (measured_all || !missing || setting != Setting::Missing);
            let (label, held) = (self.labels[at], self.held[at]);
            let error = 1.0 + (self.numbers.below(5) as f64 - 2.0) * 1e-6;
            let mz = (self.pool.compounds[held.compound()].mz + self.off[at]) * error;
            let differs = held != Held::Compound(label);
            let heavier = (self.pool.compounds[label].mz - mz).abs() > mz * 10e-6;
            if !missing && differs || measured && heavier {
                detectable.insert(at);
            }
            if !differs && self.off[at] == 0.0 {
                sound.insert(at);
            }
            let well = Well {
                row: (at / COLUMNS) as u16,
                column: (at % COLUMNS) as u16,
            };
            samples.push(Sample {
                line: at as u32 + 2,
                id: format!("S{at}"),
                well: well.to_string(),
                label: Some(self.record(Held::Compound(label))),
                received: (!missing).then(|| self.record(held)),
                measurement: measured.then(|| Measurement {
                    mz,
                    adduct: "[M+H]+".parse().ok(),
                    tolerance: Tolerance::default(),
                }),
                ..Sample::default()
            });
        }
        Planted {
            samples,
            faults: self.faults,
            detectable,
            sound,
        }
    }
}
