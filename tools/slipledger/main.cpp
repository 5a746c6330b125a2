// The operator's command. Works whether or not the daemon runs: it reads the ledger by itself and hands what writes to
// the daemon where one holds the ledger.
#include <fmt/format.h>

#include <CLI/CLI.hpp>
#include <array>
#include <cstdio>
#include <exception>

#include "tools/slipledger/command.hpp"

namespace {

using namespace slipledger::command;

constexpr std::array<void (*)(CLI::App&, Shared&), 12> commands{
    add_fleet,    add_health, add_history, add_alerts, add_acknowledge, add_replaced,
    add_note,     add_load,   add_export,  add_status, add_backup,      add_check_plant,
};

int complain(const std::exception& e, int status) {
    fmt::print(stderr, "slipledger: {}\n", e.what());
    return status;
}

}  // namespace

int main(int argc, char** argv) try {
    CLI::App app{
        "Keeps a ledger of every pump's slip and says which to watch, plan for or act on.\n"
        "Decision support, not a safety function: follow the maker's manual, site rules\n"
        "and local codes first."};
    app.require_subcommand(1);
    Shared shared;
    for (const auto add : commands) add(app, shared);
    try {
        app.parse(argc, argv);
    } catch (const CLI::ParseError& e) {
        return app.exit(e) == 0 ? fine : wrong_use;
    }
    return shared.chosen();
} catch (const slipledger::command::WrongUse& e) {
    return complain(e, slipledger::command::wrong_use);
} catch (const std::exception& e) {
    return complain(e, slipledger::command::could_not);
}
