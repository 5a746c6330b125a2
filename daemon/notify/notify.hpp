// The room as main sees it: an outbox for the alert log and one for each webhook of the plant file.
#pragma once

#include <deque>
#include <memory>
#include <string>

#include <boost/asio/any_io_executor.hpp>

#include "config/plant.hpp"
#include "daemon/clock.hpp"
#include "daemon/ledger/writer.hpp"
#include "daemon/notify/alert_log.hpp"
#include "daemon/notify/http_post.hpp"
#include "daemon/notify/outbox.hpp"
#include "daemon/notify/webhook.hpp"

namespace slipledger::notify {

// Name of the alert log among the outbox's targets.
inline constexpr const char* log_target = "log";

// Threads: any thread may call.
class Notify {
public:
    // `writer` and `clock` must outlive it; webhooks travel on `executor`. std::system_error: the alert log cannot be opened.
    Notify(boost::asio::any_io_executor executor, const config::Plant& plant, ledger::Writer& writer,
           const std::string& ledger_path, const Clock& clock);
    ~Notify();

    Notify(const Notify&) = delete;
    Notify& operator=(const Notify&) = delete;

    // std::system_error: the alert log cannot be opened anew.
    void reopen_log();

    // Begins to stop, so that the executor runs out of work. What is not delivered stays in the ledger.
    void stop();

private:
    ledger::Writer& writer_;
    HttpPost post_;
    std::unique_ptr<AlertLog> log_;
    std::deque<Webhook> hooks_;
    std::deque<Outbox> outboxes_;  // last: they end before their channels
};

}  // namespace slipledger::notify
