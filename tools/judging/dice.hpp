// Choices of the fleets: one throw after another from a named stream, the same on every machine, where the standard
// library's distributions are not.
#pragma once

#include <cstdint>
#include <initializer_list>
#include <string_view>
#include <vector>

#include "tools/plantsim/chance.hpp"

namespace slipledger::judging {

// Threads: one at a time.
class Dice {
public:
    Dice(std::uint64_t seed, std::string_view stream) : chance_(seed, stream) {}

    double between(double low, double high);
    double normal(double mean, double deviation);
    bool happens(double probability);
    std::size_t below(std::size_t count);  // 0 .. count - 1
    double sign();                         // -1 or 1

    template <typename T>
    T one_of(std::initializer_list<T> choices) {
        return *(choices.begin() + below(choices.size()));
    }
    template <typename T>
    const T& one_of(const std::vector<T>& choices) {
        return choices[below(choices.size())];
    }

    std::uint64_t seed();  // for somebody else

private:
    plantsim::Chance chance_;
    std::int64_t thrown_ = 0;
};

}  // namespace slipledger::judging
