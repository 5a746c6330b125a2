#include "daemon/intake/seven_digits.hpp"

#include <array>
#include <charconv>
#include <cmath>

#include "daemon/intake/powers_of_ten.hpp"

namespace slipledger::intake {
namespace {

double by_printing(double value) {
    std::array<char, 32> text{};
    const auto written = std::to_chars(text.data(), text.data() + text.size(), value, std::chars_format::scientific, 6);
    double rounded = 0.0;
    std::from_chars(text.data(), written.ptr, rounded);
    return rounded;
}

}  // namespace

double seven_digits(double value) {
    if (value == 0.0) return 0.0;
    const double size = std::fabs(value);
    if (!(size >= 1e-6 && size < 1e7)) return std::isfinite(value) ? by_printing(value) : value;
    int decimals = 0;  // so that 1e6 <= scaled < 1e7
    while (size * power_of_ten(decimals) < 1e6) ++decimals;
    const double scaled = size * power_of_ten(decimals);
    const double whole = std::nearbyint(scaled);
    // The product is off by at most half a unit in its last place (below 1e-9 here): only next to a tie can that matter.
    if (std::fabs(std::fabs(scaled - whole) - 0.5) < 1e-6) return by_printing(value);
    // Both are exact, so the quotient is the double nearest to the decimal number.
    return std::copysign(whole / power_of_ten(decimals), value);
}

}  // namespace slipledger::intake
