#include "tools/judging/dice.hpp"

#include <algorithm>

namespace slipledger::judging {

double Dice::between(double low, double high) {
    return low + (high - low) * chance_.uniform(thrown_++);
}

double Dice::normal(double mean, double deviation) {
    return mean + deviation * chance_.normal(thrown_++);
}

bool Dice::happens(double probability) {
    return chance_.uniform(thrown_++) < probability;
}

std::size_t Dice::below(std::size_t count) {
    const double at = chance_.uniform(thrown_++) * static_cast<double>(count);
    return std::min(static_cast<std::size_t>(at), count - 1);
}

double Dice::sign() {
    return happens(0.5) ? 1.0 : -1.0;
}

std::uint64_t Dice::seed() {
    return static_cast<std::uint64_t>(chance_.uniform(thrown_++) * 0x1.0p53);
}

}  // namespace slipledger::judging
