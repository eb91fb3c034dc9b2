// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include <string>
#include <vector>

/// The commands of the batch program. Data goes to files or standard output, everything said to
/// people about it to standard error.
namespace headroom::batch {

/// What the program ends with.
enum class Exit {
    done = 0,
    broken = 1,     ///< done, a limit is broken, and --strict was given
    wrongInput = 2, ///< the project, a name or an option of the call
    runFailed = 3,
};

/// What the user chose on the command line; empty lists mean all.
struct Call {
    std::string project{};
    std::vector<std::string> options{}, studies{};
    std::string out{};  ///< folder for results; "" for none
    std::string part{}; ///< "i/n", or ""
    int jobs = 0;     ///< threads; 0: all cores
    int traceRows = 0; ///< most rows of a trace file; 0: the usual number
    bool json = false;
    bool strict = false;
};

/// Reads and validates, compiles every option and study, prints findings and plausibility sheet.
Exit check(const Call& call);
/// Prints the starting state of the chosen cells.
Exit rest(const Call& call);
/// Runs the matrix and writes verdicts, traces and summary.
Exit run(const Call& call);
/// Prints the JSON Schema of project files.
Exit schema();

} // namespace headroom::batch
