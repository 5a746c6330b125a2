// The other end of the command socket: what the operator's command says to a running daemon. Blocking and simple.
#pragma once

#include <functional>
#include <optional>
#include <string>

#include <nlohmann/json.hpp>

#include "daemon/intake/command_request.hpp"
#include "daemon/intake/file_load.hpp"
#include "daemon/intake/passed_file.hpp"

namespace slipledger::intake {

// Threads: one at a time.
class CommandClient {
public:
    // Nothing where no daemon listens there; std::runtime_error where one does and this user may not ask it.
    static std::optional<CommandClient> connect(const std::string& path);

    // The daemon's answer. std::runtime_error where it goes away.
    nlohmann::json ask(const CommandRequest& request);
    // Opens the file and has the daemon read it. std::runtime_error where it cannot be opened or the daemon goes away.
    nlohmann::json load(const std::string& file, const CommandRequest& request,
                        const std::function<void(const LoadProgress&)>& progress);

private:
    explicit CommandClient(PassedFile socket) : socket_(std::move(socket)) {}
    nlohmann::json next_line();

    PassedFile socket_;
    std::string unread_;
};

}  // namespace slipledger::intake
