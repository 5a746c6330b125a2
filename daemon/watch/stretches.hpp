// The time of one section cut where its facts change: within a stretch one life is in service and one set of facts holds, so a
// summary never mixes two.
#pragma once

#include <optional>
#include <span>
#include <string_view>
#include <vector>

#include "analytics/fact_change.hpp"
#include "analytics/reference_test.hpp"
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
    analytics::FactChange begins_with;              // what changed at `from`, within a life
    std::optional<analytics::Instant> setting_since;  // when the compensator was set as it is; not given: nobody told
};

// Of the part in service: what the life tells, else the plant file of the time.
std::string model_of(const Stretch& stretch);
double displacement_of(const Stretch& stretch);

// A reference test of the section, and when it was made. Threads: a value, share freely.
struct DatedTest {
    analytics::Instant at;
    analytics::ReferenceTest test;
};

// Ascending, without a gap, from the beginning of time to its end. `events` are the pump's, ascending by `at`; `oldest` is
// its first reading.
std::vector<Stretch> stretches_of(const config::Pump& today, const config::Section& section,
                                  std::span<const ledger::Event> events, std::optional<analytics::Instant> oldest);

// Whether the event changes what holds from its time on, so that everything after it is judged anew.
bool changes_facts(const ledger::Event& event);

// Reference tests of the section, ascending by `at`. `events` are the pump's, ascending.
std::vector<DatedTest> tests_of(std::span<const ledger::Event> events, std::string_view section);

// Index of the stretch that covers `at`.
std::size_t stretch_at(std::span<const Stretch> stretches, analytics::Instant at);

}  // namespace slipledger::watch
