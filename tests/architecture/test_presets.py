#!/usr/bin/env python3
# SPDX-License-Identifier: GPL-3.0-or-later
"""The file of presets is read by CMake and offers what the documents name; the file that the
set-up commands write in the top folder reaches it.

    test_presets.py SOURCE_DIR FOLDER CMAKE
"""

import os
import shutil
import subprocess
import sys

WANTED = {"release", "debug", "asan", "tsan"}


def offered(source_dir, folder, cmake):
    """The presets that CMake lists in a copy of the top folder made by the set-up commands."""
    shutil.rmtree(folder, ignore_errors=True)
    shutil.copytree(os.path.join(source_dir, "packaging"), os.path.join(folder, "packaging"))
    with open(os.path.join(folder, "CMakeLists.txt"), "w", encoding="utf-8") as file:
        file.write("cmake_minimum_required(VERSION 3.25)\nproject(copy NONE)\n")
    subprocess.run(["bash", "-c", ". packaging/common.sh && offer_presets"], cwd=folder, check=True)
    done = subprocess.run([cmake, "--list-presets"], cwd=folder, capture_output=True, text=True,
                          check=False)
    print(done.stdout + done.stderr)
    return {line.split('"')[1] for line in done.stdout.splitlines() if '"' in line}


def main(source_dir, folder, cmake):
    found = offered(source_dir, os.path.join(folder, "presets"), cmake)
    if found != WANTED:
        print(f"wanted {sorted(WANTED)}, found {sorted(found)}")
    return 0 if found == WANTED else 1


if __name__ == "__main__":
    sys.exit(main(*sys.argv[1:]))
