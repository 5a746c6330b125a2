// What an engineer would say of a likely cause: its name in the trade's words, each sign for and against it with its
// numbers, and the one thing that would settle it, with its caution.
#pragma once

#include <string>
#include <vector>

#include "analytics/causes.hpp"
#include "config/plant.hpp"

namespace slipledger::report {

// Threads: a value, share freely.
struct CauseFacts {
    analytics::PumpType type = analytics::PumpType::axial_piston;
    analytics::Basis basis = analytics::Basis::case_drain;
    double test_pressure_bar = 200.0;  // of a reference test: the section's reference point
    config::DisplayUnits units = config::DisplayUnits::metric;
};

// One cause in words. Threads: a value, share freely.
struct CauseWords {
    analytics::CauseKind kind = analytics::CauseKind::none;
    double weight = 0.0;
    std::string title;                   // "wear of the rotating group"
    std::vector<std::string> in_favour;  // sentences
    std::vector<std::string> against;
    std::string settles;  // a sentence or two: what to do, and what to mind
};

std::vector<CauseWords> words_of(const std::vector<analytics::RankedCause>& causes, const CauseFacts& facts);

// The name alone; instruments are named where the evidence says which.
std::string title_of(const analytics::RankedCause& cause, analytics::PumpType type, analytics::Basis basis);

// The likeliest cause is wear, and nothing yet shows that it is not the meter: excess leakage has not been seen to grow
// with what a healthy pump would leak.
bool wear_or_instrument(const std::vector<analytics::RankedCause>& causes);

}  // namespace slipledger::report
