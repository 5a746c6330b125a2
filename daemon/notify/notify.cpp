#include "daemon/notify/notify.hpp"

namespace slipledger::notify {

Notify::Notify(boost::asio::any_io_executor executor, const config::Plant& plant, ledger::Writer& writer,
               const std::string& ledger_path, const Clock& clock)
    : writer_(writer), post_(std::move(executor)) {
    const auto bell = std::make_shared<Bell>();
    if (!plant.alerts.log.empty()) {
        log_ = std::make_unique<AlertLog>(plant.alerts.log);
        outboxes_.emplace_back(log_target, *log_, RetryPlan{}, writer, ledger_path, clock, bell);
    }
    for (const config::Webhook& hook : plant.alerts.webhooks) {
        RetryPlan plan;
        plan.give_up_after = hook.retry_for;
        Webhook& channel = hooks_.emplace_back(hook, plant.name, post_);
        outboxes_.emplace_back(hook.name, channel, plan, writer, ledger_path, clock, bell);
    }
    writer_.on_outbox([bell] { bell->ring(); });
}

Notify::~Notify() {
    writer_.on_outbox({});
    stop();
}

void Notify::reopen_log() {
    if (log_) log_->reopen();
}

void Notify::stop() {
    for (Outbox& outbox : outboxes_) outbox.stop();
    post_.close();
}

}  // namespace slipledger::notify
