"""Parents of two open collections, as RDKit sees them: the largest fragment, its charges neutralised.

    python3 tests/scripts/parents.py ../shared/data/collections fixtures/parents/reference.tsv.gz

Needs the Python package rdkit 2026.9.1. Under a header each line of the file holds the collection, the number of the
record from 1, and the SMILES of the parent (MolStandardize, ChargeParent, which takes FragmentParent
first); that is empty where the library reads no structure or finds no parent.
"""

import gzip
import sys
from pathlib import Path

from rdkit import Chem, RDLogger, rdBase
from rdkit.Chem.MolStandardize import rdMolStandardize

VERSION = "2026.09.1"


def parent(molecule):
    if molecule is None:
        return ""
    try:
        return Chem.MolToSmiles(rdMolStandardize.ChargeParent(molecule))
    except (ValueError, RuntimeError):
        return ""


def drugs(folder):
    lines = (folder / "drugs.csv").read_text().splitlines()[1:]
    return [Chem.MolFromSmiles(line) for line in lines]


def hard(folder):
    with gzip.open(folder / "hard.sdf.gz") as file:
        return list(Chem.ForwardSDMolSupplier(file))


def main(folder, output):
    if rdBase.rdkitVersion != VERSION:
        sys.exit(f"RDKit {VERSION} is expected, not {rdBase.rdkitVersion}")
    RDLogger.DisableLog("rdApp.*")
    rows = [
        f"{name}\t{number}\t{parent(molecule)}\n"
        for name, molecules in (("drugs", drugs(folder)), ("hard", hard(folder)))
        for number, molecule in enumerate(molecules, 1)
    ]
    with gzip.GzipFile(output, "wb", mtime=0) as file:
        file.write("".join(["set\trecord\tparent\n", *rows]).encode())
    print(len(rows), "records")


main(Path(sys.argv[1]), sys.argv[2])
