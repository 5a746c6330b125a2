// One logger's connection: reads lines, hands batches to the writer, answers after each durable commit. Reading waits while
// the writer's queue is full or too much of this session is on its way, so the logger's own send buffer fills and
// nothing here grows.
#pragma once

#include <array>
#include <deque>
#include <memory>
#include <string>

#include <boost/asio/ip/tcp.hpp>
#include <boost/asio/steady_timer.hpp>

#include "daemon/clock.hpp"
#include "daemon/intake/as_values.hpp"
#include "daemon/intake/feed_counters.hpp"
#include "daemon/intake/postbox.hpp"
#include "daemon/intake/row_reader.hpp"
#include "daemon/ledger/writer.hpp"

namespace slipledger::intake {

// What every session of a feed shares; all of it outlives the sessions.
struct SessionWorld {
    const Mapping& mapping;
    ledger::Writer& writer;
    const Clock& clock;
    FeedCounters& counters;
    std::shared_ptr<Postbox> postbox;
};

// Threads: network thread only; the writer's callbacks come by the postbox.
class Session : public std::enable_shared_from_this<Session> {
public:
    Session(net::ip::tcp::socket socket, const SessionWorld& world);

    // Until the peer is done, silent for too long, or stopped, and everything owed is answered.
    net::awaitable<void> run();

    void stop();  // takes what has arrived, answers it, ends
    void cut();   // ends at once

private:
    static constexpr std::size_t most_on_their_way = 4;  // batches

    net::awaitable<void> read_side();
    net::awaitable<void> write_side();
    net::awaitable<std::size_t> read_some();         // 0: the end
    net::awaitable<void> read_lines(std::string_view bytes);
    net::awaitable<void> submit(ReadBatch read);
    net::awaitable<bool> write(std::string text);    // false: the peer does not take it
    net::awaitable<void> wait_for_change();
    net::awaitable<void> let_peer_read();
    void committed(const LineAccount& account, ledger::Instant received, const ledger::IntakeOutcome& outcome);

    net::ip::tcp::socket socket_;
    SessionWorld world_;
    RowReader reader_;
    net::steady_timer changed_;  // never expires; cancelled to wake both sides
    std::array<char, 65536> buffer_{};
    std::deque<std::string> replies_;
    std::size_t on_their_way_ = 0;  // batches not yet committed and answered
    bool stopping_ = false;
    bool cut_ = false;
    bool read_all_ = false;
    bool failed_ = false;  // a batch could not be stored: nothing after it may be answered
};

}  // namespace slipledger::intake
