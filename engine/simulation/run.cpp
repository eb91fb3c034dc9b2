// SPDX-License-Identifier: GPL-3.0-or-later
#include "simulation/run.h"

#include "simulation/messages.h"

namespace headroom::simulation {

Result<std::shared_ptr<const Model>> compile(const plant::Site&, const plant::Plant&,
                                             const plant::Study&, const Settings&) {
    return Finding{&notBuilt, "plant", {}, {}, {}, {}, {}};
}

Result<Rest> rest(const Model&) { return Finding{&notBuilt, "plant", {}, {}, {}, {}, {}}; }

results::Run run(const Model&, std::stop_token, const Progress&) {
    results::Run out;
    out.status.reason = results::EndReason::failed;
    out.status.why = Finding{&notBuilt, "plant", {}, {}, {}, {}, {}};
    return out;
}

} // namespace headroom::simulation
