#!/usr/bin/env python3
"""Time and memory of `molkin families` beside a reference library, and their growth with the records.

    families_speed.py MOLKIN FILE.smi [SAMPLE]

The reference library (rdkit) parses each line, writes canonical SMILES and puts it into a dictionary: on the
first SAMPLE lines (default 50,000), scaled to the whole file. The command groups the whole file on two
threads, and its first 10^4, 10^5, 10^6 lines. Times are of processors (user and system), so that other work
on the machine matters less; wall times stand beside them.
"""

import os
import resource
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
    start = time.monotonic()
    process = subprocess.Popen(arguments, stderr=subprocess.DEVNULL)
    _, status, usage = os.wait4(process.pid, 0)
    assert os.waitstatus_to_exitcode(status) in (0, 2)
    return usage.ru_utime + usage.ru_stime, time.monotonic() - start, usage.ru_maxrss / 1024


def main(molkin, file, sample="50000"):
    with open(file) as source:
        lines = source.readlines()
    sample = lines[: int(sample)]
    scaled = reference(sample) * len(lines) / len(sample)
    peak = resource.getrusage(resource.RUSAGE_SELF).ru_maxrss / 1024
    print(f"reference: {scaled:.0f} s of one processor for {len(lines)} records, from {len(sample)} ({peak:.0f} MB)")
    sizes = [size for size in (10**4, 10**5, 10**6) if size < len(lines)] + [len(lines)]
    with tempfile.TemporaryDirectory() as folder:
        for size in sizes:
            part = os.path.join(folder, "part.smi")
            with open(part, "w") as out:
                out.writelines(lines[:size])
            busy, wall, memory = command(molkin, part, "--threads", "2")
            print(f"{size} records: {busy:.2f} s of processors, {wall:.2f} s, {memory:.1f} MB,"
                  f" {busy / size * 1e6:.1f} µs and {memory * 2**20 / size:.0f} bytes a record")
    # Two processors share the work of the command, and the reference has one.
    print(f"reference time / (processor time / 2): {scaled / (busy / 2):.1f}; / wall time: {scaled / wall:.1f}")


if __name__ == "__main__":
    main(*sys.argv[1:])
