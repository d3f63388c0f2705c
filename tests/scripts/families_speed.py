#!/usr/bin/env python3
"""Time and memory of `molkin families` beside a reference library, and their growth with the records.

    families_speed.py MOLKIN FILE.smi [SAMPLE]

The reference library (rdkit) parses each line, writes canonical SMILES and puts it into a dictionary: on the
first SAMPLE lines (default 50,000), scaled to the whole file. The command groups the whole file on two
threads, and its first 10^4, 10^5, 10^6 lines. Times are of processors (user and system), so that other work
on the machine matters less; wall times stand beside them. Needs GNU time (/usr/bin/time), since what a child of
a large process takes by itself cannot be asked for here.
"""

import itertools
import os
import subprocess
import sys
import tempfile
import time


def reference(lines):
    from rdkit import Chem, RDLogger

    RDLogger.DisableLog("rdApp.*")
    start = time.process_time()
    groups = {}
    for at, line in enumerate(lines):
        molecule = Chem.MolFromSmiles(line.split()[0])
        if molecule is not None:
            groups.setdefault(Chem.MolToSmiles(molecule), []).append(at)
    return time.process_time() - start


def command(molkin, file, *options):
    """Processor seconds, wall seconds and peak memory in MB of one run."""
    arguments = [molkin, "families", file, "--output", os.devnull, *options]
    measured = ["/usr/bin/time", "-f", "%U %S %e %M", *arguments]
    words = subprocess.run(measured, stderr=subprocess.PIPE, text=True).stderr
    user, system, wall, memory = map(float, words.splitlines()[-1].split())
    return user + system, wall, memory / 1024


def main(molkin, file, sample="50000"):
    with open(file) as source:
        count = sum(1 for _ in source)
    sizes = [size for size in (10**4, 10**5, 10**6) if size < count] + [count]
    with tempfile.TemporaryDirectory() as folder:
        for size in sizes:
            part = os.path.join(folder, "part.smi")
            with open(file) as source, open(part, "w") as out:
                out.writelines(itertools.islice(source, size))
            busy, wall, memory = command(molkin, part, "--threads", "2")
            print(f"{size} records: {busy:.2f} s of processors, {wall:.2f} s, {memory:.1f} MB,"
                  f" {busy / size * 1e6:.1f} µs and {memory * 2**20 / size:.0f} bytes a record")
    with open(file) as source:
        lines = list(itertools.islice(source, int(sample)))
    scaled = reference(lines) * count / len(lines)
    print(f"reference: {scaled:.0f} s of one processor for {count} records, from {len(lines)}")
    # Two processors share the work of the command, and the reference has one.
    print(f"reference time / (processor time / 2): {scaled / (busy / 2):.1f}; / wall time: {scaled / wall:.1f}")


if __name__ == "__main__":
    main(*sys.argv[1:])
