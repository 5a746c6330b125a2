// When a delivery that failed is tried again: soon at first, ever more seldom, and not for ever. A pure decision; waiting for
// it is somebody else's line.
#pragma once

#include <chrono>
#include <cstdint>
#include <optional>
#include <string_view>

#include "analytics/instant.hpp"

namespace slipledger::notify {

// Threads: a value, share freely.
struct RetryPlan {
    std::chrono::milliseconds first{5000};
    std::chrono::milliseconds longest{std::chrono::minutes(15)};
    std::chrono::milliseconds give_up_after{std::chrono::hours(72)};  // of waiting in all
};

// After `attempts` failed ones, the last at `now`; nullopt: give up. Pauses double, each shortened or lengthened by up to a
// fifth, so that a receiver that comes back is not met by all at once; by how much is settled by `id` and the attempt.
std::optional<analytics::Instant> next_try(const RetryPlan& plan, std::int32_t attempts, std::string_view id,
                                           analytics::Instant now);

}  // namespace slipledger::notify
