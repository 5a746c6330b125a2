#include "daemon/http/server.hpp"

#include <spdlog/spdlog.h>

#include <boost/asio/as_tuple.hpp>
#include <boost/asio/co_spawn.hpp>
#include <boost/asio/steady_timer.hpp>
#include <boost/asio/use_awaitable.hpp>
#include <boost/beast/core/flat_buffer.hpp>
#include <boost/beast/core/tcp_stream.hpp>
#include <boost/beast/http.hpp>
#include <chrono>
#include <optional>
#include <set>
#include <stdexcept>
#include <string_view>
#include <utility>

#include "daemon/spawn.hpp"

namespace slipledger::http {

namespace net = boost::asio;
namespace beast = boost::beast;
using net::ip::tcp;

namespace {

constexpr auto as_values = net::as_tuple(net::use_awaitable);
constexpr std::size_t most_connections = 256;
constexpr std::uint32_t header_limit = 16 * 1024;
constexpr std::chrono::seconds idle_timeout{30};
constexpr std::chrono::milliseconds accept_pause{100};
constexpr std::chrono::seconds linger{2};

using HttpRequest = beast::http::request<beast::http::empty_body>;
using HttpResponse = beast::http::response<beast::http::string_body>;

tcp::acceptor listen_on(net::io_context& network, const std::optional<config::Endpoint>& endpoint) {
    tcp::acceptor acceptor(network);
    if (!endpoint) return acceptor;
    const net::ip::address address = net::ip::make_address(endpoint->host);
    if (!address.is_loopback())
        throw std::runtime_error("http: " + endpoint->host + " is not a loopback address; pages are served there only, "
                                 "put a proxy with sign-in before them");
    const tcp::endpoint where(address, endpoint->port);
    acceptor.open(where.protocol());
    acceptor.set_option(tcp::acceptor::reuse_address(true));
    boost::system::error_code error;
    acceptor.bind(where, error);
    if (error)
        throw std::runtime_error("http: cannot listen on " + endpoint->host + ":" + std::to_string(endpoint->port) + ": " +
                                 error.message());
    acceptor.listen();
    return acceptor;
}

// True where the client sent what is not HTTP as it should be, and is there to hear so.
bool is_foul(const boost::system::error_code& error) {
    const boost::system::error_code of_http = beast::http::error::bad_method;
    return error.category() == of_http.category() && error != beast::http::error::end_of_stream &&
           error != beast::http::error::partial_message;
}

Answer answer_to_foul(const boost::system::error_code& error) {
    if (error == beast::http::error::header_limit || error == beast::http::error::buffer_overflow)
        return problem(431, "Header too long", "a request's header may have 16 KiB");
    return problem(400, "Foul request", error.message());
}

HttpResponse response_to(const HttpRequest& request, Answer answer) {
    HttpResponse response(static_cast<beast::http::status>(answer.status), request.version());
    response.set(beast::http::field::content_type, answer.content_type);
    response.set(beast::http::field::cache_control, "no-store");
    response.set("Content-Security-Policy",
                 "default-src 'none'; script-src 'self'; style-src 'self'; img-src 'self' data:; connect-src 'self'; "
                 "form-action 'self'; frame-ancestors 'none'; base-uri 'none'");
    response.set("X-Content-Type-Options", "nosniff");
    response.keep_alive(request.keep_alive());
    response.body() = std::move(answer.body);
    response.prepare_payload();
    if (request.method() == beast::http::verb::head) response.body().clear();
    return response;
}

// A page elsewhere may give its own name our address and have a browser ask here (DNS rebinding): then that name stands in
// the request.
bool is_for_us(const HttpRequest& request) {
    const auto written = request[beast::http::field::host];
    std::string_view host(written.data(), written.size());
    const std::size_t colon = host.rfind(':');
    if (colon != std::string_view::npos && host.find(']', colon) == std::string_view::npos) host = host.substr(0, colon);
    return beast::iequals(beast::string_view(host.data(), host.size()), "localhost") || host == "127.0.0.1" || host == "[::1]";
}

bool may_ask(const HttpRequest& request) {
    return request.method() == beast::http::verb::get || request.method() == beast::http::verb::head;
}

}  // namespace

// Threads: network thread only.
struct HttpServer::Connection {
    explicit Connection(tcp::socket socket) : stream(std::move(socket)) {}

    beast::tcp_stream stream;
    beast::flat_buffer buffer{header_limit};
};

// Threads: its pool's one thread, but for construction, `use` and destruction.
struct HttpServer::ReaderThread {
    explicit ReaderThread(std::shared_ptr<const config::Plant> first) : plant(std::move(first)) {}

