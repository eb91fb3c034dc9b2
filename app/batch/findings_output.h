// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "base/finding.h"
#include "plant/tree.h"

#include <string>
#include <string_view>

namespace headroom::batch {

/// "file:12:5: error: subject: What is so. What to do. [code]", then the line of the file with a
/// mark under the place. `about` names the option and study, if the finding belongs to one.
std::string findingText(const Finding& finding, std::string_view fileText,
                        const std::string& about = {});
/// Prints findings on standard error.
void tell(const Findings& findings, std::string_view fileText = {}, const std::string& about = {});

/// One finding as data: severity, code, subject, what, mend, file, line, column, time_s.
plant::Tree findingTree(const Finding& finding);
plant::Tree findingTrees(const Findings& findings);

} // namespace headroom::batch
