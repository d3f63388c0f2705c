//! A stereo relation in plain sentences: what it is called, how many elements differ, and where.
//!
//! Terms are those of the IUPAC Basic Terminology of Stereochemistry, Pure Appl. Chem. 1996, 68, 2193.

use molkin_graph::{Mark, Shape, StereoElement};

use crate::{Explanation, Geometry, StereoChange, StereoDifference, StereoKind, Structure};

use super::{listed, places::Places, stereo_groups};

/// Places are named in the summary if they are at most so many; the entries of `stereo` name all.
const MOST_NAMED: usize = 3;

/// The sentences for a stereo relation; without an explanation only what the verdict means.
pub(super) fn summary(
    a: &Structure,
    b: &Structure,
    kind: StereoKind,
    explained: Option<&Explanation>,
) -> String {
    let Some(explained) = explained.filter(|explained| !explained.stereo.is_empty()) else {
        return format!("{}.", meaning(kind));
    };
    let found = Found::new(a, b, explained);
    match kind {
        StereoKind::Enantiomers => found.enantiomers(),
        StereoKind::Diastereomers => found.diastereomers(),
        StereoKind::Composition | StereoKind::Undetermined | StereoKind::Unresolved => {
            found.claims(kind)
        }
    }
}

fn meaning(kind: StereoKind) -> &'static str {
    match kind {
        StereoKind::Enantiomers => "Enantiomers: mirror images that do not coincide",
        StereoKind::Diastereomers => {
            "Diastereomers: the same connectivity, a different arrangement in space, and not mirror images"
        }
        StereoKind::Composition => {
            "Composition: the same connectivity, and always a stereoisomer in common, but not the same mixture"
        }
        StereoKind::Undetermined => {
            "Undetermined: the same connectivity; as marked, the two may or may not be the same stereoisomer"
        }
        StereoKind::Unresolved => {
            "Unresolved: surely different stereoisomers, but the marks do not settle whether they are mirror images"
        }
    }
}

/// What differs, sorted by what is to be said about it.
struct Found<'e> {
    places: Places<'e>,
    elements: [Vec<StereoElement>; 2],
    explained: &'e Explanation,
    inverted: Vec<&'e StereoDifference>,
    /// Marked on one side, open on the other.
    open_in_a: Vec<&'e StereoDifference>,
    open_in_b: Vec<&'e StereoDifference>,
    /// Marked on one side, and not stereogenic on the other.
    lapsed_in_a: Vec<&'e StereoDifference>,
    lapsed_in_b: Vec<&'e StereoDifference>,
    /// Arrangements about centres that are not tetrahedral, and groups.
    others: Vec<&'e StereoDifference>,
}

impl<'e> Found<'e> {
    fn new(a: &'e Structure, b: &'e Structure, explained: &'e Explanation) -> Self {
        let mut found = Self {
            places: Places([a, b]),
            elements: [a, b].map(|side| side.canonical().stereo_elements()),
            explained,
            inverted: Vec::new(),
            open_in_a: Vec::new(),
            open_in_b: Vec::new(),
            lapsed_in_a: Vec::new(),
            lapsed_in_b: Vec::new(),
            others: Vec::new(),
        };
        for difference in &explained.stereo {
            let list = match difference.change {
                StereoChange::Inverted => &mut found.inverted,
                StereoChange::MarkedOnlyInA
                    if !lapses(difference, &found.elements[1], &difference.b) =>
                {
                    &mut found.open_in_b
                }
                StereoChange::MarkedOnlyInB
                    if !lapses(difference, &found.elements[0], &difference.a) =>
                {
                    &mut found.open_in_a
                }
                StereoChange::MarkedOnlyInA => &mut found.lapsed_in_b,
                StereoChange::MarkedOnlyInB => &mut found.lapsed_in_a,
                StereoChange::Rearranged | StereoChange::GroupDiffers => &mut found.others,
            };
            list.push(difference);
        }
        found
    }

    /// Whether some elements are inverted, and all others that both sides have agree.
    fn is_inverted_only(&self) -> bool {
        let further = [&self.open_in_a, &self.open_in_b, &self.others];
        !self.inverted.is_empty() && further.iter().all(|list| list.is_empty())
    }

