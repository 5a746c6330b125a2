// `slipledger check-plant FILE`: every fault of a plant file at once, or what it says in a few lines.
#include <fmt/format.h>

#include <nlohmann/json.hpp>

#include "config/plant_reader.hpp"
#include "tools/slipledger/command.hpp"

namespace slipledger::command {

namespace {

nlohmann::ordered_json faults_json(const std::vector<config::Fault>& faults) {
    nlohmann::ordered_json out = nlohmann::ordered_json::array();
    for (const config::Fault& fault : faults)
        out.push_back({{"pointer", fault.pointer},
                       {"line", fault.line},
                       {"column", fault.column},
                       {"found", fault.found},
                       {"wanted", fault.wanted},
                       {"code", fault.code}});
    return out;
}

void print_plant(const std::string& file, const config::Plant& plant) {
    std::size_t sections = 0;
    for (const config::Pump& pump : plant.pumps) sections += pump.sections.size();
    fmt::print("{}: fine\n{}: {} with {}, {}, {}; zone {}, ledger {}\n", report::printable(file),
               report::printable(plant.name), counted(plant.pumps.size(), "pump"), counted(sections, "section"),
               counted(plant.reservoirs.size(), "reservoir"), counted(plant.feeds.size(), "feed"), plant.time_zone,
               report::printable(plant.store.path));
}

int run(const Shared& shared, const std::string& file) {
    const std::string path = file.empty() ? shared.plant_file : file;
    const config::PlantReading reading = config::read_plant_file(path);
    if (shared.json)
        fmt::print("{}\n", nlohmann::ordered_json{{"file", path}, {"fine", bool(reading)}, {"faults", faults_json(reading.faults)}}.dump(2));
    else if (reading)
        print_plant(path, *reading.plant);
    else
        for (const config::Fault& fault : reading.faults)
            fmt::print("{}\n", report::printable(config::format_fault(fault)));
    return reading ? fine : answer_is_no;
}

}  // namespace

void add_check_plant(CLI::App& app, Shared& shared) {
    const auto file = std::make_shared<std::string>();
    CLI::App* command = add_command(app, shared, "check-plant", "say what is wrong with a plant file, all at once", true,
                                    [&shared, file] { return run(shared, *file); });
    command->add_option("file", *file, "plant file; else the one of --plant")->type_name("FILE");
}

}  // namespace slipledger::command
