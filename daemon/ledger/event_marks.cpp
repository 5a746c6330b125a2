#include "daemon/ledger/event_marks.hpp"

#include <algorithm>
#include <array>
#include <set>
#include <string>
#include <string_view>

#include "daemon/ledger/event_body.hpp"
#include "daemon/ledger/statement.hpp"

namespace slipledger::ledger {
namespace {

constexpr std::array<std::string_view, 7> events_that_judge_nothing{
    "note", "acknowledged", "shelved", "unshelved", "out-of-service", "returned-to-service", "unacknowledged"};

bool judges(const Event& event) {
    return std::ranges::find(events_that_judge_nothing, event.kind) == events_that_judge_nothing.end();
}

// Up to where what is read changes.
std::int64_t end_of(const Event& event) {
    const auto to = event.kind == "settled" ? number_in(body_of(event), "to_ms") : std::nullopt;
    return to ? std::max(static_cast<std::int64_t>(*to), ms_of(event.at)) : ms_of(event.at);
}

// Those of today, and those of which the plant file once said so.
std::set<PumpId> pumps_of_reservoir(SQLite::Database& database, const Directory& directory,
                                    const std::string& reservoir) {
    std::set<PumpId> pumps;
    const auto point = directory.reservoirs.find(reservoir);
    if (point == directory.reservoirs.end()) return pumps;
    if (const auto now = directory.pumps_of_point.find(point->second); now != directory.pumps_of_point.end())
        pumps.insert(now->second.begin(), now->second.end());
    SQLite::Statement once(database,
                           "SELECT DISTINCT pump FROM dated_event WHERE kind = 'plant-changed' AND "
                           "json_extract(body, '$.now.reservoir') = ?");
    Binder(once) << reservoir;
    while (once.executeStep()) {
        const auto found = directory.pumps.find(once.getColumn(0).getString());
        if (found != directory.pumps.end()) pumps.insert(found->second);
    }
    return pumps;
}

}  // namespace

void raise_marks(SQLite::Database& database, const Directory& directory, const Event& event, WorkMarks& marks) {
    if (!judges(event)) return;
    const std::int64_t from = ms_of(event.at);
    const std::int64_t to = end_of(event);
    if (!event.pump.empty()) {
        if (const auto pump = directory.pumps.find(event.pump); pump != directory.pumps.end())
            marks.raise(pump->second, from, to);
        return;
    }
    const std::string reservoir = reservoir_of(event);
    if (reservoir.empty()) return marks.raise_all(from, to);
    for (const PumpId pump : pumps_of_reservoir(database, directory, reservoir))
        if (marks.state(pump).newest) marks.raise(pump, from, to);
}

}  // namespace slipledger::ledger
