// Tells the stories of the fleets: which pumps a plant has, how they wear, what comes between. Wear laws for the tests
// are others than those for tuning, so that nobody tunes to the test.
#pragma once

#include "tools/judging/story.hpp"

namespace slipledger::judging {

enum class Laws : std::uint8_t { tests, tuning };

// Threads: a value, share freely.
struct Telling {
    std::uint64_t seed = 1;
    Laws laws = Laws::tests;
    double days = 365.0;
    bool fast_loggers = false;  // the first few of fleet mixed sample every 10 s
};

Story tell(Fleet fleet, std::size_t number, const Telling& telling);

// The one trouble of a plant of fleet confounded.
Confounder confounder_of(std::size_t number);

}  // namespace slipledger::judging
