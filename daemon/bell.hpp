// Wakes sleeping threads from the writer's thread. Held in common by who sleeps and by the callback that rings, because the
// writer may be about to ring while the sleeper is being taken down.
#pragma once

#include <condition_variable>
#include <cstdint>
#include <mutex>

namespace slipledger {

// Threads: any thread may ring; whoever waits holds `mutex`.
struct Bell {
    std::mutex mutex;
    std::condition_variable rung;
    std::uint64_t rings = 0;

    void ring() {
        const std::lock_guard lock(mutex);
        ++rings;
        rung.notify_all();
    }
};

}  // namespace slipledger
