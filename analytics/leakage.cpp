#include "analytics/leakage.hpp"

#include <algorithm>
#include <cmath>
#include <numbers>

namespace slipledger::analytics {
namespace {

double ratio_of_positive(double value, double reference) {
    return reference > 0.0 ? value / reference : unknown;
}

}  // namespace

LeakageState reference_state(const SectionSpec& spec) {
    return {.pressure_rise_bar = spec.reference.pressure_bar,
            .viscosity_pas = spec.fluid.dynamic_pas(spec.reference.temperature_c),
            .density_kgm3 = spec.fluid.density_kgm3(spec.reference.temperature_c),
            .speed_rpm = spec.reference.speed_rpm};
}

Features features_at(const LeakageState& at, const LeakageState& reference) {
    // max(NaN, 0) keeps the NaN only this way round.
    const double pressure = ratio_of_positive(std::max(at.pressure_rise_bar, 0.0), reference.pressure_rise_bar);
    const double fluidity = ratio_of_positive(reference.viscosity_pas, at.viscosity_pas);
    const double lightness = ratio_of_positive(reference.density_kgm3, at.density_kgm3);
    return {.laminar = pressure * fluidity,
            .orifice = std::sqrt(pressure * lightness),
            .speed = ratio_of_positive(std::abs(at.speed_rpm), reference.speed_rpm)};
}

double healthy_leakage_lpm(const LeakageCoefficients& coefficients, const Features& features) {
    return coefficients.laminar_lpm * features.laminar + coefficients.orifice_lpm * features.orifice +
           coefficients.speed_lpm * features.speed;
}

LeakageLaw leakage_law(const LeakageCoefficients& coefficients, const LeakageState& reference) {
    return {.laminar = coefficients.laminar_lpm * ratio_of_positive(reference.viscosity_pas, reference.pressure_rise_bar),
            .orifice = coefficients.orifice_lpm *
                       std::sqrt(ratio_of_positive(reference.density_kgm3, reference.pressure_rise_bar)),
            .speed = ratio_of_positive(coefficients.speed_lpm, reference.speed_rpm)};
}

double leakage_lpm(const LeakageLaw& law, const LeakageState& at) {
    const double pressure = std::max(at.pressure_rise_bar, 0.0);
    return law.laminar * ratio_of_positive(pressure, at.viscosity_pas) +
           law.orifice * std::sqrt(ratio_of_positive(pressure, at.density_kgm3)) + law.speed * std::abs(at.speed_rpm);
}

double slip_coefficient(const SlipInputs& in) {
    if (!(in.leakage_lpm >= 0.0) || !(in.viscosity_pas > 0.0) || !(in.displacement_cm3 > 0.0) ||
        !(in.pressure_rise_bar > 0.0))
        return unknown;
    const double leakage_m3s = in.leakage_lpm / 60000.0;
    const double radian_m3 = in.displacement_cm3 * 1e-6 / (2.0 * std::numbers::pi);
    return leakage_m3s * in.viscosity_pas / (radian_m3 * in.pressure_rise_bar * 1e5);
}

double clearance_growth(const LeakageCoefficients& coefficients, double leakage_ratio) {
    const double a = coefficients.laminar_lpm;
    const double linear = coefficients.orifice_lpm + coefficients.speed_lpm;
    if (!(a >= 0.0) || !(linear >= 0.0) || !(a + linear > 0.0) || !(leakage_ratio > 0.0)) return unknown;
    const double wanted = leakage_ratio * (a + linear);
    // Rising and convex for g > 0: from a start above the root Newton falls onto it without overshooting.
    double g = std::max(1.0, leakage_ratio);
    for (int step = 0; step < 60; ++step) {
        const double excess = (a * g * g + linear) * g - wanted;
        g -= excess / (3.0 * a * g * g + linear);
    }
    return g - 1.0;
}

}  // namespace slipledger::analytics
