// `slipledger health PUMP`: the health report of one pump.
#include <fmt/format.h>

#include <algorithm>
#include <nlohmann/json.hpp>

#include "daemon/report/health_query.hpp"
#include "daemon/report/render_json.hpp"
#include "daemon/report/render_text.hpp"
#include "tools/slipledger/command.hpp"

namespace slipledger::command {

namespace {

// Threads: one.
struct Options {
    std::string pump;
    std::string section;
};

void keep_only(report::PumpHealth& health, const std::string& section) {
    std::erase_if(health.sections, [&](const report::SectionHealth& each) { return each.section != section; });
}

int run(const Shared& shared, const Options& options) {
    const config::Plant plant = shared.plant();
    const config::Pump& pump = pump_named(plant, options.pump);
    const ledger::Reader reader(plant.store.path);
    report::PumpHealth health = report::query_health(reader, plant, pump);
    if (!options.section.empty()) keep_only(health, section_named(pump, options.section).id);
    if (shared.json)
        fmt::print("{}\n", report::to_json(health).dump(2));
    else
        fmt::print("{}", report::health_text(health, plant, shared.paper()));
    return fine;
}

}  // namespace

void add_health(CLI::App& app, Shared& shared) {
    const auto options = std::make_shared<Options>();
    CLI::App* command = add_command(app, shared, "health", "the health report of one pump", true,
                                    [&shared, options] { return run(shared, *options); });
    command->add_option("pump", options->pump, "id of the pump")->required()->type_name("PUMP");
    command->add_option("--section", options->section, "this section alone")->type_name("ID");
}

}  // namespace slipledger::command
