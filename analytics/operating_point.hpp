// Readings of one section, and the operating points they make: an as-of join in which each quantity takes its last value
// not older than its hold. A point stands at each time the section's flow quantity has a value.
#pragma once

#include <array>
#include <vector>

#include "analytics/instant.hpp"
#include "analytics/quantity.hpp"
#include "analytics/section_spec.hpp"
#include "analytics/usual.hpp"

namespace slipledger::analytics {

// One quantity over time: ascending, no equal times, no NaN. Disputed and missing cells are simply not in it.
struct Series {
    std::vector<Instant> times;
    std::vector<double> values;
};

using SectionReadings = std::array<Series, quantity_count>;  // pump- and reservoir-level quantities already merged in

struct OperatingPoint {
    Instant time;
    double flow_lpm = unknown;           // drain or delivery, as the basis says
    double outlet_bar = unknown;
    double case_bar = unknown;           // NaN where unmeasured: counts as 0 bar gauge
    double inlet_bar = unknown;          // the same
    double speed_rpm = unknown;
    double temperature_c = unknown;
    double stroke = unknown;
    double power_kw = unknown;
    double running = unknown;
};

// Points with time in [from, to), ascending.
std::vector<OperatingPoint> align(const SectionReadings& readings, Basis basis, const Usual& usual, Instant from,
                                  Instant to);

}  // namespace slipledger::analytics
