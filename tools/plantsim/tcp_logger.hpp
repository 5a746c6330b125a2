// A logger's side of a TCP feed with replies: it keeps every line until the daemon says that it is safe on disk, and
// after a lost connection sends again what was not.
#pragma once

#include <poll.h>

#include <chrono>
#include <cstdint>
#include <deque>
#include <string>
#include <string_view>
#include <vector>

namespace slipledger::plantsim {

struct Address {
    std::string host{};
    std::string port{};
};

// What the daemon answered, added up. Rows sent twice after a lost connection count as repeated.
struct Answered {
    std::uint64_t stored = 0;
    std::uint64_t repeated = 0;
    std::uint64_t refused = 0;
    std::uint64_t reconnects = 0;
    std::vector<std::string> faults{};  // the first few, as the daemon wrote them
};

struct Patience {
    std::size_t window = 4000;  // lines sent and not yet answered for
    int tries = 240;            // to connect, one after another, before giving up
    std::chrono::milliseconds pause{250};
    std::chrono::seconds silence{90};  // with lines owed and no reply for so long, the connection counts as lost
};

// Throws std::runtime_error once its patience is over. Threads: one at a time.
class TcpLogger {
public:
    TcpLogger(Address address, Patience patience);
    ~TcpLogger();
    TcpLogger(const TcpLogger&) = delete;
    TcpLogger& operator=(const TcpLogger&) = delete;

    // Takes one line with its line end; waits while the window is full.
    void send(std::string_view line);

    // Sends what was taken so far and reads what has been answered, without waiting for more.
    void flush();

    // Waits until every line is answered for, and closes.
    void finish();

    const Answered& answered() const { return answered_; }
    std::size_t owed() const { return unanswered_.size(); }

private:
    bool exchange(std::chrono::milliseconds wait);
    bool write_some();
    bool read_some();
    void read_reply(std::string_view line);
    void reconnect();
    bool connect_once();
    void close();

    Address address_;
    Patience patience_;
    int socket_ = -1;
    bool connected_before_ = false;
    std::deque<std::string> unanswered_;
    std::string to_send_;
    std::string received_;
    std::uint64_t through_ = 0;  // lines of this connection answered for
    std::chrono::steady_clock::time_point heard_;
    Answered answered_;
};

}  // namespace slipledger::plantsim
