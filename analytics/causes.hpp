// The likely causes of what a section shows, ranked, each with what speaks for and against it. A plain scheme that can
// be followed with a pencil: each cause begins with how common it is, each sign adds or takes a number according to how
// much more or less likely it is under that cause, and the weights are the exponentials of the sums, made to add up to
// one. The numbers stand in one table, in causes.cpp. Instruments are among the causes, on equal terms.
#pragma once

#include <array>
#include <cstdint>
#include <limits>
#include <optional>
#include <span>
#include <string_view>
#include <vector>

#include "analytics/signs.hpp"

namespace slipledger::analytics {

// Stored as numbers: new ones at the end only. `instrument` and `wear_or_instrument` were given before causes were
// ranked.
enum class CauseKind : std::uint8_t {
    none,
    wear,
    sudden_damage,
    wear_or_instrument,
    instrument,
    oil_or_operation,  // a change of oil, setting, sensor or duty
    internal_return,   // port plate or the like: leakage that returns inside the pump
    bypass,            // relief or unloading valve between pump and meter passes
    thin_oil,          // thin or hot
    compensator,       // out of adjustment
    inlet_starvation,  // or cavitation
    blocked_drain,
    vanes,  // not extending
    air_in_oil,
    sensor_stuck,
    sensor_drifting,   // or moved off its zero
    sensor_off_scale,  // shows what cannot be
    sensor_unit,       // sends another unit
    clock_off,
    feed_silent,  // of one of its instruments
};
inline constexpr std::size_t cause_count = 20;

inline constexpr std::array<std::string_view, cause_count> cause_names{"none",
                                                                       "wear",
                                                                       "sudden-damage",
                                                                       "wear-or-instrument",
                                                                       "instrument",
                                                                       "oil-or-operation",
                                                                       "internal-return",
                                                                       "bypass",
                                                                       "thin-oil",
                                                                       "compensator",
                                                                       "inlet-starvation",
                                                                       "blocked-drain",
                                                                       "vanes",
                                                                       "air-in-oil",
                                                                       "sensor-stuck",
                                                                       "sensor-drifting",
                                                                       "sensor-off-scale",
                                                                       "sensor-unit",
                                                                       "clock-off",
                                                                       "feed-silent"};

constexpr std::string_view name_of(CauseKind cause) {
    return cause_names[static_cast<std::size_t>(cause)];
}
// The cause is an instrument, its logger or its feed. Not computed: a property of the name.
bool is_instrument(CauseKind cause);

// What one sign adds to one cause. In single precision, in which it is stored: words want three digits of it. Threads:
// a value, share freely.
struct Evidence {
    Sign sign = Sign::ratio_up;
    bool present = false;  // else its absence speaks
    float value = std::numeric_limits<float>::quiet_NaN();
    float beside = std::numeric_limits<float>::quiet_NaN();
    std::optional<Quantity> quantity;  // of a sign of an instrument: which
    float adds = 0.0F;                 // to the logarithm of the cause's weight
};

// Threads: a value, share freely.
struct RankedCause {
    CauseKind kind = CauseKind::none;
    double weight = 0.0;
    std::vector<Evidence> in_favour;  // most telling first, four at most
    std::vector<Evidence> against;
};

// What decides which causes can be at all. Threads: a value, share freely.
struct CauseSetting {
    PumpType type = PumpType::axial_piston;
    Control control = Control::fixed;
    Basis basis = Basis::case_drain;
};

// Weight of each cause, by its place in CauseKind; they add up to one:
//
//   W_i = p_i exp(sum over known signs of s on_i + (1 - s) off_i),   weight_i = W_i / sum W
//
//   p_i          how common the cause is among pumps somebody was called to
//   s            strength of the sign, 0 to 1
//   on_i, off_i  what its presence or absence adds
//
// Returns pure numbers; 0 for causes that cannot be on such a section.
// Example: two causes of p 0.3 and 0.1, and a sign that adds 0 and 1.5 -> 0.401 and 0.599.
// Source: Bayes' rule with signs taken as independent; p, on and off are common practice, no source.
std::array<double, cause_count> cause_weights(const Signs& signs, const CauseSetting& setting);

// Causes of weight 0.01 and more, the heaviest first, their weights made to add up to one, with the evidence.
// Source: cause_weights.
std::vector<RankedCause> rank_causes(const Signs& signs, const CauseSetting& setting);

// Weight of all causes that are instruments. Returns a pure number, 0 to 1.
// Source: cause_weights.
double instrument_doubt(std::span<const double, cause_count> weights);

}  // namespace slipledger::analytics
