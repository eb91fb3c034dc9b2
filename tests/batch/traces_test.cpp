// SPDX-License-Identifier: GPL-3.0-or-later
#include "batch/traces.h"

#include "files/project_file.h"
#include "files/traces_writer.h"
#include "program.h"

#include <set>

using namespace headroom;

namespace {

/// One level over five instants whose third interval holds a peak that no instant shows.
results::Run ringing() {
    results::Run run;
    run.recordInterval_s = 0.5;
    results::Channel level;
    level.measure = Measure::level;
    level.place = {results::Thing::chamber, 0};
    level.trace.last = {1.0F, 2.0F, 3.0F, 2.5F, 2.0F};
    level.trace.low = {1.0F, 1.0F, 2.0F, 2.5F, 2.0F};
    level.trace.high = {1.0F, 2.0F, 3.0F, 9.1F, 2.5F};
    run.channels.push_back(level);
    return run;
}

plant::Plant plantWithShaft() {
    plant::Plant plant;
    plant.chambers.add("Shaft, \"old\"", {});
    return plant;
}

} // namespace

TEST_CASE("traces: units in the heading, names in quotes where needed, no peak lost",
          "[batch][files]") {
    CHECK(files::writeTraces(ringing(), plantWithShaft(), 100) ==
          "time [s],\"Shaft, \"\"old\"\", Water level [m]\","
          "\"Shaft, \"\"old\"\", Water level, least [m]\","
          "\"Shaft, \"\"old\"\", Water level, greatest [m]\"\r\n"
          "0,1,1,1\r\n"
          "0.5,2,1,2\r\n"
          "1,3,2,3\r\n"
          "1.5,2.5,2.5,9.1\r\n"
          "2,2,2,2.5\r\n");
}

TEST_CASE("traces: intervals are taken together for fewer rows, extremes kept", "[batch][files]") {
    const auto text = files::writeTraces(ringing(), plantWithShaft(), 3);
    CHECK_THAT(text, ContainsSubstring("\r\n0,1,1,1\r\n1,3,1,3\r\n2,2,2,9.1\r\n"));
}

TEST_CASE("traces: each cell has its own file name", "[batch][files]") {
    const auto snapshot = studies::makeSnapshot(files::openProject(program::demo).bound);
    const batch::TracePaths paths(*snapshot);
    std::set<std::string> all;
    for (int option = -1; option < snapshot->options(); ++option) {
        for (int study = 0; study < snapshot->studies(); ++study) {
            all.insert(paths.of(option, study));
        }
    }
    CHECK(all.size() ==
          static_cast<std::size_t>((snapshot->options() + 1) * snapshot->studies()));
    CHECK(paths.of(-1, 0).rfind("traces/As-built-", 0) == 0);
    CHECK(paths.of(studies::Cell{}).empty()); // not run: no traces
}
