#include "config/pump_checks.hpp"

#include <fmt/format.h>

namespace slipledger::config {
namespace {

using analytics::Control;
using analytics::PumpType;
using analytics::Quantity;

bool is_gear(PumpType type) {
    return type == PumpType::external_gear || type == PumpType::internal_gear;
}

// Threads: one thread; lives within check_section.
struct Case {
    const Pump& pump;
    const Section& section;
    const ObjectReader& pump_reader;
    const ObjectReader& section_reader;

    void complain(std::string_view key, std::string wanted, std::string code = "implausible") const {
        const ObjectReader& reader = section_reader.has(key) || !pump_reader.has(key) ? section_reader : pump_reader;
        reader.complain(key, std::move(wanted), std::move(code));
    }
    bool has_sensor(Quantity quantity) const { return section.sensors.contains(quantity); }
};

void check_control(const Case& at) {
    const Control control = at.pump.control;
    if (is_gear(at.pump.type) && control != Control::fixed)
        at.pump_reader.complain("control", "\"fixed\": a gear pump cannot change its stroke", "implausible");
    if (control == Control::fixed && at.pump.makes_up_by == MakesUpBy::stroke)
        at.pump_reader.complain("makes_up_by", "\"time\" or \"nothing\": a fixed pump has no stroke to lengthen",
                                "implausible");
    if (control == Control::pressure_compensated && at.pump.drain == Drain::internal)
        at.pump_reader.complain("drain",
                                "\"external\": a pressure-compensated pump leaks hot oil while it holds pressure, "
                                "which must leave the case by a line of its own",
                                "implausible");
    if (control == Control::pressure_compensated && !at.section.compensator_bar)
        at.complain("compensator_bar", "its setting in bar, since the pump is pressure-compensated", "missing");
    if (control == Control::fixed && at.section.compensator_bar)
        at.complain("compensator_bar", "nothing: a fixed pump has no compensator (or \"control\" is not \"fixed\")");
    if (control == Control::fixed && at.section.max_stroke_fraction < 1.0)
        at.complain("max_stroke_fraction",
                    "nothing: a fixed pump has no volume stop (or \"control\" is not \"fixed\")");
    if (control == Control::stroke_measured && !at.section.sensors.empty() && !at.has_sensor(Quantity::stroke))
        at.complain("sensors", "a stroke sensor among them, since control is \"stroke-measured\"");
}

void check_pressures(const Case& at) {
    const auto& compensator = at.section.compensator_bar;
    const auto& relief = at.section.relief_bar;
    if (compensator && relief && *relief <= *compensator)
        at.complain("relief_bar", fmt::format("above the compensator's setting of {} bar, else the relief valve opens "
                                              "before the pump strokes back",
                                              *compensator));
}

void check_drain(const Case& at) {
    const bool drain_measured = at.has_sensor(Quantity::case_drain_flow);
    if (at.pump.drain == Drain::internal && drain_measured)
        at.complain("sensors", "no case_drain_flow: the drain is internal, so its oil passes no meter");
    if (at.pump.drain == Drain::internal && at.section.case_flushing_lpm > 0.0)
        at.complain("case_flushing_lpm", "0: nothing flushes a case that is drained inside");
    if (at.pump.drain == Drain::internal && !at.section.drain_group.empty())
        at.complain("drain_group", "nothing: the drain is internal");
    if (is_gear(at.pump.type) && drain_measured && !at.has_sensor(Quantity::delivery_flow))
        at.complain("sensors",
                    "a delivery_flow meter: a gear pump leaks back to its inlet, not to the case, and can only be "
                    "judged by delivery");
}

void check_speed(const Case& at) {
    const double rated_rpm = at.section.rated.speed_rpm;
    if (rated_rpm > 0.0 && at.pump.minimum_speed_rpm >= rated_rpm)
        at.complain("rated",
                    fmt::format("a rated speed above the minimum speed of {} rpm, below which nothing is judged",
                                at.pump.minimum_speed_rpm));
}

}  // namespace

void check_section(const Pump& pump, const Section& section, const ObjectReader& pump_reader,
                   const ObjectReader& section_reader) {
    const Case at{pump, section, pump_reader, section_reader};
    check_control(at);
    check_pressures(at);
    check_drain(at);
    check_speed(at);
}

}  // namespace slipledger::config
