#include "config/pump_reading.hpp"

#include "config/pump_checks.hpp"
#include "config/section_reading.hpp"

namespace slipledger::config {
namespace {

using analytics::PumpType;

// What depends on the kind of pump, before the file is heard.
void set_type_defaults(Pump& pump) {
    constexpr double vane_minimum_rpm = 600.0;  // slower, vanes are not thrown out (common practice, no source)
    const bool gear = pump.type == PumpType::external_gear || pump.type == PumpType::internal_gear;
    pump.minimum_speed_rpm = pump.type == PumpType::vane ? vane_minimum_rpm : 0.0;
    pump.drain = gear ? Drain::internal : Drain::external;
}

void read_identity(const ObjectReader& reader, Pump& pump, PumpSurroundings& surroundings) {
    read_name(reader, "id", pump.id, surroundings.taken);
    pump.name = pump.id;
    reader.read("name", pump.name);
    reader.read("machine", pump.machine);
    reader.read("area", pump.area);
    reader.read("criticality", pump.criticality);
    reader.require("reservoir");
    read_reference(reader, "reservoir", "reservoir", pump.reservoir, surroundings.reservoirs);
    if (const Reservoir* reservoir = surroundings.plant.find_reservoir(pump.reservoir)) pump.fluid = reservoir->fluid;
}

void read_build(const ObjectReader& reader, Pump& pump) {
    reader.require("type");
    reader.read("type", pump.type);
    set_type_defaults(pump);
    reader.read("control", pump.control);
    pump.makes_up_by = pump.control == analytics::Control::fixed ? MakesUpBy::nothing : MakesUpBy::stroke;
    reader.read("makes_up_by", pump.makes_up_by);
    reader.read("minimum_speed_rpm", pump.minimum_speed_rpm);
    reader.object("motor", [&](const ObjectReader& motor) {
        motor.read("nominal_rpm", pump.motor.nominal_rpm);
        motor.read("slip_at_rated", pump.motor.slip_at_rated);
    });
    reader.read("settling", pump.settling);
    reader.object("steady", [&](const ObjectReader& steady) {
        steady.read("pressure_bar_per_s", pump.steady.pressure_bar_per_s);
        steady.read("speed_rpm_per_s", pump.steady.speed_rpm_per_s);
        steady.read("temperature_c_per_min", pump.steady.temperature_c_per_min);
    });
    reader.read("drain", pump.drain);
}

SectionDraft draft_of(const ObjectReader& reader, const Pump& pump, const PumpSurroundings& surroundings) {
    SectionDraft draft;
    draft.section.limits = default_limits(pump.type);
    if (surroundings.limits != nullptr) {
        std::vector<Fault> told_already;
        read_limits(ObjectReader(*surroundings.limits, "/alerts/limits", "limits", told_already), draft.section.limits);
    }
    read_section_facts(reader, draft);
    return draft;
}

void read_sections(const ObjectReader& reader, Pump& pump, const SectionDraft& of_pump) {
    Names taken;
    reader.each("sections", [&](const ObjectReader& section_reader) {
        SectionDraft draft = of_pump;
        read_name(section_reader, "id", draft.section.id, taken);
        read_section_facts(section_reader, draft);
        pump.sections.push_back(finish_section(section_reader, std::move(draft)));
        check_section(pump, pump.sections.back(), reader, section_reader);
    });
    if (!pump.sections.empty()) return;
    if (reader.has("sections")) reader.complain("sections", "at least one section, or no such key", "empty");
    pump.sections.push_back(finish_section(reader, of_pump));
    check_section(pump, pump.sections.back(), reader, reader);
}

}  // namespace

Pump read_pump(const ObjectReader& reader, PumpSurroundings& surroundings) {
    Pump pump;
    read_identity(reader, pump, surroundings);
    read_build(reader, pump);
    reader.read_time("since", surroundings.plant.time_zone, pump.since);
    const SectionDraft of_pump = draft_of(reader, pump, surroundings);
    pump.model = of_pump.section.model;
    pump.spare = of_pump.section.spare;
    read_sections(reader, pump, of_pump);
    return pump;
}

}  // namespace slipledger::config
