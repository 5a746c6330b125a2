// Errors of the network are values here: a peer that goes away is no exception.
#pragma once

#include <boost/asio/as_tuple.hpp>
#include <boost/asio/awaitable.hpp>
#include <boost/asio/use_awaitable.hpp>

namespace slipledger::intake {

namespace net = boost::asio;

inline constexpr auto as_values = net::as_tuple(net::use_awaitable);

}  // namespace slipledger::intake
