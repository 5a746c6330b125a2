// `slipledger alerts [PUMP]`: alarm episodes, newest first.
#include <fmt/format.h>

#include <nlohmann/json.hpp>

#include "daemon/report/alarm_query.hpp"
#include "daemon/report/render_json.hpp"
#include "daemon/report/render_text.hpp"
#include "tools/slipledger/command.hpp"

namespace slipledger::command {

namespace {

// Threads: one.
struct Options {
    std::string pump;
    bool open_only = false;
};

int run(const Shared& shared, const Options& options) {
    const config::Plant plant = shared.plant();
    if (!options.pump.empty()) static_cast<void>(pump_named(plant, options.pump));
    const ledger::Reader reader(plant.store.path);
    std::vector<report::Episode> episodes = report::query_alarms(reader, plant, options.open_only);
    if (!options.pump.empty())
        std::erase_if(episodes, [&](const report::Episode& episode) { return episode.pump != options.pump; });
    if (shared.json)
        fmt::print("{}\n", report::to_json(episodes).dump(2));
    else
        fmt::print("{}", report::alerts_text(episodes, plant, shared.paper()));
    return fine;
}

}  // namespace

void add_alerts(CLI::App& app, Shared& shared) {
    const auto options = std::make_shared<Options>();
    CLI::App* command = add_command(app, shared, "alerts", "alarms, newest first", true,
                                    [&shared, options] { return run(shared, *options); });
    command->add_option("pump", options->pump, "id of a pump; none: all")->type_name("PUMP");
    command->add_flag("--open", options->open_only, "only those that have not returned to normal");
}

}  // namespace slipledger::command
