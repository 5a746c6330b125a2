// What the service manager and the operator say to a running daemon by signal.
#pragma once

#include <boost/asio/awaitable.hpp>
#include <boost/asio/io_context.hpp>
#include <boost/asio/signal_set.hpp>
#include <functional>

namespace slipledger {

// What each signal does. Threads: called on the network thread.
struct SignalActions {
    std::function<void()> stop;         // SIGTERM, SIGINT; SIGHUP once `reload` said yes
    std::function<bool()> reload;       // SIGHUP: true if the daemon is to come up anew with what was read
    std::function<void()> reopen_logs;  // SIGUSR1
};

// After the first signal that stops, none is caught: a second ends the process at once, which the ledger survives.
// Threads: network thread only.
class Signals {
public:
    Signals(boost::asio::io_context& network, SignalActions actions);

private:
    boost::asio::awaitable<void> wait_for_signals();
    bool stops(int signal);

    boost::asio::signal_set signals_;
    SignalActions actions_;
};

}  // namespace slipledger
