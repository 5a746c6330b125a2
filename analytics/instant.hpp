// Time as readings tell it. The pipeline runs on the time in the data; nothing in this room can ask a clock.
// Two instants cannot be added and an instant is not a number: std::chrono sees to that. Running hours are a type of
// their own, since a pump's hours and calendar time are silently mixed up otherwise.
#pragma once

#include <chrono>
#include <compare>

namespace slipledger::analytics {

using Milliseconds = std::chrono::milliseconds;
using Instant = std::chrono::sys_time<Milliseconds>;  // UTC, without leap seconds

// Hours a pump's shaft has turned, since its section's life began unless said otherwise.
struct RunningHours {
    constexpr RunningHours() = default;
    constexpr explicit RunningHours(double hours) : h(hours) {}
    friend constexpr auto operator<=>(RunningHours, RunningHours) = default;
    friend constexpr RunningHours operator+(RunningHours a, RunningHours b) { return RunningHours(a.h + b.h); }
    friend constexpr RunningHours operator-(RunningHours a, RunningHours b) { return RunningHours(a.h - b.h); }

    double h = 0.0;
};

}  // namespace slipledger::analytics
