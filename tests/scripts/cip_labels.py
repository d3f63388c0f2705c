"""Labels of published collections by the reference library: RDKit 2026.09.1 from the Python package
index, `rdCIPLabeler`.

    python3 cip_labels.py | gzip -9n > fixtures/labels/digests.tsv.gz

reads the records of `../shared/data/collections` that carry a stereo mark, a fixed part of each
collection, and writes collection, record (from 1) and a digest of its labels. The labels of a record
are written as `<atom><label>`, sorted by atom, with single blanks; atoms from 1 in input order, both
ends of a double bond. With `--labels` they stand in place of the digest. Records that the library gives
up are left out.
"""

import gzip
import pathlib
import sys

from rdkit import Chem, RDLogger
from rdkit.Chem import rdCIPLabeler

RDLogger.DisableLog("rdApp.*")
# Each collection and the last of its records that counts.
COLLECTIONS = [("chiral", 40_000), ("natural_products", 50_000)]
# Steps after which the library gives up a record.
STEPS = 1_250_000


def labels(text):
    options = Chem.SmilesParserParams()
    options.removeHs = False
    molecule = Chem.MolFromSmiles(text, options)
    if molecule is None:
        return None
    for place in [*molecule.GetAtoms(), *molecule.GetBonds()]:
        place.ClearProp("_CIPCode")
    try:
        rdCIPLabeler.AssignCIPLabels(molecule, maxRecursiveIterations=STEPS)
    except RuntimeError:
        return None
    found = []
    for atom in molecule.GetAtoms():
        if atom.HasProp("_CIPCode"):
            found.append((atom.GetIdx() + 1, atom.GetProp("_CIPCode")))
    for bond in molecule.GetBonds():
        if bond.HasProp("_CIPCode"):
            for end in (bond.GetBeginAtomIdx(), bond.GetEndAtomIdx()):
                found.append((end + 1, bond.GetProp("_CIPCode")))
    return " ".join(f"{atom}{label}" for atom, label in sorted(found))


def digest(text):
    """FNV-1a, 32 bits, both halves folded into 16."""
    value = 0x811C9DC5
    for byte in text.encode():
        value = (value ^ byte) * 0x01000193 & 0xFFFFFFFF
    return f"{(value >> 16) ^ (value & 0xFFFF):04x}"


def main():
    shown = (lambda text: text) if "--labels" in sys.argv else digest
    print("collection", "record", "labels" if "--labels" in sys.argv else "digest", sep="\t")
    here = pathlib.Path(__file__).resolve().parent
    for collection, last in COLLECTIONS:
        path = here / "../../../shared/data/collections" / f"{collection}.smi.gz"
        with gzip.open(path, "rt") as lines:
            for number, line in zip(range(1, last + 1), lines):
                if any(mark in line for mark in "@/\\"):
                    found = labels(line.split()[0])
                    if found is not None:
                        print(collection, number, shown(found), sep="\t")


main()
