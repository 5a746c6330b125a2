#include "tools/plantsim/chance.hpp"

#include <cmath>
#include <numbers>

namespace slipledger::plantsim {
namespace {

// The finaliser of splitmix64 (Steele, Lea and Flood 2014, from memory): every bit of the input moves every bit out.
std::uint64_t mix(std::uint64_t x) {
    x += 0x9e3779b97f4a7c15ULL;
    x = (x ^ (x >> 30U)) * 0xbf58476d1ce4e5b9ULL;
    x = (x ^ (x >> 27U)) * 0x94d049bb133111ebULL;
    return x ^ (x >> 31U);
}

}  // namespace

Chance::Chance(std::uint64_t seed, std::string_view stream) : key_(mix(seed)) {
    for (const char c : stream) key_ = mix(key_ ^ static_cast<std::uint64_t>(static_cast<unsigned char>(c)));
}

std::uint64_t Chance::bits(std::int64_t index) const {
    return mix(key_ ^ mix(static_cast<std::uint64_t>(index)));
}

double Chance::uniform(std::int64_t index) const {
    return static_cast<double>(bits(index) >> 11U) * 0x1.0p-53;
}

double Chance::normal(std::int64_t index) const {
    const std::uint64_t word = bits(index);
    const double radius = (static_cast<double>(word >> 32U) + 1.0) * 0x1.0p-32;  // (0, 1]
    const double angle = static_cast<double>(word & 0xffffffffULL) * 0x1.0p-32;
    return std::sqrt(-2.0 * std::log(radius)) * std::cos(2.0 * std::numbers::pi * angle);
}

double Chance::wander(Millis time, Millis knot) const {
    const std::int64_t left = time / knot;
    const double at = static_cast<double>(time % knot) / static_cast<double>(knot);
    const double s = at * at * (3.0 - 2.0 * at);
    // Divided by its own spread, else it would be calmer between knots than on them.
    return (normal(left) * (1.0 - s) + normal(left + 1) * s) / std::sqrt((1.0 - s) * (1.0 - s) + s * s);
}

}  // namespace slipledger::plantsim
