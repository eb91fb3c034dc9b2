// SPDX-License-Identifier: GPL-3.0-or-later
#include "simulation/step_choice.h"

#include <algorithm>
#include <cmath>

namespace headroom::simulation {
namespace {

constexpr double rounding = 1e-9;

ConduitKind kindAt(const StepRequest::Conduit& conduit, double step) {
    if (conduit.kind != ConduitKind::elastic || !conduit.automatic) {
        return conduit.kind;
    }
    const double fewest = leastCells * (1.0 - stretchAllowed - rounding);
    return conduit.travelTime_s >= fewest * step ? ConduitKind::elastic : ConduitKind::shortElement;
}

int cellsAt(const StepRequest::Conduit& conduit, double step) {
    return std::max(leastCells, static_cast<int>(std::lround(conduit.travelTime_s / step)));
}

double stretchAt(const StepRequest::Conduit& conduit, double step) {
    return conduit.travelTime_s / (cellsAt(conduit, step) * step) - 1.0;
}

double worstStretch(const StepRequest& request, double step) {
    double worst = 0.0;
    for (const auto& conduit : request.conduits) {
        if (kindAt(conduit, step) == ConduitKind::elastic) {
            worst = std::max(worst, std::fabs(stretchAt(conduit, step)));
        }
    }
    return worst;
}

bool dividesSamples(const StepRequest& request, double step) {
    return std::all_of(request.samplePeriods_s.begin(), request.samplePeriods_s.end(),
                       [step](double period) {
                           const double count = std::round(period / step);
                           return count >= 1.0 && std::fabs(count * step / period - 1.0) < 1e-9;
                       });
}

/// Steps at which a stretch is zero or just reaches what is allowed, and an even spread between.
std::vector<double> candidates(const StepRequest& request) {
    const double low = 0.5 * request.cap_s;
    std::vector<double> steps{request.cap_s};
    const auto add = [&](double step) {
        if (step >= low && step <= request.cap_s) {
            steps.push_back(step);
        }
    };
    for (const double period : request.samplePeriods_s) {
        const int most = static_cast<int>(period / low) + 1;
        for (int count = 1; count <= most; ++count) {
            add(period / count);
        }
    }
    if (!request.samplePeriods_s.empty()) {
        return steps;
    }
    for (const auto& conduit : request.conduits) {
        const int most = static_cast<int>(std::min(conduit.travelTime_s / low + 1.0, 2000.0));
        for (int count = leastCells; count <= most; ++count) {
            const double exact = conduit.travelTime_s / count;
            add(exact);
            add(exact / (1.0 - stretchAllowed));
        }
    }
    constexpr int spread = 200;
    for (int i = 0; i < spread; ++i) {
        steps.push_back(low + (request.cap_s - low) * i / spread);
    }
    return steps;
}

double bestStep(const StepRequest& request, bool& divided) {
    std::vector<double> steps = candidates(request);
    std::sort(steps.begin(), steps.end(), std::greater<>());
    divided = std::any_of(steps.begin(), steps.end(),
                          [&](double step) { return dividesSamples(request, step); });
    double best = request.cap_s;
    double least = INFINITY;
    for (const double step : steps) {
        if (divided && !dividesSamples(request, step)) {
            continue;
        }
        const double worst = worstStretch(request, step);
        if (worst <= stretchAllowed + rounding) {
            return step;
        }
        if (worst < least) {
            least = worst;
            best = step;
        }
    }
    return best;
}

} // namespace

StepChoice chooseStep(const StepRequest& request) {
    StepChoice choice;
    choice.step_s = bestStep(request, choice.sampleTimesDivided);
    for (const auto& conduit : request.conduits) {
        const ConduitKind kind = kindAt(conduit, choice.step_s);
        const bool elastic = kind == ConduitKind::elastic;
        choice.kinds.push_back(kind);
        choice.cells.push_back(elastic ? cellsAt(conduit, choice.step_s) : 0);
        choice.stretch.push_back(elastic ? stretchAt(conduit, choice.step_s) : 0.0);
    }
    return choice;
}

} // namespace headroom::simulation
