#include "daemon/intake/session.hpp"

#include <utility>

#include <boost/asio/experimental/awaitable_operators.hpp>
#include <boost/asio/write.hpp>
#include <spdlog/spdlog.h>

#include "daemon/intake/reply.hpp"

namespace slipledger::intake {
namespace {

using namespace std::chrono_literals;
using namespace net::experimental::awaitable_operators;

ReadOptions options_of_connection() {
    ReadOptions options;
    options.unfinished_counts = false;
    return options;
}

net::awaitable<void> pause_for(std::chrono::milliseconds time) {
    net::steady_timer timer(co_await net::this_coro::executor, time);
    co_await timer.async_wait(as_values);
}

}  // namespace

Session::Session(net::ip::tcp::socket socket, const SessionWorld& world)
    : socket_(std::move(socket)),
      world_(world),
      reader_(world.mapping, options_of_connection()),
      changed_(socket_.get_executor(), net::steady_timer::time_point::max()) {}

net::awaitable<void> Session::run() {
    const auto self = shared_from_this();
    co_await (read_side() && write_side());
    if (!cut_) co_await let_peer_read();
}

void Session::stop() {
    stopping_ = true;
    boost::system::error_code ignored;
    socket_.shutdown(net::ip::tcp::socket::shutdown_receive, ignored);
}

void Session::cut() {
    cut_ = true;
    boost::system::error_code ignored;
    socket_.close(ignored);
    changed_.cancel();
}

net::awaitable<void> Session::read_side() {
    while (!failed_ && !cut_ && !reader_.hopeless()) {
        const std::size_t size = co_await read_some();
        if (size == 0) break;
        co_await read_lines(std::string_view(buffer_.data(), size));
    }
    if (!stopping_ && !cut_) reader_.finish(world_.clock.now());
    co_await submit(reader_.take());
    read_all_ = true;
    changed_.cancel();
}

net::awaitable<std::size_t> Session::read_some() {
    net::steady_timer silence(socket_.get_executor(), world_.mapping.feed().idle_timeout);
    const auto space = net::buffer(buffer_);
    const auto result = co_await (socket_.async_read_some(space, as_values) || silence.async_wait(as_values));
    if (result.index() == 1) {
        spdlog::info("feed {}: nothing came for {} s, connection closed", world_.mapping.feed().id,
                     world_.mapping.feed().idle_timeout.count());
        co_return 0;
    }
    const auto& [error, size] = std::get<0>(result);
    co_return error ? 0 : size;
}

net::awaitable<void> Session::read_lines(std::string_view bytes) {
    while (!bytes.empty() && !reader_.hopeless() && !failed_ && !cut_) {
        reader_.read(bytes, world_.clock.now());
        if (reader_.full()) co_await submit(reader_.take());
    }
    boost::system::error_code error;
    if (socket_.available(error) == 0) co_await submit(reader_.take());
}

net::awaitable<void> Session::submit(ReadBatch read) {
    if (read.empty()) co_return;
    while (on_their_way_ >= most_on_their_way && !failed_ && !cut_) co_await wait_for_change();
    if (failed_ || cut_) co_return;
    auto account = std::make_shared<const LineAccount>(std::move(read.account));
    const ledger::Instant received = world_.clock.now();
    // Weak: the writer's thread may let go of its callback last, and a socket may only end on the network thread.
    const auto done = [weak = weak_from_this(), box = world_.postbox, account, received](const ledger::IntakeOutcome& stored) {
        ledger::IntakeOutcome counts;
        counts.stored = stored.stored;
        counts.repeated = stored.repeated;
        counts.failed = stored.failed;
        counts.failure = stored.failure;
        box->post([weak, account, received, counts] {
            if (const auto self = weak.lock()) self->committed(*account, received, counts);
        });
    };
    ++on_their_way_;
    while (!world_.writer.try_submit(read.batch, done)) {
        co_await pause_for(20ms);
        if (cut_) co_return;
    }
}

void Session::committed(const LineAccount& account, ledger::Instant received, const ledger::IntakeOutcome& outcome) {
    if (failed_) return;
    if (outcome.failed) {
        spdlog::error("feed {}: could not be stored: {}", world_.mapping.feed().id, outcome.failure);
        failed_ = true;
        replies_.push_back(failure_line(outcome.failure));
        boost::system::error_code ignored;
        socket_.shutdown(net::ip::tcp::socket::shutdown_receive, ignored);  // wakes the reading side
    } else {
        world_.counters.stored += outcome.stored;
        world_.counters.repeated += outcome.repeated;
        world_.counters.refused += account.refused;
        if (outcome.stored + outcome.repeated > 0) world_.counters.brought(account.newest, received);
        if (world_.mapping.feed().reply) replies_.push_back(reply_line(account, outcome.stored, outcome.repeated));
        else --on_their_way_;
    }
    changed_.cancel();
}

net::awaitable<void> Session::write_side() {
    bool listens = world_.mapping.feed().reply;
    for (;;) {
        while (replies_.empty() && !failed_ && !cut_ && !(read_all_ && on_their_way_ == 0)) co_await wait_for_change();
        if (replies_.empty() || cut_) co_return;
        std::string text = std::move(replies_.front());
        replies_.pop_front();
        if (listens) listens = co_await write(std::move(text));
        if (failed_ && replies_.empty()) co_return;
        --on_their_way_;
        changed_.cancel();
    }
}

net::awaitable<bool> Session::write(std::string text) {
    net::steady_timer patience(socket_.get_executor(), world_.mapping.feed().idle_timeout);
    const auto bytes = net::buffer(text);
    const auto result = co_await (net::async_write(socket_, bytes, as_values) || patience.async_wait(as_values));
    const bool written = result.index() == 0 && !std::get<0>(std::get<0>(result));
    if (!written) {
        boost::system::error_code ignored;
        socket_.shutdown(net::ip::tcp::socket::shutdown_receive, ignored);  // a peer that takes no reply sends no more rows
    }
    co_return written;
}

net::awaitable<void> Session::wait_for_change() { co_await changed_.async_wait(as_values); }

// Closing a socket with bytes unread resets it, and the peer may lose the reply it was owed: the end is announced, and what
// still comes is read and dropped for a moment.
net::awaitable<void> Session::let_peer_read() {
    boost::system::error_code ignored;
    socket_.shutdown(net::ip::tcp::socket::shutdown_send, ignored);
    if (!failed_ && !reader_.hopeless()) co_return;
    net::steady_timer patience(socket_.get_executor(), 2s);
    for (;;) {
        const auto space = net::buffer(buffer_);
        const auto result = co_await (socket_.async_read_some(space, as_values) || patience.async_wait(as_values));
        if (result.index() == 1 || std::get<0>(std::get<0>(result))) co_return;
    }
}

}  // namespace slipledger::intake
