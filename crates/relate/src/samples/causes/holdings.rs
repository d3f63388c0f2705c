//! What each sample of a tray is labelled, and what it holds.

use std::collections::{BTreeMap, BTreeSet, HashMap};

use molkin_graph::{Formula, Key};

use crate::{
    Structure,
    samples::{
        Judgement, Sample, Verdict, Well,
        component::Side,
        composition::Composition,
        measured::Measurement,
        pattern::{highest, main_peaks},
    },
};

use super::{Analysis, Evidence, exchange::Edge};

/// What counts as one compound.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub(super) enum Level {
    /// Equal records.
    Compound,
    /// Records that are equal but for stereo and form.
    Family,
    /// Records whose ionising components have one formula.
    Formula,
}

impl Level {
    /// The finest first.
    pub(super) const ALL: [Self; 3] = [Self::Compound, Self::Family, Self::Formula];
}

/// What is in a vial, as far as the records say.
#[derive(Debug, Clone, PartialEq, Eq)]
pub(super) enum Content {
    /// A compound.
    Known(u32),
    /// Something with one of these formulae of labels; none where no label has its mass.
    ByMass(Vec<u32>),
    /// Nothing is known.
    Unknown,
}

/// A compound of some label or of what came.
#[derive(Debug, Clone, Copy)]
struct Compound<'t> {
    structure: &'t Structure,
    family: u32,
    formula: u32,
    /// Of the largest component, electrons aside.
    mass: Option<f64>,
}

/// A sample.
#[derive(Debug)]
pub(super) struct Holding {
    pub(super) label: Option<u32>,
    pub(super) content: Content,
    /// The content is seen not to be what the label says.
    pub(super) differs: bool,
    pub(super) seat: Option<(u32, Well)>,
    /// The measured mass of the molecule, where the ion is known, and how far it may be off.
    mass: Option<(f64, f64)>,
}

/// The samples of a tray.
pub(super) struct Holdings<'t> {
    pub(super) samples: Vec<Holding>,
    /// Samples by plate and well, those aside that share one.
    pub(super) seats: BTreeMap<(u32, Well), usize>,
    compounds: Vec<Compound<'t>>,
    /// The samples of each labelled compound, family and formula.
    labelled: [HashMap<u32, Vec<usize>>; 3],
    /// The labelled compounds of each formula.
    of_formula: HashMap<u32, BTreeSet<u32>>,
}

impl<'t> Holdings<'t> {
    pub(super) fn new(tray: &'t [(Sample, Judgement)]) -> Self {
        let mut register = Register::default();
        let structures: Vec<[Option<u32>; 2]> = tray
            .iter()
            .map(|(sample, judgement)| {
                let structures = [sample.label_structure(), sample.received_structure()];
                let sides = &judgement.sides;
                [0, 1].map(|at| Some(register.compound(structures[at]?, sides[at].as_ref()?)))
            })
            .collect();
        let labels = structures.iter().filter_map(|[label, _]| *label);
        let labels: BTreeSet<u32> = labels.collect();
        let index = MassIndex::new(&register, &labels);
        let mut plates: HashMap<&str, u32> = HashMap::new();
        let samples: Vec<Holding> = tray
            .iter()
            .zip(&structures)
            .map(|((sample, judgement), &[label, received])| {
                let next = plates.len() as u32;
                let plate = *plates.entry(sample.plate.trim()).or_insert(next);
                Holding {
                    label,
                    content: content(sample, judgement, received, &index),
                    differs: label.is_some() && differs(judgement.verdict),
                    seat: Well::parse(&sample.well).map(|well| (plate, well)),
                    mass: sample.measurement.as_ref().and_then(mass),
                }
            })
            .collect();
        Self::index(samples, register.compounds, &labels)
    }

