// Ways to spoil what the pipeline is given, to see that the bench notices.
#pragma once

#include <array>
#include <cstdint>
#include <optional>
#include <string>
#include <string_view>

namespace slipledger::judging {

enum class Spoil : std::uint8_t { nothing, viscosity, displacement, limits };

struct SpoilFacts {
    Spoil spoil;
    std::string_view name;
    std::string_view what;
};
inline constexpr std::array<SpoilFacts, 3> spoil_table{{
    {Spoil::viscosity, "no-viscosity-correction", "the plant file's oil is equally thick at every temperature"},
    {Spoil::displacement, "wrong-displacement", "every name plate says 6 % too much"},
    {Spoil::limits, "deaf", "alerts at ratios of 1.8, 2.5 and 3 only"},
}};

std::optional<Spoil> spoil_named(std::string_view name);

// The plant file, spoilt.
std::string spoilt(const std::string& plant_file, Spoil spoil);

}  // namespace slipledger::judging
