#include "tools/plantsim/oil.hpp"

#include <cmath>

namespace slipledger::plantsim {
namespace {

constexpr double zero_celsius_k = 273.15;
constexpr double heating_k_per_bar = 0.047;
constexpr double kept_by_the_oil = 0.8;

double walther(double cst) {
    return std::log10(std::log10(cst + 0.7));
}

}  // namespace

double kinematic_cst(const Oil& oil, double temperature_c, double age_years) {
    const double warm = std::log10(40.0 + zero_celsius_k);
    const double hot = std::log10(100.0 + zero_celsius_k);
    const double slope = (walther(oil.at_40_cst) - walther(oil.at_100_cst)) / (hot - warm);
    const double line = walther(oil.at_40_cst) - slope * (std::log10(temperature_c + zero_celsius_k) - warm);
    return (std::pow(10.0, std::pow(10.0, line)) - 0.7) * (1.0 - oil.thinning_per_year * age_years);
}

double density_kgm3(const Oil& oil, double temperature_c) {
    return oil.density_15_kgm3 - 0.65 * (temperature_c - 15.0);
}

double gap_viscosity_pas(const Oil& oil, double temperature_c, double pressure_bar, double age_years) {
    const double half_heated_c = temperature_c + 0.5 * kept_by_the_oil * heating_k_per_bar * pressure_bar;
    const double thickening = std::exp(oil.barus_per_gpa * 1e-4 * 0.5 * pressure_bar);
    return kinematic_cst(oil, half_heated_c, age_years) * 1e-6 * density_kgm3(oil, half_heated_c) * thickening;
}

double compression(double temperature_c, double pressure_bar) {
    // Tangent modulus in bar: 15500 unpressed and at 50 degC, stiffer under pressure, softer when hot. The air term is
    // what half a per cent of bubbles at 1 bar leaves: most of it is gone before 30 bar.
    const double modulus_bar = 15500.0 - 60.0 * (temperature_c - 50.0) + 5.0 * pressure_bar;
    const double air = 0.002 * pressure_bar / (pressure_bar + 10.0);
    return pressure_bar / modulus_bar + air;
}

}  // namespace slipledger::plantsim
