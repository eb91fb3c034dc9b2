// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "plant/tree.h"

#include <string>

namespace headroom::files {

/// The JSON Schema (draft 2020-12) of a project file, made from the field rows. What the rows
/// cannot say (names, geometry, network) is not in it.
plant::Tree projectSchema();

/// The same as text, as `resources/project.schema.json` holds it.
std::string projectSchemaText();

} // namespace headroom::files
