// All the ways readings come in, started and stopped together: a listener or a drop folder per feed of the plant file.
#pragma once

#include <chrono>
#include <cstdint>
#include <map>
#include <memory>
#include <span>
#include <string>
#include <vector>

#include <boost/asio/io_context.hpp>
#include <boost/asio/steady_timer.hpp>
#include <boost/asio/thread_pool.hpp>

#include "config/feed.hpp"
#include "config/pump.hpp"
#include "daemon/clock.hpp"
#include "daemon/intake/drop_folder.hpp"
#include "daemon/intake/tcp_listener.hpp"
#include "daemon/ledger/writer.hpp"

namespace slipledger::intake {

// Threads: network thread only, but for `status`, which any thread may call. Built after, and gone before, the io_context
// and the writer.
class Intake {
public:
    // Listens from here on, reads from `start`. std::runtime_error where a feed cannot be served, with its name and why.
    Intake(net::io_context& io, const std::vector<config::Feed>& feeds, std::span<const config::Pump> pumps,
           ledger::Writer& writer, const Clock& clock, FindReceipt find_receipt);
    ~Intake();

    void start();
    // Takes no more loggers, reads what has arrived, answers it; what is not done after `grace` is cut.
    void stop(std::chrono::milliseconds grace);
    void cut();

    std::map<std::string, std::uint16_t> ports() const;  // by feed; those the system chose too
    std::vector<FeedStatus> status() const;

private:
    struct Way {
        std::unique_ptr<const Mapping> mapping;
        std::unique_ptr<FeedCounters> counters;
        std::unique_ptr<TcpListener> listener;  // one of the two
        std::unique_ptr<DropFolder> folder;
    };

    net::awaitable<void> cut_after(std::chrono::milliseconds grace);
    bool idle() const;

    net::io_context& io_;
    std::shared_ptr<Postbox> postbox_;
    net::thread_pool readers_{1};  // of drop folders; a large file must not hold up the network thread
    std::map<std::string, Way> ways_;
};

}  // namespace slipledger::intake
