#!/usr/bin/env bash
# SPDX-License-Identifier: GPL-3.0-or-later
# Tries the two commands on a machine that has nothing installed: makes a bare Debian 12 in a
# folder, copies the tree in (what is committed and what is not yet), runs start.sh twice and
# test.sh there. Needs root; the mirror is the one that this machine's apt uses.
#
#   packaging/fresh.sh [--dir FOLDER] [--keep] [--skip-sanitizers] [--base-only] [--mirror URL]
#
#   --dir FOLDER       where (a new folder under /var/tmp); a kept folder is used again as it is
#   --keep             leave the folder for a look; otherwise it is removed at the end
#   --skip-sanitizers  test.sh with --no-sanitizers
#   --base-only        only make the bare system and try whether the packages can be installed
#   --mirror URL       instead of the machine's own
set -uo pipefail
# shellcheck source=packaging/common.sh
. "$(dirname "${BASH_SOURCE[0]}")/common.sh"

release=bookworm
inside=/opt/headroom
mark=etc/made-by-headroom-fresh # only a folder that holds it is ever used again or removed
folder=
keep=no
base_only=no
mirror=
tests=()
while [ $# -gt 0 ]; do
    case $1 in
        --dir) folder=$(realpath -m -- "${2:?--dir needs a folder}"); shift ;;
        --keep) keep=yes ;;
        --skip-sanitizers) tests=(--no-sanitizers) ;;
        --base-only) base_only=yes ;;
        --mirror) mirror=${2:?--mirror needs an address}; shift ;;
        -h | --help) sed -n '3,13s/^# \{0,1\}//p' "${BASH_SOURCE[0]}"; exit 0 ;;
        *) complain "unknown option $1 (see --help)"; exit 2 ;;
    esac
    shift
done
if [ "$(id -u)" -ne 0 ]; then
    complain "fresh.sh makes a system in a folder; that needs root."
    exit 3
fi
if [ -z "$folder" ]; then
    folder=$(mktemp -d /var/tmp/headroom-fresh.XXXXXX) || exit
elif [ -e "$folder" ] && [ ! -f "$folder/$mark" ] && [ -n "$(ls -A "$folder")" ]; then
    complain "$folder holds something else; nothing was touched."
    exit 2
fi

# The archives of Debian that this machine's apt uses, as "address suite component", whatever
# the form of its source lists.
archives() {
    # shellcheck disable=SC2016  # apt fills these in
    apt-get indextargets --format '$(ORIGIN) $(REPO_URI) $(RELEASE) $(COMPONENT)' \
        'Created-By: Packages' 2>/dev/null | awk '$1 == "Debian" { print $2, $3, $4 }' | sort -u
}

# sources: the bare system's source list, from the same addresses.
sources() {
    printf 'deb %s %s main\n' "$mirror" "$release"
    archives | while read -r address suite component; do
        case "$suite $component" in
            "$release main") ;;
            "$release"*" main") printf 'deb %s %s %s\n' "$address" "$suite" "$component" ;;
        esac
    done
}

# find_mirror: the address that serves the release, or any of Debian's main archives.
find_mirror() {
    local list
    [ -n "$mirror" ] && return 0
    list=$(archives)
    mirror=$(awk -v release="$release" '$2 == release && $3 == "main" { print $1; exit }' <<<"$list")
    [ -n "$mirror" ] || mirror=$(awk '$2 !~ /security/ && $3 == "main" { print $1; exit }' <<<"$list")
    [ -n "$mirror" ] || { complain "this machine's apt knows no Debian archive: use --mirror"; return 1; }
}

