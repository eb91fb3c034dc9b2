// SPDX-License-Identifier: GPL-3.0-or-later
#include "studies/board.h"

#include <map>
#include <mutex>

namespace headroom::studies {

namespace {

class MemoryStore final : public RunStore {
public:
    std::shared_ptr<const StoredRun> find(const plant::Fingerprint& fingerprint) const override {
        const std::lock_guard lock(mutex_);
        const auto found = runs_.find(fingerprint);
        return found == runs_.end() ? nullptr : found->second;
    }

    void keep(std::shared_ptr<const StoredRun> stored) override {
        const std::lock_guard lock(mutex_);
        auto& place = runs_[stored->fingerprint];
        if (place == nullptr || place->run != stored->run) {
            ++count_;
        }
        place = std::move(stored);
    }

    std::size_t count() const override {
        const std::lock_guard lock(mutex_);
        return count_;
    }

private:
    mutable std::mutex mutex_;
    std::map<plant::Fingerprint, std::shared_ptr<const StoredRun>> runs_;
    std::size_t count_ = 0;
};

} // namespace

std::unique_ptr<RunStore> makeMemoryStore() {
    return std::make_unique<MemoryStore>();
}

} // namespace headroom::studies
