# SPDX-License-Identifier: GPL-3.0-or-later
# shellcheck shell=bash
# What the set-up commands share. Sourced, not run.

top=$(cd "$(dirname "${BASH_SOURCE[0]}")/.." && pwd)

say() { printf '%s\n' "$*"; }
complain() { printf '%s\n' "$*" >&2; }

# phase NAME COMMAND...: runs the command and prints the phase's name and time.
phase() {
    local name=$1 begin=$SECONDS status=0
    shift
    printf '\n== %s\n' "$name"
    "$@" || status=$?
    if [ "$status" -eq 0 ]; then
        printf -- '-- %s: %d s\n' "$name" $((SECONDS - begin))
    else
        printf -- '-- %s: %d s, failed (status %d)\n' "$name" $((SECONDS - begin)) "$status"
    fi
    return "$status"
}

# packages SECTION...: the packages of these sections of packages.txt.
packages() {
    awk -v wanted=" $* " '
        /^\[/ { section = substr($1, 2, length($1) - 2); next }
        { sub(/#.*/, "") }
        NF && index(wanted, " " section " ") { print $1 }' "$top/packaging/packages.txt"
}

# missing SECTION...: those of them that are not installed.
missing() {
    local wanted installed
    wanted=$(packages "$@" | sort -u)
    # shellcheck disable=SC2086  # one word a package
    installed=$(dpkg-query -W -f '${Package} ${db:Status-Status}\n' $wanted 2>/dev/null |
        awk '$2 == "installed" { print $1 }' | sort -u)
    comm -23 <(printf '%s\n' "$wanted") <(printf '%s\n' "$installed")
}

# install SECTION...: installs what is missing. Ends the command with status 3 if it may not.
install() {
    local lacking as=()
    if ! command -v dpkg-query >/dev/null; then
        say "This is not a Debian system; packaging/packages.txt lists what has to be installed."
        return 0
    fi
    lacking=$(missing "$@" | tr '\n' ' ')
    lacking=${lacking% }
    if [ -z "$lacking" ]; then
        say "everything needed is installed"
        return 0
    fi
    say "installing: $lacking"
    if [ "$(id -u)" -ne 0 ]; then
        if command -v sudo >/dev/null && { sudo -n true 2>/dev/null || [ -t 0 ]; }; then
            as=(sudo)
        else
            complain "Installing needs root or sudo. Have this run, then repeat:"
            complain "    apt-get update && apt-get install --no-install-recommends $lacking"
            return 3
        fi
    fi
    local log
    log=$(mktemp) || return
    # shellcheck disable=SC2086  # one word a package
    if "${as[@]}" apt-get -q -o Acquire::Retries=3 update >"$log" 2>&1 &&
        "${as[@]}" env DEBIAN_FRONTEND=noninteractive apt-get -q -y -o Acquire::Retries=3 \
            -o Dpkg::Use-Pty=0 install --no-install-recommends $lacking >>"$log" 2>&1; then
        rm "$log"
    else
        complain "apt-get failed; its last lines ($log has all):"
        tail -n 15 "$log" >&2
        return 1
    fi
}

# CMake reads presets only from the top folder. The truth is packaging/cmake/presets.json; this
# writes the (ignored) file beside CMakeLists.txt that includes it.
offer_presets() {
    local file=$top/CMakeUserPresets.json
    if [ ! -e "$file" ]; then
        printf '{\n  "version": 4,\n  "include": ["packaging/cmake/presets.json"]\n}\n' >"$file"
    elif ! grep -q 'packaging/cmake/presets.json' "$file"; then
        complain "CMakeUserPresets.json is your own: add \"packaging/cmake/presets.json\" to its"
        complain "\"include\", so that the presets of this project are known."
        return 1
    fi
}

# Warnings are errors where the project's own compiler builds; a newer one may know more warnings.
warnings_as_errors() {
    case $(g++ -dumpversion 2>/dev/null) in
        12 | 12.*) printf 'ON' ;;
        *) printf 'OFF' ;;
    esac
}

# configure PRESET FOLDER ARGUMENT...: remakes the build folder if it was made for another place.
configure() {
    local preset=$1 folder=$2 fresh=()
    shift 2
    if [ -f "$folder/CMakeCache.txt" ] &&
        ! grep -qxF "CMAKE_HOME_DIRECTORY:INTERNAL=$top" "$folder/CMakeCache.txt"; then
        fresh=(--fresh)
    fi
    offer_presets && (cd "$top" && cmake --preset "$preset" "${fresh[@]}" "$@")
}

# The compiler's results are shared between build folders and between copies of the tree.
export CCACHE_BASEDIR=$top
export CCACHE_NOHASHDIR=1
