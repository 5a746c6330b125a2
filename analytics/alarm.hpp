// When an alarm is raised, worsens, eases and returns to normal: one state machine per rule, fed with values in data
// time, with on-delay, off-delay and deadband so that it neither flickers nor floods. It knows no operator: acknowledging and
// shelving are acts laid over the episodes it makes (IEC 62682 words; see daemon/watch).
#pragma once

#include <array>
#include <cstdint>
#include <optional>
#include <string_view>

#include "analytics/instant.hpp"
#include "analytics/section_spec.hpp"

namespace slipledger::analytics {

enum class Rule : std::uint8_t {
    leakage_ratio,
    efficiency,
    hours_in_hand,
    step_change,
    drain_share,
    over_temperature,
    case_pressure,
    inlet_vacuum,
    instrument_suspect,
};
inline constexpr std::size_t rule_count = 9;
inline constexpr std::array<std::string_view, rule_count> rule_names{
    "leakage-ratio", "efficiency", "hours-in-hand", "step-change", "drain-share",
    "over-temperature", "case-pressure", "inlet-vacuum", "instrument-suspect"};
constexpr std::string_view name_of(Rule rule) { return rule_names[static_cast<std::size_t>(rule)]; }
// Rules that decide the level; the others raise alarms only.
constexpr bool decides_level(Rule rule) { return rule <= Rule::step_change; }

enum class AlarmEdge : std::uint8_t { raised, worsened, eased, returned };
constexpr std::string_view name_of(AlarmEdge edge) {
    constexpr std::array<std::string_view, 4> names{"raised", "worsened", "eased", "returned"};
    return names[static_cast<std::size_t>(edge)];
}

// One change of one rule's alarm. An episode is known by rule, life and `began` (data time of its raising).
struct AlarmChange {
    Rule rule = Rule::leakage_ratio;
    AlarmEdge edge = AlarmEdge::raised;
    Level level = Level::watch;     // after the change; of `returned` the level it had
    Instant at;                     // data time of the change: end of the summary or day that showed it
    Instant began;                  // of the episode
    std::int32_t life = 1;
    double value = unknown;         // what was judged
    double limit = unknown;         // what it passed
};

}  // namespace slipledger::analytics
