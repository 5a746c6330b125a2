#include <nlohmann/json.hpp>

#include "config/pump.hpp"

namespace slipledger::config {
namespace {

using Json = nlohmann::json;  // sorts its keys, and writes a double so that it reads back the same

template <typename Value>
void put(Json& json, const char* key, const std::optional<Value>& value) {
    if (value) json[key] = *value;
}

Json facts_of(const Fluid& fluid) {
    Json json{{"name", fluid.name},
              {"density_15_kgm3", fluid.density_15_kgm3},
              {"minimum_cst", fluid.minimum_cst},
              {"maximum_cst", fluid.maximum_cst},
              {"bulk_modulus_gpa", fluid.bulk_modulus_gpa}};
    put(json, "iso_vg", fluid.iso_vg);
    put(json, "viscosity_index", fluid.viscosity_index);
    for (const ViscosityPoint& point : fluid.points)
        json["points"].push_back({{"temperature_c", point.temperature_c}, {"viscosity_cst", point.viscosity_cst}});
    return json;
}

Json facts_of(const Sensor& sensor) {
    Json json{{"measured_at", sensor.measured_at == MeasuredAt::pressure_side ? "pressure-side" : "return-side"}};
    put(json, "range_low", sensor.range_low);
    put(json, "range_high", sensor.range_high);
    put(json, "accuracy", sensor.accuracy);
    put(json, "accuracy_percent", sensor.accuracy_percent);
    put(json, "least", sensor.least);
    if (sensor.hold) json["hold_s"] = sensor.hold->count();
    return json;
}

Json facts_of(const Section& section) {
    Json json{{"model", section.model},
              {"displacement_cm3", section.displacement_cm3},
              {"displacement_accuracy_percent", section.displacement_accuracy_percent},
              {"max_stroke_fraction", section.max_stroke_fraction},
              {"full_stroke", section.full_stroke},
              {"case_flushing_lpm", section.case_flushing_lpm},
              {"drain_group", section.drain_group}};
    put(json, "compensator_bar", section.compensator_bar);
    put(json, "relief_bar", section.relief_bar);
    for (const auto& [quantity, sensor] : section.sensors)
        json["sensors"][std::string(analytics::name_of(quantity))] = facts_of(sensor);
    return json;
}

}  // namespace

std::string pump_facts(const Pump& pump) {
    Json json{{"reservoir", pump.reservoir},
              {"fluid", facts_of(pump.fluid)},
              {"type", analytics::name_of(pump.type)},
              {"control", analytics::name_of(pump.control)},
              {"drain", pump.drain == Drain::external ? "external" : "internal"},
              {"nominal_rpm", pump.motor.nominal_rpm},
              {"slip_at_rated", pump.motor.slip_at_rated}};
    for (const Section& section : pump.sections) json["sections"][section.id] = facts_of(section);
    return json.dump(-1, ' ', false, Json::error_handler_t::replace);
}

std::string fluid_facts(const Fluid& fluid) {
    return facts_of(fluid).dump(-1, ' ', false, Json::error_handler_t::replace);
}

}  // namespace slipledger::config
