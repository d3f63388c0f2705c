//! Protonation states and the form that they have in common. Structures are hand-written; which form is
//! the customary one is common practice.

use rstest::rstest;

use crate::forms::tests::overlooked;

#[track_caller]
fn check(state: &str, neutral: &str) {
    let expected = overlooked(neutral, "charge");
    assert_eq!(
        expected,
        crate::forms::tests::key(neutral),
        "{neutral} is not settled"
    );
    assert_eq!(overlooked(state, "charge"), expected, "{state}");
}

#[rstest]
#[case::acetate("CC(=O)[O-]", "CC(=O)O")]
#[case::protonated_acid("CC(=O)[OH2+]", "CC(=O)O")]
#[case::dianion("[O-]C(=O)CC(=O)[O-]", "OC(=O)CC(=O)O")]
#[case::ammonium("C[NH3+]", "CN")]
#[case::pyridinium("[nH+]1ccccc1", "c1ccncc1")]
#[case::zwitterion("[NH3+]CC(=O)[O-]", "NCC(=O)O")]
#[case::taurine("[NH3+]CCS(=O)(=O)[O-]", "NCCS(=O)(=O)O")]
#[case::glycine_cation("[NH3+]CC(=O)O", "NCC(=O)O")]
#[case::glycine_anion("NCC(=O)[O-]", "NCC(=O)O")]
#[case::phosphate("COP(=O)([O-])[O-]", "COP(=O)(O)O")]
#[case::phosphate_once("COP(=O)(O)[O-]", "COP(=O)(O)O")]
#[case::phenolate("[O-]c1ccccc1", "Oc1ccccc1")]
#[case::nitrophenolate("[O-]c1ccc([N+](=O)[O-])cc1", "Oc1ccc([N+](=O)[O-])cc1")]
#[case::phenolate_drawn_on_carbon("O=C1C=CC=C[CH-]1", "Oc1ccccc1")]
#[case::sulfonamide("CS(=O)(=O)[N-]c1ncccn1", "CS(=O)(=O)Nc1ncccn1")]
#[case::saccharin("O=C1[N-]S(=O)(=O)c2ccccc12", "O=C1NS(=O)(=O)c2ccccc12")]
#[case::saccharin_drawn_on_oxygen("[O-]C1=NS(=O)(=O)c2ccccc12", "O=C1NS(=O)(=O)c2ccccc12")]
#[case::barbital("CCC1(CC)C(=O)NC(=O)N=C1[O-]", "CCC1(CC)C(=O)NC(=O)NC1=O")]
#[case::phenytoin(
    "[O-]C1=NC(=O)C(N1)(c1ccccc1)c1ccccc1",
    "O=C1NC(=O)C(N1)(c1ccccc1)c1ccccc1"
)]
#[case::warfarin(
    "CC(=O)CC(c1ccccc1)c1c([O-])c2ccccc2oc1=O",
    "CC(=O)CC(c1ccccc1)c1c(O)c2ccccc2oc1=O"
)]
#[case::arginine("NC(CCCNC(N)=[NH2+])C(=O)O", "NC(CCCNC(N)=N)C(=O)O")]
#[case::aminopyridinium("Nc1cccc[nH+]1", "Nc1ccccn1")]
#[case::aminopyridinium_drawn_on_amino("[NH2+]=C1C=CC=CN1", "Nc1ccccn1")]
#[case::adeninium("Nc1[nH+]cnc2[nH]cnc12", "Nc1ncnc2[nH]cnc12")]
#[case::cytidine_core("CN1C=CC(N)=[NH+]C1=O", "CN1C=CC(N)=NC1=O")]
#[case::tetrazole_and_dihydropyrimidine("C1=CC(C)n2nnnc2[N-]1", "C1=CC(C)n2nnnc2N1")]
#[case::pyrimidinium_lactam("CC1=[N+](C)C(C)=CC(=O)N1", "CC1=NC(=O)C=C(C)N1C")]
#[case::flavone_imine("CC1=CC(=[NH+]C)c2ccccc2O1", "CC1=CC(=NC)c2ccccc2O1")]
#[case::porphine_dication(
    "C1=CC2=CC3=CC=C(N3)C=C3C=CC(=[NH+]3)C=C3C=CC(N3)=CC1=[NH+]2",
    "C1=CC2=CC3=CC=C(N3)C=C3C=CC(=N3)C=C3C=CC(N3)=CC1=N2"
)]
#[case::cyclopentadienide("[CH-]1C=CC=C1", "C1C=CC=C1")]
#[case::allyl_anion("[CH2-]C=C", "CC=C")]
#[case::thiolate("CC[S-]", "CCS")]
#[case::cyanide("[C-]#N", "C#N")]
#[case::azide("[N-]=[N+]=[N-]", "N=[N+]=[N-]")]
#[case::methyl_anion("[CH3-]", "C")]
#[case::hydroxide("[OH-]", "O")]
#[case::protonated_n_oxide("O[N+](C)(C)C", "[O-][N+](C)(C)C")]
#[case::chloride("[Cl-]", "Cl")]
#[case::thiophosphate("COP(=S)(OC)[O-]", "COP(=S)(OC)O")]
fn neutral_where_protons_can_do_it(#[case] state: &str, #[case] neutral: &str) {
    check(state, neutral);
}

