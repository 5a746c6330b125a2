// The lives of parts, side by side by model: how long each ran, how fast it wore, how it ended, and whether the last
// verdict on it was right by what was found when it came out.
#pragma once

#include <optional>
#include <string>
#include <vector>

#include "analytics/hindsight.hpp"
#include "config/plant.hpp"
#include "daemon/ledger/reader.hpp"
#include "daemon/report/health.hpp"

namespace slipledger::report {

// Threads: a value, share freely.
struct PastLife {
    std::string pump;
    std::string section;
    std::string model;  // empty: not told
    std::int32_t number = 1;
    std::optional<Instant> from;  // fitting; not given: in service before watching began
    std::optional<Instant> to;    // replacement; not given: in service
    std::string found;
    std::string note;                              // given when it was fitted
    std::optional<analytics::Basis> basis;         // none: nothing was judged
    std::optional<analytics::DayVerdict> verdict;  // of its last finished day
    double wear_per_1000_h = analytics::unknown;   // of the ratio, mean over the hours watched
    analytics::Hindsight hindsight = analytics::Hindsight::not_known;
};

// The lives of one model. Threads: a value, share freely.
struct ModelLives {
    std::string model;
    std::vector<PastLife> lives;  // in order of pump, section and number
    std::size_t ended = 0;
    double median_hours = analytics::unknown;            // of those that ended
    double median_wear_per_1000_h = analytics::unknown;  // of those that ended
    std::size_t right = 0;
    std::size_t late = 0;
    std::size_t wrong = 0;
};

// By model in order of name, those without one last. `pump` null: of the whole plant.
std::vector<ModelLives> query_lives(const ledger::Reader& reader, const config::Plant& plant, const config::Pump* pump,
                                    const std::optional<std::string>& model);

}  // namespace slipledger::report
