// The powers of ten that a double holds exactly. A whole number below 2^53 divided or multiplied by one of them is rounded
// once, and so is the double nearest to the decimal number it stands for.
#pragma once

#include <array>

namespace slipledger::intake {

inline constexpr int exact_powers_of_ten = 22;

inline constexpr std::array<double, exact_powers_of_ten + 1> powers_of_ten{
    1e0,  1e1,  1e2,  1e3,  1e4,  1e5,  1e6,  1e7,  1e8,  1e9,  1e10, 1e11,
    1e12, 1e13, 1e14, 1e15, 1e16, 1e17, 1e18, 1e19, 1e20, 1e21, 1e22};

// 0 <= exponent <= exact_powers_of_ten
constexpr double power_of_ten(int exponent) { return powers_of_ten[static_cast<unsigned>(exponent)]; }

}  // namespace slipledger::intake
