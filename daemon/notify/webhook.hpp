// Notices to somebody else's system, one POST each. Decides what an answer means: taken, worth another try, or never.
#pragma once

#include <condition_variable>
#include <mutex>
#include <string>

#include "config/plant.hpp"
#include "daemon/notify/channel.hpp"
#include "daemon/notify/transport.hpp"

namespace slipledger::notify {

// What to make of an answer. 2xx is taken. 400, 401, 403, 404, 410, 413 and 422 say that the request itself is at fault, and a
// redirect is not followed: refused. Everything else, no answer included, may pass.
DeliveryOutcome judge_answer(const PostOutcome& answer);

// Threads: deliver by one thread at a time, abandon by any.
class Webhook final : public Channel {
public:
    // `transport` must outlive it.
    Webhook(config::Webhook hook, std::string plant, Transport& transport);

    // Waits for the answer.
    DeliveryOutcome deliver(const ledger::Notice& notice) override;
    void abandon() override;

private:
    // Shared with an answer that may come after nobody waits for it any more. Threads: behind its mutex.
    struct Wait;

    config::Webhook hook_;
    std::string plant_;
    Transport& transport_;
    std::mutex mutex_;
    std::shared_ptr<Wait> under_way_;
    bool abandoned_ = false;
};

}  // namespace slipledger::notify
