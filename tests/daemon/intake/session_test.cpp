// Sessions over loopback, with a real ledger behind them.
#include "daemon/intake/session.hpp"

#include <thread>

#include <boost/asio/connect.hpp>
#include <boost/asio/read_until.hpp>
#include <boost/asio/streambuf.hpp>
#include <boost/asio/write.hpp>
#include <gmock/gmock.h>
#include <gtest/gtest.h>
#include <nlohmann/json.hpp>

#include "daemon/intake/intake.hpp"
#include "daemon/intake/tcp_listener.hpp"
#include "tests/daemon/intake/live_mill.hpp"

namespace slipledger::intake {
namespace {

using namespace std::chrono_literals;
using net::ip::tcp;
using nlohmann::json;
using ::testing::HasSubstr;

// A blocking logger.
class Logger {
public:
    explicit Logger(std::uint16_t port) { socket_.connect(tcp::endpoint(net::ip::address_v4::loopback(), port)); }

    void send(const std::string& text) { net::write(socket_, net::buffer(text)); }
    json reply() {
        std::string line;
        const std::size_t size = net::read_until(socket_, net::dynamic_buffer(unread_), '\n');
        line = unread_.substr(0, size);
        unread_.erase(0, size);
        return json::parse(line);
    }
    bool closed() {
        boost::system::error_code error;
        char byte = 0;
        socket_.read_some(net::buffer(&byte, 1), error);
        return static_cast<bool>(error);
    }
    void end() { socket_.shutdown(tcp::socket::shutdown_send); }

private:
    net::io_context io_;
    tcp::socket socket_{io_};
    std::string unread_;
};

class Sessions : public LiveMill {
protected:
    ~Sessions() override {
        if (!intake_) return;
        stop(2s);
    }

    std::uint16_t start() {
        plant_.feeds.resize(1);
        intake_ = std::make_unique<Intake>(io_, plant_.feeds, plant_.pumps, writer(), clock_, find_receipt());
        intake_->start();
        network_ = std::thread([this] { io_.run(); });
        return intake_->ports().at("hall");
    }
    void stop(std::chrono::milliseconds grace) {
        net::post(io_, [this, grace] { intake_->stop(grace); });
        network_.join();
        intake_.reset();
    }
    static std::string row(int second, double pressure = 180.0) {
        json row{{"time", "2026-03-01T06:00:" + std::to_string(10 + second) + "Z"}, {"pump", "press-1"}, {"outlet_pressure", pressure}};
        return row.dump() + "\n";
    }

