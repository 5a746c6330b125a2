#include "analytics/verdict.hpp"

#include <algorithm>
#include <cmath>

namespace slipledger::analytics {

namespace {

constexpr double quantile_90 = 1.2815515655446004;  // of the standard normal
constexpr double least_deadband = 0.02;             // of a ratio limit
constexpr double points_deadband = 0.05;            // of a limit on points lost
constexpr double enough_span = 1.5;
constexpr double seldom = 0.10;

template <typename Low>
RuleJudgement judge_range(const Ranged& range, const Ladder& ladder, double deadband_share, Low low_end) {
    RuleJudgement judgement{.value = range.value};
    for (const Level level : {Level::watch, Level::plan, Level::act}) {
        const double limit = limit_of(ladder, level);
        if (range.value > limit && range.low > low_end(limit)) judgement.beyond = level;
        if (range.value > limit - std::max(ladder.deadband, deadband_share * limit)) judgement.within = level;
    }
    return judgement;
}

}  // namespace

std::string_view name_of(UnjudgedReason reason) {
    switch (reason) {
        case UnjudgedReason::none:
            return "";
        case UnjudgedReason::no_data:
            return "no-data";
        case UnjudgedReason::learning:
            return "learning";
        case UnjudgedReason::seldom_judged:
            return "seldom-judged";
        case UnjudgedReason::shared_drain:
            return "shared-drain";
        case UnjudgedReason::no_basis:
            return "no-basis";
        case UnjudgedReason::no_temperature:
            return "no-temperature";
        case UnjudgedReason::silent:
            return "silent";
        case UnjudgedReason::instrument:
            return "instrument-suspect";
    }
    return "";
}

Ranged quoted(const LogEstimate& estimate) {
    const double reach = quantile_90 * estimate.sd;
    return {
        .value = std::exp(estimate.ln), .low = std::exp(estimate.ln - reach), .high = std::exp(estimate.ln + reach)};
}

double ratio_low_wanted(double limit) {
    return 1.0 + (limit - 1.0) / 2.0;
}

double points_low_wanted(double limit) {
    return limit / 2.0;
}

RuleJudgement judge_ratio(const Ranged& ratio, const Ladder& ladder) {
    return judge_range(ratio, ladder, least_deadband, ratio_low_wanted);
}

RuleJudgement judge_points_lost(const Ranged& points, const Ladder& ladder) {
    return judge_range(points, ladder, points_deadband, points_low_wanted);
}

RuleJudgement capped(RuleJudgement judgement, Level most) {
    judgement.beyond = std::min(judgement.beyond, most);
    judgement.within = std::min(judgement.within, most);
    return judgement;
}

Level most_urgent_allowed(const SectionSpec& spec, Basis basis, double laminar_span) {
    const bool told_apart = basis == Basis::case_drain || laminar_span >= enough_span;
    return spec.has_temperature_sensor && told_apart ? Level::act : Level::watch;
}

UnjudgedReason unjudged_reason(const Knowledge& knowledge) {
    if (!knowledge.temperature) return UnjudgedReason::no_temperature;
    if (knowledge.shared_drain) return UnjudgedReason::shared_drain;
    if (!knowledge.judged_yet) return UnjudgedReason::no_data;
    if (knowledge.learning_h_left > 0.0) return UnjudgedReason::learning;
    if (knowledge.share_judged < seldom) return UnjudgedReason::seldom_judged;
    return UnjudgedReason::none;
}

}  // namespace slipledger::analytics
