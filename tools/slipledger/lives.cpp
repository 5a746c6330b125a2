// `slipledger lives [PUMP]`: lives of parts side by side, by model.
#include <fmt/format.h>

#include <nlohmann/json.hpp>
#include <optional>

#include "daemon/report/past_lives.hpp"
#include "daemon/report/render_lives.hpp"
#include "tools/slipledger/command.hpp"

namespace slipledger::command {

namespace {

// Threads: one.
struct Options {
    std::string pump;
    std::string model;
};

int run(const Shared& shared, const Options& options) {
    const config::Plant plant = shared.plant();
    const config::Pump* pump = options.pump.empty() ? nullptr : &pump_named(plant, options.pump);
    const ledger::Reader reader(plant.store.path);
    const auto model = options.model.empty() ? std::nullopt : std::optional(options.model);
    const std::vector<report::ModelLives> models = report::query_lives(reader, plant, pump, model);
    if (models.empty())
        throw WrongUse(fmt::format("no life of model \"{}\" is known", report::printable(options.model)));
    if (shared.json)
        fmt::print("{}\n", report::to_json(models).dump(2));
    else
        fmt::print("{}", report::lives_text(models, plant, shared.paper()));
    return fine;
}

}  // namespace

void add_lives(CLI::App& app, Shared& shared) {
    const auto options = std::make_shared<Options>();
    CLI::App* command = add_command(app, shared, "lives", "compare the lives of parts, by model", true,
                                    [&shared, options] { return run(shared, *options); });
    command->add_option("pump", options->pump, "id of a pump; none: all")->type_name("PUMP");
    command->add_option("--model", options->model, "lives of this model alone")->type_name("MODEL");
}

}  // namespace slipledger::command