    net::io_context io_;
    std::unique_ptr<Intake> intake_;
    std::thread network_;
};

TEST_F(Sessions, AnswerAfterTheCommitWhatWasStoredRepeatedAndRefused) {
    Logger logger(start());
    logger.send(row(0));
    EXPECT_EQ(logger.reply().dump(), R"({"faults":[],"refused":0,"repeated":0,"stored":1,"through":1})");
    EXPECT_EQ(stored_readings("press-1"), 1U);
    logger.send(row(0) + "nonsense\n");
    const json second = logger.reply();
    EXPECT_EQ(second["repeated"], 1);
    EXPECT_EQ(second["refused"], 1);
    EXPECT_EQ(second["through"], 3);
    ASSERT_EQ(second["faults"].size(), 1U);
    EXPECT_EQ(second["faults"][0]["line"], 3);
    EXPECT_THAT(second["faults"][0]["reason"].get<std::string>(), HasSubstr("bad-syntax"));
}

TEST_F(Sessions, PutTogetherALineThatComesInPieces) {
    Logger logger(start());
    const std::string line = row(0);
    logger.send(line.substr(0, 20));
    std::this_thread::sleep_for(50ms);
    logger.send(line.substr(20) + row(1).substr(0, 5));
    EXPECT_EQ(logger.reply()["through"], 1);
    logger.send(row(1).substr(5));
    EXPECT_EQ(logger.reply()["through"], 2);
    EXPECT_EQ(stored_readings("press-1"), 2U);
}

TEST_F(Sessions, ServeManyLoggersAtOnce) {
    const std::uint16_t port = start();
    std::vector<std::unique_ptr<Logger>> loggers;
    for (int i = 0; i < 30; ++i) loggers.push_back(std::make_unique<Logger>(port));
    for (int i = 0; i < 30; ++i) loggers[static_cast<std::size_t>(i)]->send(row(i));
    for (const auto& logger : loggers) EXPECT_EQ(logger->reply()["stored"], 1);
    EXPECT_EQ(stored_readings("press-1"), 30U);
    EXPECT_EQ(intake_->status().at(0).connections, 30U);
    EXPECT_EQ(intake_->status().at(0).stored, 30U);
}

TEST_F(Sessions, ReadCsvWithAHeaderPerConnection) {
    plant_.feeds[0].format = config::FeedFormat::csv;
    const std::uint16_t port = start();
    Logger logger(port);
    logger.send(csv_rows(50));
    std::uint64_t stored = 0;
    for (json reply; stored < 50; stored += reply["stored"].get<std::uint64_t>()) reply = logger.reply();
    Logger second(port);
    second.send("pump,time,shaft_speed\r\npress-2,2026-03-01T06:00:00Z,1482\r\n");
    EXPECT_EQ(second.reply()["stored"], 1);
}

TEST_F(Sessions, AnswerARefusedHeaderAndCloseTheConnection) {
    plant_.feeds[0].format = config::FeedFormat::csv;
    Logger logger(start());
    logger.send("a,b\n1,2\n3,4\n");
    const json reply = logger.reply();
    EXPECT_EQ(reply["refused"], 1);
    EXPECT_THAT(reply.dump(), HasSubstr("bad-header"));
    EXPECT_TRUE(logger.closed());
}

TEST_F(Sessions, RefuseTheLineTheLoggerDidNotFinishAndDoNotCountIt) {
    Logger logger(start());
    logger.send(row(0) + row(1).substr(0, 30));
    EXPECT_EQ(logger.reply()["through"], 1);
    logger.end();
    const json reply = logger.reply();
    EXPECT_EQ(reply["through"], 1);
    EXPECT_EQ(reply["refused"], 1);
    EXPECT_TRUE(logger.closed());
}

TEST_F(Sessions, EndASilentConnection) {
    plant_.feeds[0].idle_timeout = 1s;
    Logger logger(start());
    logger.send(row(0));
    logger.reply();
    EXPECT_TRUE(logger.closed());
    EXPECT_TRUE(soon([&] { return intake_->status().at(0).connections == 0; }));
}

TEST_F(Sessions, TurnAwayOneTooMany) {
    plant_.feeds.resize(1);
    const Mapping mapping(plant_.feeds[0], writer().directory(), plant_.pumps);
    FeedCounters counters;
    const SessionWorld world{mapping, writer(), clock_, counters, std::make_shared<Postbox>(io_.get_executor())};
    TcpListener listener(io_, world, 1);
    listener.start();
    network_ = std::thread([this] { io_.run(); });
    Logger first(listener.port());
    first.send(row(0));
    first.reply();
    EXPECT_TRUE(Logger(listener.port()).closed());
    EXPECT_EQ(counters.turned_away, 1U);
    first.send(row(1));
    EXPECT_EQ(first.reply()["stored"], 1);
    net::post(io_, [&] { listener.stop(); });
    network_.join();
}

TEST_F(Sessions, StoreAndAnswerWhatHasArrivedWhenStopped) {
    Logger logger(start());
    logger.send(row(0));
    logger.reply();
    std::string text;
    for (int i = 1; i < 40; ++i) text += row(i);
    logger.send(text);
    stop(5s);
    std::uint64_t stored = 0;
    while (stored < 39) stored += logger.reply()["stored"].get<std::uint64_t>();
    EXPECT_TRUE(logger.closed());
    EXPECT_EQ(stored_readings("press-1"), 40U);
}

TEST_F(Sessions, AreCutWhenTheyGoOnSendingBeyondTheGrace) {
    plant_.feeds[0].reply = true;
    Logger logger(start());
    std::atomic<bool> done{false};
    std::thread flood([&] {
        try {
            while (!done) logger.send(row(1));
        } catch (const boost::system::system_error&) {
        }
    });
    std::this_thread::sleep_for(100ms);
    const auto before = std::chrono::steady_clock::now();
    stop(300ms);
    EXPECT_LT(std::chrono::steady_clock::now() - before, 5s);
    done = true;
    flood.join();
}

TEST_F(Sessions, TellTheLoggerThatNothingWasStoredAndClose) {
    fill_the_disk_once();
    Logger logger(start());
    logger.send(row(0));
    EXPECT_TRUE(logger.reply().contains("failed"));
    EXPECT_TRUE(logger.closed());
}

TEST_F(Sessions, SayWhichFeedCannotListenAndWhy) {
    const std::uint16_t port = start();
    plant_.feeds[0].listen.port = port;
    try {
        Intake second(io_, plant_.feeds, plant_.pumps, writer(), clock_, find_receipt());
        FAIL() << "the port is in use";
    } catch (const std::runtime_error& error) {
        EXPECT_THAT(error.what(), HasSubstr("feed hall cannot listen on 127.0.0.1:" + std::to_string(port)));
    }
}

}  // namespace
}  // namespace slipledger::intake
