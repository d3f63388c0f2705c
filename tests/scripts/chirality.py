"""Which records of the open collections are chiral, by the reference library.

    python3 tests/scripts/chirality.py ../shared/data/collections fixtures/chirality

A record is chiral where the canonical isomeric SMILES of the molecule differs from that of its mirror
image, which has every tetrahedral mark and every mark of a hindered axis inverted. The library is
rdkit 2026.09.1 with its new perception of stereo.

Writes one file for each collection: a line of tab-separated numbers of records that the library
does not read, then a bit for each record, as hexadecimal digits, the first record in the highest bit.
"""

import csv
import gzip
import sys
from pathlib import Path

from rdkit import Chem, RDLogger

COLLECTIONS = [
    "drugs.csv",
    "vendor.smi",
    "actives.smi.gz",
    "chiral.smi.gz",
]
DIGITS_PER_LINE = 96

TETRAHEDRAL = {
    Chem.ChiralType.CHI_TETRAHEDRAL_CW: Chem.ChiralType.CHI_TETRAHEDRAL_CCW,
    Chem.ChiralType.CHI_TETRAHEDRAL_CCW: Chem.ChiralType.CHI_TETRAHEDRAL_CW,
}
AXIS = {
    Chem.BondStereo.STEREOATROPCW: Chem.BondStereo.STEREOATROPCCW,
    Chem.BondStereo.STEREOATROPCCW: Chem.BondStereo.STEREOATROPCW,
}


def texts(path):
    opener = gzip.open if path.suffix == ".gz" else open
    with opener(path, "rt", encoding="utf-8") as lines:
        if path.suffix == ".csv":
            return [row[0] for row in list(csv.reader(lines))[1:]]
        return [line.split()[0] if line.split() else "" for line in lines]


def mirror(molecule):
    image = Chem.Mol(molecule)
    for atom in image.GetAtoms():
        atom.SetChiralTag(TETRAHEDRAL.get(atom.GetChiralTag(), atom.GetChiralTag()))
    for bond in image.GetBonds():
        if bond.GetStereo() in AXIS:
            bond.SetStereo(AXIS[bond.GetStereo()])
    return image


def is_chiral(text):
    """None where the library does not read the record."""
    molecule = Chem.MolFromSmiles(text)
    if molecule is None:
        return None
    marked = any(atom.GetChiralTag() in TETRAHEDRAL for atom in molecule.GetAtoms())
    if not marked and not any(bond.GetStereo() in AXIS for bond in molecule.GetBonds()):
        return False
    return Chem.MolToSmiles(molecule) != Chem.MolToSmiles(mirror(molecule))


def main(source, target):
    RDLogger.DisableLog("rdApp.*")
    Chem.SetUseLegacyStereoPerception(False)
    for name in COLLECTIONS:
        answers = [is_chiral(text) for text in texts(Path(source, name))]
        unread = [str(at) for at, answer in enumerate(answers, 1) if answer is None]
        bits = "".join("1" if answer else "0" for answer in answers)
        bits += "0" * (-len(bits) % 4)
        digits = "".join(f"{int(bits[at : at + 4], 2):x}" for at in range(0, len(bits), 4))
        lines = [digits[at : at + DIGITS_PER_LINE] for at in range(0, len(digits), DIGITS_PER_LINE)]
        stem = name.split(".")[0]
        body = "\n".join(["\t".join(unread), *lines])
        Path(target, f"{stem}.txt").write_text(body + "\n", encoding="ascii")
        print(name, len(answers), "records,", sum(map(bool, answers)), "chiral,", len(unread), "unread")


main(*sys.argv[1:])
