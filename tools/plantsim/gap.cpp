#include "tools/plantsim/gap.hpp"

#include <algorithm>
#include <cmath>
#include <numbers>

namespace slipledger::plantsim {
namespace {

constexpr double pascal_per_bar = 1e5;
constexpr double lpm_per_m3s = 60000.0;
constexpr double end_losses = 1.5;       // of entrance and exit, in dynamic pressures
constexpr double hole_discharge = 0.65;  // sharp-edged
constexpr double usual_load = 0.75;      // of rated pressure: where drawings give heights and eccentricity

// A piston pressed aside opens the bore by up to 2.5 times; how far depends on side load, thus on pressure.
double sideways(double eccentricity, double load) {
    const double now = std::min(1.0, eccentricity * (0.85 + 0.2 * load));
    return 1.0 + 1.5 * now * now;
}

}  // namespace

double annulus_conductance(double count, double diameter, double length, double clearance) {
    return count * std::numbers::pi * diameter * clearance * clearance * clearance / (12.0 * length);
}

double ring_conductance(double count, double inner_radius, double outer_radius, double height) {
    return count * std::numbers::pi * height * height * height / (6.0 * std::log(outer_radius / inner_radius));
}

double slot_conductance(double count, double width, double length, double height) {
    return count * width * height * height * height / (12.0 * length);
}

GapOil gap_oil(const Oil& oil, const Strain& strain) {
    const double pressure_bar = std::max(0.0, strain.pressure_bar);
    return {.viscosity_pas = gap_viscosity_pas(oil, strain.temperature_c, pressure_bar, strain.oil_age_years),
            .density_kgm3 = density_kgm3(oil, strain.temperature_c)};
}

double gap_flow_lpm(const Gap& gap, const Oil& oil, const Strain& strain, double rated_bar) {
    return gap_flow_lpm(gap, gap_oil(oil, strain), strain, rated_bar);
}

double gap_flow_lpm(const Gap& gap, const GapOil& oil, const Strain& strain, double rated_bar) {
    const double pressure_bar = std::max(0.0, strain.pressure_bar);
    const double load = pressure_bar / rated_bar;
    const double worn = 1.0 + gap.wears * (strain.growth - 1.0);
    const double height = worn * (1.0 + gap.opens_with_pressure * (load - usual_load));
    const double drop_pa = pressure_bar * pascal_per_bar;
    const double density = oil.density_kgm3;

    // drop = laminar q + inertia q^2, solved for q: laminar while slow, held back by its own speed when wide open.
    const double open = gap.conductance_m3 * height * height * height * sideways(gap.eccentricity, load);
    const double laminar = oil.viscosity_pas / open;
    const double area = gap.area_m2 * height;
    const double inertia = end_losses * density / (2.0 * area * area);
    const double slot_m3s = 2.0 * drop_pa / (laminar + std::sqrt(laminar * laminar + 4.0 * inertia * drop_pa));

    const double hole_m2 = gap.hole_m2 * (1.0 + gap.hole_wears * (strain.growth - 1.0));
    const double hole_m3s = hole_discharge * hole_m2 * std::sqrt(2.0 * drop_pa / density);
    const double dragged_lpm = gap.drag_cm3 * worn * strain.speed_rpm / 1000.0;
    return std::max(0.0, (slot_m3s + hole_m3s) * lpm_per_m3s + dragged_lpm);
}

}  // namespace slipledger::plantsim
