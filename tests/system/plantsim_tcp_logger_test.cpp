#include <arpa/inet.h>
#include <gtest/gtest.h>
#include <netinet/in.h>
#include <sys/socket.h>
#include <unistd.h>

#include <array>
#include <atomic>
#include <string>
#include <thread>
#include <vector>

#include "tools/plantsim/clock_time.hpp"
#include "tools/plantsim/load.hpp"
#include "tools/plantsim/tcp_logger.hpp"

namespace slipledger::plantsim {
namespace {

// A daemon that keeps lines, answers every so many, and hangs up at the lines it is told to without answering for them.
class FlightyDaemon {
public:
    explicit FlightyDaemon(std::vector<std::size_t> hang_up_at) : hang_up_at_(std::move(hang_up_at)) {
        listener_ = ::socket(AF_INET, SOCK_STREAM, 0);
        sockaddr_in address{};
        address.sin_family = AF_INET;
        address.sin_addr.s_addr = htonl(INADDR_LOOPBACK);
        socklen_t size = sizeof address;
        auto* const plain = static_cast<sockaddr*>(static_cast<void*>(&address));
        EXPECT_EQ(::bind(listener_, plain, size), 0);
        EXPECT_EQ(::listen(listener_, 4), 0);
        EXPECT_EQ(::getsockname(listener_, plain, &size), 0);
        port_ = ntohs(address.sin_port);
        thread_ = std::thread([this] { serve(); });
    }
    ~FlightyDaemon() { end(); }

    std::string port() const { return std::to_string(port_); }

    // Every line that was answered for, in order of coming. Only after the logger has finished.
    const std::vector<std::string>& kept() {
        end();
        return kept_;
    }

private:
    void end() {
        if (listener_ < 0) return;
        ::shutdown(listener_, SHUT_RDWR);
        thread_.join();
        ::close(listener_);
        listener_ = -1;
    }

    void serve() {
        for (std::size_t connection = 0;; ++connection) {
            const int socket = ::accept(listener_, nullptr, nullptr);
            if (socket < 0) return;
            const bool flighty = connection < hang_up_at_.size();
            talk(socket, flighty ? hang_up_at_[connection] : ~std::size_t{0});
            ::close(socket);
        }
    }

    void talk(int socket, std::size_t hang_up_at) {
        std::string text;
        std::size_t through = 0;
        std::array<char, 4096> block{};
        for (;;) {
            const ssize_t got = ::recv(socket, block.data(), block.size(), 0);
            if (got <= 0) return;
            text.append(block.data(), static_cast<std::size_t>(got));
            const std::size_t before = through;
            for (std::size_t end = text.find('\n'); end != std::string::npos; end = text.find('\n')) {
                if (++through == hang_up_at) return;
                kept_.push_back(text.substr(0, end));
                text.erase(0, end + 1);
            }
            const std::string reply = "{\"stored\":" + std::to_string(through - before) +
                                      ",\"repeated\":0,\"refused\":0,\"through\":" + std::to_string(through) +
                                      ",\"faults\":[]}\n";
            if (through > before) ::send(socket, reply.data(), reply.size(), MSG_NOSIGNAL);
        }
    }

    std::vector<std::size_t> hang_up_at_;
    int listener_ = -1;
    int port_ = 0;
    std::vector<std::string> kept_;
    std::thread thread_;
};

Patience impatient() {
    return {.window = 50, .tries = 5, .pause = std::chrono::milliseconds{10}};
}

TEST(PlantsimTcpLogger, BringsEveryLineInOrderOverAQuietConnection) {
    FlightyDaemon daemon({});
    TcpLogger logger({.host = "127.0.0.1", .port = daemon.port()}, impatient());
    for (int n = 0; n < 2000; ++n) logger.send("line " + std::to_string(n) + "\n");
    logger.finish();
    EXPECT_EQ(logger.answered().stored, 2000U);
    EXPECT_EQ(logger.answered().reconnects, 0U);
    ASSERT_EQ(daemon.kept().size(), 2000U);
    EXPECT_EQ(daemon.kept()[1999], "line 1999");
}

TEST(PlantsimTcpLogger, SendsAgainWhatWasNotAnsweredForAfterALostConnection) {
    FlightyDaemon daemon({1, 120, 777});
    TcpLogger logger({.host = "127.0.0.1", .port = daemon.port()}, impatient());
    for (int n = 0; n < 2000; ++n) logger.send("line " + std::to_string(n) + "\n");
    logger.finish();
    EXPECT_EQ(logger.answered().reconnects, 3U);
    // Lines may come twice (kept, then the reply lost); none may be missing, and first comings are in order.
    int next = 0;
    for (const std::string& line : daemon.kept())
        if (line == "line " + std::to_string(next)) ++next;
    EXPECT_EQ(next, 2000);
}

TEST(PlantsimTcpLogger, NeverHasMoreLinesOnTheWayThanItsWindow) {
    FlightyDaemon daemon({});
    TcpLogger logger({.host = "127.0.0.1", .port = daemon.port()}, impatient());
    for (int n = 0; n < 500; ++n) {
        logger.send("line\n");
        EXPECT_LT(logger.owed(), 50U);
    }
    logger.finish();
}

TEST(PlantsimTcpLogger, GivesUpOnceItsTriesAreOver) {
    FlightyDaemon daemon({});
    const std::string port = daemon.port();
    daemon.kept();  // ends it: nobody listens any more
    EXPECT_THROW(TcpLogger({.host = "127.0.0.1", .port = port}, impatient()), std::runtime_error);
}

TEST(PlantsimLoad, RowsOfAPumpAreAMinuteApartAndPlausible) {
    const LoadPlan plan(50, 1);
    for (std::size_t pump = 0; pump < plan.pumps(); ++pump) {
        const Row row = plan.row(pump, 20 * day_ms);
        EXPECT_GT(row[Column::case_drain_flow], 1.0);
        EXPECT_LT(row[Column::case_drain_flow], 15.0);
        EXPECT_GT(row[Column::outlet_pressure], 100.0);
    }
}

TEST(PlantsimTime, ReadsWhatItWritesAndRefusesTheRest) {
    for (const char* text : {"2025-03-30T01:02:03Z", "2024-02-29T23:59:59Z"})
        EXPECT_EQ(rfc3339(*parse_time(text)), text);
    EXPECT_EQ(rfc3339(*parse_time("2025-07-02T12:00:00+03:00")), "2025-07-02T09:00:00Z");
    EXPECT_EQ(rfc3339(*parse_time("2025-07-02")), "2025-07-02T00:00:00Z");
    for (const char* text : {"", "2025", "2025-13-01", "2025-02-29", "2025-07-02T12:00:00", "2025-07-02T24:00:00Z"})
        EXPECT_FALSE(parse_time(text)) << text;
}

}  // namespace
}  // namespace slipledger::plantsim
