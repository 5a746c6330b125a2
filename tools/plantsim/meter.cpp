#include "tools/plantsim/meter.hpp"

#include <cmath>
#include <limits>

namespace slipledger::plantsim {
namespace {

constexpr double missed_share = 0.001;
constexpr std::int64_t gain_index = -1;
constexpr std::int64_t zero_index = -2;
constexpr std::int64_t miss_stream = 1LL << 52;  // times in ms stay far below
constexpr double calibration_cst = 30.0;

}  // namespace

MeterClass pressure_class() {
    return {.gain_spread = 0.003, .zero_spread = 0.15, .noise = 0.1, .noise_share = 0.003, .last_digit = 0.1};
}

MeterClass low_pressure_class() {
    return {.gain_spread = 0.005, .zero_spread = 0.01, .noise = 0.005, .last_digit = 0.005};
}

MeterClass speed_class() {
    return {.gain_spread = 0.0003, .noise = 0.6, .last_digit = 1.0, .least = 5.0};
}
MeterClass temperature_class() {
    return {.zero_spread = 0.3, .noise = 0.1, .last_digit = 0.1};
}

MeterClass drain_class() {
    return {.gain_spread = 0.01,
            .zero_spread = 0.015,
            .noise = 0.02,
            .noise_share = 0.012,
            .last_digit = 0.02,
            .least = 0.1,
            .viscosity_share = 0.003};
}

MeterClass delivery_class() {
    return {.gain_spread = 0.002,
            .zero_spread = 0.03,
            .noise = 0.05,
            .noise_share = 0.002,
            .last_digit = 0.05,
            .least = 1.0,
            .viscosity_share = 0.0005};
}

Meter::Meter(const MeterClass& kind, std::uint64_t seed, std::string_view name)
    : kind_(kind),
      chance_(seed, name),
      gain_(1.0 + kind.gain_spread * chance_.normal(gain_index)),
      zero_(kind.zero_spread * chance_.normal(zero_index)) {}

double Meter::show(double truth, double viscosity_cst, Millis time) const {
    if (chance_.uniform(miss_stream + time) < missed_share) return std::numeric_limits<double>::quiet_NaN();
    const double thick = 1.0 + kind_.viscosity_share * std::log(viscosity_cst / calibration_cst);
    const double noise = std::hypot(kind_.noise, kind_.noise_share * truth) * chance_.normal(time);
    if (truth < kind_.least && kind_.least > 0.0) return 0.0;
    const double shown = truth * gain_ * thick + zero_ + noise;
    return std::round(shown / kind_.last_digit) * kind_.last_digit + 0.0;  // + 0.0: no "-0"
}

}  // namespace slipledger::plantsim
