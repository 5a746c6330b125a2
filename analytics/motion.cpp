#include "analytics/motion.hpp"

#include <algorithm>
#include <cmath>

namespace slipledger::analytics {

Motion::Motion(const Series& series, MotionLimit limit, Instant from) : series_(&series), limit_(limit) {
    const auto begin = series.times.begin();
    const auto found = std::lower_bound(begin, series.times.end(), from - std::chrono::hours(1));
    first_ = base_ = next_ = static_cast<std::size_t>(found - begin);
}

Instant Motion::last_until(Instant now) {
    while (next_ < series_->times.size() && series_->times[next_] <= now) {
        if (next_ > first_ && moved(next_)) last_ = series_->times[next_];
        ++next_;
    }
    return last_;
}

bool Motion::moved(std::size_t reading) {
    const std::vector<Instant>& times = series_->times;
    while (base_ + 1 < reading && times[reading] - times[base_ + 1] >= limit_.base) ++base_;
    const Milliseconds apart = times[reading] - times[base_];
    if (apart < limit_.base || apart > longest_gap) return false;
    const double change = std::abs(series_->values[reading] - series_->values[base_]);
    return change * 1000.0 > limit_.per_second * static_cast<double>(apart.count());
}

}  // namespace slipledger::analytics
