#!/usr/bin/env python3
# SPDX-License-Identifier: GPL-3.0-or-later
"""Rules of the house that a compiler does not keep. Prints `file:line: what is wrong` for each
place and ends with 1 if there is one.

    check_tree.py ROOT [RULE ...]      all rules, or the named ones
    check_tree.py --list               the names of the rules
"""

import os
import re
import sys

from floors import APP, ENGINE, MAY_USE

TOP = {"CMakeLists.txt", "README.md", "DEVELOPERS.md", "app", "engine", "resources", "studies",
       "tests", "packaging"}
NOT_OURS = {"CMakeUserPresets.json"}  # written by the set-up commands, ignored by git
LONGEST_FILE = 600
INCLUDE = re.compile(r'^\s*#\s*include\s*([<"])([^>"]+)[>"]')


class Tree:
    """The files of a tree, read once, without builds, hidden folders and caches."""

    def __init__(self, root):
        self.root = root
        self.texts = {}
        for folder, names, files in os.walk(root):
            names[:] = sorted(n for n in names if self._ours(folder, n))
            for name in sorted(files):
                path = os.path.relpath(os.path.join(folder, name), root).replace(os.sep, "/")
                self._read(path)

    def _ours(self, folder, name):
        at_top = os.path.samefile(folder, self.root)
        return not (name in (".git", "__pycache__") or (at_top and name.startswith("build")))

    def _read(self, path):
        if path in NOT_OURS:
            return
        try:
            with open(os.path.join(self.root, path), encoding="utf-8") as file:
                self.texts[path] = file.read().split("\n")
        except (UnicodeDecodeError, OSError):
            pass  # pictures, fonts and archives have no lines

    def files(self, *tops, ends=()):
        for path in self.texts:
            if (not tops or path.split("/")[0] in tops) and (not ends or path.endswith(ends)):
                yield path

    def lines(self, path):
        return enumerate(self.texts[path], start=1)


def grep(tree, paths, pattern, message):
    """A finding for every line of the paths that matches."""
    for path in paths:
        for number, line in tree.lines(path):
            if re.search(pattern, line):
                yield path, number, message


CODE = (".h", ".cpp")


def top_level(tree):
    """The top folder holds what the design says and nothing else."""
    for name in sorted({path.split("/")[0] for path in tree.texts} - TOP):
        if not name.startswith("."):
            yield name, 1, "the top folder holds only " + ", ".join(sorted(TOP))


def folders(tree):
    """The engine and the window have only the folders of the table."""
    for path in tree.files("engine", "app", ends=CODE):
        part = path.split("/")
        known = ENGINE if part[0] == "engine" else APP
        if part[1] not in known:
            yield path, 1, f"no floor is called '{part[1]}'"


def floors(tree):
    """A folder includes itself and lower floors, always as "folder/file.h"."""
    for path in tree.files("engine", "app", ends=CODE):
        own = path.split("/")[1]
        allowed = MAY_USE.get(own, ())
        for number, line in tree.lines(path):
            match = INCLUDE.match(line)
            if not match:
                continue
            folder, slash, rest = match[2].partition("/")
            if match[2].startswith("../") or "/../" in match[2]:
                yield path, number, "an include goes through a door, never through '..'"
            elif match[1] == '"' and not slash and not rest and not match[2].endswith(".moc"):
                yield path, number, f'write the folder too: "{own}/{match[2]}"'
            elif slash and folder in MAY_USE and folder != own and folder not in allowed:
                yield path, number, f"{own} may not include {folder}"


def engine_without_window(tree):
    """The engine knows neither Qt nor the window."""
    pattern = r'#\s*include\s*[<"](Qt?[A-Z]|q[a-z]+[/.]|app/|(drawing|desk|batch)/)'
    yield from grep(tree, tree.files("engine", ends=CODE), pattern,
                    "the engine knows neither Qt nor the window")
    yield from grep(tree, (p for p in tree.files("engine") if p.endswith("CMakeLists.txt")),
                    r"Qt\d?::|QCustomPlot", "the engine knows neither Qt nor the window")


def elementary(tree):
    """Transcendental functions are reached through one header, so that bits agree."""
    # base and units lie below numerics; what they compute is only printed.
    above = (p for p in tree.files("engine", ends=CODE) if not p.startswith(("engine/base/", "engine/units/")))
    paths = (p for p in above if p != "engine/numerics/elementary.h")
    names = "exp|exp2|expm1|log|log2|log10|log1p|pow|a?(sin|cos|tan)h?|atan2|cbrt|hypot"
    yield from grep(tree, paths, rf"\bstd::({names})\(", 'use "numerics/elementary.h"')


def literal_colours(tree):
    """Colours stand behind one header, app/drawing/look.h."""
    paths = (p for p in tree.files("app", ends=CODE) if not p.startswith("app/drawing/look"))
    named = "(?i:black|white|((dark|light)?gr[ae]y)|(dark)?(red|green|blue|cyan|magenta|yellow))"
    pattern = rf'\bQColor\s*[({{]\s*[^)}}\s]|#[0-9A-Fa-f]{{6}}\b|\bqRgba?\(|\bQt::({named})\b(?!::)'
    yield from grep(tree, paths, pattern, "a colour outside app/drawing/look*")


def message_boxes(tree):
    """Only the question about unsaved changes may be a message box."""
    made = re.compile(r"QMessageBox::(question|warning|information|critical|about)\s*\(|"
                      r"\bQMessageBox\s+\w+\s*[({;]|\bnew\s+QMessageBox\b")
    seen = 0
    for path in tree.files("app", ends=CODE):
        for number, line in tree.lines(path):
            if made.search(line):
                seen += 1
                if seen > 1:
                    yield path, number, "a second message box; findings say it without one"


