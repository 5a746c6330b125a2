// `slipledger history PUMP`: what was judged day by day, or summary by summary.
#include <fmt/format.h>

#include <nlohmann/json.hpp>
#include <optional>

#include "daemon/report/history.hpp"
#include "daemon/report/render_json.hpp"
#include "daemon/report/render_text.hpp"
#include "tools/slipledger/command.hpp"

namespace slipledger::command {

namespace {

// Threads: one.
struct Options {
    std::string pump;
    std::string section;
    std::string by = "day";
};

int run(const Shared& shared, const Options& options) {
    const config::Plant plant = shared.plant();
    const config::Pump& pump = pump_named(plant, options.pump);
    const ledger::Reader reader(plant.store.path);
    std::optional<std::string> section;
    if (!options.section.empty()) section = section_named(pump, options.section).id;
    const auto rows = options.by == "summary" ? report::history_by_summary(reader, pump, section)
                                              : report::history_by_day(reader, pump, section);
    if (shared.json)
        fmt::print("{}\n", report::to_json(rows).dump(2));
    else
        fmt::print("{}", report::history_text(rows, plant, shared.paper()));
    return fine;
}

}  // namespace

void add_history(CLI::App& app, Shared& shared) {
    const auto options = std::make_shared<Options>();
    CLI::App* command = add_command(app, shared, "history", "what was judged, day by day", true,
                                    [&shared, options] { return run(shared, *options); });
    command->add_option("pump", options->pump, "id of the pump")->required()->type_name("PUMP");
    command->add_option("--section", options->section, "this section alone")->type_name("ID");
    command->add_option("--by", options->by, "a row a day, or a row a closed summary")
        ->check(CLI::IsMember({"day", "summary"}))
        ->capture_default_str();
}

}  // namespace slipledger::command
