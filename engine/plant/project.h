// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "base/result.h"
#include "plant/study.h"
#include "plant/tree.h"

#include <array>
#include <cstdint>
#include <functional>
#include <optional>
#include <string>
#include <string_view>

namespace headroom::plant {

/// Where in a file a path was read from; empty for trees made in memory.
using Places = std::function<std::optional<FilePlace>(const Path&)>;

/// Binds a tree and checks it: unknown keys with the nearest known one, types, ranges, exactly
/// one kind, references, geometry, tables, and for every option the same on the patched plant.
/// Never throws for user faults: all findings come at once; the value is usable as far as bound
/// when no finding is an error.
struct Bound {
    Project project;
    Findings findings;
    bool usable() const { return !anyError(findings); }
};
Bound bind(const Tree& tree, const Places& places = {});

/// The plant, site and limits of one option (index -1: the base), bound and checked.
struct Variant {
    std::string name; ///< option's name or the base's
    Site site;
    Plant plant;
    Keyed<Limit> limits;
    Tree tree; ///< {site, plant, limits} after the patch
    Findings findings;
    bool usable() const { return !anyError(findings); }
};
Variant variant(const Project& project, int option);

/// A study with its references resolved in a variant's plant, whose positions may differ from the
/// base's; findings name what the variant lacks (the study is not applicable there).
Result<Study> studyIn(const Variant& variant, const Study& study);

/// Puts keys in the order of the field tables (users' names keep theirs).
Tree ordered(const Tree& project);

/// A new value at `path`, entered with the option `option` in the hand (-1: the base).
/// With an option in the hand only paths under site, plant and limits go into its `changes`;
/// a value equal to the base's is taken back. A change of kind writes the null beside it.
Tree edited(const Tree& project, int option, const Path& path, const Tree& value);
/// Takes an option's value back to the base.
Tree takenBack(const Tree& project, int option, const Path& path);
/// One walk over all reference fields and all options; a finding if the name is taken or bad.
Result<Tree> renamed(const Tree& project, const Path& thing, std::string_view to);

/// 128-bit digest, printed as 32 hex digits.
struct Fingerprint {
    std::uint64_t high = 0, low = 0;
    auto operator<=>(const Fingerprint&) const = default;
    std::string text() const;
};
/// Raised by hand whenever a computed number may change.
inline constexpr int physicsRevision = 1;
/// Digest of everything that can change a computed number: the variant's site and plant, the
/// study, the numerics. Names, notes, sources, costs and limits are not in it; references by
/// position, kinds by tag, numbers as SI doubles, tables by content.
Fingerprint fingerprint(const Variant& variant, const Study& study, const Numerics& numerics,
                        int refinement);

} // namespace headroom::plant
