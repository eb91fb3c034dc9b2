#!/usr/bin/env python3
# SPDX-License-Identifier: GPL-3.0-or-later
"""The schema in resources/ is what the batch program prints, and every demo project is valid by
an independent validator.

    test_schema.py SOURCE_DIR BATCH_PROGRAM
"""

import copy
import glob
import json
import os
import subprocess
import sys

from jsonschema.validators import validator_for


def read(path):
    with open(path, encoding="utf-8") as file:
        return file.read()


def faults_of_schema(source_dir, program):
    done = subprocess.run([program, "schema"], capture_output=True, text=True, check=False)
    if done.returncode != 0:
        yield f"'schema' ended with {done.returncode}: {done.stderr}"
    kept = read(os.path.join(source_dir, "resources", "project.schema.json"))
    if done.stdout != kept:
        lines = zip(kept.splitlines() + [""], done.stdout.splitlines() + [""])
        first = next((n for n, (a, b) in enumerate(lines, start=1) if a != b), 0)
        yield (f"resources/project.schema.json:{first}: differs from what 'schema' prints; "
               "write it anew from there")


def spoiled(project):
    """Projects that the schema must refuse, each with one fault put into a valid one."""
    stranger = copy.deepcopy(project)
    stranger["plant"]["nothingKnown"] = 1
    yield "a key that is not known", stranger
    wrong = copy.deepcopy(project)
    wrong["plant"]["reservoirs"] = 7
    yield "a number for a collection", wrong
    typed = copy.deepcopy(project)
    typed["headroom"] = "one"
    yield "a word for the format number", typed


def faults_of_demos(source_dir):
    schema = json.loads(read(os.path.join(source_dir, "resources", "project.schema.json")))
    kind = validator_for(schema)
    kind.check_schema(schema)
    validator = kind(schema)
    demos = sorted(glob.glob(os.path.join(source_dir, "studies", "**", "*.headroom.json"),
                             recursive=True))
    if not demos:
        yield "studies/ has no project"
    for path in demos:
        project = json.loads(read(path))
        for error in validator.iter_errors(project):
            yield f"{path}: {'/'.join(map(str, error.absolute_path))}: {error.message[:200]}"
        for fault, changed in spoiled(project):
            if validator.is_valid(changed):
                yield f"{path}: the schema does not refuse {fault}"


def main(source_dir, program):
    wrong = list(faults_of_schema(source_dir, program)) + list(faults_of_demos(source_dir))
    print("\n".join(wrong) or "the schema is current and every demo is valid")
    return 1 if wrong else 0


if __name__ == "__main__":
    sys.exit(main(*sys.argv[1:]))
