// Carries notices from the ledger's outbox to one channel, in order per pump, until each is delivered or given up. What is due
// stands in the ledger, so a restart goes on where it was; a crash between delivery and its note delivers twice, with the
// same id.
#pragma once

#include <atomic>
#include <memory>
#include <optional>
#include <span>
#include <string>
#include <thread>
#include <vector>

#include "daemon/bell.hpp"
#include "daemon/clock.hpp"
#include "daemon/ledger/reader.hpp"
#include "daemon/ledger/writer.hpp"
#include "daemon/notify/channel.hpp"
#include "daemon/notify/retry_plan.hpp"

namespace slipledger::notify {

// Delivers rows in their order and says what became of them. A row that must be tried again holds back the later rows of its
// pump; rows without a pump hold back nothing.
std::vector<ledger::DeliveryUpdate> deliver_all(std::span<const ledger::OutboxRow> rows, Channel& channel,
                                                const RetryPlan& plan, const Clock& clock);

// Threads: any thread may call; owns one thread that asks the ledger and delivers.
class Outbox {
public:
    // `channel`, `writer` and `clock` must outlive it. Rung by `bell` when there is something new.
    Outbox(std::string target, Channel& channel, RetryPlan plan, ledger::Writer& writer, std::string ledger_path,
           const Clock& clock, std::shared_ptr<Bell> bell);
    ~Outbox();  // stops and waits for the thread

    Outbox(const Outbox&) = delete;
    Outbox& operator=(const Outbox&) = delete;

    void stop();  // begins to stop: what is under way is abandoned, or delivered if it is quick

private:
    void work();
    bool deliver_due();
    void rest();

    std::string target_;
    Channel& channel_;
    RetryPlan plan_;
    ledger::Writer& writer_;
    std::string ledger_path_;
    const Clock& clock_;
    std::optional<ledger::Reader> reader_;  // its own thread only

    std::shared_ptr<Bell> bell_;
    std::uint64_t heard_ = 0;  // rings before the newest look
    std::atomic<bool> stop_ = false;
    std::thread thread_;
};

}  // namespace slipledger::notify
