#include "daemon/clock.hpp"

namespace slipledger {

analytics::Instant SystemClock::now() const {
    return std::chrono::floor<analytics::Milliseconds>(std::chrono::system_clock::now());
}

std::chrono::steady_clock::time_point Stopwatch::steady_now() { return std::chrono::steady_clock::now(); }

std::chrono::nanoseconds Stopwatch::elapsed() const { return steady_now() - begun_; }

}  // namespace slipledger