    net::awaitable<Answer> answer_to(std::string target, std::shared_ptr<const config::Plant> now) {
        try {
            if (!reader) reader.emplace(now->store.path);
            co_return answer(target, *reader, *now);
        } catch (const std::exception& e) {
            spdlog::error("http: {} could not be answered: {}", target, e.what());
            reader.reset();
            co_return problem(503, "Not now", "the ledger did not answer; see the service's log");
        }
    }

    std::shared_ptr<const config::Plant> plant;  // network thread only
    std::optional<ledger::Reader> reader;
    net::thread_pool pool{1};
};

// The open connections, so that stopping can end them. Threads: network thread only.
class HttpServer::Sessions {
public:
    bool full() const { return streams_.size() >= most_connections; }
    void add(beast::tcp_stream* stream) { streams_.insert(stream); }
    void remove(beast::tcp_stream* stream) { streams_.erase(stream); }
    void end_all() {
        for (beast::tcp_stream* stream : streams_) stream->cancel();
    }

private:
    std::set<beast::tcp_stream*> streams_;
};

HttpServer::HttpServer(net::io_context& network, std::shared_ptr<const config::Plant> plant)
    : acceptor_(listen_on(network, plant->http.listen)),
      reader_(std::make_shared<ReaderThread>(std::move(plant))),
      sessions_(std::make_shared<Sessions>()) {
    if (acceptor_.is_open()) spawn(network.get_executor(), "http listener", accept_loop());
}

HttpServer::~HttpServer() { reader_->pool.join(); }

std::uint16_t HttpServer::port() const { return acceptor_.is_open() ? acceptor_.local_endpoint().port() : std::uint16_t{0}; }

void HttpServer::stop() {
    boost::system::error_code ignored;
    acceptor_.close(ignored);
    sessions_->end_all();
}

net::awaitable<void> HttpServer::accept_loop() {
    for (;;) {
        auto [error, socket] = co_await acceptor_.async_accept(as_values);
        if (!acceptor_.is_open()) co_return;
        if (error) {  // out of handles: neither spin nor die
            net::steady_timer pause(acceptor_.get_executor(), accept_pause);
            co_await pause.async_wait(as_values);
            continue;
        }
        if (!sessions_->full()) spawn(acceptor_.get_executor(), "http session", serve(std::move(socket)));
    }
}

net::awaitable<void> HttpServer::serve(tcp::socket socket) {
    const auto connection = std::make_shared<Connection>(std::move(socket));
    const std::shared_ptr<Sessions> sessions = sessions_;
    const auto leave = [&sessions](beast::tcp_stream* ended) { sessions->remove(ended); };
    sessions->add(&connection->stream);
    const std::unique_ptr<beast::tcp_stream, decltype(leave)> registered(&connection->stream, leave);
    while (co_await serve_request(connection) && acceptor_.is_open()) {
    }
}

net::awaitable<bool> HttpServer::serve_request(std::shared_ptr<Connection> connection) {
    const std::shared_ptr<ReaderThread> reader = reader_;
    beast::http::request_parser<beast::http::empty_body> parser;
    parser.header_limit(header_limit);
    connection->stream.expires_after(idle_timeout);
    const auto [error, read] =
        co_await beast::http::async_read_header(connection->stream, connection->buffer, parser, as_values);
    if (error && !is_foul(error)) co_return false;
    const bool goes_on = !error && parser.is_done();  // else bytes are left that nobody will read
    const HttpRequest request = parser.release();
    Answer reply = problem(405, "Only GET here", "nothing can be changed over HTTP; use the slipledger command");
    if (error) {
        reply = answer_to_foul(error);
    } else if (!is_for_us(request)) {
        reply = problem(421, "Not for here", "ask by the name localhost, 127.0.0.1 or [::1]");
    } else if (may_ask(request)) {
        std::string target(request.target());
        reply = co_await net::co_spawn(reader->pool, reader->answer_to(std::move(target), reader->plant),
                                       net::use_awaitable);
    }
    HttpResponse response = response_to(request, std::move(reply));
    response.keep_alive(goes_on && request.keep_alive());
    connection->stream.expires_after(idle_timeout);
    const auto [write_error, written] = co_await beast::http::async_write(connection->stream, response, as_values);
    if (!goes_on && !write_error) co_await let_peer_read(connection);
    co_return !write_error && response.keep_alive();
}

// Closing with bytes unread resets the connection, and the peer may lose its answer: the end is announced, and what still
// comes is read and dropped for a moment.
net::awaitable<void> HttpServer::let_peer_read(std::shared_ptr<Connection> connection) {
    boost::system::error_code ignored;
    connection->stream.socket().shutdown(tcp::socket::shutdown_send, ignored);
    connection->stream.expires_after(linger);
    for (;;) {
        connection->buffer.clear();
        const auto space = connection->buffer.prepare(header_limit);
        const auto [error, size] = co_await connection->stream.async_read_some(space, as_values);
        if (error) co_return;
    }
}

}  // namespace slipledger::http
