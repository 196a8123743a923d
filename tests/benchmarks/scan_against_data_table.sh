#!/usr/bin/env bash
# SPDX-License-Identifier: GPL-3.0-or-later
# The worklist of an invented list of 1,000,000 units in 20,000 tiers by `rungwright scan` and by R's data.table, both with two threads,
# taking turns on a file that is in memory. First the two must agree in every tier; then medians of five are printed as lines of JSON, and
# what scan costs a unit at 10,000, 100,000 and 1,000,000 units (scan_speed). Ends with status 1 when scan needs more than half of R's time or more
# than a third of R's memory. R's time is its stricter one: without the start of R and of the package, while scan's has its own start.
# usage: bash tests/benchmarks/scan_against_data_table.sh [ROUNDS]      (builds the preset "swift" first, or takes the build in the folder
#                                                                       that RUNGWRIGHT_BUILD names)
set -euo pipefail
rounds=${1:-5}
cd "$(dirname "${BASH_SOURCE[0]}")/../.."
top=$PWD
here=$top/tests/benchmarks
. app/packages.sh
rungwright_install "${rungwright_build_packages[@]}" r-base-core r-cran-data.table time
build=${RUNGWRIGHT_BUILD:-$top/build/swift}
if [ -z "${RUNGWRIGHT_BUILD:-}" ]; then
    RUNGWRIGHT_TARGET=rungwright rungwright_build swift >/dev/null
    RUNGWRIGHT_TARGET=scan_speed rungwright_build swift >/dev/null
fi
work=$(mktemp -d)
trap 'rm -rf "$work"' EXIT
cd "$work"

"$build/tests/benchmarks/scan_speed" write list.csv 1000000
cat list.csv >/dev/null

# timed FILE OUT COMMAND...: appends "wall user sys KB" to FILE; what the command writes goes to OUT.
timed() {
    local into=$1 out=$2 began ended
    shift 2
    began=$EPOCHREALTIME
    /usr/bin/time -o spent -f '%U %S %M' "$@" >"$out"
    ended=$EPOCHREALTIME
    echo "$((${ended/[.,]/} - ${began/[.,]/})) $(cat spent)" >>"$into"
}
for ((round = 0; round < rounds; ++round)); do
    timed scan.times scan.csv "$build/app/rungwright" scan list.csv --threads 2
    timed r.times inner Rscript "$here/scan_against_data_table.R" list.csv r.csv
    cat inner >>r.inner
done
Rscript "$here/scan_compared.R" scan.csv r.csv 20000
"$build/tests/benchmarks/scan_speed"
Rscript "$here/scan_summary.R"
