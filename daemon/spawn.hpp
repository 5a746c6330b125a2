// Starts a coroutine that nobody awaits, with a name, so that none ends unseen: Asio's own `detached` swallows what a
// coroutine throws. A task the daemon cannot do without ends the process instead; the service manager starts it anew
// from the ledger.
#pragma once

#include <string>

#include <boost/asio/any_io_executor.hpp>
#include <boost/asio/awaitable.hpp>

namespace slipledger {

// An exception that ends `task` is logged under `name`; everything else goes on.
void spawn(const boost::asio::any_io_executor& executor, std::string name, boost::asio::awaitable<void> task);

// The same, but an exception ends the process with status 3.
void spawn_vital(const boost::asio::any_io_executor& executor, std::string name, boost::asio::awaitable<void> task);

}  // namespace slipledger
