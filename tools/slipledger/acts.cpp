// Subcommands that tell the ledger something: `acknowledge`, `replaced`, `note`.
#include <fmt/format.h>

#include <cmath>
#include <nlohmann/json.hpp>
#include <optional>

#include "daemon/clock.hpp"
#include "daemon/report/alarm_query.hpp"
#include "tools/slipledger/command.hpp"
#include "tools/slipledger/desk.hpp"
#include "tools/slipledger/given_time.hpp"

namespace slipledger::command {

namespace {

// Options of all three; each adds those it knows. Threads: one.
struct Options {
    std::string pump;
    std::string section;
    std::string at;
    std::string by;
    std::string note;
    std::string rule;
    std::string model;
    std::string found;
    std::optional<double> displacement_cm3;
};

// The pump's newest reading: what is meant where no time is given.
analytics::Instant newest_reading(const config::Plant& plant, const config::Pump& pump) {
    const ledger::Reader reader(plant.store.path);
    const auto newest = reader.newest(reader.directory().pumps.at(pump.id));
    if (!newest) throw WrongUse(fmt::format("pump {} has no readings yet; say when with --at", pump.id));
    return *newest;
}

ledger::Event event_of(const Options& options, const config::Plant& plant, const config::Pump& pump,
                       const std::string& kind) {
    ledger::Event event;
    event.pump = pump.id;
    event.kind = kind;
    event.by = options.by;
    event.at = options.at.empty() ? newest_reading(plant, pump) : given_time(options.at, plant);
    return event;
}

int keep(const Shared& shared, const config::Plant& plant, const ledger::Event& event, const std::string& told) {
    const std::unique_ptr<Desk> desk = open_desk(plant);
    const std::int64_t id = desk->keep(event);
    if (shared.json)
        fmt::print("{}\n", nlohmann::ordered_json{{"id", id}, {"kind", event.kind}, {"pump", event.pump}}.dump());
    else
        fmt::print("{}\n", told);
    return fine;
}

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
    const config::Pump& pump = pump_named(plant, options.pump);
    if (!options.section.empty()) static_cast<void>(section_named(pump, options.section));
    require_an_alarm(plant, pump, options);
    ledger::Event event = event_of(options, plant, pump, "acknowledged");
    event.section = options.section;
    nlohmann::ordered_json body{{"why", options.note}};
    if (!options.rule.empty()) body["rule"] = options.rule;
    event.body = body.dump();
    return keep(shared, plant, event, fmt::format("acknowledged: {}, by {}", pump.id, options.by));
}

int replaced(const Shared& shared, const Options& options) {
    const config::Plant plant = shared.plant();
    const config::Pump& pump = pump_named(plant, options.pump);
    const config::Section& section = section_named(pump, options.section);
    ledger::Event event = event_of(options, plant, pump, "replaced");
    event.section = section.id;
    nlohmann::ordered_json body{{"note", options.note}};
    if (options.displacement_cm3) body["displacement_cm3"] = *options.displacement_cm3;
    if (!options.model.empty()) body["model"] = options.model;
    if (!options.found.empty()) body["found"] = options.found;
    event.body = body.dump();
    return keep(shared, plant, event,
                fmt::format("replaced: {} section {} begins a new life; what was learned of the old one stays with it",
                            pump.id, section.id));
}

int note(const Shared& shared, const Options& options) {
    const config::Plant plant = shared.plant();
    const config::Pump& pump = pump_named(plant, options.pump);
    ledger::Event event = event_of(options, plant, pump, "note");
    event.section = options.section.empty() ? "" : section_named(pump, options.section).id;
    event.body = nlohmann::ordered_json{{"text", options.note}}.dump();
    return keep(shared, plant, event, fmt::format("noted: {}", pump.id));
}

// Options that every act takes.
void add_common(CLI::App* command, Options& options) {
    command->add_option("pump", options.pump, "id of the pump")->required()->type_name("PUMP");
    command->add_option("--section", options.section, "id of the section")->type_name("ID");
    command->add_option("--at", options.at, "when; default: the pump's newest reading")->type_name("TIME");
    command->add_option("--by", options.by, "who says so")->required()->type_name("NAME");
}

}  // namespace

void add_acknowledge(CLI::App& app, Shared& shared) {
    const auto options = std::make_shared<Options>();
    CLI::App* command = add_command(app, shared, "acknowledge", "say that an alarm has been seen", true,
                                    [&shared, options] { return acknowledge(shared, *options); });
    add_common(command, *options);
    command->add_option("--rule", options->rule, "alarms of this rule alone; default: all open ones")->type_name("RULE");
    command->add_option("--note", options->note, "what is done about it")->type_name("TEXT");
}

void add_replaced(CLI::App& app, Shared& shared) {
    const auto options = std::make_shared<Options>();
    CLI::App* command =
        add_command(app, shared, "replaced", "a cartridge, rotating group or gear set was replaced: a new life begins", true,
                    [&shared, options] { return replaced(shared, *options); });
    add_common(command, *options);
    command->add_option("--displacement", options->displacement_cm3, "of the new part, where it differs")
        ->type_name("CM3")
        ->check(CLI::PositiveNumber);
    command->add_option("--model", options->model, "of the new part, where it differs")->type_name("TEXT");
    command->add_option("--found", options->found, "what the old part looked like")
        ->check(CLI::IsMember({"worn", "damaged", "good", "other"}));
    command->add_option("--note", options->note, "anything worth knowing")->type_name("TEXT");
}

void add_note(CLI::App& app, Shared& shared) {
    const auto options = std::make_shared<Options>();
    CLI::App* command = add_command(app, shared, "note", "keep a dated note with a pump", true,
                                    [&shared, options] { return note(shared, *options); });
    add_common(command, *options);
    command->add_option("--text", options->note, "the note")->required()->type_name("TEXT");
}

}  // namespace slipledger::command
