//! How the samples that two records stand for lie to each other, where stereo groups are involved.
//!
//! Settled elements (those that no automorphism moves or inverts) are told apart by place. As long as
//! pieces of both sides that touch a settled element consist of settled elements only, they are kept
//! as vectors over the field of two elements: the stereoisomers of one arrangement of the groups are a
//! coset of the span of the unmarked elements. All other pieces are listed. A stereoisomer is then a
//! pair of a vector and a listed point, samples are made independently in both, and each question
//! factors.

use std::collections::BTreeSet;

use crate::{
    Canonical, OrderError, Orderer, Shape,
    claims::{
        Alternative, Family, Freedom, Piece, Place, Point, Roles, Space, Vector, leaves_room,
        masked, most_pieces,
    },
    order::Labelling,
};

use super::{Arrangement, colour};

/// Compares the samples of two records of one labelled constitution that do not stand for the same.
pub(super) fn compare(
    orderer: &mut Orderer,
    a: &Canonical,
    b: &Canonical,
) -> Result<Arrangement, OrderError> {
    let (a, b) = (Side::of(a), Side::of(b));
    let pair = Pair::of(&a, &b)?;
    let mut steps = 0;
    let lists = pair.families(orderer, false, &mut steps)?;
    let (ours, theirs) = (pair.plane(&a, false), pair.plane(&b, false));
    if ours.meets(&theirs) && lists.a.meets(&lists.b) {
        return Ok(Arrangement::Overlapping);
    }
    let mirrored = pair.plane(&b, true);
    if ours.meets(&mirrored) && lists.a.meets(&lists.mirrored) {
        let single = !a.canonical.claims.open && !b.canonical.claims.open;
        return Ok(if single && a.fixed() == b.fixed() {
            Arrangement::MirrorImages
        } else {
            Arrangement::Unresolved
        });
    }
    let share = |(a, b): (&Alternative, &Alternative)| a.shares_isomer(b);
    if !ours.shares(&theirs) || !lists.a.pairs(&lists.b).any(share) {
        return Ok(Arrangement::Unlike);
    }
    let always = ours.always_shares(&theirs) && lists.a.pairs(&lists.b).all(share);
    Ok(
        if always && !pair.may_be_apart(orderer, &ours, &theirs, &mut steps)? {
            Arrangement::Composition
        } else {
            Arrangement::Unresolved
        },
    )
}

/// One record with the part each of its variables plays.
struct Side<'c> {
    canonical: &'c Canonical,
    roles: Roles,
}

impl<'c> Side<'c> {
    fn of(canonical: &'c Canonical) -> Self {
        let roles = Roles::of(
            &canonical.bare(),
            &canonical.perception,
            &canonical.variables,
        );
        Self { canonical, roles }
    }

    /// All variables that can make a difference.
    fn variables(&self) -> impl Iterator<Item = usize> + '_ {
        (0..self.canonical.variables.len()).filter(|&v| !self.roles.never[v])
    }

    /// Settled places with whether an even value is odd there.
    fn settled(&self) -> BTreeSet<Place> {
        let own = self.variables().filter_map(|v| self.roles.settled[v]);
        own.map(|(place, _)| place).collect()
    }

    fn place(&self, variable: usize) -> Option<Place> {
        self.roles.settled[variable].map(|(place, _)| place)
    }

    fn places(&self, piece: &Piece) -> impl Iterator<Item = Place> {
        piece.variables.iter().filter_map(|&v| self.place(v))
    }

    /// Groups and unmarked elements, those aside that are free without being settled.
    fn pieces(&self) -> Vec<Piece> {
        let claims = &self.canonical.claims;
        let unmarked = self.variables().filter(|&v| {
            claims.shown[v].is_none() && (!claims.free[v] || self.roles.settled[v].is_some())
        });
        let groups = claims.groups.iter().cloned();
        groups.chain(unmarked.map(Piece::unmarked)).collect()
    }

    /// Variables that are free and not settled.
    fn loose(&self) -> impl Iterator<Item = usize> + '_ {
        self.variables()
            .filter(|&v| self.canonical.claims.free[v] && self.roles.settled[v].is_none())
    }

    /// Places of candidates whose variable has a mark that counts in the normal form.
    fn fixed(&self) -> BTreeSet<Place> {
        let own = self.variables();
        own.filter(|&v| !self.canonical.claims.free[v])
            .flat_map(|v| self.canonical.candidate_places(v))
            .collect()
    }

    fn drawn(&self) -> Vec<bool> {
        let variables = self.canonical.variables.iter();
        variables.map(|v| v.odd == Some(true)).collect()
    }
}

