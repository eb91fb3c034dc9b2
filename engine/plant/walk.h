// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "plant/fields.h"

#include <functional>

namespace headroom::plant {

/// Called for each row that has a value in the struct it belongs to, in the order of the rows.
using Visit = std::function<void(const Field& row, const void* owner)>;
/// Called before (true) and after (false) the objects inside a group, kind or named thing.
using Enter = std::function<void(const Field& row, int index, bool before)>;

/// Walks a struct by the rows that describe it.
void walk(const Fields& rows, const void* owner, const Visit& visit, const Enter& enter = {});

/// Replaces each reference held by a struct by what `resolve` makes of it.
void replaceReferences(const Fields& rows, void* owner,
                       const std::function<Reference(const Field&, const Reference&)>& resolve);

} // namespace headroom::plant
