// What people told of a pump and what changed on it, with its date: notes, replacements, oil changes. A report without them
// leaves out why a curve bends.
#pragma once

#include <span>
#include <string>
#include <string_view>
#include <vector>

#include "analytics/instant.hpp"
#include "daemon/ledger/records.hpp"

namespace slipledger::report {

// Threads: a value, share freely.
struct DatedEvent {
    analytics::Instant at;
    std::string kind;
    std::string section;  // empty: the pump
    std::string by;
    std::string text;

    bool operator==(const DatedEvent&) const = default;
};

// The newest `most` events of the section or its whole pump, newest first. `events` ascend by `at`. What the plant file
// said when the pump was first seen has no date and is left out.
std::vector<DatedEvent> dated_events(std::span<const ledger::Event> events, std::string_view section, std::size_t most);

}  // namespace slipledger::report
