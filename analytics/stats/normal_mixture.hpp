// Quantiles of a mixture of normal distributions: what several hypotheses, each with its own range, say together.
#pragma once

#include <span>

namespace slipledger::analytics::stats {

struct NormalPart {
    double weight = 0.0;  // >= 0; they need not sum to one
    double mean = 0.0;
    double sd = 1.0;  // > 0
};

// Share of the mixture below a value: sum of w Phi((x - m) / s) over the sum of w.
// Returns a pure number 0..1; NaN without a weight. Example: N(0, 1) and N(2, 1) alike, at 1 -> 0.5.
// Source: definition.
double mixture_share(std::span<const NormalPart> parts, double value);

// The value below which a share of the mixture lies, by bracketed false position (Illinois) to 10^-6 of a unit.
// Returns the unit of the means; NaN for a share outside 0..1 or without a weight. Example: as above at 0.5 -> 1.
// Source: definition; M. Dowell and P. Jarratt, A modified regula falsi method, BIT 11 (1971) (from memory).
double mixture_quantile(std::span<const NormalPart> parts, double share);

}  // namespace slipledger::analytics::stats
