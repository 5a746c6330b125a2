// Conversions between what plants write and show and the canonical units of quantity.hpp. Used at the edges only:
// intake converts once on the way in, reports on the way out; everything between is canonical.
#pragma once

#include <array>
#include <optional>
#include <span>
#include <string_view>

#include "analytics/quantity.hpp"

namespace slipledger::analytics {

// canonical = (value + offset) * factor. Not every pair is exact in binary, but every factor is the exact definition
// where there is one.
struct Unit {
    std::string_view name;
    double factor = 1.0;
    double offset = 0.0;
};

namespace units {

inline constexpr double litres_per_us_gallon = 3.785411784;  // 231 cubic inches
inline constexpr double litres_per_imperial_gallon = 4.54609;
inline constexpr double bar_per_psi = 0.45359237 * 9.80665 / (0.0254 * 0.0254) * 1e-5;
inline constexpr double kw_per_hp = 550.0 * 0.3048 * 0.45359237 * 9.80665 * 1e-3;  // mechanical horsepower
inline constexpr double kw_per_metric_hp = 75.0 * 9.80665 * 1e-3;

// The first of each list is canonical.
inline constexpr std::array<Unit, 8> pressure{{{"bar"},
                                               {"mbar", 1e-3},
                                               {"MPa", 10.0},
                                               {"kPa", 0.01},
                                               {"Pa", 1e-5},
                                               {"psi", bar_per_psi},
                                               {"kgf/cm2", 0.980665},
                                               {"atm", 1.01325}}};
inline constexpr std::array<Unit, 9> flow{{{"L/min"},
                                           {"l/min"},
                                           {"lpm"},
                                           {"L/h", 1.0 / 60.0},
                                           {"L/s", 60.0},
                                           {"m3/h", 1000.0 / 60.0},
                                           {"mL/min", 1e-3},
                                           {"gpm", litres_per_us_gallon},
                                           {"imp gpm", litres_per_imperial_gallon}}};
inline constexpr std::array<Unit, 5> temperature{
    {{"degC"}, {"C"}, {"degF", 5.0 / 9.0, -32.0}, {"F", 5.0 / 9.0, -32.0}, {"K", 1.0, -273.15}}};
inline constexpr std::array<Unit, 4> speed{{{"rpm"}, {"1/min"}, {"Hz", 60.0}, {"1/s", 60.0}}};
inline constexpr std::array<Unit, 4> power{{{"kW"}, {"W", 1e-3}, {"hp", kw_per_hp}, {"PS", kw_per_metric_hp}}};
inline constexpr std::array<Unit, 2> fraction{{{"fraction"}, {"%", 0.01}}};
inline constexpr std::array<Unit, 3> duration{{{"h"}, {"min", 1.0 / 60.0}, {"s", 1.0 / 3600.0}}};
inline constexpr std::array<Unit, 2> count{{{"1/mL"}, {"1/100mL", 0.01}}};
inline constexpr std::array<Unit, 1> state{{{"0 or 1"}}};

}  // namespace units

// Units a quantity may be written in, the canonical one first.
// Not computed: a list.
constexpr std::span<const Unit> units_of(Quantity quantity) {
    switch (quantity) {
        case Quantity::outlet_pressure:
        case Quantity::inlet_pressure:
        case Quantity::case_pressure:
        case Quantity::filter_dp:
            return units::pressure;
        case Quantity::case_drain_flow:
        case Quantity::delivery_flow:
            return units::flow;
        case Quantity::fluid_temperature:
        case Quantity::drain_temperature:
            return units::temperature;
        case Quantity::shaft_speed:
            return units::speed;
        case Quantity::shaft_power:
            return units::power;
        case Quantity::stroke:
            return units::fraction;
        case Quantity::hour_meter:
            return units::duration;
        case Quantity::particle_count:
            return units::count;
        case Quantity::running:
            return units::state;
    }
    return {};
}

// The unit of that name among those the quantity may be written in; an empty name is the canonical one.
// Not computed: a look-up.
constexpr std::optional<Unit> unit_named(Quantity quantity, std::string_view name) {
    for (const Unit& unit : units_of(quantity))
        if (name.empty() || unit.name == name) return unit;
    return std::nullopt;
}

// What was written, in the canonical unit.
// Returns the canonical unit of the quantity the unit belongs to. Example: 3000 psi -> 206.843 bar.
// Source: definition of the units; pound and inch by the international agreement of 1959.
constexpr double to_canonical(double value, const Unit& unit) {
    return (value + unit.offset) * unit.factor;
}

// The inverse of to_canonical, for showing.
// Returns `unit`. Example: 54.4 degC -> 129.9 degF. Source: as to_canonical.
constexpr double from_canonical(double value, const Unit& unit) {
    return value / unit.factor - unit.offset;
}

}  // namespace slipledger::analytics
