#!/usr/bin/env python3
"""Checks `molkin families` on a file in which duplicates were planted.

    cargo run --release -p molkin-tests --example plant_duplicates -- 5 planted.smi truth.tsv FILE...
    molkin families planted.smi > families.csv
    planted_duplicates.py planted.smi truth.tsv families.csv

Every copy has to be in one group with its original: of duplicates, or of possible duplicates where it is open.
Every two records of a group of duplicates have to be a planted pair, or the same by the reference library
(rdkit): its canonical SMILES, or its InChI where that is built in, since the files may hold duplicates of
their own. What neither says is listed. Ends with status 1 where a copy is missed or a group has no reason.
"""

import csv
import sys
from collections import defaultdict

from rdkit import Chem, RDLogger

RDLogger.DisableLog("rdApp.*")


def names(smiles):
    """By what the reference library tells structures apart."""
    molecule = Chem.MolFromSmiles(smiles)
    if molecule is None:
        return smiles, smiles
    return Chem.MolToSmiles(molecule), Chem.MolToInchiKey(molecule)


def main(planted, truth, families):
    smiles = [line.split()[0] if line.split() else "" for line in open(planted)]
    with open(truth) as file:
        rows = list(csv.DictReader(file, delimiter="\t"))
    original = [int(row["original"]) for row in rows]
    copies = [at for at, row in enumerate(rows) if row["copy"] == "1"]
    first = {number: at for at, number in enumerate(original) if rows[at]["copy"] == "0"}
    with open(families, newline="") as file:
        found = list(csv.DictReader(file))
    assert len(found) == len(rows) == len(smiles), "a row for each record"

    missed = []
    for at in copies:
        own, other = found[at], found[first[original[at]]]
        columns = ("duplicates", "possible_duplicates")
        if not any(own[column] and own[column] == other[column] for column in columns):
            missed.append(at)
    groups = defaultdict(set)
    for at, row in enumerate(found):
        if row["duplicates"]:
            groups[row["duplicates"]].add(original[at])
    mixed = [sorted(members) for members in groups.values() if len(members) > 1]
    unexplained, of_their_own = [], 0
    for members in mixed:
        texts = [smiles[first[number]] for number in members]
        (canonical, inchi) = zip(*map(names, texts))
        of_their_own += 1
        if len(set(canonical)) > 1 and len(set(inchi)) > 1:
            unexplained.append(texts)

    print(f"{len(rows)} records, {len(copies)} planted copies, {len(missed)} missed")
    print(f"{len(groups)} groups of duplicates, {of_their_own} with duplicates that the files have of their own,"
          f" {len(unexplained)} of these not the same by the reference library")
    for at in missed[:20]:
        print("missed:", smiles[at], smiles[first[original[at]]], found[at])
    for texts in unexplained[:20]:
        print("no reason:", *texts)
    return 1 if missed or unexplained else 0


if __name__ == "__main__":
    sys.exit(main(*sys.argv[1:]))
