#include "analytics/unit_jump.hpp"

#include <algorithm>
#include <array>
#include <cmath>
#include <span>

namespace slipledger::analytics {

namespace {

constexpr std::int32_t memory = 24;          // summaries: a day or two of shifts
constexpr std::int32_t least_seen = 12;      // before that a level is not known
constexpr double tolerance = 0.25;           // in the logarithm: duty changes too within the hour
constexpr double out_of_scatter = 4.0;       // standard deviations that a factor must be away from daily life
constexpr double temperature_within = 10.0;  // degF: some 5 K of daily life
constexpr double least_difference = 20.0;    // K: at -40 both scales agree
constexpr double fahrenheit_told = 0.0;

constexpr std::array<double, 4> of_flow{3.785411784, 10.0, 60.0, 1000.0};
constexpr std::array<double, 3> of_pressure{10.0, 14.503773773, 100.0};
constexpr std::array<double, 1> of_speed{60.0};

std::span<const double> factors_of(Quantity quantity) {
    switch (quantity) {
        case Quantity::case_drain_flow:
        case Quantity::delivery_flow:
            return of_flow;
        case Quantity::outlet_pressure:
            return of_pressure;
        case Quantity::shaft_speed:
            return of_speed;
        default:
            return {};
    }
}

double fahrenheit(double celsius) {
    return 1.8 * celsius + 32.0;
}

double fahrenheit_of(double before_c, double after_c) {
    if (std::abs(after_c - before_c) < least_difference) return unknown;
    const bool told = std::abs(after_c - fahrenheit(before_c)) < temperature_within ||
                      std::abs(before_c - fahrenheit(after_c)) < temperature_within;
    return told ? fahrenheit_told : unknown;
}

}  // namespace

double UnitJumpWatch::factor_of(double mean) const {
    if (seen_ < least_seen) return unknown;
    if (quantity_ == Quantity::fluid_temperature) return fahrenheit_of(before_, mean);
    const double step = std::log(mean / before_);
    for (const double factor : factors_of(quantity_)) {
        const double ln = std::log(factor);
        if (ln < out_of_scatter * std::sqrt(ln_variance_)) continue;
        if (std::abs(step - ln) < tolerance) return factor;
        if (std::abs(step + ln) < tolerance) return 1.0 / factor;
    }
    return unknown;
}

bool UnitJumpWatch::was_usual(double factor) const {
    if (quantity_ == Quantity::fluid_temperature) return std::abs(last_ - before_) < least_difference / 2.0;
    return std::abs(std::log(last_ / before_)) < std::abs(std::log(factor)) / 2.0;
}

bool UnitJumpWatch::gone_back(double mean) const {
    if (quantity_ == Quantity::fluid_temperature) return std::abs(mean - jump_.before) < std::abs(mean - jump_.after);
    return std::abs(std::log(mean / jump_.before)) < std::abs(std::log(mean / jump_.after));
}

void UnitJumpWatch::add(double mean) {
    const bool logarithmic = quantity_ != Quantity::fluid_temperature;
    if (!std::isfinite(mean) || (logarithmic && !(mean > 0.0))) return;
    if (told() && !gone_back(mean)) return;
    const double factor = told() ? unknown : factor_of(mean);
    if (std::isfinite(factor) && (in_a_row_ > 0 || was_usual(factor))) {
        in_a_row_ = jump_.factor == factor ? in_a_row_ + 1 : 1;
        jump_ = {.before = before_, .after = mean, .factor = factor};
        return;
    }
    in_a_row_ = 0;
    jump_ = {};
    last_ = mean;
    const double before = seen_ > 0 ? before_ : mean;
    seen_ = std::min(seen_ + 1, memory);
    before_ = before + (mean - before) / seen_;
    const double off = logarithmic ? std::log(mean / before) : 0.0;
    ln_variance_ += (off * off - ln_variance_) / seen_;
}

}  // namespace slipledger::analytics
