#include "tools/plantsim/tcp_logger.hpp"

#include <fmt/format.h>
#include <netdb.h>
#include <sys/socket.h>
#include <unistd.h>

#include <array>
#include <cerrno>
#include <memory>
#include <nlohmann/json.hpp>
#include <stdexcept>
#include <thread>
#include <utility>

namespace slipledger::plantsim {
namespace {

constexpr std::size_t send_at = 32U << 10U;
constexpr std::size_t faults_kept = 5;
constexpr std::chrono::milliseconds wait_step{200};

bool would_block() {
    return errno == EAGAIN || errno == EWOULDBLOCK || errno == EINTR;
}

}  // namespace

TcpLogger::TcpLogger(Address address, Patience patience) : address_(std::move(address)), patience_(patience) {
    reconnect();
}

TcpLogger::~TcpLogger() {
    close();
}

void TcpLogger::close() {
    if (socket_ >= 0) ::close(socket_);
    socket_ = -1;
}

void TcpLogger::send(std::string_view line) {
    if (unanswered_.empty()) heard_ = std::chrono::steady_clock::now();  // silence counts from when something is owed
    unanswered_.emplace_back(line);
    to_send_ += line;
    while (to_send_.size() >= send_at || unanswered_.size() >= patience_.window)
        if (!exchange(wait_step)) reconnect();
}

void TcpLogger::flush() {
    if (!exchange(std::chrono::milliseconds{0})) reconnect();
}

void TcpLogger::finish() {
    while (!unanswered_.empty())
        if (!exchange(wait_step)) reconnect();
    close();
}

// One turn of writing and reading, whichever is possible first; false when the connection is lost.
bool TcpLogger::exchange(std::chrono::milliseconds wait) {
    const auto want = static_cast<short>(to_send_.empty() ? POLLIN : POLLIN | POLLOUT);
    pollfd handle{.fd = socket_, .events = want, .revents = 0};
    const int ready = ::poll(&handle, 1, static_cast<int>(wait.count()));
    if (ready < 0) return errno == EINTR;
    if (ready == 0) {
        const bool waiting = !unanswered_.empty();
        return !waiting || std::chrono::steady_clock::now() - heard_ < patience_.silence;
    }
    if ((handle.revents & (POLLIN | POLLHUP | POLLERR)) != 0 && !read_some()) return false;
    return (handle.revents & POLLOUT) == 0 || write_some();
}

bool TcpLogger::write_some() {
    const ssize_t sent = ::send(socket_, to_send_.data(), to_send_.size(), MSG_NOSIGNAL | MSG_DONTWAIT);
    if (sent < 0) return would_block();
    to_send_.erase(0, static_cast<std::size_t>(sent));
    return true;
}

bool TcpLogger::read_some() {
    std::array<char, 16384> block{};
    const ssize_t got = ::recv(socket_, block.data(), block.size(), MSG_DONTWAIT);
    if (got < 0) return would_block();
    if (got == 0) return false;
    received_.append(block.data(), static_cast<std::size_t>(got));
    std::size_t begin = 0;
    for (std::size_t end = received_.find('\n'); end != std::string::npos; end = received_.find('\n', begin)) {
        read_reply(std::string_view(received_).substr(begin, end - begin));
        begin = end + 1;
    }
    received_.erase(0, begin);
    return true;
}

void TcpLogger::read_reply(std::string_view line) {
    const auto reply = nlohmann::json::parse(line, nullptr, false);
    if (!reply.is_object() || !reply.contains("through"))
        throw std::runtime_error(fmt::format("not a reply of a feed: {}", line));
    heard_ = std::chrono::steady_clock::now();
    answered_.stored += reply.value("stored", std::uint64_t{0});
    answered_.repeated += reply.value("repeated", std::uint64_t{0});
    answered_.refused += reply.value("refused", std::uint64_t{0});
    for (const auto& fault : reply.value("faults", nlohmann::json::array()))
        if (answered_.faults.size() < faults_kept) answered_.faults.push_back(fault.dump());
    const auto through = reply.at("through").get<std::uint64_t>();
    if (through < through_ || through - through_ > unanswered_.size())
        throw std::runtime_error(fmt::format("reply counts lines that were not sent: {}", line));
    unanswered_.erase(unanswered_.begin(), unanswered_.begin() + static_cast<std::ptrdiff_t>(through - through_));
    through_ = through;
}

// A new connection counts its lines from 1: the first of them is the first one never answered for.
void TcpLogger::reconnect() {
    close();
    for (int attempt = 0; !connect_once(); ++attempt) {
        if (attempt + 1 >= patience_.tries)
            throw std::runtime_error(fmt::format("{}:{} does not take connections", address_.host, address_.port));
        std::this_thread::sleep_for(patience_.pause);
    }
    answered_.reconnects += connected_before_ ? 1U : 0U;
    connected_before_ = true;
    through_ = 0;
    received_.clear();
    to_send_.clear();
    for (const std::string& line : unanswered_) to_send_ += line;
    heard_ = std::chrono::steady_clock::now();
}

bool TcpLogger::connect_once() {
    addrinfo hints{};
    hints.ai_socktype = SOCK_STREAM;
    addrinfo* found = nullptr;
    const int error = ::getaddrinfo(address_.host.c_str(), address_.port.c_str(), &hints, &found);
    if (error != 0) throw std::runtime_error(fmt::format("{}: {}", address_.host, ::gai_strerror(error)));
    const std::unique_ptr<addrinfo, decltype(&::freeaddrinfo)> owner(found, &::freeaddrinfo);
    for (const addrinfo* at = found; at != nullptr; at = at->ai_next) {
        socket_ = ::socket(at->ai_family, at->ai_socktype | SOCK_CLOEXEC, at->ai_protocol);
        if (socket_ >= 0 && ::connect(socket_, at->ai_addr, at->ai_addrlen) == 0) return true;
        close();
    }
    return false;
}

}  // namespace slipledger::plantsim