/// Two records, and the settled places whose pieces are listed.
struct Pair<'p, 'c> {
    a: &'p Side<'c>,
    b: &'p Side<'c>,
    listed: BTreeSet<Place>,
    /// The other settled places.
    plane: Vec<Place>,
}

/// The families on common points.
struct Families {
    a: Family,
    b: Family,
    mirrored: Family,
}

impl<'p, 'c> Pair<'p, 'c> {
    fn of(a: &'p Side<'c>, b: &'p Side<'c>) -> Result<Self, OrderError> {
        let settled = a.settled();
        let beside = |side: &Side<'_>| {
            let perception = &side.canonical.perception;
            !perception.placed.is_empty() || !perception.impossible.is_empty()
        };
        if settled != b.settled() || beside(a) || beside(b) {
            return Err(OrderError::StereoGroups);
        }
        let pieces: Vec<(Vec<Place>, bool)> = [a, b]
            .into_iter()
            .flat_map(|side| {
                let pieces = side.pieces();
                let own = pieces.iter();
                own.map(|piece| (side.places(piece).collect(), !side.roles.settles(piece)))
                    .collect::<Vec<_>>()
            })
            .collect();
        let mut listed: BTreeSet<Place> = BTreeSet::new();
        loop {
            let before = listed.len();
            for (places, always) in &pieces {
                if *always || places.iter().any(|place| listed.contains(place)) {
                    listed.extend(places);
                }
            }
            if listed.len() == before {
                break;
            }
        }
        let plane = settled.difference(&listed).copied().collect();
        Ok(Self {
            a,
            b,
            listed,
            plane,
        })
    }

    /// Whether a piece has to be listed.
    fn is_listed(&self, side: &Side<'_>, piece: &Piece) -> bool {
        !side.roles.settles(piece) || side.places(piece).any(|place| self.listed.contains(&place))
    }

    /// The settled part of one side that is not listed.
    fn plane(&self, side: &Side<'_>, mirrored: bool) -> Plane {
        let index = |variable: usize| {
            let (place, odd) = side.roles.settled[variable]?;
            Some((self.plane.binary_search(&place).ok()?, place.0, odd))
        };
        let zero = Vector::zero(self.plane.len());
        let mut plane = Plane {
            offset: zero.clone(),
            spans: [const { Vec::new() }; 3],
        };
        for v in side.variables() {
            if let (Some((at, shape, odd)), Some(value)) =
                (index(v), side.canonical.claims.shown[v])
                && (value ^ odd ^ (mirrored && shape != Shape::DoubleBond))
            {
                plane.offset.flip(at);
            }
        }
        for piece in side.pieces() {
            if !self.is_listed(side, &piece) {
                let mut vector = zero.clone();
                for (at, ..) in piece.variables.iter().filter_map(|&v| index(v)) {
                    vector.flip(at);
                }
                plane.spans[piece.freedom as usize].push(vector);
            }
        }
        plane
    }

    /// The families of both sides and of the mirror image of B. With `loose` also what is free and
    /// not settled is listed; without, only elements that neither side leaves free are told apart.
    fn families(
        &self,
        orderer: &mut Orderer,
        loose: bool,
        steps: &mut u64,
    ) -> Result<Families, OrderError> {
        let common: BTreeSet<Place> = if loose {
            let all = self.a.variables();
            all.flat_map(|v| self.a.canonical.candidate_places(v))
                .collect()
        } else {
            self.a
                .fixed()
                .intersection(&self.b.fixed())
                .copied()
                .collect()
        };
        let mut list = |side: &Side<'c>, mirrored: bool| {
            let pieces = side
                .pieces()
                .into_iter()
                .filter(|p| self.is_listed(side, p));
            let free = side.loose().filter(|_| loose).map(Piece::unmarked);
            let pieces: Vec<Piece> = pieces.chain(free).collect();
            let points = self.points(orderer, side, &pieces, &common, mirrored, steps)?;
            Ok::<_, OrderError>((pieces, points))
        };
        let lists = [
            list(self.a, false)?,
            list(self.b, false)?,
            list(self.b, true)?,
        ];
        let points: BTreeSet<&Point> = lists.iter().flat_map(|(_, points)| points).collect();
        let points: Vec<&Point> = points.into_iter().collect();
        let number = |point: &Point| points.partition_point(|&other| other < point);
        let family = |(pieces, own): &(Vec<Piece>, Vec<Point>)| {
            Family::of(pieces, |mask| number(&own[mask as usize]))
        };
        let [a, b, mirrored] = &lists;
        Ok(Families {
            a: family(a)?,
            b: family(b)?,
            mirrored: family(mirrored)?,
        })
    }

    /// The points of all masks of the listed pieces.
    fn points(
        &self,
        orderer: &mut Orderer,
        side: &Side<'_>,
        pieces: &[Piece],
        common: &BTreeSet<Place>,
        mirrored: bool,
        steps: &mut u64,
    ) -> Result<Vec<Point>, OrderError> {
        let limit = most_pieces(&orderer.limits);
        if pieces.len() > limit as usize {
            return Err(OrderError::TooManyPieces { limit });
        }
        let drawn = side.drawn();
        let labelled: Vec<bool> = (0..drawn.len())
            .map(|v| {
                let mut places = side.canonical.candidate_places(v);
                !side.roles.never[v] && places.any(|place| common.contains(&place))
            })
            .collect();
        let mut points = Vec::with_capacity(1 << pieces.len());
        for mask in 0..1u64 << pieces.len() {
            let assignment = masked(&drawn, pieces, mask);
            let value = |v: usize| {
                let turned = mirrored && side.canonical.is_chiral(v);
                let counts = labelled[v] && side.place(v).is_none();
                counts.then(|| assignment[v] ^ turned)
            };
            let certificate = match &side.roles.symmetries {
                Some(symmetries) => symmetries.least(value),
                None => orderer.certificate(side.canonical, value, steps)?,
            };
            let settled = side.variables().filter_map(|v| {
                let (place, odd) = side.roles.settled[v]?;
                let turned = mirrored && place.0 != Shape::DoubleBond;
                let listed = self.listed.contains(&place);
                listed.then_some((place, assignment[v] ^ odd ^ turned))
            });
            let mut settled: Vec<(Place, bool)> = settled.collect();
            settled.sort_unstable();
            points.push(Point {
                settled,
                certificate,
            });
        }
        Ok(points)
    }

    /// Whether some sample of A has no stereoisomer in common with some sample of B, when all
    /// alternatives share some.
    fn may_be_apart(
        &self,
        orderer: &mut Orderer,
        ours: &Plane,
        theirs: &Plane,
        steps: &mut u64,
    ) -> Result<bool, OrderError> {
        let copies = match ours.room_beside(theirs) {
            Room::Always => return Ok(true),
            Room::Copies { of_a, of_b } => (of_a, of_b),
        };
        let loose_in_b: BTreeSet<Place> = self
            .b
            .loose()
            .flat_map(|v| self.b.canonical.candidate_places(v))
            .collect();
        // The two sides can differ in how many of an orbit are odd.
        let apart = |v: usize| {
            let mut places = self.a.canonical.candidate_places(v);
            self.a.roles.keeps_count(v) && places.all(|place| loose_in_b.contains(&place))
        };
        if self.a.loose().any(apart) {
            return Ok(true);
        }
        let lists = self.families(orderer, true, steps)?;
        let limit = orderer.limits.order_steps;
        let mut steps = 0;
        for (a, b) in lists.a.pairs(&lists.b) {
            let room = match copies {
                (of_a, 1) => leaves_room(a, b, of_a, &mut steps, limit)?,
                (_, of_b) => leaves_room(b, a, of_b, &mut steps, limit)?,
            };
            if room {
                return Ok(true);
            }
        }
        Ok(false)
    }
}

