#include "tools/judging/papers.hpp"

#include <fmt/format.h>

#include <cmath>
#include <nlohmann/json.hpp>

#include "tools/plantsim/section.hpp"

namespace slipledger::judging {
namespace {

using Json = nlohmann::ordered_json;
using plantsim::SectionDrawing;

Json points_of(const plantsim::Oil& oil) {
    const auto point = [&](double c) {
        const double cst = plantsim::kinematic_cst(oil, c, 0.0);
        return Json{{"temperature_c", c}, {"viscosity_cst", std::round(cst * 10.0) / 10.0}};
    };
    return Json{{"points", Json::array({point(40.0), point(100.0)})}};
}

std::string label_of(const OilPapers& oil) {
    return fmt::format("{} {}", oil.index > 125 ? "HVLP" : "HLP", grade_of(oil.oil));
}

Json sensor(bool with_range, double low, double high, Json rest) {
    if (with_range) rest["range"] = Json::array({low, high});
    return rest;
}

Json sensors_of(const PumpPapers& papers) {
    const plantsim::PumpDrawing& pump = papers.pump.drawing;
    const SectionDrawing& section = pump.sections.front();
    const bool ranges = papers.ranges_given;
    const double rated_lpm = section.lives.front().displacement_cm3 * pump.rated.speed_rpm / 1000.0;
    Json sensors;
    sensors["outlet_pressure"] = sensor(ranges, 0, 400, {{"accuracy", 0.6}});
    if (pump.has_speed) sensors["shaft_speed"] = sensor(ranges, 0, 3000, {{"accuracy", 1}});
    if (section.fitted.drain)
        sensors["case_drain_flow"] = sensor(ranges, 0, std::ceil(0.25 * rated_lpm),
                                            {{"accuracy", 0.02}, {"accuracy_percent", 1}, {"least", 0.1}});
    if (section.fitted.delivery)
        sensors["delivery_flow"] =
            sensor(ranges, 0, std::ceil(1.3 * rated_lpm),
                   {{"accuracy", 0.05},
                    {"accuracy_percent", 0.3},
                    {"least", 1},
                    {"measured_at", section.fitted.delivery_on_return ? "return-side" : "pressure-side"}});
    if (pump.has_temperature) sensors["fluid_temperature"] = sensor(ranges, -20, 120, {{"accuracy", 0.4}});
    if (pump.has_inlet_pressure) sensors["inlet_pressure"] = sensor(ranges, -1, 3, {{"accuracy", 0.01}});
    if (pump.has_case_pressure) sensors["case_pressure"] = sensor(ranges, 0, 10, {{"accuracy", 0.01}});
    return sensors;
}

// One line of the maker's record, at 75 % of rated pressure with test oil of 40 mm2/s.
Json maker_test_of(const PumpPapers& papers, const SectionDrawing& section, const plantsim::PlantDrawing& plant) {
    constexpr double test_oil_cst = 40.0;
    const plantsim::Oil& oil = plant.reservoirs.front().oil;
    double warm_c = 20.0;
    while (plantsim::kinematic_cst(oil, warm_c, 0.0) > test_oil_cst) warm_c += 0.1;
    plantsim::Strain strain = plantsim::reference_point(papers.pump.drawing.rated);
    strain.temperature_c = warm_c;
    const plantsim::Life& life = section.lives.front();
    const double rated_bar = papers.pump.drawing.rated.pressure_bar;
    const double off = 1.0 + papers.maker_test_error;
    const plantsim::Leakage lost = plantsim::leakage(life, oil, strain, rated_bar);
    Json point{{"pressure_bar", strain.pressure_bar}, {"speed_rpm", strain.speed_rpm}, {"viscosity_cst", test_oil_cst}};
    if (section.fitted.drain) {
        point["case_drain_lpm"] = std::round(lost.to_drain_lpm * off * 100.0) / 100.0;
    } else {
        const double theoretical = life.displacement_cm3 * life.true_share * strain.speed_rpm / 1000.0;
        point["delivery_lpm"] = std::round((theoretical - (lost.to_drain_lpm + lost.inside_lpm) * off) * 100.0) / 100.0;
    }
    return Json{{"points", Json::array({point})}};
}

Json section_of(const PumpPapers& papers, const SectionDrawing& section, const plantsim::PlantDrawing& plant) {
    Json written{{"displacement_cm3", section.lives.front().displacement_cm3}, {"model", papers.pump.model}};
    if (papers.maker_test) written["maker_test"] = maker_test_of(papers, section, plant);
    if (papers.pump.drawing.one_drain_meter) written["drain_group"] = "case-" + papers.pump.drawing.id;
    return written;
}

Json pump_of(const PumpPapers& papers, const plantsim::PlantDrawing& plant) {
    const plantsim::PumpDrawing& pump = papers.pump.drawing;
    Json written{{"id", pump.id}, {"reservoir", "tank"}, {"type", name_of(papers.pump.kind)}};
    written["control"] = pump.compensator ? "pressure-compensated" : "fixed";
    written["rated"] = {{"pressure_bar", pump.rated.pressure_bar},
                        {"speed_rpm", pump.rated.speed_rpm},
                        {"fluid_temperature_c", pump.rated.fluid_temperature_c}};
    written["motor"] = {{"nominal_rpm", pump.synchronous_rpm}, {"slip_at_rated", 0.013}};
    if (pump.compensator) written["compensator_bar"] = pump.compensator->setting_bar;
    written["relief_bar"] = papers.pump.relief_bar;
    if (pump.sections.size() == 1) {
        written.update(section_of(papers, pump.sections.front(), plant));
    } else {
        for (const SectionDrawing& section : pump.sections) {
            Json part = section_of(papers, section, plant);
            part["id"] = section.id;
            written["sections"].push_back(part);
        }
    }
    written["sensors"] = sensors_of(papers);
    written["spare"] = {{"part_number", papers.pump.model}, {"in_stock", 0}, {"lead_days", 42}};
    if (papers.since) written["since"] = plantsim::rfc3339(*papers.since);
    return written;
}

}  // namespace

std::string plant_file(const PlantPapers& papers) {
    Json written{{"plant", "a fleet of the bench"}, {"time_zone", papers.plant.time_zone}};
    written["store"] = {{"commit_interval", "1 ms"}};
    std::string fluid = label_of(papers.oil);
    if (papers.oil.sampled) {
        fluid += " by sample";
        written["fluids"][fluid] = points_of(papers.oil.oil);
    }
    written["reservoirs"] = Json::array({Json{{"id", "tank"}, {"fluid", fluid}}});
    for (const PumpPapers& pump : papers.pumps) written["pumps"].push_back(pump_of(pump, papers.plant));
    return written.dump(1);
}

}  // namespace slipledger::judging
