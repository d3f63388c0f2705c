"""Labels of published collections by the reference library: RDKit from the Python package index.

    python3 cip_labels.py COLLECTION FIRST LAST > labels.tsv

reads records FIRST to LAST (from 1) of `../shared/data/collections/COLLECTION`, of which only those
with a stereo mark count, and writes a line for each: record number, and the labels as
`<atom><label>`, sorted, atoms from 1 in input order, both ends of a double bond. `!` stands for a record
that the library gives up.
"""

import gzip
import pathlib
import sys

from rdkit import Chem, RDLogger
from rdkit.Chem import rdCIPLabeler

RDLogger.DisableLog("rdApp.*")
# Steps after which the library gives up a record.
STEPS = 1_250_000


def labels(text):
    options = Chem.SmilesParserParams()
    options.removeHs = False
    molecule = Chem.MolFromSmiles(text, options)
    if molecule is None:
        return "!"
    for place in [*molecule.GetAtoms(), *molecule.GetBonds()]:
        place.ClearProp("_CIPCode")
    try:
        rdCIPLabeler.AssignCIPLabels(molecule, maxRecursiveIterations=STEPS)
    except RuntimeError:
        return "!"
    found = []
    for atom in molecule.GetAtoms():
        if atom.HasProp("_CIPCode"):
            found.append((atom.GetIdx() + 1, atom.GetProp("_CIPCode")))
    for bond in molecule.GetBonds():
        if bond.HasProp("_CIPCode"):
            for end in (bond.GetBeginAtomIdx(), bond.GetEndAtomIdx()):
                found.append((end + 1, bond.GetProp("_CIPCode")))
    return " ".join(f"{atom}{label}" for atom, label in sorted(found))


def main():
    collection, first, last = sys.argv[1], int(sys.argv[2]), int(sys.argv[3])
    here = pathlib.Path(__file__).resolve().parent
    path = here / "../../../shared/data/collections" / collection
    with gzip.open(path, "rt") as lines:
        for number, line in enumerate(lines, start=1):
            if first <= number <= last and any(mark in line for mark in "@/\\"):
                print(number, labels(line.split()[0]), sep="\t", flush=True)


main()
