// Alarm episodes as an operator sees them: what the alarm rules found in the data, with the acts of people laid over it.
// Acts are kept apart from episodes in the ledger, because late data may move an episode: an act follows the episode
// that covers the data time it was given for. States in the words of IEC 62682.
#pragma once

#include <optional>
#include <span>
#include <string>
#include <vector>

#include "analytics/alarm.hpp"
#include "analytics/instant.hpp"
#include "analytics/section_spec.hpp"
#include "daemon/ledger/records.hpp"

namespace slipledger::report {

// Threads: a value, share freely.
struct Episode {
    std::string id;
    std::string pump;
    std::string section;
    analytics::Basis basis = analytics::Basis::case_drain;
    std::string rule;
    analytics::Level level = analytics::Level::watch;  // now; once cleared, the one it had last
    std::string cause;  // the newest notice's; filled by whoever knows it
    std::string state;  // "unacknowledged", "acknowledged", "returned", "shelved", "out of service"
    analytics::Instant raised;
    std::optional<analytics::Instant> cleared;
    std::int32_t life = 1;
    double value = analytics::unknown;  // at the last change
    double limit = analytics::unknown;
    std::string acknowledged_by;  // empty: nobody
    std::optional<analytics::Instant> shelved_until;
    std::string why;  // what was given with the act that set the state

    bool operator==(const Episode&) const = default;
};

// Which section on which basis the changes belong to. Threads: a value, share freely.
struct AlarmPlace {
    std::string pump;
    std::string section;
    analytics::Basis basis = analytics::Basis::case_drain;
};

// The same for the same episode whatever was loaded in which order: a hash of place, rule, life and the data time of
// raising.
std::string episode_id(const AlarmPlace& place, analytics::Rule rule, std::int32_t life, analytics::Instant began);

// Episodes in order of raising. `changes` ascend by `at`. Acts are events of kind "acknowledged", "shelved", "unshelved",
// "out-of-service" and "in-service" on the pump, whose body may name a "rule" and a "life" (else all are meant), a "why"
// and, of a shelving, "until" (RFC 3339). `now` is the plant's newest data time: a shelving ends by it.
std::vector<Episode> episodes_of(const AlarmPlace& place, std::span<const analytics::AlarmChange> changes,
                                 std::span<const ledger::Event> acts, analytics::Instant now);

}  // namespace slipledger::report