# bare: the system itself, with this machine's ways to reach and to trust the archives.
bare() {
    local extra=()
    find_mirror || return
    if [ -f "$folder/$mark" ]; then
        say "$folder is there already"
    else
        case $mirror in https:*) extra=(--include=ca-certificates) ;; esac
        debootstrap --variant=minbase "${extra[@]}" "$release" "$folder" "$mirror" \
            >"$folder.log" 2>&1 || { tail -n 15 "$folder.log" >&2; return 1; }
        rm -f "$folder.log"
        touch "$folder/$mark"
    fi
    sources >"$folder/etc/apt/sources.list"
    apt-config dump | grep -E '^Acquire::' | grep -vE '^Acquire::(IndexTargets|Changelogs)' \
        >"$folder/etc/apt/apt.conf.d/90machine"
    cp -a /etc/apt/trusted.gpg.d/. "$folder/etc/apt/trusted.gpg.d/" 2>/dev/null
    if [ -d /usr/local/share/ca-certificates ]; then
        mkdir -p "$folder/usr/local/share/ca-certificates"
        cp -a /usr/local/share/ca-certificates/. "$folder/usr/local/share/ca-certificates/"
    fi
    cp -L /etc/resolv.conf /etc/hosts "$folder/etc/"
    printf '#!/bin/sh\nexit 101\n' >"$folder/usr/sbin/policy-rc.d" # no services start there
    chmod +x "$folder/usr/sbin/policy-rc.d"
}

mounted() { grep -qF " $1 " /proc/self/mounts; }

open_folder() {
    mounted "$folder/proc" || mount -t proc proc "$folder/proc" || return
    mounted "$folder/dev" || mount --rbind /dev "$folder/dev" || return
    mount --make-rslave "$folder/dev"
}

close_folder() {
    local place
    for place in "$folder/dev" "$folder/proc"; do
        if mounted "$place"; then
            umount -R "$place" 2>/dev/null || umount -lR "$place"
        fi
    done
}

leave() {
    local status=$?
    trap - EXIT
    close_folder
    if [ "$keep" = yes ]; then
        say "kept: $folder"
    elif [ ! -f "$folder/$mark" ] && [ -n "$(ls -A "$folder" 2>/dev/null)" ]; then
        complain "$folder was not finished and was left"
    elif mounted "$folder/dev" || mounted "$folder/proc"; then
        complain "$folder is still in use and was left"
    else
        rm -rf --one-file-system "$folder"
    fi
    exit "$status"
}
trap leave EXIT
trap 'exit 130' INT
trap 'exit 143' TERM

# within COMMAND...: there, with nothing of this machine but its way out.
within() {
    local name ways=()
    for name in http_proxy https_proxy no_proxy; do
        [ -n "${!name:-}" ] && ways+=("$name=${!name}")
    done
    chroot "$folder" /usr/bin/env -i HOME=/root LANG=C.UTF-8 TERM="${TERM:-dumb}" \
        PATH=/usr/local/sbin:/usr/local/bin:/usr/sbin:/usr/bin:/sbin:/bin "${ways[@]}" "$@"
}

# copy: the tree as it stands; what was deleted since the last copy goes too, builds stay.
copy() {
    mkdir -p "$folder$inside" &&
        find "$folder$inside" -mindepth 1 -maxdepth 1 ! -name 'build*' -exec rm -rf {} + &&
        (cd "$top" && git -c safe.directory="$top" ls-files -co --exclude-standard -z |
            while IFS= read -r -d '' file; do
                [ -e "$file" ] && printf '%s\0' "$file"
            done | tar -c --null -T - | tar -x --no-same-owner -C "$folder$inside")
}

installable() {
    local wanted
    wanted=$(packages build test | tr '\n' ' ')
    # shellcheck disable=SC2086  # one word a package
    within apt-get -q update && within apt-get -q -s --no-install-recommends install $wanted |
        awk '/^Inst / { n++ } END { printf "%d packages would be installed\n", n; exit n == 0 }'
}

first_start() { within "$inside/packaging/start.sh"; }
second_start() {
    local begin=$SECONDS
    within "$inside/packaging/start.sh" || return
    if [ $((SECONDS - begin)) -gt 60 ]; then
        complain "a repeat should take seconds, this one took $((SECONDS - begin))"
        return 1
    fi
}
all_tests() { within "$inside/packaging/test.sh" "${tests[@]}"; }

phase "fresh: debootstrap here" install fresh || exit
phase "fresh: bare Debian" bare || exit
phase "fresh: mounts" open_folder || exit
phase "fresh: copy of the tree" copy || exit
if [ "$base_only" = yes ]; then
    phase "fresh: can the packages be installed" installable
    exit
fi
phase "fresh: start.sh" first_start || exit
phase "fresh: start.sh again" second_start || exit
phase "fresh: test.sh" all_tests || exit
say ""
say "fresh: both commands pass on a bare Debian 12"
