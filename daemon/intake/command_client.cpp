#include "daemon/intake/command_client.hpp"

#include <fcntl.h>
#include <sys/socket.h>
#include <sys/un.h>
#include <unistd.h>

#include <array>
#include <cerrno>
#include <cstring>
#include <stdexcept>
#include <string_view>

namespace slipledger::intake {
namespace {

[[noreturn]] void fail(const std::string& what) { throw std::runtime_error(what + ": " + std::strerror(errno)); }

}  // namespace

std::optional<CommandClient> CommandClient::connect(const std::string& path) {
    sockaddr_un address{};
    address.sun_family = AF_UNIX;
    if (path.size() >= sizeof address.sun_path) throw std::runtime_error("the path of the command socket is too long: " + path);
    std::memcpy(address.sun_path, path.c_str(), path.size() + 1);
    PassedFile socket(::socket(AF_UNIX, SOCK_STREAM | SOCK_CLOEXEC, 0));
    if (!socket) fail("no socket");
    if (::connect(socket.get(), reinterpret_cast<const sockaddr*>(&address), sizeof address) == 0)
        return CommandClient(std::move(socket));
    if (errno == ENOENT || errno == ECONNREFUSED) return std::nullopt;
    fail("the daemon at " + path + " cannot be asked (is this user in the group slipledger?)");
}

nlohmann::json CommandClient::ask(const CommandRequest& request) {
    std::string line = command_line(request);
    for (std::string_view left = line; !left.empty();) {
        const ssize_t sent = ::send(socket_.get(), left.data(), left.size(), MSG_NOSIGNAL);
        if (sent < 0) fail("the daemon went away");
        left.remove_prefix(static_cast<std::size_t>(sent));
    }
    return next_line();
}

nlohmann::json CommandClient::load(const std::string& file, const CommandRequest& request,
                                   const std::function<void(const LoadProgress&)>& progress) {
    const PassedFile open(::open(file.c_str(), O_RDONLY | O_CLOEXEC));
    if (!open) fail(file + " cannot be opened");
    if (!send_with_file(socket_.get(), command_line(request), open.get())) fail("the daemon went away");
    for (;;) {
        nlohmann::json said = next_line();
        if (said.contains("ok")) return said;
        if (progress)
            progress(LoadProgress{said.value("bytes", std::uint64_t{0}), said.value("of_bytes", std::uint64_t{0}),
                                  said.value("rows", std::uint64_t{0})});
    }
}

nlohmann::json CommandClient::next_line() {
    std::size_t end = 0;
    while ((end = unread_.find('\n')) == std::string::npos) {
        std::array<char, 16384> space{};
        const ssize_t got = ::recv(socket_.get(), space.data(), space.size(), 0);
        if (got < 0 && errno == EINTR) continue;
        if (got <= 0) throw std::runtime_error("the daemon went away before it answered");
        unread_.append(space.data(), static_cast<std::size_t>(got));
    }
    nlohmann::json said = nlohmann::json::parse(unread_.substr(0, end), nullptr, false);
    unread_.erase(0, end + 1);
    if (!said.is_object()) throw std::runtime_error("the daemon answered something else than a JSON object");
    return said;
}

}  // namespace slipledger::intake
