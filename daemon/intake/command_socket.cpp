#include "daemon/intake/command_socket.hpp"

#include <grp.h>
#include <pwd.h>
#include <sys/socket.h>
#include <sys/stat.h>
#include <unistd.h>

#include <array>
#include <cerrno>
#include <filesystem>
#include <mutex>
#include <optional>
#include <stdexcept>
#include <utility>

#include <boost/asio/co_spawn.hpp>
#include <boost/asio/experimental/awaitable_operators.hpp>
#include <boost/asio/write.hpp>
#include <nlohmann/json.hpp>
#include <spdlog/spdlog.h>

#include "daemon/intake/line_splitter.hpp"
#include "daemon/intake/passed_file.hpp"
#include "daemon/spawn.hpp"

namespace slipledger::intake {
namespace {

using namespace std::chrono_literals;
using namespace net::experimental::awaitable_operators;
using Unix = net::local::stream_protocol;

constexpr std::size_t most_peers = 64;

std::string user_at(int socket) {
    ucred peer{};
    socklen_t size = sizeof peer;
    if (::getsockopt(socket, SOL_SOCKET, SO_PEERCRED, &peer, &size) != 0) return {};
    std::array<char, 4096> space{};
    passwd entry{};
    passwd* found = nullptr;
    ::getpwuid_r(peer.uid, &entry, space.data(), space.size(), &found);
    return found != nullptr ? found->pw_name : "uid " + std::to_string(peer.uid);
}

void give_to_group(const std::string& path) {
    std::array<char, 4096> space{};
    group entry{};
    group* found = nullptr;
    ::getgrnam_r("slipledger", &entry, space.data(), space.size(), &found);
    if (found != nullptr && ::chown(path.c_str(), static_cast<uid_t>(-1), found->gr_gid) != 0)
        spdlog::warn("{} could not be given to the group slipledger", path);
}

std::string refusal_line(const std::string& reason) {
    return nlohmann::json{{"ok", false}, {"reason", reason}}.dump(-1, ' ', false, nlohmann::json::error_handler_t::replace) + "\n";
}

}  // namespace

// One command's connection. Threads: network thread, but for `progress`.
struct CommandSocket::Peer {
    explicit Peer(Unix::socket given) : socket(std::move(given)), user(user_at(socket.native_handle())) {}

