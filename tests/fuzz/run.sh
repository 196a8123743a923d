#!/usr/bin/env bash
# SPDX-License-Identifier: GPL-3.0-or-later
# Runs every fuzzer of the build directory $1 for $2 seconds, from the corpus in the tree, and prints how many inputs each tried. What they
# discover on the way stays in the build directory; the corpus is only read. Stops at the first finding, which lies there too.
set -euo pipefail
build=$(realpath -e -- "${1:?usage: run.sh BUILD_DIRECTORY SECONDS}")
seconds=${2:?usage: run.sh BUILD_DIRECTORY SECONDS}
here=$(cd "$(dirname "${BASH_SOURCE[0]}")" && pwd -P)
for target in unit_list mapping scenario; do
    found=$build/found/$target
    mkdir -p "$found"
    log=$build/found/$target.log
    "$build/tests/fuzz/fuzz_$target" -max_total_time="$seconds" -max_len=8192 -timeout=10 -print_final_stats=1 -dict="$here/$target.dict" \
        -artifact_prefix="$found/" "$found" "$here/corpus/$target" >"$log" 2>&1 || {
        tail -n 60 "$log"
        echo "fuzz_$target found something; the input is named above" >&2
        exit 1
    }
    printf 'fuzz_%s: %s executions in %s s, no finding\n' "$target" "$(sed -n 's/^stat::number_of_executed_units: *//p' "$log")" "$seconds"
done
