// Whether a series stays level, steps once or begins to rise (or fall) at one point, and where: told apart by
// likelihood, each shape paying for what it has free (BIC).
#pragma once

#include <cstddef>
#include <span>
#include <string_view>

namespace slipledger::analytics::stats {

enum class Shape { level, step, ramp };

std::string_view name_of(Shape shape);  // "level", "step", "ramp"

struct SingleChange {
    Shape shape = Shape::level;   // of least BIC
    std::size_t before_step = 0;  // values before the best step
    std::size_t before_ramp = 0;  // values up to the best bend, itself included
    double step = 0.0;            // mean after less mean before, unit of y
    double slope = 0.0;           // after the bend, unit of y over unit of x
    double bic_level = 0.0;       // two parameters: mean and scatter
    double bic_step = 0.0;        // four: two means, scatter, place
    double bic_ramp = 0.0;        // four: level, slope, scatter, place
};

// Least squares over all places with at least `fewest` values on each side:
//
//   BIC = n (ln(2 pi RSS / n) + 1) + p ln n
//
//   level   y = m
//   step    y = m1 for i < j, else m2
//   ramp    y = m + b max(0, x - x_j)
//
//   x   xs   any unit, ascending    y   ys   any unit, as many    scatter independent and alike throughout
//
// All figures NaN under 2 * fewest + 1 values. Example: the Nile's yearly flow at Aswan 1871-1970: a step after 28
// values. Source: J. Bai and P. Perron, Estimating and testing linear models with multiple structural changes,
// Econometrica 66 (1998), for one change; G. Schwarz, Estimating the dimension of a model (1978) (from memory).
SingleChange single_change(std::span<const double> xs, std::span<const double> ys, std::size_t fewest);

}  // namespace slipledger::analytics::stats
