#include "tools/judging/spoil.hpp"

#include <algorithm>
#include <nlohmann/json.hpp>

namespace slipledger::judging {
namespace {

using Json = nlohmann::ordered_json;

void flatten_oil(Json& plant) {
    // As thick as a usual oil at 50 degC. The reader insists that oil thins when it warms, so it does, a little.
    const auto point = [](double c, double cst) { return Json{{"temperature_c", c}, {"viscosity_cst", cst}}; };
    plant["fluids"]["flat"]["points"] = Json::array({point(0.0, 31.0), point(100.0, 30.9)});
    for (Json& reservoir : plant["reservoirs"]) reservoir["fluid"] = "flat";
}

void swell(Json& owner) {
    if (owner.contains("displacement_cm3")) owner["displacement_cm3"] = 1.06 * owner["displacement_cm3"].get<double>();
    if (owner.contains("sections"))
        for (Json& section : owner["sections"]) swell(section);
}

}  // namespace

std::optional<Spoil> spoil_named(std::string_view name) {
    const auto found = std::ranges::find(spoil_table, name, &SpoilFacts::name);
    if (found == spoil_table.end()) return std::nullopt;
    return found->spoil;
}

std::string spoilt(const std::string& plant_file, Spoil spoil) {
    if (spoil == Spoil::nothing || plant_file.empty()) return plant_file;
    Json plant = Json::parse(plant_file);
    if (spoil == Spoil::viscosity) flatten_oil(plant);
    if (spoil == Spoil::displacement)
        for (Json& pump : plant["pumps"]) swell(pump);
    if (spoil == Spoil::limits) {
        plant["alerts"]["limits"]["leakage_ratio"] = {{"watch", 1.8}, {"plan", 2.5}, {"act", 3.0}};
        plant["alerts"]["limits"]["efficiency_points"] = {{"watch", 8.0}, {"plan", 9.0}, {"act", 10.0}};
    }
    return plant.dump(1);
}

}  // namespace slipledger::judging
