#include "analytics/replacement.hpp"

#include <algorithm>
#include <cmath>

namespace slipledger::analytics {

namespace {

constexpr double low = -2.0;           // standard deviations
constexpr double done_within_h = 8.0;  // running hours
constexpr Milliseconds same_hour = std::chrono::hours(1);
constexpr double as_known_as = 0.1;  // sd of ln ratio
constexpr double least_left = 0.25;  // of the logarithm before
const double worn = std::log(1.3);
const double least_fall = std::log(1.25);
const double nothing_came = std::log(1.05);
const double about_new = std::log(1.1);
constexpr double far_below_new = -0.35;  // less leakage than any part of the model: a meter, not a part

}  // namespace

void ReplacementWatch::explain(Instant at) {
    explained_ = true;
    explained_at_ = at;
}

void ReplacementWatch::note(double surprise, Instant at, double running_h, LogEstimate wear_before) {
    if (!std::isfinite(surprise) || !std::isfinite(wear_before.ln)) return;
    if (surprise > low) {
        if (ln_before_ - wear_before.ln < nothing_came) low_ = false;
        return;
    }
    if (low_ && running_h - began_running_h_ <= done_within_h) return;
    low_ = true;
    began_ = at;
    began_running_h_ = running_h;
    ln_before_ = wear_before.ln;
}

bool ReplacementWatch::looks_like_one(LogEstimate wear) const {
    const bool explained = explained_ && explained_at_ >= began_ - same_hour && explained_at_ <= began_ + same_hour;
    const bool fell = ln_before_ >= worn && ln_before_ - wear.ln >= least_fall;
    const bool new_now = wear.ln >= far_below_new && wear.ln <= std::max(about_new, least_left * ln_before_);
    return !explained && fell && new_now && wear.sd <= as_known_as;
}

bool ReplacementWatch::follow(LogEstimate wear, double running_h) {
    if (found_ && wear.ln > 0.5 * (found_ln_before_ + found_ln_after_)) found_ = false;
    if (!low_) return false;
    const bool found_now = looks_like_one(wear);
    if (found_now) {
        found_ = true;
        found_at_ = began_;
        found_ln_before_ = ln_before_;
        found_ln_after_ = wear.ln;
    }
    if (found_now || running_h - began_running_h_ > done_within_h) low_ = false;
    return found_now;
}

LikelyReplacement ReplacementWatch::likely() const {
    if (!found_) return {};
    return {.at = found_at_, .ratio_before = std::exp(found_ln_before_), .ratio_after = std::exp(found_ln_after_)};
}

}  // namespace slipledger::analytics
