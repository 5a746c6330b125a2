// What people told between two edits of the plant file: another oil, a sample of it, another setting of the
// compensator. Whichever was said last holds: an event from its time on, until the plant file's own word on the same
// thing is edited.
#pragma once

#include <optional>
#include <span>
#include <vector>

#include "analytics/fact_change.hpp"
#include "config/plant.hpp"
#include "daemon/ledger/lives.hpp"
#include "daemon/ledger/records.hpp"

namespace slipledger::watch {

// The plant file's facts of a pump by time. Threads: a value, share freely.
class PlantFileFacts {
public:
    // `facts` as ledger::facts_of gives them.
    PlantFileFacts(const config::Pump& today, std::span<const ledger::FactsFrom> facts)
        : today_(today), facts_(facts) {}

    // Today's plant file from the last change on.
    config::Pump at(analytics::Instant at) const;

    // When the plant file's word on the oil, and on the section's compensator, that holds at `at` was given; the
    // beginning of time where it was never edited.
    analytics::Instant oil_since(analytics::Instant at) const;
    analytics::Instant setting_since(analytics::Instant at, std::string_view section) const;

private:
    template <typename Same>
    analytics::Instant said_since(analytics::Instant at, Same same) const;

    const config::Pump& today_;
    std::span<const ledger::FactsFrom> facts_;
};

// The oil in the pump's reservoir at `at`: that of `pump`, the plant file's, with what was told of it since `since`
// laid over it. `events` ascend by `at`. What can be no oil counts as not told.
config::Fluid told_oil(const config::Pump& pump, std::span<const ledger::Event> events, analytics::Instant since,
                       analytics::Instant at);

// A setting of the compensator that was told, and since when it holds. Threads: a value, share freely.
struct ToldSetting {
    double bar = 0.0;
    analytics::Instant since;
};
std::optional<ToldSetting> told_setting(std::string_view section, std::span<const ledger::Event> events,
                                        analytics::Instant since, analytics::Instant at);

// What changed at `at`, from before to after: by the facts themselves and by what was told then.
analytics::FactChange change_between(const config::Pump& before, const config::Pump& after, std::string_view section,
                                     std::span<const ledger::Event> events, analytics::Instant at);

}  // namespace slipledger::watch
