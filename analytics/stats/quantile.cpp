#include "analytics/stats/quantile.hpp"

#include <algorithm>
#include <cmath>
#include <limits>
#include <utility>

namespace slipledger::analytics::stats {

double quantile(std::vector<double> sample, double share) {
    if (sample.empty() || !(share >= 0.0 && share <= 1.0)) return std::numeric_limits<double>::quiet_NaN();
    const double place = static_cast<double>(sample.size() - 1) * share;
    const auto below = static_cast<std::size_t>(std::floor(place));
    const auto lower = sample.begin() + static_cast<std::ptrdiff_t>(below);
    std::nth_element(sample.begin(), lower, sample.end());
    if (below + 1 == sample.size()) return *lower;
    const double next = *std::min_element(lower + 1, sample.end());
    return *lower + (place - static_cast<double>(below)) * (next - *lower);
}

double median(std::vector<double> sample) {
    return quantile(std::move(sample), 0.5);
}

}  // namespace slipledger::analytics::stats
