// What is told of the alarm changes a pass brings: each change once, whatever is judged again, and one correction where
// late data moved or removed what was told already. The text is a function of what is stored, so that the same change is
// always told in the same words.
#pragma once

#include <optional>
#include <span>
#include <string>
#include <vector>

#include "analytics/course.hpp"
#include "config/plant.hpp"
#include "daemon/ledger/records.hpp"
#include "daemon/report/episodes.hpp"
#include "daemon/watch/stretches.hpp"

namespace slipledger::watch {

// What a notice's text is made from. Threads: a value, share freely.
struct NoticeContext {
    const config::Plant& plant;
    const config::Pump& pump;
    const config::Section& section;
    analytics::Basis basis = analytics::Basis::case_drain;
    std::span<const Stretch> stretches;
    std::span<const analytics::DayVerdict> finished_days;  // ascending
    bool temperature_known = true;
    analytics::Instant first_reading;
};

// The same for the same change whatever was loaded in which order.
std::string notice_id(const report::AlarmPlace& place, const analytics::AlarmChange& change);

// Changes of one track before and after a pass. Threads: a value, share freely.
struct ChangesOfPass {
    std::span<const analytics::AlarmChange> now;     // from the pass's beginning on
    std::span<const analytics::AlarmChange> stored;  // the same span, as it was
    std::span<const ledger::Notice> told;            // the pump's notices, in order
    analytics::Instant from;                         // what was told of earlier times stands
    analytics::Instant to;                           // what was told of later times is not looked at in this pass
};

// In order of data time, corrections first.
std::vector<ledger::Notice> notices_of(const NoticeContext& context, const ChangesOfPass& changes);

}  // namespace slipledger::watch