impl Canonical {
    /// Whether reflection inverts a variable.
    pub(super) fn is_chiral(&self, variable: usize) -> bool {
        let mut members = self.variables[variable].members.iter();
        members.any(|&(index, _)| self.perception.candidates[index].is_chiral())
    }
}

impl Orderer {
    /// The certificate of a record with marks on the variables that `value` gives one.
    fn certificate(
        &mut self,
        canonical: &Canonical,
        value: impl Fn(usize) -> Option<bool>,
        steps: &mut u64,
    ) -> Result<Vec<u64>, OrderError> {
        colour::load(
            &mut self.graph,
            &canonical.skeleton,
            &canonical.mesomer,
            true,
        )?;
        for (v, variable) in canonical.variables.iter().enumerate() {
            if let Some(odd) = value(v) {
                for &(index, opposite) in &variable.members {
                    let unit = canonical.perception.candidates[index].unit(odd ^ opposite);
                    self.graph.units.push(unit);
                }
            }
        }
        let mut labelling = Labelling::default();
        self.labeller
            .label(&mut self.graph, &self.limits, steps, &mut labelling)?;
        Ok(labelling.certificate)
    }
}

/// The settled part of one side: an arrangement, and for each [`Freedom`] the vectors of its pieces.
struct Plane {
    offset: Vector,
    spans: [Vec<Vector>; 3],
}

