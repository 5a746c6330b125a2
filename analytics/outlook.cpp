#include "analytics/outlook.hpp"

#include <array>
#include <chrono>
#include <cmath>
#include <utility>

#include "analytics/flow.hpp"
#include "analytics/prognosis.hpp"

namespace slipledger::analytics {

namespace {

constexpr double quantile_90 = 1.2815515655446004;  // of the standard normal
constexpr double thousand_h_in_days = 1000.0 / 24.0;
constexpr double farthest_days = 50.0 * 365.25;

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

HoursInHand hours_to(const WearLaws& laws, const LifePrior& prior, const RatioLimit& limit, bool drift_established) {
    HoursInHand left;
    if (!laws.begun() || !std::isfinite(limit.ratio)) return left;
    left.limit = limit.rule;
    const PassageQuantiles passage =
        passage_quantiles({.laws = laws.laws(prior.laws), .prior = prior, .ln_limit = std::log(limit.ratio)});
    left.low = finite_or_unknown(passage.low_h);
    if (!drift_established && passage.mid_h > 0.0) return left;
    left.mid = finite_or_unknown(passage.mid_h);
    left.high = finite_or_unknown(passage.high_h);
    return left;
}

Ranged growth_per_1000_h(double ratio, const DriftEstimate& drift) {
    const double per_drift = ratio * thousand_h_in_days;
    const double reach = quantile_90 * drift.sd;
    return {.value = per_drift * drift.mean,
            .low = per_drift * (drift.mean - reach),
            .high = per_drift * (drift.mean + reach)};
}

std::optional<Instant> instant_ahead(Instant from, double hours, double duty_h_per_day) {
    const double days = hours / duty_h_per_day;
    if (!(days >= 0.0 && days < farthest_days)) return std::nullopt;
    return from + std::chrono::duration_cast<Milliseconds>(std::chrono::duration<double, std::ratio<86400>>(days));
}

}  // namespace slipledger::analytics
