// The quantities a reading can carry, with their names in feeds and their canonical units. One list: intake, ledger,
// plant file and reports all go by it. Adding a quantity begins here (DEVELOPERS.md, "add a quantity").
#pragma once

#include <array>
#include <cstddef>
#include <cstdint>
#include <optional>
#include <string_view>

namespace slipledger::analytics {

enum class Quantity : std::uint8_t {
    outlet_pressure,
    shaft_speed,
    case_drain_flow,
    fluid_temperature,
    delivery_flow,
    inlet_pressure,
    case_pressure,
    stroke,
    shaft_power,
    drain_temperature,
    running,
    hour_meter,
    particle_count,
    filter_dp,
};

inline constexpr std::size_t quantity_count = 14;

constexpr std::size_t index_of(Quantity quantity) {
    return static_cast<std::size_t>(quantity);
}

struct QuantityFacts {
    Quantity quantity;
    std::string_view name;  // as feeds and exports write it
    std::string_view unit;  // canonical, as printed
    double lowest;          // outside [lowest, highest] no pump can be: a value there is refused at the edge
    double highest;
    std::string_view example;  // a plausible value, for messages
};

// Limits are wide on purpose: they catch a wrong unit or a broken wire, not a sick pump. Common practice, no source.
inline constexpr std::array<QuantityFacts, quantity_count> quantity_table{{
    {Quantity::outlet_pressure, "outlet_pressure", "bar", -10.0, 1000.0, "181.2"},
    {Quantity::shaft_speed, "shaft_speed", "rpm", -10000.0, 10000.0, "1482"},
    {Quantity::case_drain_flow, "case_drain_flow", "L/min", -50.0, 2000.0, "3.1"},
    {Quantity::fluid_temperature, "fluid_temperature", "degC", -60.0, 200.0, "48.6"},
    {Quantity::delivery_flow, "delivery_flow", "L/min", -5000.0, 5000.0, "104.5"},
    {Quantity::inlet_pressure, "inlet_pressure", "bar", -1.1, 100.0, "-0.1"},
    {Quantity::case_pressure, "case_pressure", "bar", -1.1, 100.0, "0.6"},
    {Quantity::stroke, "stroke", "fraction", -1.1, 1.1, "0.85"},
    {Quantity::shaft_power, "shaft_power", "kW", -5000.0, 5000.0, "31.5"},
    {Quantity::drain_temperature, "drain_temperature", "degC", -60.0, 250.0, "61.0"},
    {Quantity::running, "running", "0 or 1", 0.0, 1.0, "1"},
    {Quantity::hour_meter, "hour_meter", "h", 0.0, 1000000.0, "12040.5"},
    {Quantity::particle_count, "particle_count", "1/mL", 0.0, 10000000.0, "1300"},
    {Quantity::filter_dp, "filter_dp", "bar", -1.0, 100.0, "0.8"},
}};

constexpr const QuantityFacts& facts_of(Quantity quantity) {
    return quantity_table[index_of(quantity)];
}
constexpr std::string_view name_of(Quantity quantity) {
    return facts_of(quantity).name;
}

// Not computed: a look-up.
constexpr std::optional<Quantity> quantity_named(std::string_view name) {
    for (const QuantityFacts& facts : quantity_table)
        if (facts.name == name) return facts.quantity;
    return std::nullopt;
}

}  // namespace slipledger::analytics
