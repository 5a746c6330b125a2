// A way by which notices leave the daemon. The outbox knows channels by this alone.
#pragma once

#include <cstdint>
#include <string>

#include "daemon/ledger/records.hpp"

namespace slipledger::notify {

enum class Delivery : std::uint8_t {
    delivered,
    try_again,  // failed, or its outcome is not known
    refused,    // trying again cannot help
    abandoned,  // cut short by stopping: as if it had not been tried
};

// Threads: a value, share freely.
struct DeliveryOutcome {
    Delivery delivery = Delivery::delivered;
    std::string error;  // empty if delivered
};

// Threads: each says so itself; deliver is called by one outbox thread.
class Channel {
public:
    virtual ~Channel() = default;

    // Returns when the notice has been delivered for good or has not. May be called again with the same notice.
    virtual DeliveryOutcome deliver(const ledger::Notice& notice) = 0;

    // Makes a deliver() under way return soon. Any thread.
    virtual void abandon() = 0;
};

}  // namespace slipledger::notify