    Unix::socket socket;
    std::string user;
    LineSplitter lines;
    std::array<char, 16384> buffer{};
    std::string_view bytes;  // in buffer, not yet read as lines
    PassedFile file;         // came along with the last bytes
    std::mutex progress_mutex;
    LoadProgress progress;
    bool load_done = false;
};

std::string command_socket_path(const std::string& ledger_path) { return ledger_path + ".sock"; }

CommandSocket::CommandSocket(net::io_context& io, std::string path, CommandWorld world)
    : path_(std::move(path)), world_(std::move(world)), acceptor_(io) {
    ::unlink(path_.c_str());
    const mode_t mask = ::umask(0117);
    try {
        const Unix::endpoint endpoint(path_);
        acceptor_.open(endpoint.protocol());
        acceptor_.bind(endpoint);
        acceptor_.listen();
        ::umask(mask);
    } catch (const boost::system::system_error& error) {
        ::umask(mask);
        throw std::runtime_error("cannot listen for commands on " + path_ + ": " + error.code().message());
    }
    give_to_group(path_);
}

CommandSocket::~CommandSocket() {
    stop();
    loads_.join();
    acts_.join();
    ::unlink(path_.c_str());
}

void CommandSocket::start() { spawn_vital(acceptor_.get_executor(), "command socket", accept_loop()); }

void CommandSocket::stop() {
    stop_ = true;
    boost::system::error_code ignored;
    acceptor_.close(ignored);
    for (const auto& peer : peers_) peer->socket.shutdown(Unix::socket::shutdown_receive, ignored);
}

void CommandSocket::cut() {
    boost::system::error_code ignored;
    for (const auto& peer : peers_) peer->socket.close(ignored);
}

net::awaitable<void> CommandSocket::accept_loop() {
    for (;;) {
        auto [error, socket] = co_await acceptor_.async_accept(as_values);
        if (!acceptor_.is_open()) co_return;
        if (error) {
            net::steady_timer pause(acceptor_.get_executor(), 100ms);
            co_await pause.async_wait(as_values);
            continue;
        }
        if (peers_.size() >= most_peers) continue;
        const auto peer = std::make_shared<Peer>(std::move(socket));
        peers_.insert(peer);
        spawn(acceptor_.get_executor(), "a command of " + peer->user, serve(peer));
    }
}

net::awaitable<void> CommandSocket::serve(std::shared_ptr<Peer> peer) {
    while (co_await read(peer)) {
        while (const auto line = peer->lines.next(peer->bytes)) {
            std::string text(line->text);
            co_await answer(peer, std::move(text));
        }
    }
    peers_.erase(peer);
}

net::awaitable<bool> CommandSocket::read(std::shared_ptr<Peer> peer) {
    for (;;) {
        const auto [error] = co_await peer->socket.async_wait(Unix::socket::wait_read, as_values);
        if (error) co_return false;
        ReceivedBytes received = receive_with_file(peer->socket.native_handle(), peer->buffer);
        if (received.size < 0 && (errno == EAGAIN || errno == EINTR)) continue;
        if (received.size <= 0) co_return false;
        if (received.file) peer->file = std::move(received.file);
        peer->bytes = std::string_view(peer->buffer.data(), static_cast<std::size_t>(received.size));
        co_return true;
    }
}

net::awaitable<void> CommandSocket::answer(std::shared_ptr<Peer> peer, std::string line) {
    const auto asked = read_command(line, world_.writer.directory());
    std::string said;
    try {
        if (asked) said = co_await act(peer, *asked);
        else said = refusal_line(asked.error().message());
    } catch (const std::exception& error) {
        spdlog::error("a command of {}: {}", peer->user, error.what());
        said = refusal_line(error.what());
    }
    co_await write(peer, std::move(said));
}

net::awaitable<std::string> CommandSocket::act(std::shared_ptr<Peer> peer, CommandRequest request) {
    request.event.user = peer->user;
    switch (request.kind) {
        case CommandRequest::Kind::event:
            co_return co_await do_event(std::move(request.event));
        case CommandRequest::Kind::status:
            co_return co_await do_status();
        case CommandRequest::Kind::drain:
            co_return co_await do_drain();
        case CommandRequest::Kind::backup:
            co_return co_await do_backup(std::move(request.file));
        case CommandRequest::Kind::load:
            break;
    }
    co_return co_await do_load(peer, std::move(request));
}

net::awaitable<std::string> CommandSocket::do_event(ledger::Event event) {
    auto job = store_event(std::move(event));
    co_return co_await net::co_spawn(acts_.get_executor(), std::move(job), net::use_awaitable);
}

net::awaitable<std::string> CommandSocket::store_event(ledger::Event event) {
    event.entered = world_.clock.now();
    const std::int64_t id = world_.writer.store(event);
    co_return nlohmann::json{{"ok", true}, {"id", id}}.dump() + "\n";
}

net::awaitable<std::string> CommandSocket::do_status() {
    auto job = ask_status();
    co_return co_await net::co_spawn(acts_.get_executor(), std::move(job), net::use_awaitable);
}

net::awaitable<std::string> CommandSocket::ask_status() { co_return world_.status() + "\n"; }
net::awaitable<bool> CommandSocket::ask_all_judged() { co_return world_.all_judged(); }

net::awaitable<std::string> CommandSocket::back_up(std::string file) {
    if (std::filesystem::exists(file)) co_return refusal_line(file + " exists already; a copy goes into a file of its own");
    std::string failure;
    try {
        world_.writer.backup(file);
    } catch (const std::exception& e) {
        failure = e.what();
    }
    co_return failure.empty() ? std::string("{\"ok\":true}\n") : refusal_line(failure);
}

net::awaitable<std::string> CommandSocket::do_backup(std::string file) {
    auto copied = back_up(std::move(file));
    co_return co_await net::co_spawn(acts_.get_executor(), std::move(copied), net::use_awaitable);
}

net::awaitable<void> CommandSocket::drain_writer() {
    world_.writer.drain();
    co_return;
}

net::awaitable<std::string> CommandSocket::do_drain() {
    auto stored = drain_writer();
    co_await net::co_spawn(acts_.get_executor(), std::move(stored), net::use_awaitable);
    while (!stop_) {
        auto question = ask_all_judged();
        if (co_await net::co_spawn(acts_.get_executor(), std::move(question), net::use_awaitable)) co_return "{\"ok\":true}\n";
        net::steady_timer pause(acceptor_.get_executor(), 50ms);
        co_await pause.async_wait(as_values);
    }
    co_return refusal_line("the daemon is stopping");
}

net::awaitable<std::string> CommandSocket::do_load(std::shared_ptr<Peer> peer, CommandRequest request) {
    peer->load_done = false;
    auto job = load(peer, std::move(request));
    auto loaded = net::co_spawn(loads_.get_executor(), std::move(job), net::use_awaitable);
    co_return co_await (std::move(loaded) && tell_progress(peer));
}

net::awaitable<std::string> CommandSocket::load(std::shared_ptr<Peer> peer, CommandRequest request) {
    const PassedFile file = std::move(peer->file);
    const auto end_of_progress = [](Peer* of) {
        const std::lock_guard lock(of->progress_mutex);
        of->load_done = true;
    };
    const std::unique_ptr<Peer, decltype(end_of_progress)> finally(peer.get(), end_of_progress);
    const auto feed = feed_for_load(world_.feeds, request.feed, request.file, world_.time_zone);
    if (!feed) co_return refusal_line("no feed " + in_quotes(request.feed) + " in the plant file");
    if (!file) co_return refusal_line("no open file came with the request");
    const Mapping mapping(*feed, world_.writer.directory(), world_.pumps);
    const auto told = [of = peer.get()](const LoadProgress& progress) {
        const std::lock_guard lock(of->progress_mutex);
        of->progress = progress;
    };
    const LoadWorld load_world{mapping, world_.writer, world_.clock, world_.find_receipt, &stop_, told, request.again};
    const LoadOutcome outcome = load_file(file.get(), request.file, load_world);
    if (outcome.end == LoadEnd::stopped) co_return refusal_line("the daemon is stopping; load the file again");
    if (outcome.end == LoadEnd::failed) co_return refusal_line(outcome.failure);
    nlohmann::ordered_json said{{"ok", true}};
    said["receipt"] = nlohmann::ordered_json::parse(receipt_json(outcome, feed->id));
    co_return said.dump() + "\n";
}

net::awaitable<void> CommandSocket::tell_progress(std::shared_ptr<Peer> peer) {
    std::uint64_t told = 0;
    net::steady_timer tick(acceptor_.get_executor());
    for (;;) {
        tick.expires_after(100ms);
        co_await tick.async_wait(as_values);
        LoadProgress now;
        {
            const std::lock_guard lock(peer->progress_mutex);
            if (peer->load_done) co_return;
            now = peer->progress;
        }
        if (now.bytes == told) continue;
        told = now.bytes;
        std::string line =
            nlohmann::ordered_json{{"bytes", now.bytes}, {"of_bytes", now.of_bytes}, {"rows", now.rows}}.dump() + "\n";
        co_await write(peer, std::move(line));
    }
}

net::awaitable<void> CommandSocket::write(std::shared_ptr<Peer> peer, std::string text) {
    net::steady_timer patience(acceptor_.get_executor(), 5s);
    const auto bytes = net::buffer(text);
    const auto result = co_await (net::async_write(peer->socket, bytes, as_values) || patience.async_wait(as_values));
    boost::system::error_code ignored;
    if (result.index() == 1) peer->socket.close(ignored);  // asked and does not listen
}

}  // namespace slipledger::intake
