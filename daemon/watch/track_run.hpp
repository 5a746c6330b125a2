// The filter's side of a pass: leads the course of one section on one basis through its summaries, day after day, from the
// newest checkpoint before the first thing that changed, and collects what came of it.
#pragma once

#include <optional>
#include <vector>

#include "analytics/course.hpp"
#include "daemon/ledger/reader.hpp"
#include "daemon/watch/section_days.hpp"

namespace slipledger::watch {

// Threads: a value, share freely.
struct TrackRun {
    ledger::TrackResult result;                       // of what the pass replaces
    std::vector<analytics::DayVerdict> finished_days;  // the last one before the pass included, for notices
    std::optional<std::int32_t> began;                // date of the first summary; none: nothing to judge on this basis
};

TrackRun run_track(const ledger::Reader& reader, const ledger::TrackEntry& track, const SectionView& view,
                   const RemadeSummaries& remade);

}  // namespace slipledger::watch
