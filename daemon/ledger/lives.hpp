// The lives of a section and the dated facts of a pump, read off its events: which cartridge or rotating group was in service
// when, and what the plant file said at the time. Derived anew whenever asked, so that an event entered late sets
// history right without anything else being told.
#pragma once

#include <optional>
#include <span>
#include <string>
#include <string_view>
#include <vector>

#include "analytics/section_spec.hpp"
#include "config/plant.hpp"
#include "daemon/ledger/records.hpp"

namespace slipledger::ledger {

// Threads: a value, share freely.
struct Life {
    std::int32_t number = 1;
    std::optional<Instant> since;  // fitting; not given: the first one, in service before anything was told
    std::optional<Instant> ended;  // replacement; not given: in service
    std::optional<double> displacement_cm3;  // where it differs from the plant file's
    std::string model;                       // empty: the plant file's
    std::optional<analytics::MakerTest> maker_test;
    std::string found;  // what was found when it came out
    std::string note;   // given when it was fitted

    bool covers(Instant at) const { return (!since || *since <= at) && (!ended || at < *ended); }
};

// Ascending, without a gap, never empty. `events` are the pump's, ascending by `at`; those of kind "replaced" count. A body's
// "found" tells of the part that came out, everything else of the part that went in.
std::vector<Life> lives_of(std::span<const Event> events, std::string_view section);

// Those of `events` that concern the pump: its own, and those told of a reservoir that is or once was its.
std::vector<Event> events_concerning(const config::Pump& pump, std::vector<Event> events);

// What the plant file said about a pump, from `at` on (config::pump_facts). Threads: a value, share freely.
struct FactsFrom {
    Instant at;
    std::string facts;             // canonical JSON
    std::optional<Instant> since;  // as the plant file gave it then
};

// Ascending by `at`. What was entered later and dated back replaces all that was said of the time after it. Empty: the pump
// was never seen.
std::vector<FactsFrom> facts_of(std::span<const Event> events);

// The part's model: what the life tells, else what the plant file said of the section when it was fitted.
std::string model_of(const Life& life, std::span<const FactsFrom> facts, const config::Section& today);

// Whether the part was new when watching it began, so that its ratio is "what it leaked when new": it was fitted by a
// `replaced` event, or the plant file gave a `since` at most a week before the pump's first reading, `oldest`.
bool watched_from_new(const Life& life, std::span<const FactsFrom> facts, std::optional<Instant> oldest);

// The event to store when a daemon or command opens the ledger with this plant file; none where it says what the ledger
// holds. The first sight of a pump holds from the beginning of time. A change holds from the pump's `since` where that was
// edited with it, else from the newest reading; `now` is the wall clock.
std::optional<Event> plant_change(const config::Pump& pump, std::span<const Event> events,
                                  std::optional<Instant> newest_reading, Instant now);

}  // namespace slipledger::ledger
