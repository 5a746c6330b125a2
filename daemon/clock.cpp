#include "daemon/clock.hpp"

namespace slipledger {

analytics::Instant SystemClock::now() const {
    return std::chrono::floor<analytics::Milliseconds>(std::chrono::system_clock::now());
}

}  // namespace slipledger
