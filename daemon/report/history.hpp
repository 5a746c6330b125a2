// What was judged when: a row a day, or a row a closed summary, of one section, oldest first.
#pragma once

#include <optional>
#include <string>
#include <vector>

#include "analytics/course.hpp"
#include "config/plant.hpp"
#include "daemon/ledger/reader.hpp"
#include "daemon/report/dated_event.hpp"

namespace slipledger::report {

// Threads: a value, share freely.
struct HistoryRow {
    analytics::Instant time;  // its start
    std::string pump;
    std::string section;
    analytics::Basis basis = analytics::Basis::case_drain;
    std::int32_t life = 1;
    analytics::Level level = analytics::Level::unjudged;
    std::string reason;  // why unjudged; empty otherwise
    bool stood_still = false;  // a day without running hours and nothing to judge
    analytics::Ranged leakage_ratio;
    std::optional<analytics::Ranged> filtered_ratio;  // by summary only
    analytics::Ranged efficiency;
    double excess_lpm = analytics::unknown;
    std::optional<analytics::HoursInHand> hours_in_hand;  // by day only
    std::string cause;
    std::vector<DatedEvent> events;  // from its start to the next row's, oldest first; earlier ones in the first row
};

// Rows of every section of `pump` (or of `section` alone), section by section, on the basis that speaks for it today.
std::vector<HistoryRow> history_by_day(const ledger::Reader& reader, const config::Pump& pump,
                                       const std::optional<std::string>& section);
std::vector<HistoryRow> history_by_summary(const ledger::Reader& reader, const config::Pump& pump,
                                           const std::optional<std::string>& section);

}  // namespace slipledger::report
