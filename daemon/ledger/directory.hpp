// Names to numbers: every pump, section, reservoir, drain group, feed and track of the plant file, with the ids the
// ledger gave them when it was opened. A section's quantities come from its own point, else its pump's, its drain group's or its reservoir's;
// in a pump with one section, section and pump are the same point, so that a row touches one block.
#pragma once

#include <map>
#include <optional>
#include <string>
#include <string_view>
#include <utility>
#include <vector>

#include "analytics/section_spec.hpp"
#include "daemon/ledger/records.hpp"

namespace slipledger::ledger {

struct TrackEntry {
    TrackId id{};
    PumpId pump{};
    std::string pump_name;
    std::string section;
    analytics::Basis basis = analytics::Basis::case_drain;
};

// Threads: immutable once made, share freely.
struct Directory {
    std::map<std::string, PumpId, std::less<>> pumps;
    std::map<std::pair<std::string, std::string>, PointId> points;  // (pump, section); section "" is the pump itself
    std::map<std::string, PointId, std::less<>> reservoirs;
    std::map<std::string, PointId, std::less<>> drain_groups;
    std::map<std::string, FeedId, std::less<>> feeds;               // those of the plant file, and "command" for `load`
    std::vector<TrackEntry> tracks;                                 // every section on both bases
    std::map<PointId, std::vector<PumpId>> pumps_of_point;          // whose judgement a reading there touches

    std::optional<PointId> point(std::string_view pump, std::string_view section) const;
    const TrackEntry& track(std::string_view pump, std::string_view section, analytics::Basis basis) const;
};

}  // namespace slipledger::ledger
