// SPDX-License-Identifier: GPL-3.0-or-later
#include "project_support.h"

#include "files/json_reader.h"
#include "units/text.h"

#include <stdexcept>

namespace support {

using namespace headroom;
using namespace headroom::plant;

const Tree& dorvane() {
    static const Tree tree = [] {
        const auto opened =
            files::openProject(HEADROOM_SOURCE_DIR "/studies/dorvane/Dorvane.headroom.json");
        if (!opened.usable()) {
            throw std::runtime_error(texts(opened.findings()));
        }
        return opened.tree;
    }();
    return tree;
}

const Tree& smallPlant() {
    static const Tree tree = json(R"({"headroom": 1, "title": "Small",
      "plant": {
        "points": {
          "Intake": {"chainage_m": 0, "elevation_m": 90},
          "Foot": {"chainage_m": 1000, "elevation_m": 80},
          "Inlet": {"chainage_m": 1200, "elevation_m": 20}},
        "reservoirs": {
          "Lake": {"at": "Intake", "level_m": 100, "lowest_m": 95, "highest_m": 101},
          "River": {"level_m": 22}},
        "conduits": {
          "Tunnel": {"from": "Intake", "to": "Foot",
            "reaches": {"rock": {"diameter_m": 3, "strickler": 35, "waveSpeed_mps": 1100}}},
          "Pipe": {"from": "Foot", "to": "Inlet", "axis": [[1100, 50]],
            "reaches": {
              "upper": {"to_m": 1100, "diameter_m": 2, "darcy": 0.012, "waveSpeed_mps": 1200},
              "lower": {"diameter_m": 2, "darcy": 0.012, "wall": {"steel": {"thickness_mm": 12}}}},
            "losses": {"bend": {"chainage_m": 1100, "coefficient": 0.2}}}},
        "chambers": {
          "Shaft": {"at": "Foot", "shape": {"open": {"areaByLevel": [[82, 20], [120, 20]]}}}},
        "units": {
          "U1": {"from": "Inlet", "to": "River",
            "turbine": {"orifice": {"ratedHead_m": 75, "ratedFlow_m3s": 8}},
            "servo": {"opening_s": 10, "closing_s": 10}}}},
      "limits": {
        "Shaft, highest": {"level": {"at": "Shaft", "max_m": {"normal": 118}},
          "source": {"document": "letter 1", "author": "Works"}}},
      "options": {
        "Rough": {"changes": {"plant": {"conduits": {"Tunnel": {"reaches": {"rock": {"strickler": 30}}}}}}}},
      "studies": {
        "Close": {"class": "normal", "start": {"opening_pct": {"U1": 100}},
          "events": {
            "first": {"at_s": 5, "opening": {"unit": "U1", "opening": [[0, 100], [10, 0]]}},
            "second": {"after_s": 50, "of": "first", "opening": {"unit": "U1", "opening": [[0, 0], [10, 50]]}}},
          "until_s": 200}}})");
    return tree;
}

Tree json(std::string_view text) {
    auto parsed = files::parseJson(text, "test.json");
    if (!parsed.complete) {
        throw std::runtime_error(texts(parsed.findings));
    }
    return parsed.tree;
}

std::vector<Finding> found(const Findings& findings, std::string_view code,
                           std::string_view subject) {
    std::vector<Finding> out;
    for (const auto& finding : findings) {
        if (finding.message->code == code && (subject.empty() || finding.subject == subject)) {
            out.push_back(finding);
        }
    }
    return out;
}

bool has(const Findings& findings, std::string_view code, std::string_view subject) {
    return !found(findings, code, subject).empty();
}

std::string texts(const Findings& findings) {
    std::string out;
    for (const auto& finding : findings) {
        out += std::string(finding.message->code) + " | " + text(finding) + "\n";
    }
    return out;
}

Findings findingsWith(const Tree& tree, std::string_view path, std::string_view value) {
    return bind(tree.with(split(path), json(value))).findings;
}

Findings findingsWithout(const Tree& tree, std::string_view path) {
    return bind(tree.without(split(path))).findings;
}

} // namespace support
