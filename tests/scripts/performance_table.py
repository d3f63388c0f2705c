#!/usr/bin/env python3
"""Prints the table of docs/performance.md, all ratios from one run.

    tests/scripts/performance_table.py [--write PAGE] MOLKIN FILE...

MOLKIN is the built program, FILE a .smi, .smi.gz or .csv with a column `smiles`. With --write the
table takes the place of the one on that page. Needs the Python package rdkit (the reference library:
parse and canonical SMILES, one thread), valgrind for allocations and nauty's labelg; a column that
cannot be measured says so.
"""

import argparse, csv, gzip, os, shutil, subprocess, sys, tempfile, time
from pathlib import Path

ROUNDS = 3
REFERENCE_RECORDS = 5_000
BEGIN, END = "<!-- table: begin -->", "<!-- table: end -->"
ABSENT = "not measured"


def structures(path):
    """The SMILES of a file, and its bytes before compression."""
    opened = gzip.open if path.endswith(".gz") else open
    with opened(path, "rt", encoding="utf-8", newline="") as file:
        text = file.read()
    if ".csv" in path:
        rows = csv.DictReader(text.splitlines())
        column = next(name for name in rows.fieldnames if name.lower() == "smiles")
        return [row[column] for row in rows], len(text)
    return [line.split()[0] for line in text.splitlines() if line.split()], len(text)


def start(command):
    return subprocess.Popen(command, stdout=subprocess.DEVNULL, stderr=subprocess.DEVNULL)


def seconds(command):
    begin = time.perf_counter()
    # Status 2 says that some records could not be read.
    if start(command).wait() not in (0, 2):
        sys.exit(f"{command} failed")
    return time.perf_counter() - begin


def best(command):
    return min(seconds(command) for _ in range(ROUNDS))


def peak_memory(command):
    """Peak memory in MB. What the system counts for a child includes this process before the child
    begins, so the child's own mark is looked at while it runs."""
    process = start(command)
    status = Path(f"/proc/{process.pid}/status")
    peak = None
    while process.poll() is None:
        try:
            lines = [line for line in status.read_text().splitlines() if line.startswith("VmHWM")]
        except OSError:
            lines = []
        if lines:
            peak = int(lines[0].split()[1]) / 1024
        time.sleep(0.005)
    return ABSENT if peak is None else f"{peak:.1f}"


def allocations(molkin, texts, folder):
    """Allocations a record: the difference between 500 and 1,000 of them."""
    if not shutil.which("valgrind") or len(texts) < 1000:
        return ABSENT
    counts = []
    for records in (500, 1000):
        part = Path(folder, "part.smi")
        part.write_text("\n".join(texts[:records]) + "\n")
        command = ["valgrind", molkin, "keys", "--brief", "--threads", "1", str(part)]
        words = subprocess.run(command, capture_output=True, text=True).stderr
        line = next(line for line in words.splitlines() if "total heap usage" in line)
        counts.append(int(line.split("usage:")[1].split()[0].replace(",", "")))
    return f"{(counts[1] - counts[0]) / 500:,.0f}"