    fn index(samples: Vec<Holding>, compounds: Vec<Compound<'t>>, labels: &BTreeSet<u32>) -> Self {
        let mut by_seat: BTreeMap<(u32, Well), Vec<usize>> = BTreeMap::new();
        for (at, sample) in samples.iter().enumerate() {
            if let Some(seat) = sample.seat {
                by_seat.entry(seat).or_default().push(at);
            }
        }
        let single = |(seat, list): ((u32, Well), Vec<usize>)| match list[..] {
            [only] => Some((seat, only)),
            _ => None,
        };
        let mut holdings = Self {
            samples,
            seats: by_seat.into_iter().filter_map(single).collect(),
            compounds,
            labelled: Default::default(),
            of_formula: HashMap::new(),
        };
        for (slot, level) in Level::ALL.into_iter().enumerate() {
            for at in 0..holdings.samples.len() {
                if let Some(vertex) = holdings.label_at(level, at) {
                    holdings.labelled[slot].entry(vertex).or_default().push(at);
                }
            }
        }
        for &label in labels {
            let formula = holdings.compounds[label as usize].formula;
            holdings
                .of_formula
                .entry(formula)
                .or_default()
                .insert(label);
        }
        holdings
    }

    /// The vertex of a compound.
    fn vertex(&self, level: Level, compound: u32) -> u32 {
        match level {
            Level::Compound => compound,
            Level::Family => self.compounds[compound as usize].family,
            Level::Formula => self.compounds[compound as usize].formula,
        }
    }

    /// The vertex of a sample's label.
    fn label_at(&self, level: Level, sample: usize) -> Option<u32> {
        Some(self.vertex(level, self.samples[sample].label?))
    }

    /// The labelled compounds of some formulae, in order.
    fn compounds_of(&self, formulae: &[u32]) -> Vec<u32> {
        let lists = formulae
            .iter()
            .filter_map(|formula| self.of_formula.get(formula));
        lists.flatten().copied().collect()
    }

    /// The compound that a sample holds: that of the record, or the only labelled one of its mass.
    pub(super) fn held(&self, sample: usize) -> Option<u32> {
        match &self.samples[sample].content {
            Content::Known(compound) => Some(*compound),
            Content::ByMass(formulae) => match self.compounds_of(formulae)[..] {
                [only] => Some(only),
                _ => None,
            },
            Content::Unknown => None,
        }
    }

    /// The vertex of what a sample holds, if some label has it.
    fn content_at(&self, level: Level, sample: usize) -> Option<u32> {
        let vertex = match (&self.samples[sample].content, level) {
            (Content::ByMass(formulae), Level::Formula) => match formulae[..] {
                [only] => only,
                _ => return None,
            },
            _ => self.vertex(level, self.held(sample)?),
        };
        self.labelled(level, vertex).map(|_| vertex)
    }

    /// The samples whose labels have a vertex.
    fn labelled(&self, level: Level, vertex: u32) -> Option<&[usize]> {
        let slot = Level::ALL.iter().position(|&other| other == level)?;
        self.labelled[slot].get(&vertex).map(Vec::as_slice)
    }

