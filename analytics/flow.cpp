#include "analytics/flow.hpp"

#include <algorithm>
#include <limits>

namespace slipledger::analytics {
namespace {

constexpr double nan = std::numeric_limits<double>::quiet_NaN();
constexpr double bar_per_gpa = 1e4;
constexpr double pa_per_bar = 1e5;
constexpr double kelvin = 273.15;

}  // namespace

double theoretical_flow_lpm(double displacement_cm3, double speed_rpm, double stroke_fraction) {
    return displacement_cm3 * speed_rpm * stroke_fraction / 1000.0;
}

double efficiency_by_delivery(double delivery_lpm, double theoretical_lpm) {
    return theoretical_lpm > 0.0 ? delivery_lpm / theoretical_lpm : nan;
}

double efficiency_by_drain(double drain_lpm, double theoretical_lpm) {
    return theoretical_lpm > 0.0 ? 1.0 - drain_lpm / theoretical_lpm : nan;
}

double hydraulic_power_kw(double pressure_bar, double flow_lpm) {
    return pressure_bar * flow_lpm / 600.0;
}

double to_inlet_density_lpm(double flow_lpm, double pressure_rise_bar, double bulk_modulus_gpa) {
    const double left = 1.0 - pressure_rise_bar / (bulk_modulus_gpa * bar_per_gpa);
    return bulk_modulus_gpa > 0.0 && left > 0.0 ? flow_lpm / left : nan;
}

double heating_of_leaked_oil_k(const LeakedOil& oil) {
    if (!(oil.density_kgm3 > 0.0) || !(oil.heat_capacity_jkgk > 0.0)) return nan;
    const double to_heat = 1.0 - oil.expansion_per_k * (oil.temperature_c + kelvin);
    return oil.pressure_drop_bar * pa_per_bar * to_heat / (oil.density_kgm3 * oil.heat_capacity_jkgk);
}

double motor_speed_rpm(const MotorLoad& load) {
    if (load.slip_at_rated == 0.0) return load.nominal_rpm;
    if (!(load.rated_bar > 0.0)) return nan;
    return load.nominal_rpm * (1.0 - load.slip_at_rated * std::max(load.pressure_bar, 0.0) / load.rated_bar);
}

}  // namespace slipledger::analytics
