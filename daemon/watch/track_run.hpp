// The filter's side of a pass: leads the course of one section on one basis through its summaries, day after day, from the
// newest checkpoint before the first thing that changed, and collects what came of it.
#pragma once

#include <optional>
#include <vector>

#include "analytics/course.hpp"
#include "daemon/ledger/reader.hpp"
#include "daemon/watch/section_days.hpp"
#include "daemon/watch/sisters.hpp"

namespace slipledger::watch {

// Threads: a value, share freely.
struct TrackRun {
    ledger::TrackResult result;                       // of what the pass replaces
    std::vector<analytics::DayVerdict> finished_days;  // the last one before the pass included, for notices
    std::optional<std::int32_t> began;                // date of the first summary; none: nothing to judge on this basis
};

TrackRun run_track(const ledger::Reader& reader, const ledger::TrackEntry& track, const SectionView& view,
                   const RemadeSummaries& remade, const SistersAsked& sisters);

// A course as it stood at the end of one stored summary. Threads: one at a time, as the course.
struct Replay {
    analytics::Course course;
    analytics::SectionSpec spec;        // that held then
    analytics::SummaryVerdict verdict;  // the same as stored, unless readings wait to be judged anew
    analytics::DaySpan day;             // to which the summary belongs
};

// Leads the course over the stored summaries again, from the checkpoint before the day of `until` up to the end of that
// summary: how a verdict came about is shown by the very code that judged. `view`'s facts reach back to the checkpoint.
std::optional<Replay> replay_track(const ledger::Reader& reader, const ledger::TrackEntry& track,
                                   const SectionView& view, const ledger::SummaryRecord& until);

}  // namespace slipledger::watch
