#include "analytics/signs.hpp"

#include <algorithm>

namespace slipledger::analytics {

double strength_between(double value, double from, double to) {
    const double share = (value - from) / (to - from);
    return share > 0.0 ? std::min(share, 1.0) : 0.0;  // NaN is not above 0
}

}  // namespace slipledger::analytics
