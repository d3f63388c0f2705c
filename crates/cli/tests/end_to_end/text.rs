//! The text form, as a chemist sees it.

use insta::assert_snapshot;

use crate::runner::{demo, run};

/// Without the caution, which is the same everywhere.
fn compared(a: &str, b: &str) -> String {
    let out = demo(&["compare", a, b]).out;
    let (text, _) = out.split_once("\nThis compares").unwrap();
    text.to_owned()
}

#[test]
fn constitutional() {
    assert_snapshot!(compared("label.mol", "arrived.mol"), @r"
    Constitutional isomers: the same formula C8H8O2, but other functional groups (aldehyde and ether
    in A, carboxylic ester in B). The methoxy group on C3 of A (para to the formyl group) is on C3
    of B (the carbonyl carbon).
      A                 label.mol: QM-0417 label (C8H8O2)
                        C1(OC)=CC=C(C=O)C=C1
      B                 arrived.mol: QM-0417 bottle (C8H8O2)
                        C1(C(=O)OC)=CC=CC=C1
      besides           The rest, 9 of 10 bonds, is the same.
      only in A         O2–C3
      only in B         O2–C3
                        in A                                   in B
      groups            ether (O2), aldehyde (C7, O8)          carboxylic ester (O2, C3, O4)
      branch points     C3 (ring + 2), C6 (ring + 2)           C3 (1 + 2 + 6), C5 (ring + 4)
      atoms, A → B      C1 → C1, O2 → O2, C3 → C8, C4 → C9, C5 → C10, C6 → C5, C7 → C3, O8 → O4,
                        C9 → C6, C10 → C7
      common practice   Mass alone cannot tell: it is equal. NMR and achiral chromatography can.
    ");
}

#[test]
fn bond_orders() {
    assert_snapshot!(compared("C=CCO", "C/C=C/O"), @r"
    Constitutional isomers: the same formula C3H6O, but other functional groups (alcohol and alkene
    in A, enol in B). The double bond C1=C2 of A is C2=C3 in B.
      A                 C=CCO (C3H6O)
                        C(=C)CO
      B                 C/C=C/O (C3H6O)
                        C(/C)=C\O
      besides           The same atoms are bonded in both, 1 of 3 bonds in the same order.
      order, A → B      C1=C2 → C1–C2, C2–C3 → C2=C3
                        in A                                   in B
      groups            alkene (C1, C2), alcohol (O4)          enol (C2, C3, O4)
      atoms, A → B      the same numbers in both
      common practice   Mass alone cannot tell: it is equal. NMR and achiral chromatography can.
    ");
}

#[test]
fn chains() {
    assert_snapshot!(compared("CC(=O)CN", "NCCC=O"), @r"
    Constitutional isomers: the same formula C3H7NO, but other functional groups (ketone in A,
    aldehyde in B). The aminomethyl group on C2 of A (the carbonyl carbon) is on C3 of B (alpha to
    the carbonyl group).
      A                 CC(=O)CN (C3H7NO)
                        C(=O)(C)CN
      B                 NCCC=O (C3H7NO)
                        O=CCCN
      besides           The rest, 3 of 4 bonds, is the same.
      only in A         C2–C4
      only in B         C2–C3
                        in A                                   in B
      groups            ketone (C2, O3)                        aldehyde (C4, O5)
      branch points     C2 (1 + 1 + 2)                         –
      main chains       4 atoms, O3 to N5, branches at C2      5 atoms, N1 to O5
      atoms, A → B      C1 → C3, C2 → C4, O3 → O5, C4 → C2, N5 → N1
      common practice   Mass alone cannot tell: it is equal. NMR and achiral chromatography can.
    ");
}

#[test]
fn kinds() {
    // The verdict may take several lines; those below it are indented.
    let verdict = |a, b| {
        let text = compared(a, b);
        let lines = text.lines().take_while(|line| !line.starts_with(' '));
        lines.collect::<Vec<_>>().join(" ")
    };
    let lines = [
        verdict("[2H]CCO", "CCO[2H]"),
        verdict("CC=C", "C1CC1"),
        verdict("OC(CO)CO", "COCOCO"),
        verdict("CCCC", "CC(C)C"),
        verdict("CCCO", "CC(C)O"),
        verdict("CC.CCCC", "CCC.CCC"),
        verdict("[2H]C", "C"),
        verdict("CO", "CCCO"),
    ];
    assert_snapshot!(lines.join("\n"), @r"
    Constitutional isomers: the same formula C2H6O, with the same isotopes in other places. All bonds agree; hydrogens, charges or isotopes sit elsewhere.
    Constitutional isomers: the same formula C3H6, but a chain of one is closed to a ring in the other. The three-membered ring closed by C2–C3 in B is open in A: C3 and C1 are not bonded; one more difference.
    Constitutional isomers: the same formula C3H8O3, but other functional groups (3 × alcohol in A, an unnamed group of 5 atoms in B). The hydroxymethyl group on C2 of A (geminal to the other hydroxymethyl group) is on O4 of B; one more difference.
    Constitutional isomers: the same formula C4H10, but another carbon skeleton. The methyl group on C3 of A is on C2 of B.
    Constitutional isomers: the same formula C3H8O and the same functional groups, but in other places. The hydroxy group on C3 of A (a primary carbon) is on C2 of B (a secondary carbon).
    Constitutional isomers: the same formula C6H16, but the atoms are connected differently. The methyl group on C5 of A is on C5 of B.
    Not isomers: the same elements (CH4), but a different isotopic composition.
    Not isomers but homologues: the same functional groups, and formulae that differ by CH2 units (CH4O and C3H8O). B has C2H4 more. Ethyl group on C3 of B (C1 in A); all else is bonded alike.
    ");
}

#[test]
fn enantiomers() {
    assert_snapshot!(compared("hand-label.mol", "hand-arrived.mol"), @r"
    Enantiomers: mirror images that do not coincide; the only stereocentre is inverted: C2 (S in A,
    R in B).
      A                 hand-label.mol: QM-0422 label (C8H10O)
                        C1([C@@H](O)C)=CC=CC=C1
      B                 hand-arrived.mol: QM-0422 bottle (C8H10O)
                        C1([C@H](O)C)=CC=CC=C1
      stereo            C2 → C2: centre, inverted: S in A, R in B
      atoms, A → B      the same numbers in both
      common practice   Equal in mass, NMR and achiral chromatography; only a chiral method (chiral
                        chromatography, optical rotation or circular dichroism against a reference)
                        tells enantiomers apart.
    ");
}

#[test]
fn diastereomers() {
    assert_snapshot!(compared("O=C/C=C(C)/CCC=C(C)C geranial", "O=C/C=C(C)\\CCC=C(C)C neral"), @r"
    Diastereomers (cis/trans isomers): the only double bond is of opposite geometry: C3=C4 (E in A,
    Z in B).
      A                 O=C/C=C(C)/CCC=C(C)C geranial (C10H16O)
                        C(/C)(=C/C=O)CCC=C(C)C
      B                 O=C/C=C(C)\CCC=C(C)C neral (C10H16O)
                        C(/C)(=C\C=O)CCC=C(C)C
      stereo            C3=C4 → C3=C4: double bond, opposite geometry: E in A, Z in B
      atoms, A → B      the same numbers in both
      common practice   Mass alone cannot tell: it is equal. NMR and achiral chromatography can.
    ");
}

#[test]
fn epimers() {
    assert_snapshot!(compared("OC[C@H](O)[C@H](O)[C@H](O)CO ribitol", "OC[C@@H](O)[C@H](O)[C@H](O)CO arabinitol"), @r"
    Diastereomers (epimers): 1 of 2 stereocentres is inverted: C3 (S in A, R in B). C5 is not
    stereogenic in B.
      A                 OC[C@H](O)[C@H](O)[C@H](O)CO ribitol (C5H12O5)
                        [C@H](O)(CO)[C@H](O)[C@H](O)CO
      B                 OC[C@@H](O)[C@H](O)[C@H](O)CO arabinitol (C5H12O5)
                        [C@@H](O)(CO)C(O)[C@H](O)CO
      stereo            C3 → C3: centre, inverted: S in A, R in B
      stereo            C5 → C5: centre, s in A, not stereogenic in B
      atoms, A → B      the same numbers in both
      common practice   Mass alone cannot tell: it is equal. NMR and achiral chromatography can.
      note on A         A meso compound: it has stereocentres (atoms 3, 5 and 7), but its mirror
                        image is itself. [meso]
      note on B         The stereo mark at atom 5 says nothing: by symmetry, or because other
                        elements are unmarked, both arrangements give the same. [mark-idle]
    ");
}

#[test]
fn undetermined() {
    assert_snapshot!(compared("crossed-label.mol", "crossed-arrived.mol"), @r"
    Undetermined: the same connectivity; as marked, the two may or may not be the same stereoisomer.
    Open in A, marked in B: C4=C5 (E).
      A                 crossed-label.mol: QM-0430 label (C10H10O)
                        C1(C=CC(=O)C)=CC=CC=C1
      B                 crossed-arrived.mol: QM-0430 bottle (C10H10O)
                        C1(/C=C/C(=O)C)=CC=CC=C1
      stereo            C4=C5 → C4=C5: double bond, open in A, E in B
      atoms, A → B      the same numbers in both
      common practice   Equal mass, and the records leave stereo open: NMR and achiral
                        chromatography tell diastereomers apart, only a chiral method enantiomers.
      note on A         Stereogenic but unmarked: atoms 4 and 5. [unmarked-stereo]
    ");
}

#[test]
fn unresolved() {
    assert_snapshot!(compared("half-label.mol", "half-arrived.mol"), @r"
    Unresolved: surely different stereoisomers, but the marks do not settle whether they are mirror
    images. Inverted: C6 (R in A, S in B). Open in both: C2.
      A                 half-label.mol: QM-0433 label (C7H14O)
                        C1(C)CCC[C@@H](O)C1
      B                 half-arrived.mol: QM-0433 bottle (C7H14O)
                        C1(C)CCC[C@H](O)C1
      stereo            C6 → C6: centre, inverted: R in A, S in B
      atoms, A → B      the same numbers in both
      common practice   Equal mass, and the records leave stereo open: NMR and achiral
                        chromatography tell diastereomers apart, only a chiral method enantiomers.
      note on A         Stereogenic but unmarked: atom 2. [unmarked-stereo]
      note on B         Stereogenic but unmarked: atom 2. [unmarked-stereo]
    ");
}

#[test]
fn identical() {
    assert_snapshot!(compared("nitro-label.mol", "nitro-arrived.mol"), @r"
    The two records are the same compound.
      A                 nitro-label.mol: QM-0436 label (C7H7NO3)
                        C1([N+](=O)[O-])=CC=C(OC)C=C1
      B                 nitro-arrived.mol: QM-0436 bottle (C7H7NO3)
                        C1([N+](=O)[O-])=CC=C(OC)C=C1
    ");
}

#[test]
fn identical_but_open() {
    assert_snapshot!(compared("wavy-label.mol", "wavy-arrived.mol"), @r"
    The two records say the same, but they leave stereo open: the samples may still differ.
      A                 wavy-label.mol: QM-0440 label (C9H10O2)
                        C1(C(C)C(=O)O)=CC=CC=C1
      B                 wavy-arrived.mol: QM-0440 bottle (C9H10O2)
                        C1(C(C)C(=O)O)=CC=CC=C1
      common practice   Equal mass, and the records leave stereo open: NMR and achiral
                        chromatography tell diastereomers apart, only a chiral method enantiomers.
      note on A         Stereogenic but unmarked: atom 2. [unmarked-stereo]
      note on B         Stereogenic but unmarked: atom 2. [unmarked-stereo]
    ");
}

#[test]
fn not_isomers() {
    assert_snapshot!(compared("salt-label.mol", "salt-arrived.mol"), @r"
    Not isomers, but one compound: B is the sodium salt of A (C7H6O3 and C7H5NaO3).
      A                 salt-label.mol: QM-0444 label (C7H6O3)
                        C(=O)(O)C1=C(O)C=CC=C1
      B                 salt-arrived.mol: QM-0444 bottle (C7H5NaO3)
                        O=C([O-])C1=C(O)C=CC=C1.[Na+]
      same apart from   salt
      left over in B    Na+ (Na11)
      order, A → B      O1=C2 → O1:C2, C2–O3 → C2:O3 (: is a mobile bond)
      hydrogens, A → B  O3 (1 H) → O3 (no H)
                        in A                                   in B
      groups            carboxylic acid (O1, C2, O3)           carboxylate (O1, C2, O3),
                                                               unnamed (Na11)
      atoms, A → B      the same numbers in both
      common practice   What both contain agrees, so mass and NMR of it do; an assay of the
                        counter-ion or the solvent tells them apart.
    ");
}

#[test]
fn unreadable() {
    assert_snapshot!(compared("CCOC(=O)c1ccccc1", "CCOC(=O)c1cccc1"), @r"
    No verdict.
      A                 CCOC(=O)c1ccccc1 (C9H10O2)
                        C1(C(=O)OCC)=CC=CC=C1
      B                 CCOC(=O)c1cccc1
      error             no-kekule-structure at line 1, column 14: no choice of double bonds fits the
                        aromatic atoms; left over: atom 10
        1 | CCOC(=O)c1cccc1
          |              ^
    ");
}

#[test]
fn budget_ended() {
    let outcome = run(&["compare", "OCC=C=CO", "O=CC=CCO", "--steps", "1"]);
    let (text, _) = outcome.out.split_once("\nThis compares").unwrap();
    assert_snapshot!(text, @r"
    Constitutional isomers: the same formula C4H6O2, but other functional groups (an unnamed group
    of 4 atoms in A, enal in B). One way to see it, not proved the least: a hydrogen on O6 of A is
    on C3 of B; one more difference.
      A                 OCC=C=CO (C4H6O2)
                        C(=CO)=CCO
      B                 O=CC=CCO (C4H6O2)
                        O=CC=CCO
      besides           The double bond C4=C5 of A is O1=C2 in B.
                        The same atoms are bonded in both, 3 of 5 bonds in the same order.
      order, A → B      C4=C5 → C2–C3, C5–O6 → O1=C2
      not proved least  The search ended at its budget; another map may change less. --steps N looks
                        further.
                        in A                                   in B
      groups            unnamed (C3, C4, C5, O6)               enal (O1, C2, C3, C4)
      atoms, A → B      O1 → O6, C2 → C5, C3 → C4, C4 → C3, C5 → C2, O6 → O1
      common practice   Mass alone cannot tell: it is equal. NMR and achiral chromatography can.
    ");
}

#[test]
fn described() {
    assert_snapshot!(demo(&["describe", "half-label.mol", "CC[O-] ethoxide", "C1CC"]).out, @r"
    half-label.mol: QM-0433 label
      formula           C7H14O
      mass              114.188 average, 114.10447 monoisotopic
      rings + π bonds   1
      SMILES            C1(C)CCC[C@@H](O)C1
      constitution key  1-e570806958116d789fcbc3025cde7c70
      compound key      1-0ec34e3267ce833815b7f23ddba03bc5
      open              The record stands for more than one possible sample.
      stereo            C2: tetrahedral, unmarked
      stereo            C6: tetrahedral, marked, R

    CC[O-] ethoxide
      formula           C2H5O-
      mass              45.062 average, 45.03459 monoisotopic
      rings + π bonds   0 (by the textbook formula 0.5)
      SMILES            [O-]CC
      constitution key  1-93a1caef877dbff3eada47880e33f144
      compound key      1-d7b0c725e710eff4569adf87f29c5fbf

    C1CC
      error             ring-not-closed at line 1, column 2: ring label 1 is opened and never closed
        1 | C1CC
          |  ^
    ");
}

#[test]
fn dependent_centre() {
    let text = demo(&["describe", "C[C@H](O)[C@H](O)[C@H](O)C"]).out;
    let stereo = text.lines().skip_while(|line| !line.contains("stereo"));
    assert_snapshot!(stereo.collect::<Vec<_>>().join("\n"), @r"
      stereo            C2: tetrahedral, marked, S
      stereo            C4: tetrahedral, marked, s, depends on C2 and C6
      stereo            C6: tetrahedral, marked, R
      note              A meso compound: it has stereocentres (atoms 2, 4 and 6), but its mirror
                        image is itself. [meso]
    ");
}

#[test]
fn counted() {
    let outcome = demo(&["compare", "held.smi", "vendor.sdf", "--by", "name"]);
    let tally = outcome.out.lines().rev().nth(2).unwrap();
    assert_snapshot!(tally, @"14 pairs: 6 identical (1 of them open), 4 stereo, 2 constitutional, 1 not isomers, 1 without a verdict");
}
