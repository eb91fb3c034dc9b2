#!/usr/bin/env bash
# SPDX-License-Identifier: GPL-3.0-or-later
# Installs what is missing, builds with warnings as errors and runs every test; then again with
# the address and undefined-behaviour sanitisers, then the engine with the thread sanitiser.
#
#   packaging/test.sh [--long] [--no-sanitizers] [--jobs N]
#
#   --long           large counts in the random tests
#   --no-sanitizers  only the plain build
#   --jobs N         tests at a time (2)
set -uo pipefail
# shellcheck source=packaging/common.sh
. "$(dirname "${BASH_SOURCE[0]}")/common.sh"

sanitizers=yes
jobs=2
timeouts=()
while [ $# -gt 0 ]; do
    case $1 in
        --long) export HEADROOM_LONG=1; timeouts=(-DHEADROOM_TIMEOUT_FACTOR=30) ;;
        --no-sanitizers) sanitizers=no ;;
        --jobs) jobs=${2:?--jobs needs a number}; shift ;;
        -h | --help) sed -n '3,10s/^# \{0,1\}//p' "${BASH_SOURCE[0]}"; exit 0 ;;
        *) complain "unknown option $1 (see --help)"; exit 2 ;;
    esac
    shift
done

export QT_QPA_PLATFORM=offscreen
unset DISPLAY WAYLAND_DISPLAY
passed=0
failed=0
broken_phases=0

# The sanitisers reserve fixed ranges of addresses; a kernel that scatters programs widely can
# take them. Where it is allowed, programs are started unscattered.
steady=()
if setarch "$(uname -m)" -R true 2>/dev/null; then
    steady=(setarch "$(uname -m)" -R)
fi

# build PRESET FOLDER ARGUMENT...
build() {
    local preset=$1 folder=$2
    shift 2
    mkdir -p "$folder"
    configure "$preset" "$folder" -DHEADROOM_TESTS=ON "${timeouts[@]}" "$@" \
        >"$folder/configure.log" 2>&1 || { cat "$folder/configure.log"; return 1; }
    "${steady[@]}" cmake --build "$folder"
}

# run FOLDER: the tests in random order; adds to the sums. No test at all is a failure. Tests that
# only look at sources run in the plain build alone.
run() {
    local folder=$1 log=$1/closing.log left_out=() status counted
    [ "$folder" = "$top/build" ] || left_out=(--label-exclude '^sources$')
    "${steady[@]}" ctest --test-dir "$folder" --schedule-random --parallel "$jobs" \
        "${left_out[@]}" --output-on-failure --no-tests=error 2>&1 | tee "$log"
    status=${PIPESTATUS[0]}
    counted=$(sed -nE 's/^[0-9]+% tests passed, ([0-9]+) tests? failed out of ([0-9]+).*/\1 \2/p' \
        "$log" | tail -n 1)
    if [ -z "$counted" ]; then
        complain "no test ran"
        return 1
    fi
    failed=$((failed + ${counted% *}))
    passed=$((passed + ${counted#* } - ${counted% *}))
    awk '/^All tests passed \(/ { for (i = 1; i < NF; i++) {
             if ($(i + 1) ~ /^assertion/) { sub(/\(/, "", $i); checks += $i }
             if ($(i + 1) == "test" && $(i + 2) ~ /^case/) cases += $i } }
         END { printf "%d test cases with %d checks in the passed programs\n", cases, checks }' \
        "$folder/Testing/Temporary/LastTest.log"
    return "$status"
}

# probe SANITIZER: can a program built with it run here at all?
probe() {
    local folder
    folder=$(mktemp -d) || return
    printf 'int main() { return 0; }\n' >"$folder/probe.cpp"
    g++ -fsanitize="$1" "$folder/probe.cpp" -o "$folder/probe" &&
        "${steady[@]}" "$folder/probe" 2>"$folder/said"
    local status=$?
    if [ "$status" -ne 0 ]; then
        if [ "$1" != thread ] && ASAN_OPTIONS=detect_leaks=0 "${steady[@]}" "$folder/probe"; then
            say "leaks cannot be looked for here (the tracer is not allowed); the rest can"
            export ASAN_OPTIONS=detect_leaks=0${ASAN_OPTIONS:+:$ASAN_OPTIONS}
            status=0
        else
            complain "a program built with -fsanitize=$1 does not run on this kernel:"
            head -n 5 "$folder/said" >&2
        fi
    fi
    rm -r "$folder"
    return "$status"
}

# pass NAME PRESET FOLDER ARGUMENT...: build, then test; a failed phase does not hide the next.
pass() {
    local name=$1 preset=$2 folder=$top/$3
    shift 3
    { phase "$name: build" build "$preset" "$folder" "$@" &&
        phase "$name: tests" run "$folder"; } || broken_phases=$((broken_phases + 1))
}

begin=$SECONDS
phase "install" install build test || exit
pass "release" release build -DHEADROOM_WERROR=ON -DHEADROOM_BENCH=ON
if [ "$sanitizers" = yes ]; then
    export UBSAN_OPTIONS=print_stacktrace=1${UBSAN_OPTIONS:+:$UBSAN_OPTIONS}
    export LSAN_OPTIONS=suppressions=$top/packaging/leaks.txt:print_suppressions=0
    if phase "address and undefined: probe" probe address,undefined; then
        pass "address and undefined" asan build-asan
    else
        broken_phases=$((broken_phases + 1))
    fi
    if phase "thread: probe" probe thread; then
        pass "thread" tsan build-tsan
    else
        broken_phases=$((broken_phases + 1))
    fi
fi

printf '\n== all phases: %d s' $((SECONDS - begin))
if [ "$broken_phases" -gt 0 ]; then
    printf ', %d of them failed' "$broken_phases"
fi
if [ "$failed" -eq 0 ] && [ "$broken_phases" -gt 0 ]; then
    failed=1 # a build that failed counts as one, so that the closing line tells the truth
fi
printf '\n%d passed, %d failed\n' "$passed" "$failed"
[ "$failed" -eq 0 ] && [ "$broken_phases" -eq 0 ] && [ "$passed" -gt 0 ]