/// What the planes say of samples without a common stereoisomer.
enum Room {
    /// There are some, whatever the listed part.
    Always,
    /// There are, where the listed parts leave room: one side chooses anew in each copy, and for the
    /// other one stereoisomer of each block in any copy is enough.
    Copies { of_a: u64, of_b: u64 },
}

impl Plane {
    fn span(&self, freedom: Freedom) -> &[Vector] {
        &self.spans[freedom as usize]
    }

    /// All stereoisomers of one decision of the OR groups, as differences.
    fn all(&self) -> impl Iterator<Item = &Vector> {
        self.span(Freedom::Any)
            .iter()
            .chain(self.span(Freedom::And))
    }

    fn difference(&self, other: &Self) -> Vector {
        let mut difference = self.offset.clone();
        difference.add(&other.offset);
        difference
    }

    /// Whether some sample is one of the other's: each block of one meets what the other allows.
    fn meets(&self, other: &Self) -> bool {
        let hit = |own: &Self, other: &Self| {
            Space::of(own.span(Freedom::Any).iter().chain(other.all()))
                .contains_all(own.span(Freedom::And))
        };
        hit(self, other) && hit(other, self) && self.shares(other)
    }

    /// Whether some sample has a stereoisomer in common with one of the other's.
    fn shares(&self, other: &Self) -> bool {
        let decided = self.span(Freedom::Or).iter().chain(other.span(Freedom::Or));
        Space::of(self.all().chain(other.all()).chain(decided)).contains(&self.difference(other))
    }

    /// Whether all decisions of the OR groups allow a common stereoisomer.
    fn always_shares(&self, other: &Self) -> bool {
        let space = Space::of(self.all().chain(other.all()));
        space.contains(&self.difference(other))
            && space.contains_all(self.span(Freedom::Or))
            && space.contains_all(other.span(Freedom::Or))
    }

    /// Blocks are cosets of what is unmarked. Where both have two stereoisomers or more in common, or
    /// one side's blocks reach beyond the other's stereoisomers, each block finds one of its own.
    fn room_beside(&self, other: &Self) -> Room {
        let (ours, theirs) = (self.span(Freedom::Any), other.span(Freedom::Any));
        let within =
            Space::of(other.all()).contains_all(ours) && Space::of(self.all()).contains_all(theirs);
        if !within || (!ours.is_empty() && !theirs.is_empty()) {
            return Room::Always;
        }
        // Now one side's blocks are single vectors, and each block of the other is a union of such.
        let copies = |own: &[Vector]| 1u64 << Space::of(own).dimension().min(63);
        Room::Copies {
            of_a: copies(theirs),
            of_b: copies(ours),
        }
    }
}
