// What was told of a section, by our pipeline or by a yardstick: the one form in which the bench marks them all.
#pragma once

#include <limits>
#include <optional>
#include <string>
#include <vector>

#include "tools/plantsim/section.hpp"

namespace slipledger::judging {

using plantsim::Millis;

inline constexpr double not_told = std::numeric_limits<double>::quiet_NaN();

// One day as it stood at its end. Threads: a value, share freely.
struct DayTold {
    Millis end = 0;
    bool judged = false;    // it had a level
    bool alerting = false;  // above sound
    plantsim::Seen seen = plantsim::Seen::drain;
    double ratio = not_told;
    double efficiency = not_told;  // fraction
    bool at_rated = true;          // else at the reference point
    bool life_given = false;       // a range of hours in hand
    double life_low_h = not_told;
    double life_mid_h = not_told;
    double life_high_h = not_told;  // NaN though given: it may last for ever
    std::string cause{};
};

// From the moment a section was told to be worn until that was taken back. Threads: a value, share freely.
struct AlertTold {
    Millis raised = 0;
    std::optional<Millis> cleared{};
};

// Threads: a value, share freely.
struct SectionTold {
    std::vector<AlertTold> alerts{};
    std::vector<Millis> steps{};        // moments at which a step was called one
    std::vector<DayTold> days{};        // on the basis that speaks, ascending
    std::vector<DayTold> other_days{};  // on the other basis, where both are fitted
    std::string compared_with{};        // in the report at the end
    std::string sentence{};             // the same
    bool sound_at_end = false;
};

}  // namespace slipledger::judging
