// What one pass over a pump must do anew, in time: worked out from the mark, the newest reading and what is stored, before
// anything is read. Summaries lie on multiples of their length since the epoch; days are the plant's; a summary belongs to the
// day in which it ends.
#pragma once

#include <cstdint>
#include <optional>

#include "analytics/course.hpp"
#include "daemon/watch/plant_days.hpp"

namespace slipledger::watch {

// A stretch of time, half open.
// Threads: a value, share freely.
struct Span {
    analytics::Instant from;
    analytics::Instant to;

    bool empty() const { return from >= to; }
    bool overlaps(const Span& other) const { return from < other.to && other.from < to; }
};

Span common(const Span& one, const Span& other);

// Threads: a value, share freely.
struct PassSpan {
    analytics::Milliseconds summary_length{};
    analytics::Instant boundary;  // summaries that end by here are closed
    Span touched;                 // summaries that start here are made from readings again
    analytics::Instant from;      // results from here on are replaced
    std::int32_t first_date = 0;  // of the day to which `from` belongs
    std::int32_t last_date = 0;   // of the day to which the last closed summary belongs
    bool cut_short = false;       // more is closed than one pass takes

    // Where the summaries that belong to a day start, whether closed or not.
    Span summaries_of(const analytics::DaySpan& day) const;
    bool is_finished(const analytics::DaySpan& day) const { return boundary >= day.end; }
};

analytics::Instant floor_to(analytics::Instant at, analytics::Milliseconds length);

// Threads: a value, share freely.
struct PassInput {
    analytics::Milliseconds summary_length{};
    analytics::Milliseconds lateness{};
    analytics::Instant oldest;  // of the pump's readings
    analytics::Instant newest;
    Span mark;                                // readings changed from .. to, both included
    std::optional<std::int32_t> stored_until;  // last finished day of every track that has any; none: judge everything
    std::int64_t most_summaries = 20000;       // of one track in one pass: keeps memory bounded
};

// nullopt: nothing is closed from the mark on.
std::optional<PassSpan> pass_span(const PassInput& input, const PlantDays& days);

}  // namespace slipledger::watch
