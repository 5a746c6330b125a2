#include "analytics/stats/theil_sen.hpp"

#include <algorithm>
#include <cmath>
#include <limits>
#include <vector>

#include <boost/math/distributions/normal.hpp>

#include "analytics/stats/mann_kendall.hpp"

namespace slipledger::analytics::stats {

namespace {

std::vector<double> pair_slopes(std::span<const double> xs, std::span<const double> ys) {
    std::vector<double> slopes;
    slopes.reserve(xs.size() * (xs.size() - 1) / 2);
    for (std::size_t i = 1; i < xs.size(); ++i)
        for (std::size_t j = 0; j < i; ++j)
            if (xs[i] != xs[j]) slopes.push_back((ys[i] - ys[j]) / (xs[i] - xs[j]));
    return slopes;
}

// The value that would stand at that place were they in order; a place beyond an end is that end.
double at_rank(std::vector<double>& values, double rank) {
    const double last = static_cast<double>(values.size()) - 1.0;
    const auto place = values.begin() + static_cast<std::ptrdiff_t>(std::clamp(rank, 0.0, last));
    std::nth_element(values.begin(), place, values.end());
    return *place;
}

}  // namespace

SlopeRange theil_sen(std::span<const double> xs, std::span<const double> ys, double share, double variance_factor) {
    constexpr double nan = std::numeric_limits<double>::quiet_NaN();
    const bool fit = xs.size() == ys.size() && xs.size() >= 2 && share > 0.0 && share < 1.0 && variance_factor > 0.0;
    std::vector<double> slopes = fit ? pair_slopes(xs, ys) : std::vector<double>();
    if (slopes.empty()) return {nan, nan, nan};
    const double z = boost::math::quantile(boost::math::normal(), 0.5 + 0.5 * share);
    const double n = static_cast<double>(xs.size());
    const double tied = tie_sum(xs) + tie_sum(ys);
    const double spread =
        z * std::sqrt(variance_factor * std::fmax(n * (n - 1.0) * (2.0 * n + 5.0) - tied, 0.0) / 18.0);
    const double count = static_cast<double>(slopes.size());
    return {
        .value = 0.5 * (at_rank(slopes, std::floor((count - 1.0) / 2.0)) + at_rank(slopes, std::floor(count / 2.0))),
        .low = at_rank(slopes, std::nearbyint((count - spread) / 2.0) - 1.0),
        .high = at_rank(slopes, std::nearbyint((count + spread) / 2.0))};
}

}  // namespace slipledger::analytics::stats