def reference_rate(texts):
    """Records/s of the reference library on one thread."""
    try:
        from rdkit import Chem, RDLogger
    except ImportError:
        return None
    RDLogger.DisableLog("rdApp.*")
    step = max(1, len(texts) // REFERENCE_RECORDS)
    sample = texts[::step]

    def once():
        start = time.perf_counter()
        for text in sample:
            molecule = Chem.MolFromSmiles(text)
            if molecule is not None:
                Chem.MolToSmiles(molecule)
        return time.perf_counter() - start

    return len(sample) / min(once() for _ in range(ROUNDS))


def row(molkin, path, folder):
    texts, size = structures(path)
    alone = [molkin, "keys", "--brief", "--threads", "1", path]
    one, all_cores = best(alone), best([molkin, "keys", "--brief", path])
    reference = reference_rate(texts)
    rate = len(texts) / one
    cells = [
        f"`{Path(path).name}`",
        f"{len(texts):,}",
        f"{rate:,.0f}",
        f"{len(texts) / all_cores:,.0f}",
        f"{one / all_cores:.2f}",
        f"{size / one / 1e6:.1f}",
        allocations(molkin, texts, folder),
        peak_memory(alone),
        ABSENT if reference is None else f"{rate / reference:.1f}",
    ]
    return "| " + " | ".join(cells) + " |"


def graph6(atoms, bonds):
    """A graph of at most 62 vertices in the format of nauty."""
    joined = {(min(a, b), max(a, b)) for a, b in bonds}
    bits = [int((a, b) in joined) for b in range(1, atoms) for a in range(b)]
    bits += [0] * (-len(bits) % 6)
    words = [bits[at : at + 6] for at in range(0, len(bits), 6)]
    return chr(atoms + 63) + "".join(chr(63 + int("".join(map(str, word)), 2)) for word in words)


def bare_graphs(molkin, path, folder):
    """The same graphs without elements and bond orders, from text to canonical text by both."""
    labelg = shutil.which("labelg") or shutil.which("nauty-labelg")
    try:
        from rdkit import Chem
    except ImportError:
        labelg = None
    if not labelg:
        return f"Bare graphs against labelg: {ABSENT}."
    chains, graphs = Path(folder, "bare.smi"), Path(folder, "bare.g6")
    texts, _ = structures(path)
    count = 0
    with open(chains, "w") as smiles, open(graphs, "w") as lines:
        for text in texts:
            molecule = Chem.MolFromSmiles(text)
            if molecule is None or not 0 < molecule.GetNumAtoms() <= 62:
                continue
            # As hydrocarbons: an atom with more neighbours than carbon can have is left out.
            if any(atom.GetDegree() > 4 for atom in molecule.GetAtoms()):
                continue
            bonds = [(b.GetBeginAtomIdx(), b.GetEndAtomIdx()) for b in molecule.GetBonds()]
            bare = Chem.RWMol()
            for _ in range(molecule.GetNumAtoms()):
                bare.AddAtom(Chem.Atom(6))
            for a, b in bonds:
                bare.AddBond(a, b, Chem.BondType.SINGLE)
            smiles.write(Chem.MolToSmiles(bare, canonical=False) + "\n")
            lines.write(graph6(molecule.GetNumAtoms(), bonds) + "\n")
            count += 1
    own = best([molkin, "keys", "--brief", "--threads", "1", str(chains)])
    other = best([labelg, "-q", str(graphs), "/dev/null"])
    return (
        f"Bare graphs of `{Path(path).name}` ({count:,}, elements and bond orders left out), text to canonical\n"
        f"text on one core: molkin keys, as saturated hydrocarbons, {count / own:,.0f} graphs/s; labelg of nauty,\n"
        f"as graph6, {count / other:,.0f} graphs/s."
    )


def main():
    parser = argparse.ArgumentParser(description=__doc__.split("\n")[0])
    parser.add_argument("--write", metavar="PAGE", type=Path)
    parser.add_argument("molkin")
    parser.add_argument("files", nargs="+", metavar="FILE")
    options = parser.parse_args()
    with tempfile.TemporaryDirectory() as folder:
        lines = [
            f"`molkin keys`, best of {ROUNDS} runs, {os.cpu_count()} cores; the reference library parses and writes",
            "canonical SMILES on one thread.",
            "",
            "| file | records | records/s, one core | records/s, all cores | gain | MB/s, one core | allocations a record | peak MB, one core | times the reference, one core |",
            "|---|---|---|---|---|---|---|---|---|",
        ]
        lines += [row(options.molkin, path, folder) for path in options.files]
        lines += ["", bare_graphs(options.molkin, options.files[0], folder)]
    table = "\n".join(lines) + "\n"
    print(table, end="")
    if options.write:
        page = options.write.read_text()
        before, rest = page.split(BEGIN)
        _, after = rest.split(END)
        options.write.write_text(f"{before}{BEGIN}\n{table}{END}{after}")


if __name__ == "__main__":
    main()
