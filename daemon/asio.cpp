// Boost.Asio and Boost.Beast compiled once, here, instead of in every source that includes them.
#include <boost/asio/impl/src.hpp>
#include <boost/asio/ssl/impl/src.hpp>
#include <boost/beast/src.hpp>
