// Accepts the loggers of one feed and keeps their sessions.
#pragma once

#include <cstdint>
#include <memory>
#include <set>
#include <string>

#include <boost/asio/io_context.hpp>

#include "daemon/intake/session.hpp"

namespace slipledger::intake {

// Threads: network thread only.
class TcpListener {
public:
    static constexpr std::size_t most_sessions = 1000;  // of one feed

    // Listens from here on; std::runtime_error with the feed's name and the address where it cannot.
    TcpListener(net::io_context& io, const SessionWorld& world, std::size_t most = most_sessions);

    void start();
    void stop();  // no new loggers; those here are read to the end of what has arrived
    void cut();

    std::uint16_t port() const { return port_; }
    bool idle() const { return sessions_.empty(); }

private:
    net::awaitable<void> accept_loop();
    net::awaitable<void> serve(std::shared_ptr<Session> session);
    void turn_away();

    SessionWorld world_;
    std::size_t most_;
    net::ip::tcp::acceptor acceptor_;
    std::uint16_t port_ = 0;
    std::set<std::shared_ptr<Session>> sessions_;
    bool told_full_ = false;
};

}  // namespace slipledger::intake
