// What parts of the same model in other machines, or earlier in the same one, say of a new life before it is watched:
// how much such a part leaks when healthy. A worn pump that is taken over looks healthy beside itself; beside its
// sisters it does not.
#pragma once

#include <optional>
#include <span>

#include "analytics/leakage.hpp"
#include "analytics/section_spec.hpp"

namespace slipledger::analytics {

// A life of the same model whose baseline is settled.
struct Sister {
    LeakageLaw healthy;
    double healthy_sd = unknown;  // of ln of it, at its own reference point
    double displacement_cm3 = unknown;
};

// Healthy leakage at the section's reference point as its sisters have it, scaled by displacement:
//
//   y_i = ln(q_i V / V_i),   m = mean y_i,   s^2 = (2 x 0.15^2 + sum (y_i - m)^2) / (2 + k - 1)
//   leakage = exp(m),   sd^2 = s^2 (1 + 1 / k) + mean of sd_i^2 / k
//
//   q_i   L/min     > 0   of sister i by its law, at this section's reference point and oil
//   V, V_i   cm3/rev   > 0   this displacement, hers
//   k   sisters of which all this is known; the scatter between parts of a model starts as 0.15, worth two sisters
//
// nullopt without any.
// Example: one of 71 cm3 and 2.42 L/min, known to 0.03, for one of 71 cm3 -> 2.42 L/min, sd 0.214.
// Source: leakage in proportion to displacement: Wilson (1946, from memory); the spread of one more from a normal
// sample with a conjugate prior on its variance: Gelman et al., Bayesian Data Analysis (from memory).
std::optional<SistersFigure> sisters_figure(std::span<const Sister> sisters, const SectionSpec& spec);

}  // namespace slipledger::analytics
