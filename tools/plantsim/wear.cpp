#include "tools/plantsim/wear.hpp"

#include <algorithm>
#include <cmath>
#include <limits>

namespace slipledger::plantsim {
namespace {

constexpr double widest_growth = 8.0;
constexpr int table_steps = 400;

// Between the pillars of a table, straight; at its ends, flat.
double between(const std::vector<std::pair<double, double>>& table, double at) {
    const auto right = std::ranges::upper_bound(table, at, {}, &std::pair<double, double>::first);
    if (right == table.begin()) return table.front().second;
    if (right == table.end()) return table.back().second;
    const auto left = right - 1;
    const double share = (at - left->first) / (right->first - left->first);
    return left->second + share * (right->second - left->second);
}

// Of whose leakage the drawing gives the ratios.
Seen ratios_of(const Life& life, const Fitted& fitted) {
    return life.wear.inside ? Seen::everything : seen_by(fitted);
}

}  // namespace

WearCourse::WearCourse(const Life& life, const Fitted& fitted, const Oil& oil, const Duty& rated, double span_hours)
    : wear_(life.wear),
      span_hours_(span_hours),
      first_growth_(growth_for(life, ratios_of(life, fitted), oil, rated, wear_.first_ratio)),
      end_growth_(growth_for(life, ratios_of(life, fitted), oil, rated, std::max(wear_.end_ratio, wear_.first_ratio))),
      step_growth_(growth_for(life, ratios_of(life, fitted), oil, rated, wear_.step_ratio)) {
    if (wear_.law == WearLaw::gap_power) return;
    for (int i = 0; i <= table_steps; ++i) {
        const double growth = std::pow(widest_growth, static_cast<double>(i) / table_steps);
        ratio_of_growth_.emplace_back(true_ratio(life, ratios_of(life, fitted), oil, rated, growth), growth);
    }
}

double WearCourse::growth(double hours, Millis time) const {
    const double share = std::max(0.0, (hours / span_hours_ - wear_.begins) / (1.0 - wear_.begins));
    const double slow = wear_.law == WearLaw::gap_power
                            ? first_growth_ + (end_growth_ - first_growth_) * std::pow(share, wear_.bend)
                            : growth_of_ratio(ratio_at(share));
    const bool broken = wear_.step_at && time >= *wear_.step_at;
    return std::min(widest_growth, slow + (broken ? step_growth_ - 1.0 : 0.0));
}

double WearCourse::growth_of_ratio(double ratio) const {
    return between(ratio_of_growth_, ratio);
}

double WearCourse::ratio_at(double share) const {
    const double first = wear_.first_ratio;
    const double last = std::max(wear_.end_ratio, first);
    const double bend = wear_.bend;
    if (wear_.law == WearLaw::ratio_power) return first + (last - first) * std::pow(share, bend);
    if (wear_.law == WearLaw::ratio_exponential)
        return first + (last - first) * std::expm1(bend * share) / std::expm1(bend);
    const double power = 1.0 - bend;
    if (std::abs(power) < 1e-6) return first * std::pow(last / first, share);
    const double base = std::pow(first, power) + share * (std::pow(last, power) - std::pow(first, power));
    return base > 0.0 ? std::pow(base, 1.0 / power) : std::numeric_limits<double>::infinity();
}

}  // namespace slipledger::plantsim
