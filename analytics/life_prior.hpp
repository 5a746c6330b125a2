// What is believed of how long a section lasts, and by which law it wears, before it has shown either: the default, and
// what past lives of the same model add to it.
#pragma once

#include <array>
#include <span>

namespace slipledger::analytics {

// Wear laws dw/dt = rate w^k: slowing down, straight, speeding up. Which one a pump follows is not known beforehand.
inline constexpr std::array<double, 4> wear_powers{-0.6, 0.0, 0.6, 1.2};
inline constexpr std::size_t wear_laws = wear_powers.size();
using LawWeights = std::array<double, wear_laws>;

// Running hours from new to a ratio of 3, as a lognormal distribution; laws by their weights, which sum to one.
// Threads: a value, share freely.
struct LifePrior {
    double median_h = 10000.0;  // common practice, no source: one and a half to two years of two shifts
    double ln_sd = 0.9;         // four pumps in five between 3200 and 32,000 h
    LawWeights laws{0.25, 0.25, 0.25, 0.25};

    bool operator==(const LifePrior&) const = default;
};

// A life that has ended: hours from new to a ratio of 3, run and foretold, as it stood on its last day.
// Threads: a value, share freely.
struct PastLife {
    double life_h = 0.0;  // > 0
    double ln_sd = 0.0;   // how well that is known
    LawWeights laws{};    // what it showed of its law
};

// The same after n past lives of the model. Lives of one model scatter by 0.5 in ln about their common median:
//
//   1 / var m = 1 / (0.9^2 - 0.5^2) + sum 1 / (0.5^2 + s_i^2),   ln_sd^2 = var m + 0.5^2
//   m = var m (m_0 / (0.9^2 - 0.5^2) + sum ln life_i / (0.5^2 + s_i^2)),   laws = (2 laws_0 + sum laws_i) / (2 + n)
//
// Returns the default for none; lives that are no positive numbers are passed over.
// Example: three lives of 4000 h known exactly -> median 4504 h, ln_sd 0.568.
// Source: method.md, 6 (after Whitmore and Schenkelberg 1997; conjugate normal, any text).
LifePrior life_prior(std::span<const PastLife> lives);

}  // namespace slipledger::analytics
