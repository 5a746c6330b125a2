#include "analytics/onset.hpp"

#include <algorithm>
#include <cmath>
#include <numbers>
#include <vector>

#include "analytics/stats/kalman.hpp"
#include "analytics/wear_filter.hpp"
#include "analytics/wear_motion.hpp"

namespace slipledger::analytics {

namespace {

using Belief = stats::Belief<moving_states>;

constexpr double hours_per_day = 24.0;
const double worn = std::log(1.05);

Belief belief_of(const DayState& state) {
    Belief belief;
    belief.mean << state.wear, state.drift, state.disturbance;
    belief.covariance << state.wear_variance, state.wear_drift_covariance, state.wear_disturbance_covariance,
        state.wear_drift_covariance, state.drift_variance, state.drift_disturbance_covariance,
        state.wear_disturbance_covariance, state.drift_disturbance_covariance, state.disturbance_variance;
    return belief;
}

std::vector<DayVerdict> newest_judged(std::span<const DayVerdict> days) {
    std::vector<DayVerdict> judged;
    for (auto day = days.rbegin(); day != days.rend() && judged.size() < looked_back_days; ++day) {
        if (day->life != days.back().life) break;
        if (day->judged_h > 0.0 && std::isfinite(day->state.wear_variance)) judged.push_back(*day);
    }
    std::ranges::reverse(judged);
    return judged;
}

Belief smoothed(const DayVerdict& day, const DayVerdict& next, const Belief& later, Basis basis) {
    WearMotion wear =
        wear_motion((next.life_running_h - day.life_running_h) / hours_per_day, next.day.date - day.day.date, basis);
    if (next.state.let_go) wear.noise(0, 0) += jump_variance;
    const Belief filtered = belief_of(day.state);
    Belief expected = filtered;
    stats::carry(expected, wear.motion, wear.noise);
    return stats::smooth(filtered, wear.motion, expected, later);
}

// How likely wear was beyond 5 % on each day, looking back.
std::vector<double> beyond(const std::vector<DayVerdict>& days, Basis basis) {
    std::vector<double> likely(days.size());
    Belief belief = belief_of(days.back().state);
    for (std::size_t i = days.size(); i-- > 0;) {
        if (i + 1 < days.size()) belief = smoothed(days[i], days[i + 1], belief, basis);
        const double sd = std::sqrt(std::fmax(belief.covariance(0, 0), 1e-12));
        likely[i] = 0.5 * std::erfc((worn - belief.mean(0)) / sd / std::numbers::sqrt2);
    }
    return likely;
}

// First of the days from which on all are at least so likely; the last day where none is.
std::size_t first_of_run(const std::vector<double>& likely, double share) {
    std::size_t first = likely.size() - 1;
    while (first > 0 && likely[first] >= share && likely[first - 1] >= share) --first;
    return first;
}

}  // namespace

std::optional<Onset> onset_of(std::span<const DayVerdict> days, Basis basis) {
    const std::vector<DayVerdict> judged = newest_judged(days);
    if (judged.empty()) return std::nullopt;
    const std::vector<double> likely = beyond(judged, basis);
    if (likely.back() < 0.5) return std::nullopt;
    const std::size_t low = first_of_run(likely, 0.1);
    return Onset{.date = judged[first_of_run(likely, 0.5)].day.date,
                 .low = judged[low].day.date,
                 .high = judged[first_of_run(likely, 0.9)].day.date,
                 .earlier = low == 0};
}

}  // namespace slipledger::analytics
