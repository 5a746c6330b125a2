#include "analytics/outlook.hpp"

#include <array>
#include <cmath>
#include <utility>

#include "analytics/flow.hpp"
#include "analytics/prognosis.hpp"

namespace slipledger::analytics {

namespace {

constexpr double quantile_90 = 1.2815515655446004;  // of the standard normal
constexpr double thousand_h_in_days = 1000.0 / 24.0;

double finite_or_unknown(double value) {
    return std::isfinite(value) ? value : unknown;
}

}  // namespace

RatioLimit first_limit(const WearFilter& filter, const SectionSpec& spec, Basis basis,
                       const RatedEfficiency& efficiency) {
    const RuleLimits& limits = spec.limits;
    const double flow = theoretical_flow_lpm(spec.displacement_cm3, spec.reference.speed_rpm, spec.max_stroke_fraction);
    const double healthy_percent = 100.0 * std::exp(filter.healthy_leakage(spec.reference).ln) / flow;
    const std::array<std::pair<Rule, double>, 3> ends{
        {{Rule::leakage_ratio, limits.leakage_ratio.act},
         {Rule::efficiency, 1.0 + limits.efficiency_points_lost.act / efficiency.points_per_ratio},
         {Rule::drain_share, limits.drain_share_percent.act / healthy_percent}}};
    RatioLimit first;
    for (const auto& [rule, ratio] : ends) {
        if (rule == Rule::drain_share && basis != Basis::case_drain) continue;
        if (!(ratio > 1.0) || ratio >= first.ratio) continue;  // NaN: the first one stands
        first = {.ratio = ratio, .rule = name_of(rule)};
    }
    return first;
}

HoursInHand hours_to(const WearFilter& filter, const RatioLimit& limit, bool drift_established) {
    HoursInHand left;
    if (!filter.primed() || !std::isfinite(limit.ratio)) return left;
    left.limit = limit.rule;
    const WearBelief& belief = filter.belief();
    const PassageQuantiles passage = passage_quantiles({.ln_ratio = belief.mean(ln_wear),
                                                        .drift_per_day = belief.mean(drift),
                                                        .ratio_variance = belief.covariance(ln_wear, ln_wear),
                                                        .drift_variance = belief.covariance(drift, drift),
                                                        .covariance = belief.covariance(ln_wear, drift),
                                                        .ln_limit = std::log(limit.ratio)});
    left.low = finite_or_unknown(passage.low_h);
    if (!drift_established && std::exp(belief.mean(ln_wear)) < limit.ratio) return left;
    left.mid = finite_or_unknown(passage.mid_h);
    left.high = finite_or_unknown(passage.high_h);
    return left;
}

Ranged growth_per_1000_h(const WearFilter& filter) {
    if (!filter.primed()) return {};
    const WearBelief& belief = filter.belief();
    const double per_drift = std::exp(belief.mean(ln_wear)) * thousand_h_in_days;
    const double reach = quantile_90 * std::sqrt(belief.covariance(drift, drift));
    return {.value = per_drift * belief.mean(drift),
            .low = per_drift * (belief.mean(drift) - reach),
            .high = per_drift * (belief.mean(drift) + reach)};
}

}  // namespace slipledger::analytics
