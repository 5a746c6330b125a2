#include "analytics/stuck_run.hpp"

#include <algorithm>
#include <cmath>

namespace slipledger::analytics {

namespace {
constexpr std::int32_t least_run = 2;     // summaries: one still hour alone may be a pause in the duty
constexpr std::int32_t least_moved = 24;  // before that its own ways are not known
}  // namespace

void StuckRun::add(double lowest, double highest, bool duty_moves) {
    if (!std::isfinite(lowest) || !std::isfinite(highest)) return;
    const bool still = lowest == highest;
    if (still && length_ > 0 && lowest == value_) {
        if (duty_moves) ++length_;
        return;
    }
    if (!stuck()) longest_ = std::max(longest_, length_);
    if (!still) {
        moved_ = std::min(moved_ + 1, least_moved);
        lowest_ = std::fmin(lowest_, lowest);  // which pass over NaN
        highest_ = std::fmax(highest_, highest);
    }
    length_ = still && duty_moves ? 1 : 0;
    value_ = lowest;
}

bool StuckRun::stuck() const {
    return moved_ >= least_moved && length_ >= least_run && length_ > 2 * longest_ + 1;
}

}  // namespace slipledger::analytics
