#!/usr/bin/env python3
# SPDX-License-Identifier: GPL-3.0-or-later
"""Tries the doors with the compiler: a source that has what a floor's target gives it compiles
when it includes the ground floor and itself, and does not when it includes a floor above.

    test_doors.py SOURCE_DIR DOORS FOLDER COMPILER

DOORS has one line a floor: its name, then the include folders its target exports, with `;`.
"""

import glob
import os
import subprocess
import sys
from concurrent.futures import ThreadPoolExecutor

from floors import ENGINE, MAY_USE, place_of


def headers_of(source_dir, floor):
    return sorted(os.path.basename(path)
                  for path in glob.glob(os.path.join(source_dir, place_of(floor), "*.h")))


def compiles(compiler, folder, includes, header):
    """Does a source with this one include compile? Also what the compiler said."""
    source = os.path.join(folder, header.replace("/", "_").replace(".", "_") + ".cpp")
    with open(source, "w", encoding="utf-8") as file:
        file.write(f'#include "{header}"\nint main() {{ return 0; }}\n')
    words = [compiler, "-std=c++20", "-fsyntax-only"]
    words += [word for path in includes for word in ("-I", path)] + [source]
    done = subprocess.run(words, capture_output=True, text=True, check=False)
    return done.returncode == 0, done.stderr


def shortest(source_dir, floor):
    """The header of a floor that is quickest to compile."""
    paths = [os.path.join(source_dir, place_of(floor), h) for h in headers_of(source_dir, floor)]
    paths = [p for p in paths if "#pragma once" in open(p, encoding="utf-8").read()]
    return f"{floor}/{os.path.basename(min(paths, key=os.path.getsize))}" if paths else None


def faults_of_door(job):
    source_dir, folder, compiler, floor, includes, floors = job
    folder = os.path.join(folder, floor)
    os.makedirs(folder, exist_ok=True)
    for own in {shortest(source_dir, f) for f in ("base", floor)} - {None}:
        good, said = compiles(compiler, folder, includes, own)
        if not good:
            yield f"{floor}: a right include, {own}, does not compile:\n{said}"
    for other in floors:
        header = shortest(source_dir, other)
        if header is None or other == floor or other in MAY_USE[floor]:
            continue
        good, said = compiles(compiler, folder, includes, header)
        if good:
            yield f"{floor}: a wrong include, {header}, compiles"
        elif "No such file" not in said:
            yield f"{floor}: {header} fails for another reason than its door:\n{said}"


def main(source_dir, doors, folder, compiler):
    with open(doors, encoding="utf-8") as file:
        lines = [line.split(" ", 1) for line in file.read().splitlines() if line]
    given = {name: [p for p in paths.split(";") if p] for name, paths in lines}
    floors = [floor for floor in ENGINE if floor in given]
    jobs = [(source_dir, folder, compiler, floor, given[floor], floors) for floor in floors]
    with ThreadPoolExecutor(max_workers=2) as pool:
        wrong = [fault for faults in pool.map(lambda j: list(faults_of_door(j)), jobs)
                 for fault in faults]
    # The trial itself must be able to find an open door: one that leads everywhere.
    everywhere = [path for paths in given.values() for path in paths]
    if not list(faults_of_door((source_dir, folder, compiler, "base", everywhere, floors))):
        wrong.append("an open door was not noticed")
    tried = sum(1 for f in floors for o in floors if o != f and o not in MAY_USE[f])
    print("\n".join(wrong) or f"{len(floors)} doors held against {tried} wrong includes")
    return 1 if wrong or len(floors) < 2 else 0


if __name__ == "__main__":
    sys.exit(main(*sys.argv[1:]))
