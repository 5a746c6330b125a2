// What kind of pump it is and how its stroke is controlled: with the sensors fitted, this decides what can be judged.
#pragma once

#include <array>
#include <cstdint>
#include <optional>
#include <string_view>
#include <utility>

namespace slipledger::analytics {

enum class PumpType : std::uint8_t { axial_piston, radial_piston, vane, external_gear, internal_gear };
enum class Control : std::uint8_t { fixed, pressure_compensated, load_sensing, stroke_measured };

inline constexpr std::array<std::pair<PumpType, std::string_view>, 5> pump_type_names{{
    {PumpType::axial_piston, "axial-piston"},
    {PumpType::radial_piston, "radial-piston"},
    {PumpType::vane, "vane"},
    {PumpType::external_gear, "external-gear"},
    {PumpType::internal_gear, "internal-gear"},
}};

inline constexpr std::array<std::pair<Control, std::string_view>, 4> control_names{{
    {Control::fixed, "fixed"},
    {Control::pressure_compensated, "pressure-compensated"},
    {Control::load_sensing, "load-sensing"},
    {Control::stroke_measured, "stroke-measured"},
}};

constexpr std::string_view name_of(PumpType type) {
    return pump_type_names[static_cast<std::size_t>(type)].second;
}
constexpr std::string_view name_of(Control control) {
    return control_names[static_cast<std::size_t>(control)].second;
}

// What wears and is replaced as a whole, in the trade's words.
constexpr std::string_view replaceable_part(PumpType type) {
    switch (type) {
        case PumpType::axial_piston:
        case PumpType::radial_piston:
            return "rotating group";
        case PumpType::vane:
            return "cartridge";
        case PumpType::external_gear:
        case PumpType::internal_gear:
            return "gear set";
    }
    return "rotating group";
}

}  // namespace slipledger::analytics
