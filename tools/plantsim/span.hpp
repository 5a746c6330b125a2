// Which rows are wanted, and how fast they come: shared by every way of delivery.
#pragma once

#include <chrono>
#include <optional>
#include <vector>

#include "tools/plantsim/mill.hpp"

namespace slipledger::plantsim {

// Threads: a value, share freely.
struct Span {
    Millis from = 0;
    Millis to = 0;  // not itself
    Millis interval = 10 * minute_ms;
};

// The columns a file with rows of these pumps has.
CsvLayout layout_for(const PlantDrawing& plant, const std::vector<std::size_t>& pumps);

// Lets data time pass `speedup` times as fast as the wall clock; without a speed-up it never waits.
// Threads: immutable, share freely.
class Pace {
public:
    Pace(Millis from, std::optional<double> speedup);

    void wait_until(Millis data_time) const;
    bool at_full_speed() const { return !speedup_; }

private:
    Millis from_;
    std::optional<double> speedup_;
    std::chrono::steady_clock::time_point begun_;
};

}  // namespace slipledger::plantsim
