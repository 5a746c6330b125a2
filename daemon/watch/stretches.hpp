// The time of one section cut where its facts change: within a stretch one life is in service and one set of facts holds, so a
// summary never mixes two.
#pragma once

#include <optional>
#include <span>
#include <string_view>
#include <vector>

#include "config/plant.hpp"
#include "daemon/ledger/lives.hpp"
#include "daemon/ledger/records.hpp"

namespace slipledger::watch {

// Threads: a value, share freely.
struct Stretch {
    analytics::Instant from = analytics::Instant::min();
    analytics::Instant to = analytics::Instant::max();
    ledger::Life life;
    config::Pump pump;        // with the facts of the time
    config::Section section;  // the same of the section
    bool watched_from_new = false;
};

// Ascending, without a gap, from the beginning of time to its end. `events` are the pump's, ascending by `at`; `oldest` is
// its first reading.
std::vector<Stretch> stretches_of(const config::Pump& today, const config::Section& section,
                                  std::span<const ledger::Event> events, std::optional<analytics::Instant> oldest);

// Whether the event changes what holds from its time on, so that everything after it is judged anew.
bool changes_facts(const ledger::Event& event);

// Index of the stretch that covers `at`.
std::size_t stretch_at(std::span<const Stretch> stretches, analytics::Instant at);

}  // namespace slipledger::watch
