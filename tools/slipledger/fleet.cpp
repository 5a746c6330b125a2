// `slipledger fleet`: every section of the plant, most urgent first.
#include <fmt/format.h>

#include <nlohmann/json.hpp>

#include "daemon/report/health_query.hpp"
#include "daemon/report/render_json.hpp"
#include "daemon/report/render_text.hpp"
#include "tools/slipledger/command.hpp"

namespace slipledger::command {

void add_fleet(CLI::App& app, Shared& shared) {
    add_command(app, shared, "fleet", "list every pump, most urgent first", true, [&shared] {
        const config::Plant plant = shared.plant();
        const ledger::Reader reader(plant.store.path);
        const auto fleet = report::query_fleet(reader, plant);
        if (shared.json)
            fmt::print("{}\n", report::to_json(fleet).dump(2));
        else
            fmt::print("{}", report::fleet_text(fleet, plant, shared.paper()));
        return fine;
    });
}

}  // namespace slipledger::command