#[rstest]
#[case::nitro("C[N+](=O)[O-]")]
#[case::n_oxide("C[N+](C)(C)[O-]")]
#[case::diazo("C=[N+]=[N-]")]
#[case::isonitrile("C[N+]#[C-]")]
#[case::quaternary("C[N+](C)(C)C")]
#[case::choline("C[N+](C)(C)CCO")]
#[case::tetrafluoroborate("F[B-](F)(F)F")]
#[case::hexafluorophosphate("F[P-](F)(F)(F)(F)F")]
#[case::triiodide("I[I-]I")]
#[case::tropylium("[CH+]1C=CC=CC=C1")]
#[case::sodium("[Na+]")]
#[case::sydnone("C[N+]1=NOC([O-])=C1")]
#[case::betaine("C[N+](C)(C)CC(=O)[O-]")]
#[case::sodium_acetate("[Na+].CC(=O)[O-]")]
#[case::sodium_ethoxide("[Na+].CC[O-]")]
#[case::methyl_lithium("[Li+].[CH3-]")]
#[case::disodium_phosphate("[Na+].[Na+].OP(=O)([O-])[O-]")]
#[case::ammonium_fluoroborate("C[NH3+].F[B-](F)(F)F")]
#[case::ylide("C=P(C)(C)C")]
#[case::pyridine_imide("[N-](C(C)=O)[n+]1ccccc1")]
#[case::dequalinium_half("Cc1cc(N)c2ccccc2[n+]1C")]
#[case::pyridinium_enolate("O=C1C=CC(=O)C([O-])=C1[n+]1ccccc1")]
#[case::methylcyclopentadienide("C[C-]1C=CC=C1")]
#[case::hydrazone("CC=NN")]
fn what_no_proton_takes_away_stays(#[case] text: &str) {
    check(text, text);
}

#[rstest]
#[case::carnitine("C[N+](C)(C)CC(O)CC(=O)O", "C[N+](C)(C)CC(O)CC(=O)[O-]")]
#[case::edrophonium("CC[N+](C)(C)c1cccc([O-])c1", "CC[N+](C)(C)c1cccc(O)c1")]
#[case::choline_zwitterion("C[N+](C)(C)CC[O-]", "C[N+](C)(C)CCO")]
#[case::phosphocholine("C[N+](C)(C)CCOP(=O)(O)O", "C[N+](C)(C)CCOP(=O)(O)[O-]")]
#[case::on_the_weaker_acid("[Na+].[O-]c1ccccc1.CC(=O)O", "[Na+].Oc1ccccc1.CC(=O)[O-]")]
#[case::bicarbonate(
    "[Na+].[O-]C(=O)c1ccccc1[O-].[Na+]",
    "[Na+].[O-]C(=O)c1ccccc1[O-].[Na+]"
)]
#[case::fluoroboric("CN.[H+].F[B-](F)(F)F", "C[NH3+].F[B-](F)(F)F")]
#[case::bare_proton("CN.[H+].[Cl-]", "CN.Cl")]
#[case::hydrochloride("C[NH3+].[Cl-]", "CN.Cl")]
#[case::guanidine_before_amine("NCCNC(N)=N.F[B-](F)(F)F", "NCCNC(N)=[NH2+].F[B-](F)(F)F")]
#[case::amide_no_base("CC(N)=O.F[B-](F)(F)F", "CC(N)=O.F[B-](F)(F)F")]
fn fixed_charges_are_balanced(#[case] state: &str, #[case] balanced: &str) {
    check(state, balanced);
}
