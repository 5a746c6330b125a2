// The wall clock, for the edge alone: how far ahead a reading is, whether a file is still being written, when a delivery is
// tried again. Everything else runs on the time in the readings.
#pragma once

#include <chrono>

#include "analytics/instant.hpp"

namespace slipledger {

// Threads: any thread may ask.
class Clock {
public:
    virtual ~Clock() = default;
    virtual analytics::Instant now() const = 0;
};

// Threads: any thread may ask.
class SystemClock final : public Clock {
public:
    analytics::Instant now() const override;
};

// How long something takes, whatever the wall clock is set to meanwhile. Runs from its making.
// Threads: share freely.
class Stopwatch {
public:
    std::chrono::nanoseconds elapsed() const;

private:
    std::chrono::steady_clock::time_point begun_ = steady_now();
    static std::chrono::steady_clock::time_point steady_now();
};

}  // namespace slipledger
