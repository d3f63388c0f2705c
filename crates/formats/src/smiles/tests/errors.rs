use insta::assert_snapshot;
use rstest::rstest;

use super::fault;

/// Text, code, column and width.
#[rstest]
#[case::stray("CxC", "unexpected-character", 2, 1)]
#[case::not_ascii("C\u{e9}C", "unexpected-character", 2, 2)]
#[case::reaction("C>>C", "unexpected-character", 2, 1)]
#[case::open_bracket("CC[C", "bracket-not-closed", 3, 2)]
#[case::open_bracket_and_name("C[NH3 x", "bracket-not-closed", 2, 4)]
#[case::empty_bracket("[]", "unexpected-character", 2, 1)]
#[case::bracket_order("C[CH@](F)Cl", "unexpected-character", 5, 1)]
#[case::two_digits_of_hydrogen("[CH10]", "unexpected-character", 5, 1)]
#[case::mixed_signs("[Na+-]", "unexpected-character", 5, 1)]
#[case::class_without_number("[C:]", "unexpected-character", 4, 1)]
#[case::unknown_element("[Xx]", "unknown-element", 2, 2)]
#[case::deuterium("[D]", "unknown-element", 2, 1)]
#[case::not_aromatic("[cl]", "not-aromatic", 2, 2)]
#[case::isotope("[1000C]", "number-out-of-range", 2, 4)]
#[case::huge_isotope("[99999999999999999999C]", "number-out-of-range", 2, 20)]
#[case::charge("[C+16]", "number-out-of-range", 3, 3)]
#[case::closing("C)C", "branch-not-opened", 2, 1)]
#[case::open_branch("C(C(C)", "branch-not-closed", 2, 1)]
#[case::empty_branch("C()C", "empty-branch", 2, 2)]
#[case::dot_only_branch("C(.)C", "empty-branch", 2, 3)]
#[case::leading_branch("(C)C", "branch-without-atom", 1, 1)]
#[case::double_branch("C((C))C", "branch-without-atom", 3, 1)]
#[case::leading_bond("=C", "misplaced-bond", 1, 1)]
#[case::bond_after_dot("C.=C", "misplaced-bond", 3, 1)]
#[case::trailing_bond("CC=", "misplaced-bond", 3, 1)]
#[case::bond_before_dot("C=.C", "misplaced-bond", 2, 1)]
#[case::bond_before_branch("C=(C)C", "misplaced-bond", 2, 1)]
#[case::bond_at_branch_end("C(C=)C", "misplaced-bond", 4, 1)]
#[case::double_bond_symbol("C==C", "unexpected-character", 3, 1)]
#[case::leading_label("1CC1", "ring-label-without-atom", 1, 1)]
#[case::label_in_branch("C(1CC1)C", "ring-label-without-atom", 3, 1)]
#[case::label_after_dot("C.1CC1", "ring-label-without-atom", 3, 1)]
#[case::open_ring("C1CC%12C", "ring-not-closed", 2, 1)]
#[case::first_open_ring("C5CC1", "ring-not-closed", 2, 1)]
#[case::ring_orders("C-1CCCCC=1", "ring-order-conflict", 10, 1)]
#[case::ring_to_self("C11", "self-bond", 3, 1)]
#[case::ring_twice("C12CCCCC12", "duplicate-bond", 10, 1)]
#[case::ring_beside_bond("C1C1", "duplicate-bond", 4, 1)]
#[case::percent("C%", "unexpected-end", 3, 0)]
#[case::percent_one_digit("C%1C", "unexpected-character", 4, 1)]
#[case::parenthesised_label("C%(12)C", "unsupported", 2, 2)]
#[case::arrow("N->C", "unsupported", 2, 2)]
#[case::arrow_back("C<-N", "unsupported", 2, 2)]
#[case::tag_number("[C@TH3](F)(Cl)(Br)I", "bad-stereo-tag", 3, 4)]
#[case::tag_without_number("[C@TH](F)(Cl)(Br)I", "bad-stereo-tag", 3, 3)]
#[case::square_planar_four("N[Pt@SP4](F)(Cl)Br", "bad-stereo-tag", 5, 4)]
#[case::octahedral_31("C[Co@OH31](F)(Cl)(Br)(I)S", "bad-stereo-tag", 5, 5)]
#[case::bipyramidal_zero("S[As@TB0](F)(Cl)(Br)N", "bad-stereo-tag", 5, 4)]
#[case::bipyramidal_21("S[As@TB21](F)(Cl)(Br)N", "bad-stereo-tag", 5, 5)]
#[case::bipyramidal_277("S[As@TB277](F)(Cl)(Br)N", "bad-stereo-tag", 5, 6)]
#[case::five_ligands_square("N[Pt@SP1](F)(Cl)(Br)I", "bad-stereo", 2, 8)]
#[case::six_ligands_bipyramidal("C[Co@TB1](F)(Cl)(Br)(I)S", "bad-stereo", 2, 8)]
#[case::seven_ligands("C[Co@OH1H](F)(Cl)(Br)(I)S", "bad-stereo", 2, 9)]
#[case::seven_ligands_plain("C[Co@H](F)(Cl)(Br)(I)S", "bad-stereo", 2, 6)]
#[case::five_ligands_tetrahedral("S[As@TH1](F)(Cl)(Br)C", "bad-stereo", 2, 8)]
#[case::white_space_first(" CC", "no-structure", 1, 1)]
fn errors_have_a_code_and_a_place(
    #[case] text: &str,
    #[case] code: &str,
    #[case] column: u32,
    #[case] width: u32,
) {
    let error = fault(text);
    let span = error.span();
    assert_eq!(
        (error.code(), span.column, span.width),
        (code, column, width),
        "{error}"
    );
}

#[test]
fn a_misplaced_symbol_is_shown() {
    assert_snapshot!(fault("CC(=O)1CC[C@@X](F)Cl").render(), @r"
    1:14: unexpected 'X' where `@`, `H`, a charge, `:` or `]`, in this order, is expected
    1 | CC(=O)1CC[C@@X](F)Cl
      |              ^
    ");
}

#[test]
fn both_ends_of_a_ring_bond_are_shown() {
    assert_snapshot!(fault("OC-1CCCCC=1 cyclohexanol").render(), @r"
    1:11: the two ends of ring label 1 state different bond orders
    1 | OC-1CCCCC=1 cyclohexanol
      |    -      ^
    ");
}

#[test]
fn an_atom_left_over_is_shown() {
    assert_snapshot!(fault("Cc1ccc(n1)c1cnccc1").render(), @r"
    1:8: no choice of double bonds fits the aromatic atoms; left over: atom 6
    1 | Cc1ccc(n1)c1cnccc1
      |        ^
    ");
}

#[test]
fn an_open_bracket_is_shown_to_its_end() {
    assert_snapshot!(fault("CC[NH3+").render(), @r"
    1:3: the bracket is opened and never closed
    1 | CC[NH3+
      |   ^^^^^
    ");
}

#[test]
fn a_long_text_is_cut_round_the_fault() {
    let long = format!("{}!{}", "C".repeat(90), "N".repeat(90));
    assert_snapshot!(fault(&long).render(), @r"
    1:91: unexpected '!' where an atom, a bond, a ring label, a branch or a dot is expected
    1 | ...CCCCCCCCCCCCCCCCCCCCCCCCCCCCCCCCCCCCCCCC!NNNNNNNNNNNNNNNNNNNNNNNNNNNNNNNNNNNNNNNNNNNNNNNNNNNNNNNNNNN...
      |                                            ^
    ");
}
