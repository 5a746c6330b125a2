// The operator's command. Works whether or not the daemon runs: it reads the ledger by itself and hands what writes to
// the daemon where one holds the ledger.
#include <fmt/format.h>

#include <CLI/CLI.hpp>
#include <algorithm>
#include <array>
#include <cstdio>
#include <exception>
#include <memory>
#include <sstream>
#include <string_view>
#include <vector>

#include "config/nearest.hpp"
#include "tools/slipledger/command.hpp"

namespace {

using namespace slipledger::command;

constexpr std::array<void (*)(CLI::App&, Shared&), 20> commands{
    add_fleet,       add_health,     add_history,         add_explain,            add_alerts,
    add_lives,       add_acknowledge, add_replaced,       add_oil_changed,        add_oil_sample,
    add_compensator_set,             add_instrument_changed, add_reference_test,  add_settle,
    add_note,        add_load,       add_export,          add_status,             add_backup,
    add_check_plant,
};

int complain(const std::exception& e, int status) {
    fmt::print(stderr, "slipledger: {}\n", slipledger::report::printable(e.what()));
    return status;
}

// Help within the page's width: what an option is for is broken at spaces. Threads: one.
class Help final : public CLI::Formatter {
public:
    std::string make_option_desc(const CLI::Option* option) const override { return broken(option->get_description()); }

    std::string make_subcommand(const CLI::App* command) const override {
        std::stringstream out;
        CLI::detail::format_help(out, command->get_display_name(), broken(command->get_description()), get_column_width());
        return out.str();
    }

private:
    std::string broken(const std::string& text) const {
        std::string lines = slipledger::report::paragraph("", text, slipledger::report::page_width - get_column_width());
        lines.pop_back();  // the last line's end
        return lines;
    }
};

// CLI11 would take a misspelt subcommand for an argument too many and could not say what was meant.
void require_known(const CLI::App& app, std::string_view name) {
    std::vector<std::string_view> known;
    const std::vector<const CLI::App*> all = app.get_subcommands([](const CLI::App*) { return true; });
    for (const CLI::App* command : all) known.push_back(command->get_name());
    if (std::find(known.begin(), known.end(), name) != known.end()) return;
    const auto nearest = slipledger::config::nearest_name(name, known);
    throw WrongUse(fmt::format("no subcommand \"{}\"; {}", name,
                               nearest.empty() ? "see slipledger --help" : fmt::format("did you mean \"{}\"?", nearest)));
}

// A full disk or a closed pipe shows at the latest here.
int when_written(int status) {
    if (std::fflush(stdout) != 0 || std::ferror(stdout) != 0)
        throw std::runtime_error("standard output could not be written");
    return status;
}

}  // namespace

int main(int argc, char** argv) try {
    CLI::App app{
        "Keeps a ledger of every pump's slip and says which to watch, plan for or act on.\n"
        "Decision support, not a safety function: follow the maker's manual, site rules\n"
        "and local codes first."};
    app.name("slipledger");  // not its path: usage lines stay within a page wherever it is installed
    app.require_subcommand(1);
    app.formatter(std::make_shared<Help>());
    app.set_version_flag("--version", "slipledger " SLIPLEDGER_VERSION);
    Shared shared;
    for (const auto add : commands) add(app, shared);
    if (argc > 1 && *argv[1] != '-') require_known(app, argv[1]);
    try {
        app.parse(argc, argv);
    } catch (const CLI::ParseError& e) {
        return when_written(app.exit(e) == 0 ? fine : wrong_use);
    }
    return when_written(shared.chosen());
} catch (const slipledger::command::WrongUse& e) {
    return complain(e, slipledger::command::wrong_use);
} catch (const std::exception& e) {
    return complain(e, slipledger::command::could_not);
}
