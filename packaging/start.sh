#!/usr/bin/env bash
# SPDX-License-Identifier: GPL-3.0-or-later
# From an empty machine to the workbench: installs what is missing, builds, opens the demo.
# Without a display, or with --batch, runs the demo's studies and prints the verdicts.
#
#   packaging/start.sh [--batch] [PROJECT.headroom.json]
#
# Ends with 3 if something has to be installed and neither root nor sudo is at hand.
set -uo pipefail
# shellcheck source=packaging/common.sh
. "$(dirname "${BASH_SOURCE[0]}")/common.sh"

demo=$top/studies/dorvane/Dorvane.headroom.json
batch=no
project=
while [ $# -gt 0 ]; do
    case $1 in
        --batch) batch=yes ;;
        -h | --help) sed -n '3,9s/^# \{0,1\}//p' "${BASH_SOURCE[0]}"; exit 0 ;;
        -*) complain "unknown option $1 (see --help)"; exit 2 ;;
        *) project=$(realpath -- "$1") ;;
    esac
    shift
done

build() {
    if [ ! -f "$top/build/build.ninja" ] ||
        ! grep -qxF "CMAKE_HOME_DIRECTORY:INTERNAL=$top" "$top/build/CMakeCache.txt"; then
        configure release "$top/build" -DHEADROOM_TESTS=OFF -DHEADROOM_BENCH=OFF \
            -DHEADROOM_WERROR="$(warnings_as_errors)" || return
    fi
    offer_presets
    cmake --build "$top/build" --target headroom headroom-batch
}

verdicts() {
    "$top/build/bin/headroom-batch" run "${project:-$demo}" --out "$top/build/verdicts" || return
    cat "$top/build/verdicts/summary.txt"
}

phase "install" install build || exit
phase "build" build || exit
if [ "$batch" = yes ] || [ -z "${DISPLAY:-}${WAYLAND_DISPLAY:-}" ]; then
    phase "verdicts of ${project:-the demo}" verdicts
    exit
fi
say ""
say "== opening the workbench"
if [ -n "$project" ]; then
    exec "$top/build/bin/headroom" "$project"
fi
exec "$top/build/bin/headroom"
