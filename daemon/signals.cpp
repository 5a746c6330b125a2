#include "daemon/signals.hpp"

#include <boost/asio/as_tuple.hpp>
#include <boost/asio/use_awaitable.hpp>
#include <csignal>
#include <utility>

#include "daemon/spawn.hpp"

namespace slipledger {

namespace net = boost::asio;

Signals::Signals(net::io_context& network, SignalActions actions)
    : signals_(network, SIGTERM, SIGINT, SIGHUP), actions_(std::move(actions)) {
    signals_.add(SIGUSR1);
    spawn_vital(network.get_executor(), "signals", wait_for_signals());
}

net::awaitable<void> Signals::wait_for_signals() {
    for (;;) {
        const auto [error, signal] = co_await signals_.async_wait(net::as_tuple(net::use_awaitable));
        if (error) co_return;
        if (!stops(signal)) continue;
        signals_.clear();
        actions_.stop();
        co_return;
    }
}

bool Signals::stops(int signal) {
    if (signal == SIGUSR1) {
        actions_.reopen_logs();
        return false;
    }
    return signal != SIGHUP || actions_.reload();
}

}  // namespace slipledger
