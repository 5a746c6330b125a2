#include "analytics/own_usual.hpp"

#include <algorithm>
#include <cmath>

namespace slipledger::analytics {

void OwnUsual::add(double value, double weight) {
    if (!std::isfinite(value) || !(weight > 0.0)) return;
    if (!known()) {
        const double before = learned_weight_ > 0.0 ? mean_ : value;
        learned_weight_ += weight;
        mean_ = before + (value - before) * weight / learned_weight_;
        squares_ += weight * (value - before) * (value - mean_);
    }
    // While there is little of late, a plain mean of it: no first value may weigh for long.
    recent_weight_ = std::min(recent_weight_ + weight, pace_.memory);
    if (!std::isfinite(recent_)) recent_ = value;
    recent_ += (value - recent_) * std::min(1.0, weight / recent_weight_);
}

double OwnUsual::learned_sd() const {
    return learned_weight_ > 0.0 ? std::sqrt(std::max(squares_ / learned_weight_, 0.0)) : 0.0;
}

double OwnUsual::moved() const {
    return known() ? recent_ - mean_ : unknown;
}

}  // namespace slipledger::analytics
