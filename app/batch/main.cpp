// SPDX-License-Identifier: GPL-3.0-or-later
#include "base/ensure.h"
#include "batch/commands.h"

#include <CLI/CLI.hpp>

#include <cstdio>
#include <exception>
#include <functional>

namespace {

using headroom::batch::Call;
using headroom::batch::Exit;

void addProject(CLI::App& command, Call& call) {
    command.add_option("PROJECT", call.project, "project file (.headroom.json)")->required();
}

void addCells(CLI::App& command, Call& call) {
    command.add_option("--option", call.options, "only this option; may be repeated")
        ->take_all()
        ->expected(1);
    command.add_option("--study", call.studies, "only this study; may be repeated")
        ->take_all()
        ->expected(1);
}

int answer(int count, char** words) {
    CLI::App program{"Runs a project's studies against its options and judges their limits.\n"
                     "Ends with 0 done, 1 a limit is broken (with --strict), 2 the input is "
                     "wrong, 3 a run failed.",
                     "headroom-batch"};
    program.require_subcommand(1);
    Call call;
    std::function<Exit()> command;
    const auto add = [&](const char* name, const char* help, Exit (*does)(const Call&)) {
        auto* made = program.add_subcommand(name, help);
        addProject(*made, call);
        addCells(*made, call);
        made->add_flag("--json", call.json, "data on standard output as JSON");
        made->callback([&command, &call, does] { command = [&call, does] { return does(call); }; });
        return made;
    };
    add("check", "reads, validates, compiles; prints findings and the plausibility sheet",
        headroom::batch::check);
    add("rest", "prints the starting state: every head, flow and level", headroom::batch::rest);
    auto* run = add("run", "runs the matrix; writes verdicts.json, summary.txt and traces",
                    headroom::batch::run);
    run->add_option("--out", call.out, "folder for the results");
    run->add_option("--jobs", call.jobs, "runs at a time; all cores if left out")
        ->check(CLI::Range(1, 1024));
    run->add_option("--trace-rows", call.traceRows, "most rows of a trace file (6000)")
        ->check(CLI::Range(2, 10000000));
    run->add_option("--part", call.part, "i/n: only every n-th cell, beginning with the i-th");
    run->add_flag("--strict", call.strict, "end with 1 if a limit is broken");
    program.add_subcommand("schema", "prints the JSON Schema of project files")
        ->callback([&command] { command = headroom::batch::schema; });
    try {
        program.parse(count, words);
    } catch (const CLI::ParseError& fault) {
        return program.exit(fault) == 0 ? 0 : static_cast<int>(Exit::wrongInput);
    }
    return static_cast<int>(command());
}

} // namespace

int main(int count, char** words) {
    try {
        return answer(count, words);
    } catch (const std::exception& fault) {
        std::fprintf(stderr, "internal error: %s\n", fault.what());
        return static_cast<int>(Exit::runFailed);
    }
}