    /// Samples that differ from their label and hold what another label says.
    pub(super) fn edges(&self, level: Level) -> impl Iterator<Item = Edge> + '_ {
        (0..self.samples.len()).filter_map(move |sample| {
            let holding = &self.samples[sample];
            let (from, to) = (
                self.label_at(level, sample)?,
                self.content_at(level, sample)?,
            );
            let edge = Edge { from, to, sample };
            (holding.differs && from != to).then_some(edge)
        })
    }

    /// Samples labelled so that may have lost their compound: nothing is known of their content, or it is
    /// on no label.
    pub(super) fn bereft(&self, level: Level, vertex: u32) -> Vec<usize> {
        let samples = self.labelled(level, vertex).unwrap_or_default().iter();
        let bereft = samples.filter(|&&at| {
            let holding = &self.samples[at];
            holding.content == Content::Unknown
                || holding.differs && self.content_at(level, at).is_none()
        });
        bereft.copied().collect()
    }

    /// Whether nothing is known of the content of a sample.
    pub(super) fn is_unseen(&self, sample: usize) -> bool {
        self.samples[sample].content == Content::Unknown
    }

    /// The mass of what a sample holds that no label has, and how far it may be off.
    pub(super) fn foreign_mass(&self, sample: usize) -> Option<(f64, f64)> {
        match &self.samples[sample].content {
            Content::ByMass(formulae) if formulae.is_empty() => self.samples[sample].mass,
            Content::Known(compound) => Some((self.compounds[*compound as usize].mass?, 0.0)),
            _ => None,
        }
    }

    /// How firmly the records say that a sample holds the compound of another's label; see
    /// [`super::Hypothesis::score`].
    pub(super) fn strength(&self, sample: usize, other: usize) -> f64 {
        let Some(label) = self.samples[other].label else {
            return 0.0;
        };
        match &self.samples[sample].content {
            Content::Known(compound) if *compound == label => 1.0,
            Content::Known(compound) => {
                let family = |compound| self.vertex(Level::Family, compound);
                if family(*compound) == family(label) {
                    0.5
                } else {
                    0.0
                }
            }
            Content::ByMass(formulae) => {
                let fits = formulae.contains(&self.vertex(Level::Formula, label));
                if fits { self.share(formulae) } else { 0.0 }
            }
            Content::Unknown => 0.0,
        }
    }

    /// One by the number of labelled compounds of some formulae.
    fn share(&self, formulae: &[u32]) -> f64 {
        1.0 / self.compounds_of(formulae).len().max(1) as f64
    }

    /// How firmly an edge of a level stands.
    pub(super) fn strength_at(&self, level: Level, sample: usize) -> f64 {
        match (&self.samples[sample].content, level) {
            (Content::ByMass(formulae), _) => self.share(formulae),
            (Content::Known(_), Level::Compound) => 1.0,
            (Content::Known(compound), Level::Family) => {
                let same = self.labelled(Level::Compound, *compound).is_some();
                if same { 1.0 } else { 0.5 }
            }
            (Content::Known(compound), Level::Formula) => {
                if self.labelled(Level::Compound, *compound).is_some() {
                    return 1.0;
                }
                let formula = self.vertex(Level::Formula, *compound);
                self.share(&[formula])
            }
            (Content::Unknown, _) => 0.0,
        }
    }

    /// What speaks for an exchange among samples at a level.
    pub(super) fn evidence(&self, level: Level, samples: &[usize]) -> Evidence {
        let by_mass = |&at: &usize| matches!(self.samples[at].content, Content::ByMass(_));
        match level {
            Level::Formula => Evidence::Mass,
            _ if samples.iter().any(by_mass) => Evidence::Mass,
            Level::Family => Evidence::Form,
            Level::Compound => Evidence::Structure,
        }
    }

    /// What would tell the compounds apart that samples are labelled and seem to hold.
    pub(super) fn analyses(&self, samples: &[usize]) -> Vec<Analysis> {
        let analysis = |&sample: &usize| {
            let label = self.samples[sample].label?;
            let Content::Known(content) = self.samples[sample].content else {
                // The mass is known already, and isomers would have it too.
                return Some(Analysis::Nmr);
            };
            let [a, b] = [label, content].map(|compound| self.compounds[compound as usize]);
            let constitution = a
                .structure
                .canonical()
                .same_labelled_constitution(b.structure.canonical());
            Some(match () {
                () if constitution => Analysis::Stereo,
                () if a.family == b.family => Analysis::Content,
                () if a.formula == b.formula => Analysis::Nmr,
                () => Analysis::MassSpectrum,
            })
        };
        let set: BTreeSet<Analysis> = samples.iter().filter_map(analysis).collect();
        set.into_iter().collect()
    }
}

/// Whether a sample with this verdict holds something else than its label says.
fn differs(verdict: Verdict) -> bool {
    matches!(
        verdict,
        Verdict::AnotherCompound
            | Verdict::MeasurementContradicts
            | Verdict::Isomer
            | Verdict::StereoDiffers
            | Verdict::AgreesButForm
    )
}

/// The mass that a measurement says, electrons aside, and how far it may be off.
fn mass(measurement: &Measurement) -> Option<(f64, f64)> {
    let adduct = measurement.adduct.as_ref()?;
    let mass = adduct.mass_of_molecule(measurement.mz)?;
    let width = measurement.tolerance.width(measurement.mz);
    Some((mass, adduct.width_of_molecule(width)))
}

/// A measurement is made on what is in the vial; where it contradicts the record of what came, that
/// record says nothing about the vial.
fn content(
    sample: &Sample,
    judgement: &Judgement,
    received: Option<u32>,
    index: &MassIndex,
) -> Content {
    match (received, &sample.measurement, &sample.formula) {
        (Some(compound), ..) if !judgement.contradicts(1) => Content::Known(compound),
        (_, Some(measurement), _) => Content::ByMass(index.of_measurement(measurement)),
        (_, None, Some(formula)) => Content::ByMass(index.of_formula(&formula.formula())),
        _ => Content::Unknown,
    }
}

