# SPDX-License-Identifier: GPL-3.0-or-later
"""The one table of floors: what each folder may include besides itself.

A folder uses only lower floors; the engine knows nothing of the window, and the window reaches
the simulator only through `studies`.
"""

GROUND = ("base", "units")
NUMBERS = GROUND + ("numerics",)
VALUES = NUMBERS + ("plant", "results")
LAWS = VALUES + ("hydraulics", "machines", "grid", "control")
RUN = LAWS + ("simulation",)
EDGE = VALUES + ("limits", "studies", "files")

MAY_USE = {
    "base": (),
    "units": ("base",),
    "numerics": GROUND,
    "plant": NUMBERS,
    "results": NUMBERS,
    "hydraulics": VALUES,
    "machines": VALUES,
    "grid": VALUES,
    "control": VALUES,
    "simulation": LAWS,
    "prediction": RUN,
    "limits": VALUES,
    "studies": RUN + ("prediction", "limits"),
    "files": RUN + ("prediction", "limits", "studies"),
    "drawing": EDGE,
    "batch": EDGE,
    "desk": EDGE + ("drawing",),
}

APP = ("drawing", "batch", "desk")
ENGINE = tuple(folder for folder in MAY_USE if folder not in APP)


def place_of(folder):
    """Where a folder of the table lies in the tree."""
    return ("app/" if folder in APP else "engine/") + folder