def plot_header(tree):
    """The large header of the plot is read, directly or through ours, by at most three sources."""
    reads = {}
    for path in tree.files("app", ends=CODE):
        for number, line in tree.lines(path):
            match = INCLUDE.match(line)
            if match:
                reads.setdefault(path, {}).setdefault("app/" + match[2], number)
    heavy = {"app/qcustomplot.h"}
    while True:
        more = {p for p, lines in reads.items() if p.endswith(".h") and heavy & set(lines)}
        if more <= heavy:
            break
        heavy |= more
    sources = [p for p in reads if p.endswith(".cpp") and heavy & set(reads[p])]
    for path in sources[3:]:
        number = min(reads[path][name] for name in heavy & set(reads[path]))
        yield path, number, "more than three sources read qcustomplot.h"


def unfinished(tree):
    """Nothing is unfinished by its own words."""
    words = ["T" + "ODO", "F" + "IXME", "X" + "XX", "H" + "ACK", "not imple" + "mented",
             "place" + "holder", "st" + "ub"]
    pattern = r"(?i)\b(" + "|".join(words) + r")\b"
    yield from grep(tree, tree.files("app", "engine", "tests", "packaging", "resources"), pattern,
                    "unfinished by its own words")


def machine_paths(tree):
    """No file knows the machine it was written on."""
    paths = (p for p in tree.files() if not p.startswith("resources/theory/"))
    yield from grep(tree, paths, r"(?<![\w.$}*])/(?:work|root|home|Users)/[\w.]",
                    "a path of one machine")


def toothless_tests(tree):
    """Every test can fail."""
    pattern = (r"\bSUCCEED\s*\(|\b(CHECK|REQUIRE)\s*\(\s*true\s*\)|\[!(?:may|should)fail|"
               r"\bGTEST_" + r"SKIP\b")
    paths = (p for p in tree.files("tests", ends=CODE))
    yield from grep(tree, paths, pattern, "a test that cannot fail, or is allowed to")


def long_files(tree):
    """A file holds one concept."""
    for path in tree.files("engine", "app", ends=CODE):
        length = len(tree.texts[path]) - 1
        if length > LONGEST_FILE:
            yield path, LONGEST_FILE + 1, f"{length} lines, more than {LONGEST_FILE}"


def licence_line(tree):
    """Every source names its licence at its head; every header guards itself."""
    ours = CODE + (".cmake", ".py", ".sh", "CMakeLists.txt", ".ci/run")
    for path in tree.files(ends=ours):
        head = tree.texts[path][:3]
        if not any("SPDX-License-Identifier: GPL-3.0-or-later" in line for line in head):
            yield path, 1, "the line SPDX-License-Identifier: GPL-3.0-or-later is missing"
        several = any("Included once by each" in line for line in head)
        if path.endswith(".h") and not several and "#pragma once" not in head:
            yield path, 1, "#pragma once is missing at the head"


def inner_headers(tree):
    """Headers of the engine that are included, and only by sources of their own folder."""
    inside, outside = set(), set()
    for path in tree.files(ends=CODE):
        folder = path.rsplit("/", 1)[0]
        for line in tree.texts[path]:
            found = re.match(r'\s*#include "([\w./]+)"', line)
            if found:
                wanted = "engine/" + found.group(1)
                (inside if wanted.rsplit("/", 1)[0] == folder else outside).add(wanted)
    return inside - outside


def tested_headers(tree):
    """Each header of the engine that another folder sees is named by a test.

    A header that only its own folder includes is tested through what that folder shows.
    """
    tests = list(tree.files("tests"))
    words = set()
    for path in tests:
        words.update(re.findall(r"\w+", path))
        for line in tree.texts[path]:
            words.update(re.findall(r"\w+", line))
    inner = inner_headers(tree)
    for path in tree.files("engine", ends=(".h",)):
        stem = path.split("/")[-1][:-2]
        if path in inner:
            continue
        if not any(stem == word or word in (stem + "_test", "test_" + stem) for word in words):
            yield path, 1, "no test names this header"


def units_explained(tree):
    """DEVELOPERS.md names every unit suffix of the closed list of quantities."""
    lines = tree.texts.get("engine/units/quantity.cpp", [])
    told = set(re.findall(r"`(\w+)` \|", "\n".join(tree.texts.get("DEVELOPERS.md", []))))
    for number, line in enumerate(lines, start=1):
        match = re.match(r'\s*QuantityInfo\{Quantity::\w+, "[^"]*", "(\w+)"', line)
        if match and match[1] not in told:
            yield "engine/units/quantity.cpp", number, f"DEVELOPERS.md does not explain _{match[1]}"


RULES = {rule.__name__: rule for rule in (
    top_level, folders, floors, engine_without_window, elementary, literal_colours, message_boxes,
    plot_header, unfinished, machine_paths, toothless_tests, long_files, licence_line,
    tested_headers, units_explained)}


def check(root, names=None):
    """The findings of the named rules (all without names), as (path, line, message)."""
    tree = Tree(root)
    return [finding for name in (names or RULES) for finding in RULES[name](tree)]


def main(words):
    if words == ["--list"]:
        print("\n".join(RULES))
        return 0
    if not words or any(name not in RULES for name in words[1:]):
        print(__doc__, file=sys.stderr)
        return 2
    findings = check(words[0], words[1:])
    for path, line, message in findings:
        print(f"{path}:{line}: {message}")
    print(f"{len(findings)} findings of {len(words[1:]) or len(RULES)} rules")
    return 1 if findings else 0


if __name__ == "__main__":
    sys.exit(main(sys.argv[1:]))
