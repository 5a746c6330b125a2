#include "daemon/watch/past_facts.hpp"

#include <nlohmann/json.hpp>

namespace slipledger::watch {
namespace {

using nlohmann::json;

void take(const json& facts, const char* key, double& value) {
    if (const auto found = facts.find(key); found != facts.end() && found->is_number()) value = found->get<double>();
}

void take(const json& facts, const char* key, std::string& value) {
    if (const auto found = facts.find(key); found != facts.end() && found->is_string())
        value = found->get<std::string>();
}

void take(const json& facts, const char* key, bool& value) {
    if (const auto found = facts.find(key); found != facts.end() && found->is_boolean()) value = found->get<bool>();
}

// A fact that the text leaves out was not given then, whatever is given today.
void take(const json& facts, const char* key, std::optional<double>& value) {
    const auto found = facts.find(key);
    value = found != facts.end() && found->is_number() ? std::optional(found->get<double>()) : std::nullopt;
}

template <typename Value, std::size_t Count>
void take(const json& facts, const char* key, const std::array<std::pair<Value, std::string_view>, Count>& names,
          Value& value) {
    std::string name;
    take(facts, key, name);
    for (const auto& [candidate, candidate_name] : names)
        if (candidate_name == name) value = candidate;
}

config::Fluid fluid_of(const json& facts, config::Fluid fluid) {
    take(facts, "name", fluid.name);
    take(facts, "density_15_kgm3", fluid.density_15_kgm3);
    take(facts, "minimum_cst", fluid.minimum_cst);
    take(facts, "maximum_cst", fluid.maximum_cst);
    take(facts, "bulk_modulus_gpa", fluid.bulk_modulus_gpa);
    take(facts, "iso_vg", fluid.iso_vg);
    take(facts, "viscosity_index", fluid.viscosity_index);
    fluid.points.clear();
    for (const json& written : facts.value("points", json::array())) {
        config::ViscosityPoint point;
        take(written, "temperature_c", point.temperature_c);
        take(written, "viscosity_cst", point.viscosity_cst);
        fluid.points.push_back(point);
    }
    return fluid;
}

config::Sensor sensor_of(const json& facts) {
    config::Sensor sensor;
    take(facts, "range_low", sensor.range_low);
    take(facts, "range_high", sensor.range_high);
    take(facts, "accuracy", sensor.accuracy);
    take(facts, "accuracy_percent", sensor.accuracy_percent);
    take(facts, "least", sensor.least);
    if (facts.value("measured_at", "") == "return-side") sensor.measured_at = config::MeasuredAt::return_side;
    if (const auto hold = facts.find("hold_s"); hold != facts.end() && hold->is_number_integer())
        sensor.hold = std::chrono::seconds(hold->get<std::int64_t>());
    return sensor;
}

void take_section(const json& facts, config::Section& section) {
    take(facts, "model", section.model);
    take(facts, "displacement_cm3", section.displacement_cm3);
    take(facts, "displacement_accuracy_percent", section.displacement_accuracy_percent);
    take(facts, "max_stroke_fraction", section.max_stroke_fraction);
    take(facts, "full_stroke", section.full_stroke);
    take(facts, "case_flushing_lpm", section.case_flushing_lpm);
    take(facts, "drain_group", section.drain_group);
    take(facts, "compensator_bar", section.compensator_bar);
    take(facts, "relief_bar", section.relief_bar);
    section.sensors.clear();
    const json sensors = facts.value("sensors", json::object());
    for (const auto& [name, sensor] : sensors.items())
        if (const auto quantity = analytics::quantity_named(name)) section.sensors[*quantity] = sensor_of(sensor);
}

}  // namespace

config::Fluid with_fluid_facts(config::Fluid fluid, std::string_view text) {
    const json facts = json::parse(text, nullptr, false);
    return facts.is_object() ? fluid_of(facts, std::move(fluid)) : fluid;
}

config::Pump with_facts(config::Pump pump, std::string_view text) {
    const json facts = json::parse(text, nullptr, false);
    if (!facts.is_object()) return pump;
    take(facts, "reservoir", pump.reservoir);
    take(facts, "type", analytics::pump_type_names, pump.type);
    take(facts, "control", analytics::control_names, pump.control);
    take(facts, "nominal_rpm", pump.motor.nominal_rpm);
    take(facts, "slip_at_rated", pump.motor.slip_at_rated);
    if (facts.contains("drain"))
        pump.drain = facts.value("drain", "") == "internal" ? config::Drain::internal : config::Drain::external;
    if (const auto fluid = facts.find("fluid"); fluid != facts.end() && fluid->is_object())
        pump.fluid = fluid_of(*fluid, pump.fluid);
    const json sections = facts.value("sections", json::object());
    for (config::Section& section : pump.sections)
        if (const auto found = sections.find(section.id); found != sections.end()) take_section(*found, section);
    return pump;
}

}  // namespace slipledger::watch
