#!/usr/bin/env python3
"""Time to order plain graphs beside nauty's labelg: a table by family, both from the same run.

    python3 tests/scripts/beside_nauty.py BENCH SHARED [SMILES]

BENCH is the bench of plain graphs that `cargo bench -p molkin-tests --bench graphs --no-run` names,
SHARED the folder of graph files (../shared/data/graphs), SMILES a file of one SMILES a line whose
first 50,000 bare graphs are taken. Needs Debian's package nauty (nauty-labelg, nauty-copyg).

The columns are microseconds a graph of processor time. Reading is left out on both sides: labelg's
time is what it takes above nauty-copyg on the same file, the lesser of its dense and sparse modes.
"""

import gzip
import os
import resource
import subprocess
import sys
import tempfile
from pathlib import Path

SLOW = 20  # processor seconds after which labelg is stopped


def encode(vertices, edges):
    """One line of sparse6, or of graph6 for small graphs."""
    head = [vertices] if vertices < 63 else [63] + [vertices >> shift & 63 for shift in (12, 6, 0)]
    if vertices >= 1 << 18:
        head = [63, 63] + [vertices >> shift & 63 for shift in (30, 24, 18, 12, 6, 0)]
    pairs = {(min(a, b), max(a, b)) for a, b in edges}
    if vertices < 100:
        bits = [(a, b) in pairs for b in range(1, vertices) for a in range(b)]
        bits += [False] * (-len(bits) % 6)
        return text(head) + text(sixes(bits))
    width = max(1, (vertices - 1).bit_length())
    bits, current = [], 0
    for low, high in sorted(pairs, key=lambda pair: (pair[1], pair[0])):
        step = high - current
        if step > 1:
            bits += [True] + binary(high, width)
            step = 0
        current = high
        bits += [step == 1] + binary(low, width)
    bits += [True] * (-len(bits) % 6)
    return ":" + text(head) + text(sixes(bits))


def binary(number, width):
    return [bool(number >> at & 1) for at in reversed(range(width))]


def sixes(bits):
    return [sum(bit << 5 - at for at, bit in enumerate(bits[i : i + 6])) for i in range(0, len(bits), 6)]


def text(values):
    return "".join(chr(value + 63) for value in values)


def skeleton(smiles):
    """The bare graph of a plain SMILES."""
    vertices, edges, before, branches, open_rings, at = 0, [], None, [], {}, 0
    while at < len(smiles):
        letter = smiles[at]
        if letter == "(":
            branches.append(before)
        elif letter == ")":
            before = branches.pop()
        elif letter == ".":
            before = None
        elif letter.isdigit() or letter == "%":
            ring = smiles[at + 1 : at + 3] if letter == "%" else letter
            at += 2 if letter == "%" else 0
            if ring in open_rings:
                edges.append((open_rings.pop(ring), before))
            else:
                open_rings[ring] = before
        elif letter not in "-=#:/\\$":
            if letter == "[":
                at = smiles.index("]", at)
            elif smiles[at : at + 2] in ("Cl", "Br"):
                at += 1
            if before is not None:
                edges.append((before, vertices))
            before = vertices
            vertices += 1
        at += 1
    return vertices, edges


def chain(size):
    return size, [(at, at + 1) for at in range(size - 1)]


def ring(size):
    return size, chain(size)[1] + [(size - 1, 0)]


def ladder(size):
    half = size // 2
    rails = [(at + side, at + side + 1) for at in range(half - 1) for side in (0, half)]
    return size, rails + [(at, at + half) for at in range(half)]


def dendrimer(generations):
    """A core with three branches, each atom outwards with two."""
    edges, layer, vertices = [], [0], 1
    for generation in range(generations):
        outer = []
        for vertex in layer:
            for _ in range(2 if generation else 3):
                edges.append((vertex, vertices))
                outer.append(vertices)
                vertices += 1
        layer = outer
    return vertices, edges


def bipartite(few, many):
    return few + many, [(a, few + b) for a in range(few) for b in range(many)]


