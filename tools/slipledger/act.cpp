#include "tools/slipledger/act.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <chrono>
#include <nlohmann/json.hpp>

#include "daemon/clock.hpp"
#include "tools/slipledger/desk.hpp"
#include "tools/slipledger/given_time.hpp"

namespace slipledger::command {

namespace {

constexpr std::chrono::minutes farthest_ahead{15};  // a wall clock may be off by so much

// The pump's newest reading: what is meant where no time is given.
analytics::Instant newest_reading(const config::Plant& plant, const config::Pump& pump) {
    const ledger::Reader reader(plant.store.path);
    const auto newest = reader.newest(reader.directory().pumps.at(pump.id));
    if (!newest) throw WrongUse(fmt::format("pump {} has no readings yet; say when with --at", pump.id));
    return *newest;
}

analytics::Instant time_of_act(const ActOptions& options, const config::Plant& plant, const config::Pump* pump) {
    if (options.at.empty() && pump == nullptr) throw WrongUse("no pump draws from it; say when with --at");
    if (options.at.empty()) return newest_reading(plant, *pump);
    const analytics::Instant at = given_time(options.at, plant);
    if (at > SystemClock().now() + farthest_ahead)
        throw WrongUse(fmt::format("{} is in the future; say when it was", options.at));
    return at;
}

}  // namespace

void add_pump_options(CLI::App* command, ActOptions& options) {
    command->add_option("pump", options.place, "id of the pump")->required()->type_name("PUMP");
    command->add_option("--section", options.section, "id of the section")->type_name("ID");
    add_who_and_when(command, options);
}

void add_oil_options(CLI::App* command, ActOptions& options) {
    command->add_option("place", options.place, "id of the reservoir, or of a pump that draws from it")
        ->required()
        ->type_name("PLACE");
    add_who_and_when(command, options);
}

void add_who_and_when(CLI::App* command, ActOptions& options) {
    command->add_option("--at", options.at, "when; default: the pump's newest reading")->type_name("TIME");
    command->add_option("--by", options.by, "who says so")->required()->type_name("NAME");
}

void add_place_options(CLI::App* command, ActOptions& options) {
    command->add_option("place", options.place, "id of the pump, or of a reservoir")->required()->type_name("PLACE");
    command->add_option("--section", options.section, "of this section alone")->type_name("ID");
}

void add_note_option(CLI::App* command, ActOptions& options) {
    command->add_option("--note", options.note, "anything worth knowing")->type_name("TEXT");
}

std::string told(std::string_view option, const std::string& text) {
    if (text.find_first_not_of(" \t\r\n") == std::string::npos) throw WrongUse(fmt::format("{} is empty", option));
    return report::printable(text);
}

ledger::Event event_of(const ActOptions& options, const config::Plant& plant, const config::Pump& pump,
                       const std::string& kind) {
    ledger::Event event;
    event.pump = pump.id;
    event.kind = kind;
    event.by = told("--by", options.by);
    event.at = time_of_act(options, plant, &pump);
    return event;
}

ledger::Event section_event_of(const ActOptions& options, const config::Plant& plant, const config::Pump& pump,
                               const std::string& kind) {
    ledger::Event event = event_of(options, plant, pump, kind);
    event.section = section_named(pump, options.section).id;
    return event;
}

ledger::Event place_event_of(const ActOptions& options, const config::Plant& plant, const std::string& kind,
                             nlohmann::ordered_json& body) {
    ledger::Event event;
    event.kind = kind;
    event.by = told("--by", options.by);
    const OilPlace place = oil_place(options, plant);
    event.at = time_of_act(options, plant, place.pump);
    if (plant.find_pump(options.place) == nullptr) {
        body["reservoir"] = options.place;
        return event;
    }
    const config::Pump& pump = pump_named(plant, options.place);
    event.pump = pump.id;
    if (!options.section.empty()) event.section = section_named(pump, options.section).id;
    return event;
}

OilPlace oil_place(const ActOptions& options, const config::Plant& plant) {
    OilPlace place;
    place.reservoir = plant.find_reservoir(options.place);
    if (place.reservoir == nullptr) {
        place.pump = &pump_named(plant, options.place);
        place.reservoir = plant.find_reservoir(place.pump->reservoir);
        return place;
    }
    const auto draws = [&](const config::Pump& pump) { return pump.reservoir == options.place; };
    const auto first = std::ranges::find_if(plant.pumps, draws);
    if (first != plant.pumps.end()) place.pump = &*first;
    return place;
}

ledger::Event oil_event_of(const ActOptions& options, const config::Plant& plant, const OilPlace& place,
                           const std::string& kind) {
    ledger::Event event;
    event.kind = kind;
    event.by = told("--by", options.by);
    event.at = time_of_act(options, plant, place.pump);
    if (place.reservoir == nullptr) event.pump = place.pump->id;
    return event;
}

int keep(const Shared& shared, const config::Plant& plant, const ledger::Event& event, const std::string& line) {
    const std::unique_ptr<Desk> desk = open_desk(plant);
    const std::int64_t id = desk->keep(event);
    if (shared.json) {
        nlohmann::ordered_json said{{"id", id}, {"kind", event.kind}, {"pump", event.pump}};
        if (event.pump.empty()) said["pump"] = nullptr;
        fmt::print("{}\n", said.dump());
    } else {
        fmt::print("{}", report::paragraph("", report::printable(line)));
    }
    return fine;
}

void require_between(std::string_view option, double value, double least, double most, std::string_view unit) {
    if (value >= least && value <= most) return;  // written so that NaN is refused
    throw WrongUse(fmt::format("{} has to be {:g} to {:g} {}, not {:g}", option, least, most, unit, value));
}

}  // namespace slipledger::command
