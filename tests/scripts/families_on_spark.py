#!/usr/bin/env python3
"""Groups the records of several files on a Spark cluster by the columns of `molkin keys`, and compares the
groups with those of `molkin families`.

    families_on_spark.py MOLKIN FILE...

Needs a Java runtime and PySpark (`pip install pyspark`). It starts a cluster of its own on this machine, with
two workers; docs/scaling.md says what changes on a real one. Each FILE is keyed by a process of its own, as it
would be on many machines. Ends with status 0 if duplicates, stereo families, forms of one parent and isomers
are the same, 1 if they differ, 3 if there is no Java or no PySpark.
"""

import csv
import os
import subprocess
import sys
import tempfile
from collections import defaultdict
from shutil import which

# A group is there when it holds at least two things that differ in the second column.
GROUPS = {
    "duplicates": ("compound_key", None),
    "stereo": ("labelled_constitution_key", "compound_key"),
    "forms": ("parent_key", "labelled_constitution_key"),
    "isomers": ("isomer_key", "labelled_constitution_key"),
}


def on_spark(folder):
    """The groups of each sort, as sets of records."""
    from pyspark.sql import SparkSession, functions as f

    session = (
        SparkSession.builder.master("local-cluster[2,1,512]")
        .config("spark.executor.memory", "512m")
        .config("spark.driver.memory", "512m")
        .config("spark.driver.host", "127.0.0.1")
        .config("spark.driver.bindAddress", "127.0.0.1")
        .config("spark.sql.shuffle.partitions", "2")
        .config("spark.ui.enabled", "false")
        .config("spark.ui.showConsoleProgress", "false")
        .getOrCreate()
    )
    session.sparkContext.setLogLevel("ERROR")
    keys = session.read.parquet(folder).where(f.col("status") == "ok")
    groups = {}
    for name, (key, differing) in GROUPS.items():
        # Open records may be different compounds though their keys are equal.
        table = keys.where(~f.col("open")) if name == "duplicates" else keys
        size = f.count(f.lit(1)) if differing is None else f.count_distinct(differing)
        rows = (
            table.where(f.col(key).isNotNull())
            .groupBy(key)
            .agg(f.collect_list(f.struct("source", "record")).alias("members"), size.alias("size"))
            .where(f.col("size") > 1)
            .select("members")
            .collect()
        )
        groups[name] = {frozenset((m.source, m.record) for m in row.members) for row in rows}
    workers = session.sparkContext._jsc.sc().getExecutorMemoryStatus().size() - 1
    session.stop()
    return groups, workers


def of_command(command, files):
    """The same, from the rows of `molkin families`."""
    arguments = [command, "families", *files, "--overlook", "salt,charge"]
    table = subprocess.run(arguments, stdout=subprocess.PIPE, stderr=subprocess.DEVNULL, text=True).stdout
    groups = {name: defaultdict(set) for name in GROUPS}
    for row in csv.DictReader(table.splitlines(keepends=True)):
        for name in GROUPS:
            if row[name]:
                groups[name][row[name]].add((row["source"], int(row["record"])))
    return {name: set(map(frozenset, numbered.values())) for name, numbered in groups.items()}


def main(command, *files):
    command = os.path.abspath(command)
    try:
        import pyspark  # noqa: F401
    except ImportError:
        print("skipped: PySpark is not installed")
        return 3
    if not which("java") and not os.environ.get("JAVA_HOME"):
        print("skipped: there is no Java")
        return 3
    with tempfile.TemporaryDirectory() as folder:
        for number, file in enumerate(files):
            output = os.path.join(folder, f"{number}.parquet")
            arguments = [command, "keys", file, "--format", "parquet", "--output", output]
            # Status 2 says that some records cannot be read, which both sides leave out.
            if subprocess.run(arguments, stderr=subprocess.DEVNULL).returncode not in (0, 2):
                print(f"{file}: no keys")
                return 1
        found, workers = on_spark(folder)
    expected = of_command(command, files)
    differ = False
    for name in GROUPS:
        same = found[name] == expected[name]
        differ |= not same
        verdict = "the same" if same else f"DIFFERENT, {len(expected[name])} by the command"
        print(f"{name}: {len(found[name])} groups on {workers} workers, {verdict}")
        for group in sorted(map(sorted, found[name] ^ expected[name]))[:3]:
            print("  ", group)
    return 1 if differ else 0


if __name__ == "__main__":
    sys.exit(main(*sys.argv[1:]))
