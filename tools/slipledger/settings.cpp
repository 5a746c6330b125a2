// Subcommands about what surrounds the part: `compensator-set`, `instrument-changed`.
#include <fmt/format.h>

#include <nlohmann/json.hpp>

#include "analytics/quantity.hpp"
#include "tools/slipledger/act.hpp"

namespace slipledger::command {

namespace {

// Threads: one.
struct Options : ActOptions {
    double bar = 0.0;
    std::string quantity;
};

int compensator_set(const Shared& shared, const Options& options) {
    const config::Plant plant = shared.plant();
    const config::Pump& pump = pump_named(plant, options.place);
    if (pump.control == analytics::Control::fixed)
        throw WrongUse(fmt::format("pump {} is fixed by the plant file: it has no compensator", pump.id));
    ledger::Event event = section_event_of(options, plant, pump, "compensator-set");
    require_between("--bar", options.bar, 5.0, 1000.0, "bar");
    nlohmann::ordered_json body{{"bar", options.bar}};
    if (!options.note.empty()) body["note"] = report::printable(options.note);
    event.body = body.dump();
    return keep(shared, plant, event, fmt::format("compensator set: {} at {:g} bar", pump.id, options.bar));
}

std::string quantity_names() {
    std::string names;
    for (const analytics::QuantityFacts& facts : analytics::quantity_table)
        names += (names.empty() ? "" : ", ") + std::string(facts.name);
    return names;
}

int instrument_changed(const Shared& shared, const Options& options) {
    const config::Plant plant = shared.plant();
    if (!analytics::quantity_named(options.quantity))
        throw WrongUse(fmt::format("--quantity \"{}\" is not known; wanted one of {}",
                                   report::printable(options.quantity), quantity_names()));
    nlohmann::ordered_json body{{"quantity", options.quantity}};
    ledger::Event event = place_event_of(options, plant, "instrument-changed", body);
    if (!options.note.empty()) body["note"] = report::printable(options.note);
    event.body = body.dump();
    return keep(shared, plant, event,
                fmt::format("instrument changed: {} of {}; what it is off by is learned anew", options.quantity,
                            options.place));
}

}  // namespace

void add_compensator_set(CLI::App& app, Shared& shared) {
    const auto options = std::make_shared<Options>();
    CLI::App* command = add_command(app, shared, "compensator-set", "the compensator was set to another pressure", true,
                                    [&shared, options] { return compensator_set(shared, *options); });
    add_pump_options(command, *options);
    command->add_option("--bar", options->bar, "its setting from then on")->required()->type_name("BAR");
    add_note_option(command, *options);
}

void add_instrument_changed(CLI::App& app, Shared& shared) {
    const auto options = std::make_shared<Options>();
    CLI::App* command = add_command(app, shared, "instrument-changed", "a sensor was replaced or calibrated", true,
                                    [&shared, options] { return instrument_changed(shared, *options); });
    add_place_options(command, *options);
    add_who_and_when(command, *options);
    command->add_option("--quantity", options->quantity, "what it measures, e.g. case_drain_flow")
        ->required()
        ->type_name("NAME");
    add_note_option(command, *options);
}

}  // namespace slipledger::command
