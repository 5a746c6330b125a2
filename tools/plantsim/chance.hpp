// Randomness that is a pure function of (seed, name, index): no generator is carried along, so that the value at a
// moment is the same whatever was asked before it, in whichever thread, at whatever interval. That is what makes every
// way of delivery give the same bytes.
#pragma once

#include <cstdint>
#include <string_view>

#include "tools/plantsim/clock_time.hpp"

namespace slipledger::plantsim {

// One named stream of random numbers. Threads: immutable, share freely.
class Chance {
public:
    Chance(std::uint64_t seed, std::string_view stream);

    double uniform(std::int64_t index) const;  // [0, 1)
    double normal(std::int64_t index) const;   // mean 0, standard deviation 1

    // A smooth wandering of mean 0 and standard deviation 1 that forgets itself after about `knot` milliseconds.
    double wander(Millis time, Millis knot) const;

private:
    std::uint64_t bits(std::int64_t index) const;

    std::uint64_t key_;
};

}  // namespace slipledger::plantsim
