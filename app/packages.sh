# shellcheck shell=bash
# SPDX-License-Identifier: GPL-3.0-or-later
# Sourced by app/run.sh, tests/run.sh and .ci/run: the Debian 12 packages they need, and the way to install what is missing.
# shellcheck disable=SC2034 # each script takes the lists it needs

# To build and run the desk and the commands.
rungwright_build_packages=(
    g++ cmake ninja-build
    qt6-base-dev libqt6sql6-sqlite qt6-svg-dev qt6-wayland
    libqcustomplot-dev libeigen3-dev libboost-math-dev libcsv-dev
    fontconfig fonts-dejavu-core
)
# Beside these, to run every test: R and three of its packages for the live comparisons, a virtual display for the GUI.
rungwright_test_packages=(r-base-core r-cran-e1071 r-cran-robustbase r-cran-quadprog poppler-utils xvfb xauth)
# Beside these, for the checks of .ci/run.
rungwright_check_packages=(
    git clang clang-format clang-tidy libclang-rt-14-dev shellcheck desktop-file-utils appstream
)

# Installs the named packages that are not there yet. Does nothing, and needs no rights, when none is missing.
rungwright_install() {
    local missing=() package
    for package in "$@"; do
        if [ "$(dpkg-query -W -f='${db:Status-Status}' "$package" 2>/dev/null)" != installed ]; then
            missing+=("$package")
        fi
    done
    if [ ${#missing[@]} -eq 0 ]; then
        return 0
    fi

    local as_root=()
    if [ "$(id -u)" -ne 0 ]; then
        if ! command -v sudo >/dev/null; then
            echo "Missing packages, and neither root nor sudo to install them. As root: apt-get install ${missing[*]}" >&2
            return 1
        fi
        as_root=(sudo)
    fi
    echo "Installing: ${missing[*]}"
    local quiet=(env DEBIAN_FRONTEND=noninteractive apt-get -qq -o Dpkg::Use-Pty=0)
    "${as_root[@]}" "${quiet[@]}" update </dev/null || return
    "${as_root[@]}" "${quiet[@]}" install -y --no-install-recommends "${missing[@]}" </dev/null || return
}

# Configures the preset $1 (further arguments go to CMake) and builds its target $RUNGWRIGHT_TARGET, or everything.
rungwright_build() {
    local preset=$1
    shift
    if command -v ccache >/dev/null; then
        set -- "$@" -DCMAKE_CXX_COMPILER_LAUNCHER=ccache
    fi
    cmake --preset "$preset" "$@" || return
    cmake --build --preset "$preset" --target "${RUNGWRIGHT_TARGET:-all}" || return
}
