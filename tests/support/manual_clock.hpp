// A wall clock that stands still until a test moves it.
#pragma once

#include <atomic>
#include <chrono>

#include "daemon/clock.hpp"

namespace slipledger::support {

// Threads: any thread may ask or move it.
class ManualClock final : public Clock {
public:
    explicit ManualClock(analytics::Instant start) : now_(start) {}

    analytics::Instant now() const override { return now_.load(); }
    void advance(std::chrono::milliseconds by) { now_.store(now_.load() + by); }
    void set(analytics::Instant to) { now_.store(to); }

private:
    std::atomic<analytics::Instant> now_;
};

}  // namespace slipledger::support
