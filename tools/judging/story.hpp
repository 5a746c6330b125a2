// What happens to whom: the words in which fleets are told, and a plant with the truth about each of its sections. A
// story is fixed by seed, fleet and number, so that any single one can be told again.
#pragma once

#include <array>
#include <cstdint>
#include <optional>
#include <string>
#include <string_view>
#include <vector>

#include "tools/plantsim/drawing.hpp"

namespace slipledger::judging {

using plantsim::Millis;

enum class Fleet : std::uint8_t {
    healthy,
    wear,
    step,
    confounded,
    mixed,
    hard,
    double_pumps,
    taken_over,
    second_life,      // a worn part was replaced, and said so; its successor is watched
    internal_return,  // wears where the drain sees nothing
};
inline constexpr std::array<std::string_view, 10> fleet_names{
    "healthy", "wear", "step", "confounded", "mixed", "hard", "double", "taken-over", "second-life", "internal-return"};
constexpr std::string_view name_of(Fleet fleet) {
    return fleet_names[static_cast<std::size_t>(fleet)];
}
std::optional<Fleet> fleet_named(std::string_view name);

// What looks like wear, or hides it (method.md, 7).
enum class Confounder : std::uint8_t {
    hot_oil,
    other_oil,   // filled with one of another viscosity index
    ageing_oil,  // multigrade, thinning in service
    shifted_work,
    compensator,
    starved_inlet,
    blocked_drain,
    air_in_oil,
    vanes,   // not extending while the oil is thick
    bypass,  // a valve between pump and meter passes: by delivery nobody can tell it from wear
    pilot_flow,
    stuck_sensor,
    drifting_sensor,
    out_of_range,
    wrong_unit,
    clock_off,
    zero_drift,
    silent_sensor,
};
inline constexpr std::array<std::string_view, 18> confounder_names{
    "hot oil",         "other oil",    "ageing oil", "shifted work", "compensator", "starved inlet",
    "blocked drain",   "air in oil",   "vanes",      "bypass",       "pilot flow",  "stuck sensor",
    "drifting sensor", "out of range", "wrong unit", "clock off",    "zero drift",  "silent sensor"};
constexpr std::string_view name_of(Confounder confounder) {
    return confounder_names[static_cast<std::size_t>(confounder)];
}
// Whether it is an instrument that is at fault and not the pump, its oil or its work.
constexpr bool is_of_instrument(Confounder confounder) {
    return confounder >= Confounder::stuck_sensor;
}

enum class WearShape : std::uint8_t { none, linear, accelerating, decelerating, late };

// The truth about one section. Threads: a value, share freely.
struct SectionStory {
    std::size_t pump = 0;
    std::size_t section = 0;
    WearShape shape = WearShape::none;
    bool steps = false;
    bool taken_over = false;                // worn before watching began
    bool inside = false;                    // it wears where the drain sees nothing
    std::optional<Millis> fitted_at{};      // its successor is watched from then on
    std::vector<Confounder> confounders{};  // that can be felt here
    Millis confounded_from = 0;

    bool wears() const { return shape != WearShape::none || steps; }
};

// What a person entered on the day. Threads: a value, share freely.
struct Entry {
    std::size_t pump = 0;
    std::string section{};
    Millis at = 0;
    std::string kind{};
    std::string body{};  // JSON
};

// Threads: a value, share freely.
struct Story {
    Fleet fleet = Fleet::healthy;
    std::size_t number = 0;
    std::uint64_t seed = 0;  // of the simulation
    plantsim::PlantDrawing plant{};
    Millis interval = 0;
    std::string plant_file{};        // as the plant's people wrote it
    std::string plant_file_after{};  // as it was edited for the oil change; empty: never
    std::vector<Entry> entries{};
    std::vector<SectionStory> sections{};

    std::string name() const;  // "wear 17"
};

}  // namespace slipledger::judging
