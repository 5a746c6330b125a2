#include "tools/judging/garwood.hpp"

#include <boost/math/distributions/chi_squared.hpp>

namespace slipledger::judging {

CountBounds garwood(int count, double confidence) {
    const double outside = 0.5 * (1.0 - confidence);
    const auto half_quantile = [](double probability, double freedom) {
        return 0.5 * boost::math::quantile(boost::math::chi_squared(freedom), probability);
    };
    const double k = count;
    return {.low = count == 0 ? 0.0 : half_quantile(outside, 2.0 * k),
            .high = half_quantile(1.0 - outside, 2.0 * k + 2.0)};
}

}  // namespace slipledger::judging
