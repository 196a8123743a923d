#!/usr/bin/env bash
# SPDX-License-Identifier: GPL-3.0-or-later
# Installs what is missing, builds, and opens FILE (or the sample of storage rooms) in the desk. With no display it does the main
# job without a window instead (measure, sheet, picture) and leaves the results in build/results/.
set -euo pipefail

sample="sample-scenarios/quillmere-storage.rungs.json"
if [ $# -gt 1 ]; then
    echo "usage: bash app/run.sh [FILE]" >&2
    exit 2
fi
if [ $# -eq 1 ]; then
    file=$(realpath -e -- "$1")
fi
cd "$(dirname "${BASH_SOURCE[0]}")/.."
top=$PWD
. app/packages.sh

rungwright_install "${rungwright_build_packages[@]}"
RUNGWRIGHT_TARGET=rungwright rungwright_build desk
program=$top/build/desk/app/rungwright

if [ -n "${DISPLAY:-}${WAYLAND_DISPLAY:-}" ]; then
    exec "$program" "${file:-$top/$sample}"
fi

results=$top/build/results
mkdir -p "$results"
"$program" scan "${file:-$sample}" --out "$results/worklist.csv"
# The tier with the greatest gap share stands first in the worklist: its site and its name, out of their CSV cells.
mapfile -t worst < <(awk '
    BEGIN { RS = "\r\n" }
    NR == 2 {
        cell = 1
        for (i = 1; i <= length($0) && cell <= 2; i++) {
            c = substr($0, i, 1)
            if (c == "\"" && quoted && substr($0, i + 1, 1) == "\"") { text[cell] = text[cell] c; i++ }
            else if (c == "\"") quoted = !quoted
            else if (c == "," && !quoted) cell++
            else text[cell] = text[cell] c
        }
        print text[1]; print text[2]
    }' "$results/worklist.csv")
if [ ${#worst[@]} -ne 2 ]; then
    echo "The worklist is in $results; it holds no tier to write a sheet of."
    exit 0
fi
# A file of the user's may hold no candidate; the sample does.
candidate=current
if [ -z "${file:-}" ]; then
    candidate="Lower the low end"
fi
ladder=(--site "${worst[0]}" --tier "${worst[1]}" --candidate "$candidate")

"$program" measure "${file:-$sample}" | tee "$results/measure.txt"
"$program" measure "${file:-$sample}" --json >"$results/measure.json"
"$program" sheet "${file:-$sample}" "${ladder[@]}" --out "$results/sheet.csv"
"$program" picture "${file:-$sample}" "${ladder[@]}" --out "$results/bench.png"
cat <<END

There is no display, so the main job was done without a window. In $results:
  worklist.csv  every tier, the greatest gap share first
  measure.txt   the figures, for reading; measure.json for scripts
  sheet.csv     the price sheet of ${worst[0]} / ${worst[1]}, candidate "$candidate"
  bench.png     its bench, drawn
END
