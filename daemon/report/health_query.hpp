// Asks the ledger for a pump's health. Reads stored judgements only, so its cost does not grow with the readings; what
// silence changes is laid over here and never stored.
#pragma once

#include <vector>

#include "config/plant.hpp"
#include "daemon/ledger/reader.hpp"
#include "daemon/report/health.hpp"

namespace slipledger::report {

// A pump is silent when its newest reading is this much older than the plant's newest.
inline constexpr std::chrono::hours silent_after{24};

PumpHealth query_health(const ledger::Reader& reader, const config::Plant& plant, const config::Pump& pump);

// Every section of the plant, most urgent first: by level, then fewest hours in hand, then highest ratio, then name.
// Unjudged sections come last.
std::vector<SectionHealth> query_fleet(const ledger::Reader& reader, const config::Plant& plant);

}  // namespace slipledger::report
