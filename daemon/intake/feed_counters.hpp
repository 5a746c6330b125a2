// What each feed has brought since the daemon started, for the metrics page, `status` and the watch on silent feeds.
#pragma once

#include <algorithm>
#include <atomic>
#include <cstdint>
#include <string>

#include "analytics/instant.hpp"

namespace slipledger::intake {

// One moment's reading of the counters.
struct FeedStatus {
    std::string feed;
    std::uint64_t connections = 0;  // open now
    std::uint64_t turned_away = 0;  // because too many were open
    std::uint64_t stored = 0;       // rows
    std::uint64_t repeated = 0;
    std::uint64_t refused = 0;
    std::uint64_t files = 0;
    analytics::Instant last_reading = analytics::Instant::min();   // newest data time brought; min(): none yet
    analytics::Instant last_received = analytics::Instant::min();  // wall clock of the last batch with a reading
};

// Threads: any thread may add and read; each number is right by itself.
class FeedCounters {
public:
    std::atomic<std::uint64_t> connections{0}, turned_away{0}, stored{0}, repeated{0}, refused{0}, files{0};

    void brought(analytics::Instant newest, analytics::Instant received) {
        raise(last_reading_, newest);
        raise(last_received_, received);
    }
    FeedStatus read(std::string feed) const {
        FeedStatus status;
        status.feed = std::move(feed);
        status.connections = connections;
        status.turned_away = turned_away;
        status.stored = stored;
        status.repeated = repeated;
        status.refused = refused;
        status.files = files;
        status.last_reading = last_reading_;
        status.last_received = last_received_;
        return status;
    }

private:
    static void raise(std::atomic<analytics::Instant>& newest, analytics::Instant to) {
        auto now = newest.load();
        while (now < to && !newest.compare_exchange_weak(now, to)) {
        }
    }

    std::atomic<analytics::Instant> last_reading_{analytics::Instant::min()};
    std::atomic<analytics::Instant> last_received_{analytics::Instant::min()};
};

}  // namespace slipledger::intake