def families(shared, smiles):
    """Names with lines of graphs."""
    if smiles:
        with open(smiles, encoding="ascii") as file:
            words = [line.split()[0] for line in file if line.strip() and not line.startswith("SMILES")]
        yield "drug-like records, bare", [encode(*skeleton(word)) for word in words[:50_000]]
    for name, pattern in [
        ("fullerenes C20 to C84, every tenth", "fullerenes/*.g6.gz"),
        ("cubic", "regular/cubic_*.g6"),
        ("quartic", "regular/quartic_*.g6"),
        ("strongly regular", "srg/*.g6"),
        ("Cai-Fürer-Immerman 200 to 500", "cfi/cfi-*.g6"),
        ("latin squares", "cfi/latin_*.g6"),
        ("Steiner triples, 57 to 301", "cfi/sts_[1-4][1379]_*.g6"),
    ]:
        lines = []
        for path in sorted(Path(shared).glob(pattern)):
            opener = gzip.open if path.suffix == ".gz" else open
            with opener(path, "rt", encoding="ascii") as file:
                lines += file.read().split()
        yield name, lines[::10] if len(lines) > 10_000 else lines
    for name, make, sizes in [
        ("chain", chain, (100, 1_000, 10_000, 100_000)),
        ("ring", ring, (100, 1_000, 10_000, 100_000)),
        ("ladder", ladder, (100, 1_000, 10_000, 100_000)),
        ("dendrimer", dendrimer, (5, 7, 9)),
    ]:
        for size in sizes:
            vertices, edges = make(size)
            yield f"{name} {vertices:,}", [encode(vertices, edges)]
    yield "K(4,245)", [encode(*bipartite(4, 245))]


def bounded():
    resource.setrlimit(resource.RLIMIT_CPU, (SLOW, SLOW))


def processor_seconds(command):
    """Processor time of a command, the least of three, or nothing if it is slow."""
    best = None
    for _ in range(3):
        before = resource.getrusage(resource.RUSAGE_CHILDREN)
        try:
            subprocess.run(command, check=True, stderr=subprocess.DEVNULL, preexec_fn=bounded)
        except subprocess.CalledProcessError:
            return None
        after = resource.getrusage(resource.RUSAGE_CHILDREN)
        spent = after.ru_utime + after.ru_stime - before.ru_utime - before.ru_stime
        best = spent if best is None else min(best, spent)
        if spent > 2:
            break
    return best


def labelg(file, count):
    """labelg's seconds above reading and writing. Short files are repeated until it shows."""
    copy = 1
    while True:
        with tempfile.NamedTemporaryFile("w", suffix=".g6") as repeated:
            repeated.write(Path(file).read_text(encoding="ascii") * copy)
            repeated.flush()
            # The dense mode needs memory that grows like the square of the vertices.
            dense = Path(file).read_text(encoding="ascii")[:1] != ":"
            modes = [["-S"]] + ([[]] if dense else [])
            times = [
                processor_seconds(["nauty-labelg", "-q", *mode, repeated.name, os.devnull]) for mode in modes
            ]
            times = [time for time in times if time is not None]
            if not times:
                return None
            best = min(times)
            if best < 0.1 and copy * count < 1_000_000:
                copy *= 8
                continue
            reading = processor_seconds(["nauty-copyg", "-q", repeated.name, os.devnull])
            return max(best - reading, 0) / copy


def main():
    bench, shared, *smiles = sys.argv[1:]
    print("| family | graphs | ordered | steps a graph | µs | nauty µs | ratio |")
    print("|---|---|---|---|---|---|---|")
    for name, lines in families(shared, smiles[0] if smiles else None):
        with tempfile.NamedTemporaryFile("w", suffix=".g6") as file:
            file.write("\n".join(lines) + "\n")
            file.flush()
            line = subprocess.run([bench, file.name], check=True, capture_output=True, text=True).stdout
            _, graphs, ordered, steps, seconds = line.split("\t")
            own = float(seconds) / int(graphs) * 1e6
            other = labelg(file.name, int(graphs))
            beside = f"> {SLOW} s | –" if other is None else "too short for the clock | –" if other == 0 else f"{other / int(graphs) * 1e6:,.1f} | {own / (other / int(graphs) * 1e6):.2f}"
            print(f"| {name} | {graphs} | {ordered} | {int(steps) // int(graphs):,} | {own:,.1f} | {beside} |", flush=True)


if __name__ == "__main__":
    main()
