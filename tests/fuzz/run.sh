#!/usr/bin/env bash
# Runs every fuzz target for some seconds (20 if not said), or only those named after the seconds.
#   tests/fuzz/run.sh [SECONDS [TARGET…]]
# Coverage comes from flags of the stable compiler; the sanitizers, which need another one, are left
# out: there is no unsafe code to watch. Corpus and findings: tests/fuzz/corpus, tests/fuzz/artifacts.
set -euo pipefail
cd "$(dirname "$0")"

seconds=${1:-20}
shift || true
targets=("$@")
[ ${#targets[@]} -gt 0 ] || targets=(smiles round_trip molfile sdf table)
# The most bytes of an input, by target.
declare -A longest=([smiles]=400 [round_trip]=200 [molfile]=4000 [sdf]=8000 [table]=1000)

command -v g++ >/dev/null || command -v clang++ >/dev/null || {
    echo "fuzz targets skipped: libFuzzer is built from source, and there is no C++ compiler"
    exit 0
}
host=$(rustc -vV | sed -n 's/^host: //p')
case $host in
    x86_64-*-linux-gnu | aarch64-*-linux-gnu) ;;
    *) echo "fuzz targets skipped: not tried on $host"; exit 0 ;;
esac

# A build that never was has to fetch the libFuzzer crate.
cargo fetch --quiet || { echo "fuzz targets skipped: the crates they need cannot be fetched"; exit 0; }

coverage="-C passes=sancov-module -C codegen-units=1 --cfg fuzzing"
for option in level=4 inline-8bit-counters pc-table trace-compares; do
    coverage+=" -C llvm-args=-sanitizer-coverage-$option"
done
# With --target the flags leave build scripts and macros alone.
RUSTFLAGS=$coverage cargo build --quiet --release --target "$host"
built=${CARGO_TARGET_DIR:-target}/$host/release

# Seeds: records and the starts of files among the fixtures, and findings of earlier runs.
seeds() {
    local target=$1 corpus=corpus/$1 name file
    mkdir -p "$corpus" "artifacts/$target"
    case $target in
        smiles | round_trip)
            fixtures '*.tsv' '*.smi' | xargs -0 cat | tr -s '\t ' '\n' | awk 'length <= 200' | sort -u |
                split -l 1 -a 4 - "$corpus/seed-"
            ;;
        molfile)
            fixtures '*.mol' '*.sdf' | xargs -0 cat | awk -v start="$corpus/seed-" '
                $0 == "$$$$" { if (file) close(file); file = ""; next }
                { if (!file) file = start (++count); print > file }'
            ;;
        sdf | table)
            name=('*.sdf' '*.mol')
            [ "$target" = sdf ] || name=('*.csv' '*.tsv')
            fixtures "${name[@]}" | while IFS= read -r -d '' file; do
                head -c "${longest[$target]}" "$file" >"$corpus/seed-$(basename "$file")"
            done
            ;;
    esac
    [ ! -d "../../fixtures/fuzz/$target" ] || cp "../../fixtures/fuzz/$target"/* "$corpus/"
}

fixtures() {
    local names=(-name "$1")
    shift
    for name in "$@"; do names+=(-o -name "$name"); done
    find ../../fixtures -type f \( "${names[@]}" \) -print0 | sort -z
}

status=0
for target in "${targets[@]}"; do
    seeds "$target"
    log=artifacts/$target.log
    if "$built/$target" -max_total_time="$seconds" -max_len="${longest[$target]}" -timeout=10 \
        -rss_limit_mb=1024 -print_final_stats=1 -artifact_prefix="artifacts/$target/" \
        "corpus/$target" 2>"$log"; then
        echo "$target: $(sed -n 's/^stat::number_of_executed_units: *//p' "$log") inputs, no finding"
    else
        echo "$target: a finding"
        grep -a -A3 -E 'panicked at|ERROR: libFuzzer|Test unit written' "$log" || true
        status=1
    fi
done
exit $status