    /// How many elements of some shapes A marks, those that are not stereogenic in B aside.
    fn marked(&self, shapes: &[Shape]) -> usize {
        let lapsed = |element: &StereoElement| {
            let mut lapsed = self.lapsed_in_b.iter();
            lapsed.any(|difference| element.centres.contains(&difference.a[0]))
        };
        let marked = self.elements[0].iter().filter(|element| {
            element.mark != Mark::Absent && shapes.contains(&element.shape) && !lapsed(element)
        });
        marked.count()
    }

    fn enantiomers(&self) -> String {
        let meaning = meaning(StereoKind::Enantiomers);
        let all = self.marked(&[Shape::Tetrahedral, Shape::Axis]);
        if !self.is_inverted_only() || all < self.inverted.len() {
            return format!("{meaning}. {}", self.counted());
        }
        let noun = match (
            self.marked(&[Shape::Tetrahedral]),
            self.marked(&[Shape::Axis]),
        ) {
            (_, 0) => "stereocentre",
            (0, _) => "stereogenic axis",
            _ => "stereo element",
        };
        let further = match all == self.inverted.len() {
            true => self.further(),
            false => format!(" Under the atom map the others agree.{}", self.further()),
        };
        format!(
            "{meaning}; {} inverted{}.{further}",
            share(self.inverted.len(), all, noun),
            self.named(&self.inverted, ": ")
        )
    }

    fn diastereomers(&self) -> String {
        let meaning = meaning(StereoKind::Diastereomers);
        if !self.is_inverted_only() {
            return format!("{meaning}. {}", self.counted());
        }
        let bond = Geometry::Element(Shape::DoubleBond);
        let (count, places) = (self.inverted.len(), self.named(&self.inverted, ": "));
        let further = self.further();
        if self.inverted.iter().all(|d| d.geometry == bond) {
            let all = self.marked(&[Shape::DoubleBond]);
            let share = share(count, all, "double bond");
            return format!(
                "Diastereomers (cis/trans isomers): {share} of opposite geometry{places}.{further}"
            );
        }
        let centres = self.marked(&[Shape::Tetrahedral]);
        let everything = self.marked(&[Shape::Tetrahedral, Shape::Axis, Shape::DoubleBond]);
        if self.are_epimers(centres) {
            let share = share(count, centres, "stereocentre");
            let term = match self.depend_on_each_other() {
                true => "epimers, cis/trans on the ring",
                false => "epimers",
            };
            return format!("Diastereomers ({term}): {share} inverted{places}.{further}");
        }
        let noun = match centres == everything {
            true => "stereocentre",
            false => "stereo element",
        };
        let share = share(count, everything, noun);
        format!(
            "Diastereomers: stereoisomers but not mirror images; {share} inverted{places}.{further}"
        )
    }

    /// Opposite configuration at only one of two or more tetrahedral centres (the source above:
    /// epimers). What both leave open does not count; of records with groups it is not said.
    fn are_epimers(&self, centres: usize) -> bool {
        let tetrahedral = Geometry::Element(Shape::Tetrahedral);
        let one = matches!(self.inverted[..], [only] if only.geometry == tetrahedral);
        let mut elements = self.elements.iter().flatten();
        one && centres > 1 && elements.all(|element| element.group.is_none())
    }

    /// Whether A has two elements only, and each is stereogenic only by the other: two centres that
    /// two like paths join, so that they lie across a ring.
    fn depend_on_each_other(&self) -> bool {
        let [first, second] = &self.elements[0][..] else {
            return false;
        };
        let dependences = self.places.0[0].canonical().dependences();
        dependences.is_some_and(|of| of == [vec![second.centres], vec![first.centres]])
    }

