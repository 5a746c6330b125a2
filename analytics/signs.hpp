// The signs by which causes are told apart: what each is called, and how one stands. A sign is a measured thing with a
// number or two to show for it; what it speaks for is causes.hpp's business.
#pragma once

#include <array>
#include <cstdint>
#include <optional>
#include <string_view>

#include "analytics/quantity.hpp"
#include "analytics/section_spec.hpp"

namespace slipledger::analytics {

// Stored by name. Beside each: its value, and what that is held beside.
enum class Sign : std::uint8_t {
    ratio_up,            // leakage ratio; its low end
    ratio_down,          // leakage ratio; its high end
    step,                // ratio after over before
    step_explained,      // the same; a change of oil, setting, sensor or range fell into its hour
    excess_scales,       // slope of seen on healthy leakage; low end of its 90 % interval
    excess_constant,     // the same slope; its high end
    worse_when_thick,    // the same
    zero_moved,          // flow at standstill of late, L/min; when learned
    flow_at_standstill,  // flow at standstill, L/min; while running
    unit_jump,           // mean after; mean before
    stuck,               // value; summaries in a row
    off_the_scale,       // value of an instrument; limit no pump passes, or NaN where it stands at a place it never was
    contradicting,       // percent of running points that contradict themselves
    missing,             // percent of running points without it; when learned
    share_up,            // raw share of theoretical flow of late, percent; when learned
    share_down,          // the same
    oil_thinner,         // viscosity of late, mm2/s; when learned
    pressure_up,         // mean pressure of late, bar; when learned
    plateau_moved,       // highest pressure of late, bar; when learned
    case_pressure_up,    // highest case pressure of late, bar; when learned
    inlet_lower,         // lowest inlet pressure of late, bar; when learned
    unsteady,            // scatter within an hour of late over when learned
    pattern_lost,        // how far leakage follows pressure within an hour; 1, as when learned
    other_basis_agrees,  // excess on the other basis, L/min; on this one
    other_basis_differs,  // the same
    flow_unmoved,         // change of the raw flow at the step, L/min; of the excess, L/min
};
inline constexpr std::size_t sign_count = 26;
inline constexpr std::array<std::string_view, sign_count> sign_names{"ratio-up",
                                                                     "ratio-down",
                                                                     "step",
                                                                     "step-explained",
                                                                     "excess-scales",
                                                                     "excess-constant",
                                                                     "worse-when-thick",
                                                                     "zero-moved",
                                                                     "flow-at-standstill",
                                                                     "unit-jump",
                                                                     "stuck",
                                                                     "off-the-scale",
                                                                     "contradicting",
                                                                     "missing",
                                                                     "share-up",
                                                                     "share-down",
                                                                     "oil-thinner",
                                                                     "pressure-up",
                                                                     "plateau-moved",
                                                                     "case-pressure-up",
                                                                     "inlet-lower",
                                                                     "unsteady",
                                                                     "pattern-lost",
                                                                     "other-basis-agrees",
                                                                     "other-basis-differs",
                                                                     "flow-unmoved"};

// Not computed: a look-up.
constexpr std::string_view name_of(Sign sign) {
    return sign_names[static_cast<std::size_t>(sign)];
}

// How one sign stands. Threads: a value, share freely.
struct SignReading {
    bool known = false;     // there was enough to look at
    double strength = 0.0;  // 0 absent .. 1 plain
    double value = unknown;
    double beside = unknown;
    std::optional<Quantity> quantity{};  // of a sign of an instrument: which
};

// All of them, by place. Threads: a value, share freely.
struct Signs {
    std::array<SignReading, sign_count> all{};

    SignReading& operator[](Sign sign) { return all[static_cast<std::size_t>(sign)]; }
    const SignReading& operator[](Sign sign) const { return all[static_cast<std::size_t>(sign)]; }
};

// Strength of a sign that begins to show at `from` and is plain at `to`: a straight line between, held in 0 to 1; `to`
// may lie below `from`. NaN gives 0.
// Returns a pure number. Example: 1.5 between 1 and 2 -> 0.5; 1.5 between 3 and 2 -> 1.
// Source: definition.
double strength_between(double value, double from, double to);

}  // namespace slipledger::analytics
