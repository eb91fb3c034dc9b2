// SPDX-License-Identifier: GPL-3.0-or-later
#pragma once

#include "drawing/selection.h"

#include <QObject>

namespace headroom::desk {

using drawing::CellId;
using drawing::Selection;

/// The window's one selection. Parts show it and ask to change it; no part knows another.
class SelectionModel final : public QObject {
    Q_OBJECT
public:
    static constexpr std::size_t mostShown = 6;

    const Selection& now() const { return now_; }
    /// Takes the first six different runs; tells everyone if anything changed.
    void set(Selection next);
    void setTime(double time_s);
    void setThing(plant::Path thing);

signals:
    void changed(const headroom::drawing::Selection& before);

private:
    Selection now_;
};

} // namespace headroom::desk
