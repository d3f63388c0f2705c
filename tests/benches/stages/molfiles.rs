//! The inputs as molfiles, without coordinates and marks (CTfile formats, 2020).

use std::fmt::Write as _;

use molkin_graph::Molecule;

pub(crate) fn v2000(molecule: &Molecule) -> String {
    let counts = (molecule.atom_count(), molecule.bonds().len());
    let mut text = format!(
        "\n\n\n{:3}{:3}  0  0  0  0            999 V2000\n",
        counts.0, counts.1
    );
    for atom in molecule.atoms() {
        let symbol = atom.element.symbol();
        writeln!(
            text,
            "    0.0000    0.0000    0.0000 {symbol:<3} 0  0  0  0  0"
        )
        .unwrap();
    }
    for (a, b, order) in molecule.bonds() {
        writeln!(text, "{:3}{:3}{:3}  0", a + 1, b + 1, order as u8).unwrap();
    }
    for (atom, number) in molecule.atoms().zip(1..) {
        if atom.charge != 0 {
            writeln!(text, "M  CHG  1{number:4}{:4}", atom.charge).unwrap();
        }
    }
    text + "M  END\n"
}

pub(crate) fn v3000(molecule: &Molecule) -> String {
    let counts = (molecule.atom_count(), molecule.bonds().len());
    let mut text =
        String::from("\n\n\n  0  0  0     0  0            999 V3000\nM  V30 BEGIN CTAB\n");
    writeln!(
        text,
        "M  V30 COUNTS {} {} 0 0 0\nM  V30 BEGIN ATOM",
        counts.0, counts.1
    )
    .unwrap();
    for (atom, number) in molecule.atoms().zip(1..) {
        let symbol = atom.element.symbol();
        write!(text, "M  V30 {number} {symbol} 0 0 0 0").unwrap();
        if atom.charge != 0 {
            write!(text, " CHG={}", atom.charge).unwrap();
        }
        text.push('\n');
    }
    text.push_str("M  V30 END ATOM\nM  V30 BEGIN BOND\n");
    for ((a, b, order), number) in molecule.bonds().zip(1..) {
        let order = order as u8;
        writeln!(text, "M  V30 {number} {order} {} {}", a + 1, b + 1).unwrap();
    }
    text + "M  V30 END BOND\nM  V30 END CTAB\nM  END\n"
}
