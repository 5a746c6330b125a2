// `slipledger status`: what the running daemon is doing. Ends with 1 where none runs.
#include <fmt/format.h>

#include <nlohmann/json.hpp>

#include "daemon/intake/command_client.hpp"
#include "daemon/intake/command_socket.hpp"
#include "tools/slipledger/command.hpp"

namespace slipledger::command {

namespace {

std::string text_of(const nlohmann::json& value) { return value.is_string() ? value.get<std::string>() : value.dump(); }

void print_status(const nlohmann::json& status) {
    fmt::print("{} {:>10} {:>10} {:>8} {:>5}  newest reading\n", report::cell("feed", 18), "stored", "repeated", "refused",
               "conn");
    for (const auto& feed : status.at("feeds"))
        fmt::print("{} {:>10} {:>10} {:>8} {:>5}  {}\n", report::cell(feed.value("feed", ""), 18),
                   feed.value("stored", 0ULL), feed.value("repeated", 0ULL), feed.value("refused", 0ULL),
                   feed.value("connections", 0ULL), text_of(feed.at("last_reading")));
    fmt::print("pumps waiting to be judged: {}\n", status.value("marks", 0));
    const auto& longest = status.at("longest_commit_ms");
    fmt::print("longest commit: {:.0f} ms in the last minute, {:.0f} ms since the start\n", longest.value("last_minute", 0.0),
               longest.value("since_start", 0.0));
    for (const auto& target : status.at("deliveries"))
        fmt::print("notices for {}: {} waiting, {} failed\n", target.value("target", ""), target.value("pending", 0),
                   target.value("failed", 0));
}

int run(const Shared& shared) {
    const config::Plant plant = shared.plant();
    auto client = intake::CommandClient::connect(intake::command_socket_path(plant.store.path));
    if (!client) {
        fmt::print(stderr, "no daemon runs on {}\n", plant.store.path);
        if (shared.json) fmt::print("null\n");
        return answer_is_no;
    }
    const nlohmann::json status = client->ask(intake::CommandRequest{});
    if (shared.json)
        fmt::print("{}\n", status.dump(2));
    else
        print_status(status);
    return fine;
}

}  // namespace

void add_status(CLI::App& app, Shared& shared) {
    add_command(app, shared, "status", "what the running daemon is doing", true, [&shared] { return run(shared); });
}

}  // namespace slipledger::command
