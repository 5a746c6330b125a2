// A test with bucket and stopwatch: drain or delivery flow at a set pressure, speed and temperature, measured past
// every meter of the plant. It outranks what is inferred from readings.
#pragma once

#include <optional>

#include "analytics/leakage.hpp"
#include "analytics/section_spec.hpp"

namespace slipledger::analytics {

struct ReferenceTest {
    Basis of = Basis::case_drain;  // which flow went into the bucket
    double flow_lpm = unknown;
    DutyPoint at;
    double viscosity_cst = unknown;  // else from the oil at at.temperature_c
    double accuracy = 0.03;  // of the flow, one standard deviation: bucket, stopwatch and the set point together
    bool as_new = false;     // the part was as new then: what it leaks is its baseline
};

// What a test says of the leakage, at a point in terms of the section's reference point.
struct TestedLeakage {
    double leakage_lpm = unknown;
    double sd_lpm = unknown;
    Features features;
    double flow_lpm = unknown;
    double speed_rpm = unknown;
};

// Leakage a test saw: drain flow less flushing, or name-plate theoretical flow less delivery; sd is accuracy x flow.
//
// nullopt where a figure is missing or out of range: flow below 0, speed or pressure not positive, no viscosity.
// Example: 3.3 L/min of drain, 3 %, at the reference point -> 3.3 +- 0.099 L/min, features 1, 1, 1.
// Source: definition; 3 % is common practice, no source.
std::optional<TestedLeakage> tested_leakage(const ReferenceTest& test, const SectionSpec& spec);

}  // namespace slipledger::analytics
