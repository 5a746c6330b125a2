// What every act shares: a command by which somebody tells the ledger a dated fact. Whom it is about, when it was, who
// says so; how it is kept, and how that is said.
#pragma once

#include <nlohmann/json_fwd.hpp>
#include <string>
#include <string_view>

#include "config/plant.hpp"
#include "daemon/ledger/records.hpp"
#include "tools/slipledger/command.hpp"

namespace slipledger::command {

// Threads: one.
struct ActOptions {
    std::string place;  // id of a pump; of an act on oil, of a reservoir or a pump that draws from it
    std::string section;
    std::string at;
    std::string by;
    std::string note;
};

// PUMP, --section, --at and --by; of an act on oil PLACE, --at and --by.
void add_pump_options(CLI::App* command, ActOptions& options);
void add_oil_options(CLI::App* command, ActOptions& options);
void add_who_and_when(CLI::App* command, ActOptions& options);  // --at and --by
void add_note_option(CLI::App* command, ActOptions& options);

// Foreign text, kept as it may later stand on a terminal. WrongUse where there is nothing in it.
std::string told(std::string_view option, const std::string& text);

// The event so far: kind, pump, time and who. WrongUse for a time in the future.
ledger::Event event_of(const ActOptions& options, const config::Plant& plant, const config::Pump& pump,
                       const std::string& kind);

// The same of a section: the named one, or the pump's only one.
ledger::Event section_event_of(const ActOptions& options, const config::Plant& plant, const config::Pump& pump,
                               const std::string& kind);

// Of a pump (or a section of it, where one is named), or of a reservoir and so of all that draw from it.
ledger::Event place_event_of(const ActOptions& options, const config::Plant& plant, const std::string& kind,
                             nlohmann::ordered_json& body);
void add_place_options(CLI::App* command, ActOptions& options);  // PLACE and --section

// Whose oil is meant. Threads: a value, share freely.
struct OilPlace {
    const config::Reservoir* reservoir = nullptr;  // null: the pump's own oil, of no reservoir
    const config::Pump* pump = nullptr;            // the first that draws from it; null: none does
    const config::Fluid& fluid() const { return reservoir != nullptr ? reservoir->fluid : pump->fluid; }
    std::string name() const { return reservoir != nullptr ? reservoir->id : pump->id; }
};
OilPlace oil_place(const ActOptions& options, const config::Plant& plant);
ledger::Event oil_event_of(const ActOptions& options, const config::Plant& plant, const OilPlace& place,
                           const std::string& kind);

// Keeps it and prints `line`, or its id as JSON.
int keep(const Shared& shared, const config::Plant& plant, const ledger::Event& event, const std::string& line);

// WrongUse unless `value` lies between the two, naming the option and its unit.
void require_between(std::string_view option, double value, double least, double most, std::string_view unit);

}  // namespace slipledger::command
