# SPDX-License-Identifier: GPL-3.0-or-later
"""Validates every demo project against resources/project.schema.json, and checks that the
schema refuses what it must refuse. Needs the package jsonschema."""

import copy
import json
import pathlib
import sys

import jsonschema


def load(path):
    with open(path, encoding="utf-8") as file:
        return json.load(file)


def refused(validator, demo, path, value):
    """Whether the demo with `value` at `path` is refused; `...` removes the key."""
    changed = copy.deepcopy(demo)
    owner = changed
    for key in path[:-1]:
        owner = owner[key]
    if value is ...:
        del owner[path[-1]]
    else:
        owner[path[-1]] = value
    return not validator.is_valid(changed)


REFUSED = [
    (["headroom"], ...),
    (["plant"], ...),
    (["title"], 5),
    (["nonsense"], 1),
    (["plant", "points", "Intake", "chainage_m"], "0"),
    (["plant", "points", "Intake", "chainage_m"], ...),
    (["plant", "conduits", "Headrace", "reaches", "rock", "strickler"], ...),
    (["plant", "conduits", "Headrace", "reaches", "rock", "darcy"], 0.02),
    (["plant", "conduits", "Headrace", "reaches", "rock", "area_m2"], -1),
    (["plant", "conduits", "Headrace", "axis"], [[1800]]),
    (["plant", "chambers", "Surge shaft", "shape", "open"], {}),
    (["plant", "units", "U1", "turbine"], {}),
    (["plant", "units", "U1", "servo", "closing_s"], None),
    (["limits", "Shaft, lowest", "head"], {"at": "U1 inlet"}),
    (["limits", "Shaft, lowest", "level", "min_m", "normal"], "460"),
    (["studies", "Runaway", "class"], "worst"),
    (["studies", "Runaway", "events", "trip", "after_s"], 5),
    (["options", "Flywheel", "changes", "studies"], {}),
    (["options", "Flywheel", "changes", "plant", "units", "U1", "inertia", "j_tm2"], "x"),
]

ACCEPTED = [
    (["x-own"], {"a": 1}),
    (["plant", "points", "Intake", "note"], "seen"),
    (["plant", "conduits", "Headrace", "axis"], {"csv": "axis.csv"}),
    (["options", "Flywheel", "changes", "plant", "units", "U1", "inertia"], None),
    (["studies", "Runaway", "events", "trip"], {"at_s": 1, "rejectLoad": {}}),
]


def main(root):
    schema = load(root / "resources" / "project.schema.json")
    jsonschema.Draft202012Validator.check_schema(schema)
    validator = jsonschema.Draft202012Validator(schema)
    demos = sorted((root / "studies").glob("*/*.headroom.json"))
    faults = [] if demos else ["no demo found"]
    for path in demos:
        for error in validator.iter_errors(load(path)):
            faults.append(f"{path.name}: {error.json_path}: {error.message[:200]}")
    demo = load(root / "studies" / "dorvane" / "Dorvane.headroom.json")
    for path, value in REFUSED:
        if not refused(validator, demo, path, value):
            faults.append(f"accepted, but must be refused: {'/'.join(path)} = {value}")
    for path, value in ACCEPTED:
        if refused(validator, demo, path, value):
            faults.append(f"refused, but must be accepted: {'/'.join(path)} = {value}")
    print("\n".join(faults) or f"{len(demos)} demo(s), {len(REFUSED)} refused, {len(ACCEPTED)} accepted")
    return 1 if faults else 0


if __name__ == "__main__":
    sys.exit(main(pathlib.Path(sys.argv[1])))
