#include "daemon/notify/http_post.hpp"

#include <gmock/gmock.h>
#include <gtest/gtest.h>

#include <array>
#include <future>
#include <string>
#include <thread>

#include <boost/asio/executor_work_guard.hpp>
#include <boost/asio/io_context.hpp>
#include <boost/asio/ip/tcp.hpp>
#include <boost/asio/read_until.hpp>
#include <boost/asio/write.hpp>

namespace slipledger::notify {
namespace {

using namespace std::chrono_literals;
namespace net = boost::asio;
using net::ip::tcp;
using testing::HasSubstr;

// A receiver that answers one request with the bytes it is given; without bytes it never answers.
class Receiver {
public:
    explicit Receiver(std::string answer) : acceptor_(io_, tcp::endpoint(net::ip::address_v4::loopback(), 0)) {
        url_ = "http://127.0.0.1:" + std::to_string(acceptor_.local_endpoint().port()) + "/hook?who=me";
        thread_ = std::thread([this, answer = std::move(answer)] { serve(answer); });
    }
    ~Receiver() {
        done_.set_value();
        thread_.join();
    }

    const std::string& url() const { return url_; }
    std::string request() { return request_.get_future().get(); }

private:
    void serve(const std::string& answer) {
        tcp::socket socket(io_);
        boost::system::error_code ignored;
        acceptor_.accept(socket, ignored);
        std::string text;
        net::read_until(socket, net::dynamic_buffer(text), "}", ignored);
        request_.set_value(text);
        if (answer.empty()) done_.get_future().wait();
        else net::write(socket, net::buffer(answer), ignored);
    }

    net::io_context io_;
    tcp::acceptor acceptor_;
    std::string url_;
    std::promise<std::string> request_;
    std::promise<void> done_;
    std::thread thread_;
};

class HttpPostTo : public testing::Test {
protected:
    HttpPostTo() : work_(net::make_work_guard(io_)), thread_([this] { io_.run(); }), post_(io_.get_executor()) {}
    ~HttpPostTo() override {
        post_.close();
        work_.reset();
        if (thread_.joinable()) thread_.join();
    }

    PostOutcome post(const std::string& url, std::chrono::milliseconds timeout = 5s) {
        std::promise<PostOutcome> outcome;
        post_.post({url, "application/cloudevents+json", R"({"id":"a"})", timeout},
                   [&](PostOutcome answer) { outcome.set_value(std::move(answer)); });
        return outcome.get_future().get();
    }

    net::io_context io_;
    net::executor_work_guard<net::io_context::executor_type> work_;
    std::thread thread_;
    HttpPost post_;
};

TEST_F(HttpPostTo, AReceiverTellsItsStatusAndGetsTheBodyWhole) {
    Receiver receiver("HTTP/1.1 202 Accepted\r\nContent-Length: 2\r\n\r\nok");
    const PostOutcome outcome = post(receiver.url());
    EXPECT_EQ(outcome.status, 202);
    EXPECT_EQ(outcome.text, "ok");
    const std::string request = receiver.request();
    EXPECT_THAT(request, HasSubstr("POST /hook?who=me HTTP/1.1\r\n"));
    EXPECT_THAT(request, HasSubstr("Content-Type: application/cloudevents+json\r\n"));
    EXPECT_THAT(request, HasSubstr("\r\n\r\n{\"id\":\"a\"}"));
}

TEST_F(HttpPostTo, AReceiverThatRedirectsIsNotFollowed) {
    Receiver receiver("HTTP/1.1 302 Found\r\nLocation: http://127.0.0.1:1/\r\nContent-Length: 0\r\n\r\n");
    EXPECT_EQ(post(receiver.url()).status, 302);
}

TEST_F(HttpPostTo, AReceiverThatAnswersWithoutEndIsCutAndItsStatusStands) {
    Receiver receiver("HTTP/1.1 200 OK\r\nContent-Length: 1000000\r\n\r\n" + std::string(1000000, 'x'));
    const PostOutcome outcome = post(receiver.url());
    EXPECT_EQ(outcome.status, 200);
    EXPECT_LE(outcome.text.size(), 200U);
}

TEST_F(HttpPostTo, AReceiverThatNeverAnswersRunsOutOfTime) {
    Receiver receiver("");
    const PostOutcome outcome = post(receiver.url(), 200ms);
    EXPECT_EQ(outcome.status, 0);
    EXPECT_TRUE(outcome.possible);
    EXPECT_THAT(outcome.text, HasSubstr("in time"));
}

TEST_F(HttpPostTo, APortWhereNobodyListensIsWorthAnotherTry) {
    net::io_context io;
    tcp::acceptor unused(io, tcp::endpoint(net::ip::address_v4::loopback(), 0));
    const auto port = unused.local_endpoint().port();
    unused.close();
    const PostOutcome outcome = post("http://127.0.0.1:" + std::to_string(port) + "/");
    EXPECT_EQ(outcome.status, 0);
    EXPECT_TRUE(outcome.possible);
}

TEST_F(HttpPostTo, AnAddressThatIsNoneCanNeverWork) {
    EXPECT_FALSE(post("mill hall").possible);
    EXPECT_FALSE(post("ftp://127.0.0.1/").possible);
}

TEST_F(HttpPostTo, NobodyIsCalledBackAfterClosing) {
    Receiver receiver("");
    bool called = false;
    post_.post({receiver.url(), "text/plain", R"({})", 60s}, [&called](const PostOutcome&) { called = true; });
    receiver.request();
    post_.close();
    work_.reset();
    thread_.join();  // ends by itself: nothing is left to wait for, although the receiver never answered
    EXPECT_FALSE(called);
}

}  // namespace
}  // namespace slipledger::notify
