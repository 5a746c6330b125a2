#include "analytics/stats/garwood.hpp"

#include <limits>

#include <boost/math/distributions/chi_squared.hpp>

namespace slipledger::analytics::stats {

namespace {

double half_chi_squared(double degrees, double share) {
    return 0.5 * boost::math::quantile(boost::math::chi_squared(degrees), share);
}

}  // namespace

CountBounds garwood_bounds(std::uint64_t count, double tail) {
    constexpr double nan = std::numeric_limits<double>::quiet_NaN();
    if (!(tail > 0.0 && tail < 0.5)) return {nan, nan};
    const double twice = 2.0 * static_cast<double>(count);
    return {.low = count == 0 ? 0.0 : half_chi_squared(twice, tail), .high = half_chi_squared(twice + 2.0, 1.0 - tail)};
}

}  // namespace slipledger::analytics::stats
