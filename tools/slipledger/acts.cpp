// Subcommands that tell the ledger something and change no judgement: `acknowledge`, `note`.
#include <fmt/format.h>

#include <nlohmann/json.hpp>

#include "daemon/report/alarm_query.hpp"
#include "tools/slipledger/act.hpp"

namespace slipledger::command {

namespace {

// Threads: one.
struct Options : ActOptions {
    std::string rule;
};

void require_an_alarm(const config::Plant& plant, const config::Pump& pump, const Options& options) {
    const ledger::Reader reader(plant.store.path);
    for (const report::Episode& episode : report::query_alarms(reader, plant, true)) {
        const bool same_section = options.section.empty() || episode.section == options.section;
        if (episode.pump == pump.id && same_section && (options.rule.empty() || episode.rule == options.rule)) return;
    }
    throw WrongUse(fmt::format("pump {} has no such alarm open; see `slipledger alerts {} --open`", pump.id, pump.id));
}

int acknowledge(const Shared& shared, const Options& options) {
    const config::Plant plant = shared.plant();
    const config::Pump& pump = pump_named(plant, options.place);
    if (!options.section.empty()) static_cast<void>(section_named(pump, options.section));
    require_an_alarm(plant, pump, options);
    ledger::Event event = event_of(options, plant, pump, "acknowledged");
    event.section = options.section;
    nlohmann::ordered_json body{{"why", report::printable(options.note)}};
    if (!options.rule.empty()) body["rule"] = options.rule;
    event.body = body.dump();
    return keep(shared, plant, event, fmt::format("acknowledged: {}, by {}", pump.id, options.by));
}

int note(const Shared& shared, const Options& options) {
    const config::Plant plant = shared.plant();
    const config::Pump& pump = pump_named(plant, options.place);
    ledger::Event event = event_of(options, plant, pump, "note");
    event.section = options.section.empty() ? "" : section_named(pump, options.section).id;
    event.body = nlohmann::ordered_json{{"text", told("--text", options.note)}}.dump();
    return keep(shared, plant, event, fmt::format("noted: {}", pump.id));
}

}  // namespace

void add_acknowledge(CLI::App& app, Shared& shared) {
    const auto options = std::make_shared<Options>();
    CLI::App* command = add_command(app, shared, "acknowledge", "say that an alarm has been seen", true,
                                    [&shared, options] { return acknowledge(shared, *options); });
    add_pump_options(command, *options);
    command->add_option("--rule", options->rule, "alarms of this rule alone; default: all open ones")->type_name("RULE");
    command->add_option("--note", options->note, "what is done about it")->type_name("TEXT");
}

void add_note(CLI::App& app, Shared& shared) {
    const auto options = std::make_shared<Options>();
    CLI::App* command = add_command(app, shared, "note", "keep a dated note with a pump", true,
                                    [&shared, options] { return note(shared, *options); });
    add_pump_options(command, *options);
    command->add_option("--text", options->note, "the note")->required()->type_name("TEXT");
}

}  // namespace slipledger::command
