// SPDX-License-Identifier: GPL-3.0-or-later
#include "desk/selection_model.h"

#include <algorithm>

namespace headroom::desk {

void SelectionModel::set(Selection next) {
    std::vector<CellId> different;
    for (const auto& cell : next.shown) {
        if (std::find(different.begin(), different.end(), cell) == different.end() &&
            different.size() < mostShown) {
            different.push_back(cell);
        }
    }
    next.shown = std::move(different);
    if (next == now_) {
        return;
    }
    std::swap(now_, next);
    emit changed(next);
}

void SelectionModel::setTime(double time_s) {
    auto next = now_;
    next.time_s = time_s;
    set(std::move(next));
}

void SelectionModel::setThing(plant::Path thing) {
    auto next = now_;
    next.thing = std::move(thing);
    set(std::move(next));
}

} // namespace headroom::desk
