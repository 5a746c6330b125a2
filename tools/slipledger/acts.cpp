// Subcommands that tell the ledger something: `acknowledge`, `replaced`, `note`.
#include <fmt/format.h>

#include <chrono>
#include <cmath>
#include <nlohmann/json.hpp>
#include <optional>
#include <string_view>

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
    bool displacement_is_right = false;
};

// The pump's newest reading: what is meant where no time is given.
analytics::Instant newest_reading(const config::Plant& plant, const config::Pump& pump) {
    const ledger::Reader reader(plant.store.path);
    const auto newest = reader.newest(reader.directory().pumps.at(pump.id));
    if (!newest) throw WrongUse(fmt::format("pump {} has no readings yet; say when with --at", pump.id));
    return *newest;
}

constexpr std::chrono::minutes farthest_ahead{15};  // a wall clock may be off by so much

// Foreign text, kept as it may later stand on a terminal. WrongUse where there is nothing in it.
std::string told(std::string_view option, const std::string& text) {
    if (text.find_first_not_of(" \t\r\n") == std::string::npos)
        throw WrongUse(fmt::format("{} is empty", option));
    return report::printable(text);
}

analytics::Instant time_of_act(const Options& options, const config::Plant& plant, const config::Pump& pump) {
    if (options.at.empty()) return newest_reading(plant, pump);
    const analytics::Instant at = given_time(options.at, plant);
    if (at > SystemClock().now() + farthest_ahead)
        throw WrongUse(fmt::format("{} is in the future; say when it was", options.at));
    return at;
}

ledger::Event event_of(const Options& options, const config::Plant& plant, const config::Pump& pump,
                       const std::string& kind) {
    ledger::Event event;
    event.pump = pump.id;
    event.kind = kind;
    event.by = told("--by", options.by);
    event.at = time_of_act(options, plant, pump);
    return event;
}

int keep(const Shared& shared, const config::Plant& plant, const ledger::Event& event, const std::string& line) {
    const std::unique_ptr<Desk> desk = open_desk(plant);
    const std::int64_t id = desk->keep(event);
    if (shared.json)
        fmt::print("{}\n", nlohmann::ordered_json{{"id", id}, {"kind", event.kind}, {"pump", event.pump}}.dump());
    else
        fmt::print("{}\n", report::printable(line));
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
    nlohmann::ordered_json body{{"why", report::printable(options.note)}};
    if (!options.rule.empty()) body["rule"] = options.rule;
    event.body = body.dump();
    return keep(shared, plant, event, fmt::format("acknowledged: {}, by {}", pump.id, options.by));
}

// A slip of the pen here (71 for 17, or cubic inches) would make every later ratio wrong.
void require_likely_displacement(const Options& options, const config::Section& section) {
    const double cm3 = *options.displacement_cm3;
    if (!std::isfinite(cm3) || cm3 <= 0.0) throw WrongUse("--displacement has to be a number of cm3 above 0");
    const double name_plate_cm3 = section.displacement_cm3;
    if (options.displacement_is_right || (cm3 >= 0.5 * name_plate_cm3 && cm3 <= 2.0 * name_plate_cm3)) return;
    throw WrongUse(fmt::format("--displacement {:g} is far from the name plate's {:g} cm3; where it is right, add "
                               "--displacement-is-right", cm3, name_plate_cm3));
}

int replaced(const Shared& shared, const Options& options) {
    const config::Plant plant = shared.plant();
    const config::Pump& pump = pump_named(plant, options.pump);
    const config::Section& section = section_named(pump, options.section);
    if (options.displacement_cm3) require_likely_displacement(options, section);
    ledger::Event event = event_of(options, plant, pump, "replaced");
    event.section = section.id;
    nlohmann::ordered_json body{{"note", report::printable(options.note)}};
    if (options.displacement_cm3) body["displacement_cm3"] = *options.displacement_cm3;
    if (!options.model.empty()) body["model"] = report::printable(options.model);
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
    event.body = nlohmann::ordered_json{{"text", told("--text", options.note)}}.dump();
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
        ->type_name("CM3");
    command->add_flag("--displacement-is-right", options->displacement_is_right,
                      "take it although it is far from the name plate's");
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
