#!/usr/bin/env python3
# SPDX-License-Identifier: GPL-3.0-or-later
"""Each rule of check_tree can fail: a sound little tree has no finding, and one fault put into it
is found by its rule, in its file and line, and by no other rule.

    test_rules.py FOLDER     the little trees are made in this folder
"""

import os
import shutil
import sys

from check_tree import RULES, check
from floors import MAY_USE

SPDX = "SPDX-License-Identifier: GPL-3.0-or-later"
HEADER = f"// {SPDX}\n#pragma once\n"

SOUND = {
    "CMakeLists.txt": f"# {SPDX}\n",
    "README.md": "# A tree\n",
    "DEVELOPERS.md": "# A tree\n",
    "engine/base/ground.h": HEADER,
    "engine/plant/pipe.h": HEADER + '#include "base/ground.h"\n',
    "engine/plant/pipe.cpp": f'// {SPDX}\n#include "plant/pipe.h"\n#include <cmath>\n',
    "engine/simulation/run.h": HEADER + '#include "plant/pipe.h"\n',
    "app/drawing/look.h": HEADER + 'const QColor ink("#102030");\n',
    "app/desk/window.cpp": f"// {SPDX}\n#include <QMessageBox>\nQMessageBox box(this);\n",
    "app/desk/lanes.h": HEADER + "#include <qcustomplot.h>\n",
    "app/desk/lane_a.cpp": f'// {SPDX}\n#include "desk/lanes.h"\n',
    "app/desk/lane_b.cpp": f'// {SPDX}\n#include "desk/lanes.h"\n',
    "app/desk/lane_c.cpp": f'// {SPDX}\n#include <qcustomplot.h>\n',
    "tests/plant/pipe_test.cpp": f"// {SPDX}\n// pipe, ground, run\n",
    "packaging/start.sh": f"# {SPDX}\n",
}

# rule -> (file, text put at its end, line of the finding); the file may be new
FAULTS = {
    "top_level": [("notes/plan.md", "a\n", 1)],
    "folders": [("engine/extras/tool.cpp", f"// {SPDX}\n", 1)],
    "floors": [
        ("engine/plant/pipe.cpp", '#include "simulation/run.h"\n', 4),
        ("engine/plant/pipe.cpp", '#  include <simulation/run.h>\n', 4),
        ("engine/plant/pipe.cpp", '#include "../base/ground.h"\n', 4),
        ("engine/plant/pipe.cpp", '#include "pipe.h"\n', 4),
        ("app/desk/window.cpp", '#include "simulation/run.h"\n', 4),
        ("app/drawing/look.h", '#include "desk/window.h"\n', 4),
    ],
    "engine_without_window": [
        ("engine/base/ground.h", "#include <QString>\n", 3),
        ("engine/base/ground.h", "#include <QtCore/qstring.h>\n", 3),
        ("engine/base/ground.h", "#include <qstring.h>\n", 3),
        ("engine/base/CMakeLists.txt", f"# {SPDX}\ntarget_link_libraries(a Qt6::Core)\n", 2),
    ],
    "elementary": [("engine/plant/pipe.cpp", "double a = std::exp(1.0);\n", 4)],
    "literal_colours": [
        ("app/desk/window.cpp", "QColor red(255, 0, 0);\nauto c = QColor(255, 0, 0);\n", 5),
        ("app/desk/window.cpp", 'auto sheet = "color: #a0b0c0";\n', 4),
        ("app/desk/window.cpp", "painter.setPen(Qt::darkGray);\n", 4),
    ],
    "message_boxes": [("app/desk/window.cpp", "QMessageBox::warning(this);\n", 4)],
    "plot_header": [("app/desk/window.cpp", '#include <qcustomplot.h>\n', 4)],
    "unfinished": [
        ("engine/plant/pipe.cpp", "// T" + "ODO later\n", 4),
        ("packaging/start.sh", "# a st" + "ub\n", 2),
    ],
    "machine_paths": [("README.md", "see /ho" + "me/someone/notes\n", 2)],
    "toothless_tests": [
        ("tests/plant/pipe_test.cpp", "CHECK" + "( true );\n", 3),
        ("tests/plant/pipe_test.cpp", 'TEST_CASE("a", "[!may' + 'fail]") {}\n', 3),
    ],
    "long_files": [("engine/plant/pipe.cpp", "//\n" * 700, 601)],
    "licence_line": [
        ("engine/plant/valve.cpp", "int a;\n", 1),
        ("packaging/stop.sh", "true\n", 1),
        ("app/desk/gauge.h", f"// {SPDX}\n", 1),
    ],
    "tested_headers": [("engine/plant/valve.h", HEADER, 1)],
    "units_explained": [
        ("engine/units/quantity.cpp",
         f'// {SPDX}\n    QuantityInfo{{Quantity::power, "power", "MW", "MW", 1e6, 0, 1}},\n', 2),
    ],
}


def plant_tree(folder, files):
    shutil.rmtree(folder, ignore_errors=True)
    for path, text in files.items():
        full = os.path.join(folder, path)
        os.makedirs(os.path.dirname(full), exist_ok=True)
        with open(full, "w", encoding="utf-8") as file:
            file.write(text)


def faults_of_rules(folder):
    """What is wrong with the rules, as sentences."""
    plant_tree(folder, SOUND)
    for finding in check(folder):
        yield f"the sound tree has a finding: {finding}"
    for rule in RULES:
        if not FAULTS.get(rule):
            yield f"no fault is known that the rule {rule} must find"
    for rule, faults in FAULTS.items():
        for path, text, line in faults:
            plant_tree(folder, {**SOUND, path: SOUND.get(path, "") + text})
            places = [(found, number) for found, number, _ in check(folder, [rule])]
            wanted = ("notes", 1) if rule == "top_level" else (path, line)
            if wanted not in places:
                yield f"{rule} did not find {path}:{line} ({text.strip()[:60]!r}), only {places}"


def faults_of_table():
    """The table of floors has no circle, and what lies below is closed."""
    for folder, allowed in MAY_USE.items():
        for lower in allowed:
            if folder in MAY_USE[lower]:
                yield f"{folder} and {lower} may include each other"


def main(folder):
    count = sum(len(faults) for faults in FAULTS.values())
    wrong = list(faults_of_rules(os.path.join(folder, "little_tree"))) + list(faults_of_table())
    print("\n".join(wrong) or f"{len(RULES)} rules find the {count} faults made for them")
    return 1 if wrong else 0


if __name__ == "__main__":
    sys.exit(main(sys.argv[1]))
