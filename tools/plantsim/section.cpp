#include "tools/plantsim/section.hpp"

#include <algorithm>
#include <cmath>

namespace slipledger::plantsim {

Leakage leakage(const Life& life, const Oil& oil, const Strain& strain, double rated_bar) {
    Leakage sum;
    for (const Gap& gap : life.gaps) {
        const double flow = gap_flow_lpm(gap, oil, strain, rated_bar);
        (gap.to_drain ? sum.to_drain_lpm : sum.inside_lpm) += flow;
    }
    return sum;
}

double delivered_lpm(const Life& life, const Oil& oil, const Strain& strain, double rated_bar, double stroke) {
    const double theoretical = life.displacement_cm3 * life.true_share * strain.speed_rpm / 1000.0;
    // Oil left in the dead volume expands on the way back to the inlet and takes the place of fresh oil.
    const double expanded = theoretical * life.dead_share * compression(strain.temperature_c, strain.pressure_bar);
    const Leakage lost = leakage(life, oil, strain, rated_bar);
    return std::max(0.0, theoretical * stroke - expanded - lost.to_drain_lpm - lost.inside_lpm);
}

Strain reference_point(const Duty& rated) {
    return {.pressure_bar = 0.75 * rated.pressure_bar,
            .speed_rpm = rated.speed_rpm,
            .temperature_c = rated.fluid_temperature_c};
}

double true_ratio(const Life& life, const Fitted& fitted, const Oil& oil, const Duty& rated, double growth) {
    const auto seen = [&](double at_growth) {
        Strain strain = reference_point(rated);
        strain.growth = at_growth;
        const Leakage flow = leakage(life, oil, strain, rated.pressure_bar);
        return fitted.drain ? flow.to_drain_lpm : flow.to_drain_lpm + flow.inside_lpm;
    };
    return seen(growth) / seen(1.0);
}

double growth_for(const Life& life, const Fitted& fitted, const Oil& oil, const Duty& rated, double ratio) {
    double low = 1.0;
    double high = 8.0;
    for (int halving = 0; halving < 60; ++halving) {
        const double middle = 0.5 * (low + high);
        (true_ratio(life, fitted, oil, rated, middle) < ratio ? low : high) = middle;
    }
    return low;
}

WearCourse::WearCourse(const Life& life, const Fitted& fitted, const Oil& oil, const Duty& rated, double year_hours)
    : wear_(life.wear),
      year_hours_(year_hours),
      end_growth_(growth_for(life, fitted, oil, rated, wear_.end_ratio)),
      step_growth_(growth_for(life, fitted, oil, rated, wear_.step_ratio)) {}

double WearCourse::growth(double hours, Millis time) const {
    const double share = std::clamp((hours / year_hours_ - wear_.begins) / (1.0 - wear_.begins), 0.0, 1.0);
    const double slow = (end_growth_ - 1.0) * std::pow(share, wear_.power);
    const bool broken = wear_.step_at && time >= *wear_.step_at;
    return 1.0 + slow + (broken ? step_growth_ - 1.0 : 0.0);
}

}  // namespace slipledger::plantsim
