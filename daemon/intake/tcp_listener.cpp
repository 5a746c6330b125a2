#include "daemon/intake/tcp_listener.hpp"

#include <stdexcept>
#include <utility>

#include <spdlog/spdlog.h>

#include "daemon/spawn.hpp"

namespace slipledger::intake {
namespace {

using namespace std::chrono_literals;
using net::ip::tcp;

tcp::endpoint resolved(net::io_context& io, const config::Endpoint& listen) {
    boost::system::error_code error;
    const auto address = net::ip::make_address(listen.host, error);
    if (!error) return tcp::endpoint(address, listen.port);
    tcp::resolver resolver(io);
    return resolver.resolve(listen.host, std::to_string(listen.port), tcp::resolver::passive)->endpoint();
}

}  // namespace

TcpListener::TcpListener(net::io_context& io, const SessionWorld& world, std::size_t most)
    : world_(world), most_(most), acceptor_(io) {
    const config::Feed& feed = world.mapping.feed();
    try {
        const tcp::endpoint endpoint = resolved(io, feed.listen);
        acceptor_.open(endpoint.protocol());
        acceptor_.set_option(tcp::acceptor::reuse_address(true));
        acceptor_.bind(endpoint);
        acceptor_.listen();
        port_ = acceptor_.local_endpoint().port();
    } catch (const boost::system::system_error& error) {
        throw std::runtime_error("feed " + feed.id + " cannot listen on " + feed.listen.host + ":" +
                                 std::to_string(feed.listen.port) + ": " + error.code().message());
    }
}

void TcpListener::start() { spawn_vital(acceptor_.get_executor(), "feed " + world_.mapping.feed().id, accept_loop()); }

void TcpListener::stop() {
    boost::system::error_code ignored;
    acceptor_.close(ignored);
    for (const auto& session : sessions_) session->stop();
}

void TcpListener::cut() {
    for (const auto& session : sessions_) session->cut();
}

net::awaitable<void> TcpListener::accept_loop() {
    bool complained = false;
    for (;;) {
        auto [error, socket] = co_await acceptor_.async_accept(as_values);
        if (!acceptor_.is_open()) co_return;
        if (error) {
            if (!complained) spdlog::error("feed {}: cannot accept: {}", world_.mapping.feed().id, error.message());
            complained = true;  // out of handles: told once, tried again
            net::steady_timer pause(acceptor_.get_executor(), 100ms);
            co_await pause.async_wait(as_values);
            continue;
        }
        complained = false;
        if (sessions_.size() >= most_) {
            turn_away();
            continue;
        }
        told_full_ = false;
        boost::system::error_code ignored;
        socket.set_option(tcp::no_delay(true), ignored);
        socket.set_option(net::socket_base::keep_alive(true), ignored);
        const auto session = std::make_shared<Session>(std::move(socket), world_);
        sessions_.insert(session);
        spawn(acceptor_.get_executor(), "a session of feed " + world_.mapping.feed().id, serve(session));
    }
}

void TcpListener::turn_away() {
    ++world_.counters.turned_away;
    if (!told_full_) spdlog::warn("feed {}: {} connections are open, no more are taken", world_.mapping.feed().id, most_);
    told_full_ = true;
}

net::awaitable<void> TcpListener::serve(std::shared_ptr<Session> session) {
    struct Leave {
        TcpListener& listener;
        const std::shared_ptr<Session>& session;
        ~Leave() {
            --listener.world_.counters.connections;
            listener.sessions_.erase(session);
        }
    };
    ++world_.counters.connections;
    const Leave leave{*this, session};
    co_await session->run();
}

}  // namespace slipledger::intake
