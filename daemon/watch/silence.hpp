// Notices a feed that has gone silent, by the wall clock, which is passed in: the only thing here that data time cannot
// tell. Told once when silence begins and once when it ends.
#pragma once

#include <map>
#include <mutex>
#include <span>
#include <string>
#include <vector>

#include "config/plant.hpp"
#include "daemon/ledger/records.hpp"

namespace slipledger::watch {

// Threads: any thread may call.
class Silence {
public:
    // Feeds without `silent_after` are not watched. `told` are the notices of earlier runs: a feed that was silent when the
    // daemon stopped is not told again. Silence counts from `now` at the earliest.
    Silence(std::span<const config::Feed> feeds, std::span<const ledger::Notice> told, analytics::Instant now);

    void heard(const std::string& feed, analytics::Instant now);

    // What is to be told: kinds "feed-silent" and "feed-heard".
    std::vector<ledger::Notice> look(analytics::Instant now);

private:
    // Threads: behind the mutex.
    struct Feed {
        analytics::Milliseconds silent_after{};
        analytics::Instant last_heard;
        analytics::Instant silent_since;  // while silent
        bool silent = false;
        bool heard_again = false;
    };

    std::mutex mutex_;
    std::map<std::string, Feed> feeds_;
};

}  // namespace slipledger::watch
