#include "analytics/fluid.hpp"

#include <array>
#include <cmath>
#include <limits>
#include <numbers>

namespace slipledger::analytics {
namespace {

constexpr double nan = std::numeric_limits<double>::quiet_NaN();
constexpr double kelvin = 273.15;
constexpr double least_cst = 2.0;              // D341's plain form and D2270's index both end here
constexpr double lubricating_oil_k1 = 0.6278;  // D1250's K1 of lubricating oils, kg/(m3 K)

struct Grade {
    double number;
    double mid_point_cst;
};

constexpr std::array<Grade, 20> grades{{{2, 2.2},     {3, 3.2},     {5, 4.6},     {7, 6.8},     {10, 10.0},
                                        {15, 15.0},   {22, 22.0},   {32, 32.0},   {46, 46.0},   {68, 68.0},
                                        {100, 100.0}, {150, 150.0}, {220, 220.0}, {320, 320.0}, {460, 460.0},
                                        {680, 680.0}, {1000, 1000}, {1500, 1500}, {2200, 2200}, {3200, 3200}}};

// L = a Y^2 + b Y + c and H = d Y^2 + e Y + f up to `below_cst` at 100 degC: D2270's own fit of its table 1.
struct ReferenceOils {
    double below_cst;
    double a, b, c;
    double d, e, f;
};

constexpr std::array<ReferenceOils, 16> reference_oils{{
    {3.8, 1.14673, 1.7576, -0.109, 0.84155, 1.5521, -0.077},
    {4.4, 3.38095, -15.4952, 33.196, 0.78571, 1.7929, -0.183},
    {5.0, 2.5000, -7.2143, 13.812, 0.82143, 1.5679, 0.119},
    {6.4, 0.10100, 16.6350, -45.469, 0.04985, 9.1613, -18.557},
    {7.0, 3.35714, -23.5643, 78.466, 0.22619, 7.7369, -16.656},
    {7.7, 0.01191, 21.4750, -72.870, 0.79762, -0.7321, 14.610},
    {9.0, 0.41858, 16.1558, -56.040, 0.05794, 10.5156, -28.240},
    {12.0, 0.88779, 7.5527, -16.600, 0.26665, 6.7015, -10.810},
    {15.0, 0.76720, 10.7972, -38.180, 0.20073, 8.4658, -22.490},
    {18.0, 0.97305, 5.3135, -2.200, 0.28889, 5.9741, -4.930},
    {22.0, 0.97256, 5.2500, -0.980, 0.24504, 7.4160, -16.730},
    {28.0, 0.91413, 7.4759, -21.820, 0.20323, 9.1267, -34.230},
    {40.0, 0.87031, 9.7157, -50.770, 0.18411, 10.1015, -46.750},
    {55.0, 0.84703, 12.6752, -133.310, 0.17029, 11.4866, -80.620},
    {70.0, 0.85921, 11.1009, -83.190, 0.17130, 11.3680, -76.940},
    {std::numeric_limits<double>::infinity(), 0.83531, 14.6731, -216.246, 0.16841, 11.8493, -96.947},
}};

double walther(double viscosity_cst) {
    return std::log(std::log(viscosity_cst + 0.7));
}

bool is_usable(ViscosityAt point) {
    return point.viscosity_cst >= least_cst && std::isfinite(point.viscosity_cst) && point.temperature_c > -kelvin &&
           std::isfinite(point.temperature_c);
}

bool is_usable(const FluidTraits& traits) {
    return traits.density_15_kgm3 > 0.0 && traits.minimum_cst >= 0.0 && traits.maximum_cst > traits.minimum_cst &&
           traits.bulk_modulus_gpa > 0.0;
}

}  // namespace

double grade_mid_point_cst(double grade) {
    for (const Grade& known : grades)
        if (known.number == grade) return known.mid_point_cst;
    return nan;
}

ViscosityBand grade_band(double grade) {
    const double mid = grade_mid_point_cst(grade);
    return {.low_cst = 0.9 * mid, .high_cst = 1.1 * mid};
}

double viscosity_index(double viscosity_40_cst, double viscosity_100_cst) {
    const double u = viscosity_40_cst;
    const double y = viscosity_100_cst;
    if (!(y >= least_cst) || !(u > y)) return nan;
    const ReferenceOils* oils = reference_oils.data();
    while (y >= oils->below_cst) ++oils;
    const double l = (oils->a * y + oils->b) * y + oils->c;
    const double h = (oils->d * y + oils->e) * y + oils->f;
    if (u > h) return 100.0 * (l - u) / (l - h);
    const double n = (std::log(h) - std::log(u)) / std::log(y);
    return 100.0 + (std::pow(10.0, n) - 1.0) / 0.00715;
}

double viscosity_at_100_cst(double viscosity_40_cst, double index) {
    if (!(viscosity_40_cst > least_cst) || !(index >= 0.0 && index <= 400.0)) return nan;
    double low = least_cst;
    double high = viscosity_40_cst;
    if (viscosity_index(viscosity_40_cst, low) > index) return nan;
    for (int step = 0; step < 60; ++step) {
        const double middle = 0.5 * (low + high);
        (viscosity_index(viscosity_40_cst, middle) < index ? low : high) = middle;
    }
    return 0.5 * (low + high);
}

Fluid::Fluid()
    : Fluid({.temperature_c = 40.0, .viscosity_cst = 46.0}, {.temperature_c = 100.0, .viscosity_cst = 6.76}, {}) {}

Fluid::Fluid(ViscosityAt one, ViscosityAt other, const FluidTraits& traits)
    : one_(one), other_(other), traits_(traits) {
    const double x1 = std::log(one.temperature_c + kelvin);
    const double x2 = std::log(other.temperature_c + kelvin);
    slope_ = (walther(other.viscosity_cst) - walther(one.viscosity_cst)) / (x2 - x1);
    intercept_ = walther(one.viscosity_cst) - slope_ * x1;
}

std::optional<Fluid> Fluid::from_points(ViscosityAt one, ViscosityAt other, const FluidTraits& traits) {
    if (!is_usable(one) || !is_usable(other) || !is_usable(traits)) return std::nullopt;
    const double warmer_by = other.temperature_c - one.temperature_c;
    const double thinner_by = one.viscosity_cst - other.viscosity_cst;
    if (!(warmer_by * thinner_by > 0.0)) return std::nullopt;
    return Fluid(one, other, traits);
}

std::optional<Fluid> Fluid::from_grade(double iso_vg, double viscosity_index, const FluidTraits& traits) {
    const double at_40 = grade_mid_point_cst(iso_vg);
    const double at_100 = viscosity_at_100_cst(at_40, viscosity_index);
    return from_points({.temperature_c = 40.0, .viscosity_cst = at_40},
                       {.temperature_c = 100.0, .viscosity_cst = at_100}, traits);
}

double Fluid::kinematic_cst(double temperature_c) const {
    const double kelvins = temperature_c + kelvin;
    if (!(kelvins > 0.0)) return nan;
    return std::exp(std::exp(intercept_ + slope_ * std::log(kelvins))) - 0.7;
}

// log10 log10 z = (ln ln z - ln ln 10) / ln 10, and log10 T = ln T / ln 10: the slope only changes its sign.
ViscosityLine Fluid::line() const {
    return {.one = one_,
            .other = other_,
            .a = (intercept_ - std::log(std::numbers::ln10)) / std::numbers::ln10,
            .b = -slope_};
}

double Fluid::density_kgm3(double temperature_c) const {
    const double expansion = lubricating_oil_k1 / traits_.density_15_kgm3 * (temperature_c - 15.0);
    return traits_.density_15_kgm3 * std::exp(-expansion * (1.0 + 0.8 * expansion));
}

double Fluid::dynamic_pas(double temperature_c) const {
    return 1e-6 * kinematic_cst(temperature_c) * density_kgm3(temperature_c);
}

}  // namespace slipledger::analytics
