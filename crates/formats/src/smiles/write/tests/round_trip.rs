use rstest::rstest;

use super::canonical;
use crate::smiles::{ReadOptions, Reader, parse};

/// Reads, writes, reads, writes: keys and text stay. Strict reading minds only what the structure
/// itself has.
#[track_caller]
fn assert_stable(text: &str) {
    let (written, keys) = canonical(&parse(text).unwrap());
    assert_eq!(written.lost, [], "{text} as {}", written.text);
    let options = ReadOptions {
        strict: true,
        ..ReadOptions::default()
    };
    if let Err(error) = Reader::new(options).read(&written.text, 1) {
        assert_eq!(error.code(), "unusual-valence", "{error}");
    }
    let (again, keys_again) = canonical(&parse(&written.text).unwrap());
    assert_eq!(again, written, "{text}");
    assert_eq!(keys_again, keys, "{text} as {}", written.text);
}

#[rstest]
#[case::methane("C")]
#[case::hydrogen("[H][H]")]
#[case::deuterium("[2H][2H]")]
#[case::hydrogen_deuteride("[H][2H]")]
#[case::proton("[H+]")]
#[case::electron_pair_donor("[NH4+].[OH-]")]
#[case::diborane("[BH2]1[H][BH2][H]1")]
#[case::sodium_acetate("CC(=O)[O-].[Na+]")]
#[case::hydrochloride("CC[NH3+].[Cl-]")]
#[case::two_of_a_kind("[Na+].[Na+].[O-]C(=O)C(=O)[O-]")]
#[case::isotopes("[13CH3]C([2H])([3H])O")]
#[case::isotope_zero("[0CH3]C")]
#[case::nitro("C[N+](=O)[O-]")]
#[case::azide("CN=[N+]=[N-]")]
#[case::diazo("C=[N+]=[N-]")]
#[case::isocyanide("C[N+]#[C-]")]
#[case::carbon_monoxide("[C-]#[O+]")]
#[case::sulfone("CS(=O)(=O)N")]
#[case::phosphate("COP(=O)(O)[O-]")]
#[case::ylide("C=P(C)(C)C")]
#[case::perchlorate("[O-]Cl(=O)(=O)=O")]
#[case::radical("C[CH2]")]
#[case::carbene("[CH2]")]
#[case::wildcard("*c1ccccc1*")]
#[case::ferrous("[Fe+2].[Cl-].[Cl-]")]
#[case::imidazolium("C[n+]1ccn(C)c1")]
#[case::guanidinium("NC(N)=[NH2+]")]
#[case::naphthalene("c1ccc2ccccc2c1")]
#[case::azulene("c1cccc2cccc2c1")]
#[case::pyrene("c1cc2ccc3cccc4ccc(c1)c2c34")]
#[case::porphine("c1cc2cc3ccc([nH]3)cc3ccc(n3)cc3ccc([nH]3)cc1n2")]
#[case::cubane("C12C3C4C1C5C2C3C45")]
#[case::dodecahedrane("C12C3C4C5C1C6C7C2C8C3C9C4C1C5C6C2C7C8C9C12")]
#[case::adamantane("C1C2CC3CC1CC(C2)C3")]
#[case::buckminsterfullerene(
    "c12c3c4c5c1c1c6c7c2c2c8c3c3c9c4c4c%10c5c5c1c1c6c6c%11c7c2c2c7c8c3c3c8c9c4c4c9c%10c5c5c1c1c6c6\
     c%11c2c2c7c3c3c8c4c4c9c5c1c1c6c2c3c41"
)]
fn constitution(#[case] text: &str) {
    assert_stable(text);
}