/// Numbers for compounds, families and formulae. Keys find candidates; certificates decide.
#[derive(Default)]
struct Register<'t> {
    compounds: Vec<Compound<'t>>,
    by_key: HashMap<Key, Vec<u32>>,
    families: HashMap<Key, u32>,
    formulae: HashMap<Vec<Composition>, u32>,
    compositions: Vec<Vec<Composition>>,
}

impl<'t> Register<'t> {
    fn compound(&mut self, structure: &'t Structure, side: &Side) -> u32 {
        let key = structure.canonical().compound_key();
        let known = self.by_key.get(&key).into_iter().flatten().copied();
        let is_same = |&compound: &u32| {
            let other = self.compounds[compound as usize].structure;
            other.canonical().same_compound(structure.canonical())
        };
        if let Some(compound) = known.into_iter().find(is_same) {
            return compound;
        }
        let compound = self.compounds.len() as u32;
        let next = self.families.len() as u32;
        let family = *self.families.entry(side.family).or_insert(next);
        let components = side
            .components
            .iter()
            .map(|component| component.neutral.clone());
        let components: Vec<Composition> = components.collect();
        let mass = components.first().cloned().and_then(|neutral| {
            let mass = neutral.with_charge(0).monoisotopic();
            mass.ok()
        });
        let next = self.compositions.len() as u32;
        let formula = *self.formulae.entry(components.clone()).or_insert(next);
        if formula == next {
            self.compositions.push(components);
        }
        self.compounds.push(Compound {
            structure,
            family,
            formula,
            mass,
        });
        self.by_key.entry(key).or_default().push(compound);
        compound
    }
}

/// Formulae of labels by mass.
struct MassIndex {
    /// The mass of the atoms, electrons aside, and the formula; ascending.
    masses: Vec<(f64, u32)>,
    formulae: HashMap<Formula, BTreeSet<u32>>,
}

/// What differs less is one peak.
const ONE_PEAK: f64 = 0.5;

impl MassIndex {
    fn new(register: &Register<'_>, labels: &BTreeSet<u32>) -> Self {
        let of_label = |&label: &u32| register.compounds[label as usize].formula;
        let labelled: BTreeSet<u32> = labels.iter().map(of_label).collect();
        let mut masses = Vec::new();
        let mut formulae: HashMap<Formula, BTreeSet<u32>> = HashMap::new();
        let bare = "[M]+".parse().ok();
        for formula in labelled {
            for composition in &register.compositions[formula as usize] {
                formulae
                    .entry(composition.formula())
                    .or_default()
                    .insert(formula);
                let Ok(mass) = composition.clone().with_charge(0).monoisotopic() else {
                    continue;
                };
                masses.push((mass, formula));
                let peaks = bare.as_ref().map(|bare| main_peaks(composition, bare));
                if let Some(peak) = highest(&peaks.unwrap_or_default())
                    && (peak.mz - mass).abs() > ONE_PEAK
                {
                    masses.push((peak.mz, formula));
                }
            }
        }
        masses.sort_by(|a, b| a.0.total_cmp(&b.0).then(a.1.cmp(&b.1)));
        Self { masses, formulae }
    }

    /// The formulae that a measurement may be of.
    fn of_measurement(&self, measurement: &Measurement) -> Vec<u32> {
        let mut found = BTreeSet::new();
        for adduct in measurement.adducts() {
            let Some(mass) = adduct.mass_of_molecule(measurement.mz) else {
                continue;
            };
            let width = measurement.tolerance.width(measurement.mz);
            let width = adduct.width_of_molecule(width);
            let start = self.masses.partition_point(|entry| entry.0 < mass - width);
            let within = self.masses[start..]
                .iter()
                .take_while(|entry| entry.0 <= mass + width);
            found.extend(within.map(|entry| entry.1));
        }
        found.into_iter().collect()
    }

    fn of_formula(&self, formula: &Formula) -> Vec<u32> {
        let found = self.formulae.get(formula).into_iter().flatten();
        found.copied().collect()
    }
}
