// The daemon's door for the operator's command: a Unix socket beside the ledger. One process writes the ledger, so while the
// daemon runs, commands that write ask here. Requests: command_request.hpp; answers, one JSON object a line:
//   load   {"bytes":..,"of_bytes":..,"rows":..} now and then, then {"ok":true,"receipt":{...}} or {"ok":false,"reason":".."}
//   event  {"ok":true,"id":..}     status  what the daemon says     drain  {"ok":true} once everything stored is judged
//   backup {"ok":true} once the copy is whole
#pragma once

#include <atomic>
#include <functional>
#include <memory>
#include <set>
#include <string>
#include <vector>

#include <boost/asio/io_context.hpp>
#include <boost/asio/local/stream_protocol.hpp>
#include <boost/asio/steady_timer.hpp>
#include <boost/asio/thread_pool.hpp>

#include "config/feed.hpp"
#include "config/pump.hpp"
#include "daemon/clock.hpp"
#include "daemon/intake/as_values.hpp"
#include "daemon/intake/command_request.hpp"
#include "daemon/intake/file_load.hpp"
#include "daemon/ledger/writer.hpp"

namespace slipledger::intake {

// What the command socket works with and whom it asks. `status` and `all_judged` are called on a worker thread.
struct CommandWorld {
    std::vector<config::Feed> feeds;
    std::vector<config::Pump> pumps;
    std::string time_zone;  // of times without one in files that no feed describes
    ledger::Writer& writer;
    const Clock& clock;
    FindReceipt find_receipt;
    std::function<std::string()> status;    // one JSON object, no line break
    std::function<bool()> all_judged;       // no mark is left
};

// "<ledger>.sock"
std::string command_socket_path(const std::string& ledger_path);

// Threads: network thread only; files are read and acts stored on worker threads of its own.
class CommandSocket {
public:
    // Mode 0660, group slipledger where there is one. std::runtime_error where it cannot listen. A socket left over from a killed
    // daemon is replaced: whoever builds this holds the ledger's lock.
    CommandSocket(net::io_context& io, std::string path, CommandWorld world);
    ~CommandSocket();

    void start();
    void stop();  // ends loads at their next piece, answers what is owed
    void cut();
    bool idle() const { return peers_.empty(); }

private:
    struct Peer;

    net::awaitable<void> accept_loop();
    net::awaitable<void> serve(std::shared_ptr<Peer> peer);
    net::awaitable<bool> read(std::shared_ptr<Peer> peer);
    net::awaitable<void> answer(std::shared_ptr<Peer> peer, std::string line);
    net::awaitable<std::string> act(std::shared_ptr<Peer> peer, CommandRequest request);
    net::awaitable<std::string> do_event(ledger::Event event);
    net::awaitable<std::string> do_status();
    net::awaitable<std::string> do_drain();
    net::awaitable<std::string> do_backup(std::string file);
    net::awaitable<std::string> do_load(std::shared_ptr<Peer> peer, CommandRequest request);
    net::awaitable<void> tell_progress(std::shared_ptr<Peer> peer);
    net::awaitable<void> write(std::shared_ptr<Peer> peer, std::string text);

    // On a worker thread.
    net::awaitable<std::string> store_event(ledger::Event event);
    net::awaitable<std::string> ask_status();
    net::awaitable<bool> ask_all_judged();
    net::awaitable<void> drain_writer();
    net::awaitable<std::string> back_up(std::string file);
    net::awaitable<std::string> load(std::shared_ptr<Peer> peer, CommandRequest request);

    std::string path_;
    CommandWorld world_;
    net::local::stream_protocol::acceptor acceptor_;
    std::set<std::shared_ptr<Peer>> peers_;
    std::atomic<bool> stop_{false};
    net::thread_pool loads_{1};
    net::thread_pool acts_{2};  // not behind a long load
};

}  // namespace slipledger::intake
