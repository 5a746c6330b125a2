#include "daemon/notify/outbox.hpp"

#include <spdlog/spdlog.h>

#include <set>

namespace slipledger::notify {
namespace {

constexpr std::size_t at_once = 50;                 // delivered between two commits
constexpr std::chrono::milliseconds look_every{1000};  // for retries that have come due

ledger::DeliveryUpdate update_of(const ledger::OutboxRow& row, const DeliveryOutcome& outcome, const RetryPlan& plan,
                                 analytics::Instant now) {
    ledger::DeliveryUpdate update;
    update.id = row.id;
    update.attempts = row.attempts + 1;
    update.last_error = outcome.error;
    if (outcome.delivery == Delivery::delivered) {
        update.state = ledger::DeliveryState::delivered;
        return update;
    }
    if (outcome.delivery == Delivery::try_again) update.next_try = next_try(plan, update.attempts, row.notice.id, now);
    update.state = update.next_try ? ledger::DeliveryState::pending : ledger::DeliveryState::failed;
    return update;
}

}  // namespace

std::vector<ledger::DeliveryUpdate> deliver_all(std::span<const ledger::OutboxRow> rows, Channel& channel,
                                                const RetryPlan& plan, const Clock& clock) {
    std::vector<ledger::DeliveryUpdate> updates;
    std::set<std::string> held_back;
    for (const ledger::OutboxRow& row : rows) {
        if (held_back.contains(row.notice.pump)) continue;
        const DeliveryOutcome outcome = channel.deliver(row.notice);
        if (outcome.delivery == Delivery::abandoned) break;
        updates.push_back(update_of(row, outcome, plan, clock.now()));
        if (updates.back().state == ledger::DeliveryState::pending && !row.notice.pump.empty())
            held_back.insert(row.notice.pump);
    }
    return updates;
}

Outbox::Outbox(std::string target, Channel& channel, RetryPlan plan, ledger::Writer& writer, std::string ledger_path,
               const Clock& clock, std::shared_ptr<Bell> bell)
    : target_(std::move(target)), channel_(channel), plan_(plan), writer_(writer), ledger_path_(std::move(ledger_path)),
      clock_(clock), bell_(std::move(bell)) {
    thread_ = std::thread([this] { work(); });
}

Outbox::~Outbox() {
    stop();
    thread_.join();
}

void Outbox::stop() {
    stop_ = true;
    bell_->ring();
    channel_.abandon();
}

void Outbox::work() {
    while (!stop_) {
        bool delivered_some = false;
        try {
            delivered_some = deliver_due();
        } catch (const std::exception& failure) {
            spdlog::error("notices to {} wait, the ledger does not answer: {}", target_, failure.what());
            reader_.reset();
        }
        if (!delivered_some) rest();
    }
}

bool Outbox::deliver_due() {
    if (!reader_) reader_.emplace(ledger_path_);
    const std::vector<ledger::OutboxRow> rows = reader_->due(target_, clock_.now(), at_once);
    std::vector<ledger::DeliveryUpdate> updates = deliver_all(rows, channel_, plan_, clock_);
    for (const ledger::DeliveryUpdate& update : updates)
        if (update.state != ledger::DeliveryState::delivered)
            spdlog::warn("notice {} to {}, attempt {}{}: {}", update.id, target_, update.attempts,
                         update.state == ledger::DeliveryState::failed ? ", given up" : "", update.last_error);
    const bool any = !updates.empty();
    if (any) writer_.store(std::move(updates));
    return any;
}

void Outbox::rest() {
    std::unique_lock lock(bell_->mutex);
    bell_->rung.wait_for(lock, look_every, [&] { return stop_ || bell_->rings != heard_; });
    heard_ = bell_->rings;
}

}  // namespace slipledger::notify
