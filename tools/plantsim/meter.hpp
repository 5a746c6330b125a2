// A measuring instrument with the faults an honest one has: a gain a little off, a zero a little off, noise, and a last
// digit.
#pragma once

#include <string_view>

#include "tools/plantsim/chance.hpp"

namespace slipledger::plantsim {

// What the instrument's data sheet promises; spreads are one standard deviation. Threads: a value, share freely.
struct MeterClass {
    double gain_spread = 0.0;  // fraction of the reading
    double zero_spread = 0.0;  // in the unit of the reading
    double noise = 0.0;        // in the unit of the reading
    double noise_share = 0.0;  // fraction of the reading
    double last_digit = 0.1;
    double least = 0.0;            // below it shows nothing
    double viscosity_share = 0.0;  // gain gained per factor e of viscosity above 30 mm2/s
};

MeterClass pressure_class();
MeterClass low_pressure_class();  // of a case or an inlet
MeterClass speed_class();
MeterClass temperature_class();
MeterClass drain_class();     // small gear flow meter
MeterClass delivery_class();  // turbine, calibrated on site

// Threads: immutable, share freely.
class Meter {
public:
    Meter(const MeterClass& kind, std::uint64_t seed, std::string_view name);

    // What it shows at `time`; NaN once in a thousand times, when the logger missed it.
    double show(double truth, double viscosity_cst, Millis time) const;

private:
    MeterClass kind_;
    Chance chance_;
    double gain_;
    double zero_;
};

}  // namespace slipledger::plantsim
