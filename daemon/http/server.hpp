// The HTTP server: pages, API and metrics on loopback. Requests are read and written on the network thread; what they
// ask is answered on a reader thread with its own read-only connection, so that a slow query holds up no logger.
#pragma once

#include <boost/asio/awaitable.hpp>
#include <boost/asio/io_context.hpp>
#include <boost/asio/ip/tcp.hpp>
#include <boost/asio/thread_pool.hpp>
#include <cstdint>
#include <memory>
#include <string>

#include "config/plant.hpp"
#include "daemon/http/routes.hpp"

namespace slipledger::http {

// Threads: network thread only; owns the reader thread.
class HttpServer {
public:
    // Listens where `plant.http.listen` says; does nothing where it says nothing. Throws std::runtime_error where the
    // address is not of this machine's loopback (there are no tokens yet) or cannot be had.
    HttpServer(boost::asio::io_context& network, std::shared_ptr<const config::Plant> plant);
    ~HttpServer();

    // The port listened on; 0: none.
    std::uint16_t port() const;

    // Takes no new connections and ends those that wait for a request.
    void stop();

private:
    struct ReaderThread;
    class Sessions;
    struct Connection;

    boost::asio::awaitable<void> accept_loop();
    boost::asio::awaitable<void> serve(boost::asio::ip::tcp::socket socket);
    boost::asio::awaitable<bool> serve_request(std::shared_ptr<Connection> connection);  // false: the last one
    boost::asio::awaitable<void> let_peer_read(std::shared_ptr<Connection> connection);

    boost::asio::ip::tcp::acceptor acceptor_;
    std::shared_ptr<ReaderThread> reader_;
    std::shared_ptr<Sessions> sessions_;
};

}  // namespace slipledger::http
