#include "daemon/notify/http_post.hpp"

#include <boost/asio/as_tuple.hpp>
#include <boost/asio/experimental/awaitable_operators.hpp>
#include <boost/asio/ip/tcp.hpp>
#include <boost/asio/post.hpp>
#include <boost/asio/steady_timer.hpp>
#include <boost/asio/use_awaitable.hpp>
#include <boost/beast/core/flat_buffer.hpp>
#include <boost/beast/core/tcp_stream.hpp>
#include <boost/beast/http.hpp>
#include <boost/url/parse.hpp>
#include <boost/url/url_view.hpp>
#include <set>

#include "daemon/spawn.hpp"

namespace slipledger::notify {
namespace {

namespace net = boost::asio;
namespace http = boost::beast::http;
using net::ip::tcp;
using namespace net::experimental::awaitable_operators;

constexpr auto as_values = net::as_tuple(net::use_awaitable);
constexpr std::size_t longest_answer = 64 * 1024;
constexpr std::size_t longest_quote = 200;  // of an answer, in an error

// Where a request goes, taken from its URL.
struct Address {
    std::string host;
    std::string port;
    std::string target;
    std::string host_header;
    std::string fault;  // empty: fine
};

Address address_of(const std::string& text) {
    const auto url = boost::urls::parse_uri(text);
    if (!url || url->host().empty()) return {{}, {}, {}, {}, "\"" + text + "\" is not a URL"};
    if (url->scheme_id() != boost::urls::scheme::http)
        return {{}, {}, {}, {}, "\"" + text + "\": only http is understood"};
    Address address;
    address.host = url->host_address();
    address.port = url->has_port() && !url->port().empty() ? std::string(url->port()) : "80";
    address.target = std::string(url->encoded_target().data(), url->encoded_target().size());
    if (address.target.empty() || address.target.front() != '/') address.target.insert(0, "/");
    address.host_header = std::string(url->encoded_host_and_port().data(), url->encoded_host_and_port().size());
    return address;
}

PostOutcome no_answer(const char* doing, const boost::system::error_code& error) {
    return {0, std::string(doing) + ": " + error.message(), true};
}

http::request<http::string_body> request_of(const PostRequest& post, const Address& address) {
    http::request<http::string_body> request(http::verb::post, address.target, 11);
    request.set(http::field::host, address.host_header);
    request.set(http::field::user_agent, "slipledger");
    request.set(http::field::content_type, post.content_type);
    request.set(http::field::connection, "close");
    request.body() = post.body;
    request.prepare_payload();
    return request;
}

// The status decides; a body that is too long, or breaks off, does not change it. Read into a buffer of fixed size: Beast's
// string body would make room for whatever length the receiver announces.
net::awaitable<PostOutcome> read_answer(boost::beast::tcp_stream& stream) {
    boost::beast::flat_buffer buffer(longest_answer);
    http::response_parser<http::buffer_body> parser;
    parser.body_limit(boost::none);
    const auto [failure, count] = co_await http::async_read_header(stream, buffer, parser, as_values);
    if (failure) co_return no_answer("no answer", failure);
    std::string body(longest_answer, '\0');
    parser.get().body().data = body.data();
    parser.get().body().size = body.size();
    co_await http::async_read(stream, buffer, parser, as_values);
    body.resize(body.size() - parser.get().body().size);
    PostOutcome outcome;
    outcome.status = static_cast<int>(parser.get().result_int());
    outcome.text = body.substr(0, longest_quote);
    co_return outcome;
}

net::awaitable<PostOutcome> exchange(PostRequest post, Address address) {
    const auto executor = co_await net::this_coro::executor;
    tcp::resolver resolver(executor);
    const auto [unresolved, endpoints] = co_await resolver.async_resolve(address.host, address.port, as_values);
    if (unresolved) co_return no_answer("cannot resolve", unresolved);
    boost::beast::tcp_stream stream(executor);
    const auto [unconnected, endpoint] = co_await stream.async_connect(endpoints, as_values);
    if (unconnected) co_return no_answer("cannot connect", unconnected);
    const http::request<http::string_body> request = request_of(post, address);
    const auto [unsent, count] = co_await http::async_write(stream, request, as_values);
    if (unsent) co_return no_answer("cannot send", unsent);
    co_return co_await read_answer(stream);
}

}  // namespace

// Lives as long as the transport or any request under way. Threads: the executor's.
struct HttpPost::Inside {
    explicit Inside(net::any_io_executor on) : executor(std::move(on)) {}

    net::any_io_executor executor;
    std::set<net::steady_timer*> deadlines;  // of requests under way
    bool closed = false;

    static net::awaitable<void> carry(std::shared_ptr<Inside> inside, PostRequest post,
                                      std::function<void(PostOutcome)> done) {
        if (inside->closed) co_return;
        const Address address = address_of(post.url);
        PostOutcome outcome{0, address.fault, false};
        if (address.fault.empty()) {
            net::steady_timer deadline(inside->executor, post.timeout);
            inside->deadlines.insert(&deadline);
            auto first = co_await (exchange(std::move(post), address) || deadline.async_wait(as_values));
            inside->deadlines.erase(&deadline);
            if (inside->closed) co_return;
            const PostOutcome late{0, "no answer in time", true};
            outcome = first.index() == 0 ? std::get<0>(std::move(first)) : late;
        }
        done(std::move(outcome));
    }
};

HttpPost::HttpPost(net::any_io_executor executor) : inside_(std::make_shared<Inside>(std::move(executor))) {}

HttpPost::~HttpPost() { close(); }

void HttpPost::post(PostRequest request, std::function<void(PostOutcome)> done) {
    spawn(inside_->executor, "webhook " + request.url, Inside::carry(inside_, std::move(request), std::move(done)));
}

void HttpPost::close() {
    net::post(inside_->executor, [inside = inside_] {
        inside->closed = true;
        for (net::steady_timer* deadline : inside->deadlines) deadline->cancel();
    });
}

}  // namespace slipledger::notify
