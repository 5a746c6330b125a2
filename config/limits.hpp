// Where each rule of the alarm list begins, per section, after the plant's, the pump's and the section's own entries
// were laid over the built-in defaults of the pump's type.
#pragma once

#include <chrono>
#include <optional>

#include "analytics/pump_type.hpp"

namespace slipledger::config {

// The limits of one rule, least to most urgent; a level without a limit is never raised by this rule.
// Threads: a value, share freely.
struct Ladder {
    std::optional<double> watch;
    std::optional<double> plan;
    std::optional<double> act;
    std::chrono::seconds on_delay{0};   // data time the value must stay beyond the limit before the level is raised
    std::chrono::seconds off_delay{0};  // data time it must stay inside before the level is cleared
    double deadband = 0.0;              // how far inside the limit the value must come, in the rule's own unit

    bool operator==(const Ladder&) const = default;
};

// Threads: a value, share freely.
struct Limits {
    Ladder leakage_ratio;        // ratio, 1 = as new; judged on days, so its delays are whole days
    Ladder efficiency_points;    // points of volumetric efficiency lost against the life's baseline
    Ladder drain_share_percent;  // raw case drain flow over theoretical flow
    Ladder over_temperature_c;   // fluid temperature
    Ladder case_pressure_bar;    // case pressure
    Ladder inlet_vacuum_bar;     // how far the inlet is below 0 bar gauge, as a positive number
    double step_lasting_h = 12.0;  // running hours that a sudden change must last before it is told as a step

    bool operator==(const Limits&) const = default;
};

// The built-in defaults of a pump type (common practice, no source, but for the leakage ratio: the method's own).
Limits default_limits(analytics::PumpType type);

}  // namespace slipledger::config
