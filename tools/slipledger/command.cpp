#include "tools/slipledger/command.hpp"

#include <fmt/format.h>
#include <unistd.h>

#include <cstdio>
#include <cstdlib>
#include <utility>
#include <vector>

#include "config/nearest.hpp"
#include "config/plant_reader.hpp"

namespace slipledger::command {

config::Plant Shared::plant() const {
    config::PlantReading reading = config::read_plant_file(plant_file);
    for (const config::Fault& fault : reading.faults) fmt::print(stderr, "{}\n", report::printable(config::format_fault(fault)));
    if (!reading)
        throw std::runtime_error(fmt::format("plant file {} cannot be used; `slipledger check-plant {}` says why",
                                             plant_file, plant_file));
    return std::move(*reading.plant);
}

report::Paper Shared::paper() const {
    const char* no_colour = std::getenv("NO_COLOR");
    const bool unwanted = no_colour != nullptr && *no_colour != '\0';
    const char* terminal = std::getenv("TERM");
    const bool dumb = terminal != nullptr && std::string_view(terminal) == "dumb";
    return report::Paper{!unwanted && !dumb && ::isatty(STDOUT_FILENO) == 1};
}

CLI::App* add_command(CLI::App& app, Shared& shared, const std::string& name, const std::string& what, bool prints_json,
                      std::function<int()> run) {
    CLI::App* command = app.add_subcommand(name, what);
    command->add_option("--plant", shared.plant_file, "plant file")
        ->envname("SLIPLEDGER_PLANT")
        ->type_name("FILE")
        ->capture_default_str();
    if (prints_json) command->add_flag("--json", shared.json, "one JSON value on standard output");
    command->callback([&shared, run = std::move(run)] { shared.chosen = run; });
    return command;
}

const config::Pump& pump_named(const config::Plant& plant, const std::string& id) {
    if (const config::Pump* pump = plant.find_pump(id)) return *pump;
    std::vector<std::string_view> known;
    for (const config::Pump& pump : plant.pumps) known.push_back(pump.id);
    const auto nearest = config::nearest_name(id, known);
    throw WrongUse(fmt::format("no pump \"{}\" in the plant file{}", id,
                               nearest.empty() ? std::string() : fmt::format("; did you mean \"{}\"?", nearest)));
}

std::string counted(std::size_t count, std::string_view what) {
    return fmt::format("{} {}{}", count, what, count == 1 ? "" : "s");
}

const config::Section& section_named(const config::Pump& pump, const std::string& id) {
    if (id.empty() && pump.sections.size() == 1) return pump.sections.front();
    if (const config::Section* section = pump.find_section(id)) return *section;
    std::string known;
    for (const config::Section& section : pump.sections) known += (known.empty() ? "" : ", ") + section.id;
    if (!id.empty())
        throw WrongUse(fmt::format("pump {} has no section \"{}\"; it has {}", pump.id, id, known));
    throw WrongUse(fmt::format("pump {} has the sections {}; say which with --section", pump.id, known));
}

}  // namespace slipledger::command
