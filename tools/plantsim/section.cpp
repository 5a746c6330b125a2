#include "tools/plantsim/section.hpp"

#include <algorithm>
#include <cmath>

namespace slipledger::plantsim {

Leakage leakage(const Life& life, const Oil& oil, const Strain& strain, double rated_bar) {
    Leakage sum;
    const GapOil in_gaps = gap_oil(oil, strain);
    for (const Gap& gap : life.gaps) {
        const double flow = gap_flow_lpm(gap, in_gaps, strain, rated_bar);
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

Strain rated_point(const Duty& rated) {
    return {
        .pressure_bar = rated.pressure_bar, .speed_rpm = rated.speed_rpm, .temperature_c = rated.fluid_temperature_c};
}

Seen seen_by(const Fitted& fitted) {
    return fitted.drain ? Seen::drain : Seen::everything;
}

double true_ratio(const Life& life, Seen seen, const Oil& oil, const Duty& rated, double growth) {
    const auto leaks = [&](double at_growth) {
        Strain strain = reference_point(rated);
        strain.growth = at_growth;
        const Leakage flow = leakage(life, oil, strain, rated.pressure_bar);
        return seen == Seen::drain ? flow.to_drain_lpm : flow.to_drain_lpm + flow.inside_lpm;
    };
    return leaks(growth) / leaks(1.0);
}

double true_efficiency(const Life& life, Seen seen, const Oil& oil, Strain point, double rated_bar, double growth) {
    point.growth = growth;
    const double theoretical = life.displacement_cm3 * life.true_share * point.speed_rpm / 1000.0;
    if (seen == Seen::everything) return delivered_lpm(life, oil, point, rated_bar, 1.0) / theoretical;
    return 1.0 - leakage(life, oil, point, rated_bar).to_drain_lpm / theoretical;
}

double growth_for(const Life& life, Seen seen, const Oil& oil, const Duty& rated, double ratio) {
    double low = 1.0;
    double high = 8.0;
    for (int halving = 0; halving < 60; ++halving) {
        const double middle = 0.5 * (low + high);
        (true_ratio(life, seen, oil, rated, middle) < ratio ? low : high) = middle;
    }
    return low;
}

}  // namespace slipledger::plantsim
