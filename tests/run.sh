#!/usr/bin/env bash
# SPDX-License-Identifier: GPL-3.0-or-later
# Installs what is missing, builds, and runs every test; arguments go to ctest ("bash tests/run.sh -R headless").
set -euo pipefail
cd "$(dirname "${BASH_SOURCE[0]}")/.."
. app/packages.sh

rungwright_install "${rungwright_build_packages[@]}" "${rungwright_test_packages[@]}"
rungwright_build desk
# With R installed above, a comparison with R that does not run is a failure, not a skip.
export RUNGWRIGHT_REQUIRE_R=1
exec ctest --preset desk -j2 --no-tests=error --no-label-summary "$@"