#[rstest]
#[case::alanine("C[C@H](N)C(=O)O")]
#[case::deuterated("C[C@]([2H])(O)[H]")]
#[case::tartaric("OC(=O)[C@H](O)[C@@H](O)C(=O)O")]
#[case::meso_tartaric("OC(=O)[C@H](O)[C@H](O)C(=O)O")]
#[case::pseudoasymmetric("C[C@H](O)[C@@H](Cl)[C@@H](C)O")]
#[case::glucose("OC[C@H]1O[C@@H](O)[C@H](O)[C@@H](O)[C@@H]1O")]
#[case::inositol("O[C@H]1[C@H](O)[C@@H](O)[C@H](O)[C@H](O)[C@@H]1O")]
#[case::partly_marked("C[C@H](O)C(F)Cl")]
#[case::cholesterol(
    "C[C@H](CCCC(C)C)[C@H]1CC[C@@H]2[C@@]1(CC[C@H]3[C@H]2CC=C4[C@@]3(CC[C@@H](C4)O)C)C"
)]
#[case::camphor("CC1(C)[C@@H]2CC[C@@]1(C)C(=O)C2")]
#[case::quinuclidine("C=C[C@H]1C[N@@]2CC[C@H]1C[C@@H]2CO")]
#[case::spiro("C[C@H]1CC[C@]2(CC1)OCCO2")]
#[case::sulfoxide("C[S@](=O)CC")]
#[case::sulfonium("C[S@+](CC)CCC")]
#[case::sulfoximine("C[S@](=O)(=N)CC")]
#[case::phosphine_oxide("C[P@](=O)(CC)OC")]
#[case::phosphane("C[P@](CC)OC")]
#[case::thiophosphate("CO[P@](=S)(C)OCC")]
#[case::ammonium("C[N@+](CC)(CCC)CO")]
#[case::allene("C/C=[C@]=CC")]
#[case::allene_substituted("CC(F)=[C@@]=C(C)Cl")]
#[case::pentatetraene("CC=C=[C@]=C=CC")]
#[case::silane("C[Si@H](F)Cl")]
fn tags(#[case] text: &str) {
    assert_stable(text);
}

#[rstest]
#[case::trans("F/C=C/F")]
#[case::cis("F/C=C\\F")]
#[case::deuterium("[2H]/C=C/F")]
#[case::both_hydrogens("[2H]/C([H])=C(/[2H])[H]")]
#[case::oxime("C/C=N/O")]
#[case::azo("C/N=N/C")]
#[case::hydrazone("C/C(F)=N/NC")]
#[case::butatriene("C/C=C=C=C\\C")]
#[case::diene("C/C=C/C=C/F")]
#[case::diene_half("C/C=C/C=CF")]
#[case::triene("C/C=C/C=C\\C=C/F")]
#[case::triene_outer("C/C=C/C=CC=C/F")]
#[case::triene_outer_only("F/C=C([H])/C=CC([H])=C/Cl")]
#[case::unmarked_inside("C/C=C([H])/C=C/C([H])=C/F")]
#[case::unmarked_inside_substituted("C/C=C(F)/C=C/C(Cl)=C/F")]
#[case::four_in_a_row("C/C=C/C=CC=C/C=C\\C")]
#[case::cross_conjugated("C/C=C/C(/C=C/F)=C/C")]
#[case::tetrasubstituted("C/C(F)=C(/Cl)Br")]
#[case::cyclooctene("C1CCC/C=C/CC1")]
#[case::cyclodecadiene("C1C/C=C/CC/C=C\\CC1")]
#[case::marks_at_labels("C/C=C/1CCCC(C)C1")]
#[case::marks_at_labels_both_ends("C1(=C/F)\\CCCC(=C/Cl)\\C1")]
#[case::ring_of_twelve("C1CC/C=C/C=C/C=C\\CCC1")]
#[case::retinal("CC1=C(C(CCC1)(C)C)/C=C/C(C)=C/C=C/C(C)=C/C=O")]
#[case::exocyclic_pair("C/C=C1CC/C(=C\\C)CC/1")]
#[case::bilirubin_like("CC1=C(C)/C(=C/C2=C(C)C(C)=C(N2)C)NC1=O")]
#[case::with_centres("C[C@H](O)/C=C/[C@@H](C)O")]
#[case::centre_by_double_bonds("C/C=C/[C@H](O)/C=C\\C")]
fn slopes(#[case] text: &str) {
    assert_stable(text);
}