    /// Where a verdict rests on what the records leave open, or on their groups.
    fn claims(&self, kind: StereoKind) -> String {
        let mut sentences = vec![format!("{}.", meaning(kind))];
        let regrouped: Vec<&StereoDifference> = self
            .explained
            .stereo
            .iter()
            .filter(|difference| difference.groups != [None, None])
            .collect();
        let alike = self.explained.stereo.len() == self.others.len();
        sentences.extend(stereo_groups::sentence(&regrouped, &self.elements, alike));
        let lists = [
            ("Inverted: ", &self.inverted),
            ("Marked in A, open in B: ", &self.open_in_b),
            ("Open in A, marked in B: ", &self.open_in_a),
        ];
        for (label, list) in lists.into_iter().filter(|(_, list)| !list.is_empty()) {
            let named = self.named(list, label);
            sentences.push(match named.is_empty() {
                true => format!("{label}{} stereo elements.", list.len()),
                false => format!("{named}."),
            });
        }
        sentences.extend(self.open_in_both());
        sentences.join(" ")
    }

    /// "Open in both: C2."
    fn open_in_both(&self) -> Option<String> {
        let image = |atom: u32| {
            let map = &self.explained.atom_map;
            let at = map.binary_search_by_key(&atom, |&(a, _)| a).ok()?;
            Some(map[at].1)
        };
        let open = |element: &&StereoElement| element.mark == Mark::Absent && !element.quiet;
        let places = self.elements[0].iter().filter(open).filter_map(|element| {
            let mut theirs = [image(element.centres[0])?, image(element.centres[1])?];
            theirs.sort_unstable();
            let mut others = self.elements[1].iter().filter(open);
            others.find(|other| {
                let mut centres = other.centres;
                centres.sort_unstable();
                centres == theirs
            })?;
            Some(self.places.of_pair(&element.centres, &theirs, [None, None]))
        });
        let places: Vec<String> = places.collect();
        match places.len() {
            0 => None,
            n if n > MOST_NAMED => Some(format!("Open in both: {n} stereo elements.")),
            _ => Some(format!("Open in both: {}.", listed(&places))),
        }
    }

    /// What is not stereogenic or not marked, each sentence after a blank.
    fn further(&self) -> String {
        let open = self.open_in_both();
        let open = open.map_or_else(String::new, |sentence| format!(" {sentence}"));
        self.lapsed() + &open
    }

    /// "C3 is not stereogenic in B.", after a blank.
    fn lapsed(&self) -> String {
        let sides = [(&self.lapsed_in_a, 0, "A"), (&self.lapsed_in_b, 1, "B")];
        let sentences = sides.iter().filter(|(list, ..)| !list.is_empty());
        let sentences = sentences.map(|&(list, side, name)| {
            let places: Vec<String> = list
                .iter()
                .map(|difference| self.places.on_side(side, difference))
                .collect();
            let verb = if places.len() == 1 { "is" } else { "are" };
            format!(" {} {verb} not stereogenic in {name}.", listed(&places))
        });
        sentences.collect()
    }

    /// The places after a separator, or nothing if there are many.
    fn named(&self, list: &[&StereoDifference], separator: &str) -> String {
        if list.len() > MOST_NAMED {
            return String::new();
        }
        let places: Vec<String> = list
            .iter()
            .map(|difference| {
                self.places
                    .of_pair(&difference.a, &difference.b, difference.labels)
            })
            .collect();
        format!("{separator}{}", places.join("; "))
    }

    fn counted(&self) -> String {
        match self.explained.stereo.len() {
            1 => "One stereo element differs.".to_owned(),
            n => format!("{n} stereo elements differ."),
        }
    }
}

/// Whether an element of one side is not stereogenic on the other. Arrangements about centres that are
/// not tetrahedral are known by their marks alone.
fn lapses(difference: &StereoDifference, others: &[StereoElement], atoms: &[u32]) -> bool {
    let is_here = |other: &StereoElement| other.centres.iter().all(|end| atoms.contains(end));
    matches!(difference.geometry, Geometry::Element(_)) && !others.iter().any(is_here)
}

/// "the only stereocentre is", "both stereocentres are", "1 of 3 stereocentres is".
fn share(count: usize, all: usize, noun: &str) -> String {
    let plural = match noun.strip_suffix("axis") {
        Some(rest) => format!("{rest}axes"),
        None => format!("{noun}s"),
    };
    match (count, all) {
        (1, 1) => format!("the only {noun} is"),
        (2, 2) => format!("both {plural} are"),
        (n, all) if n == all => format!("all {all} {plural} are"),
        (1, all) => format!("1 of {all} {plural} is"),
        (n, all) => format!("{n} of {all} {plural} are"),
    }
}
