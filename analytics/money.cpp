#include "analytics/money.hpp"

#include <algorithm>
#include <cmath>
#include <limits>

namespace slipledger::analytics {
namespace {

double electric_kw(double shaft_kw, double motor_efficiency) {
    return motor_efficiency > 0.0 ? shaft_kw / motor_efficiency : unknown;
}

}  // namespace

double leak_power_kw(const LeakLoss& loss) {
    return electric_kw(loss.healthy_kw * (loss.leakage_ratio - 1.0), loss.motor_efficiency);
}

double flow_lost_share(double leakage_ratio, double healthy_efficiency) {
    if (!(healthy_efficiency > 0.0)) return unknown;
    return (leakage_ratio - 1.0) * (1.0 - healthy_efficiency) / healthy_efficiency;
}

double stretched_power_kw(const StretchedDuty& duty) {
    return electric_kw(duty.full_flow_kw * duty.flow_lost_share, duty.motor_efficiency);
}

double cost_per_year(double power_kw, double running_h_per_year, double energy_price_per_kwh) {
    return power_kw * running_h_per_year * energy_price_per_kwh;
}

// The positive root in the form that loses nothing where growth is small against what is lost already.
double payback_years(const Payback& payback) {
    const double excess = payback.leakage_ratio - 1.0;
    const double growth = std::max(payback.ratio_growth_per_year, 0.0);
    const double owed = payback.replacement_cost / payback.cost_per_year_and_ratio;
    if (!std::isfinite(excess + owed + growth) || payback.replacement_cost < 0.0) return unknown;
    if (!(payback.cost_per_year_and_ratio > 0.0)) return unknown;
    if (owed == 0.0) return 0.0;
    const double root = excess + std::sqrt(excess * excess + 2.0 * growth * owed);
    return root > 0.0 ? 2.0 * owed / root : std::numeric_limits<double>::infinity();
}

}  // namespace slipledger::analytics
