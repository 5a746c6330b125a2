// A sensor that stands still: the same value to the last digit, summary after summary, while the pump's duty moves.
// What is remarkable is measured by the sensor itself: a coarse thermometer in a steady tank may well show one value
// for an hour.
#pragma once

#include <cstdint>

#include "analytics/section_spec.hpp"

namespace slipledger::analytics {

// Threads: one at a time.
class StuckRun {
public:
    // Takes what the sensor showed over one summary: lowest and highest. NaN says nothing. A summary in which duty did
    // not move is no proof: it neither ends a run nor makes it longer.
    // Not computed: counts.
    void add(double lowest, double highest, bool duty_moves);

    // Stuck: at least 2 summaries in a row at one value, more than twice the longest run it ever had before, plus one,
    // and it has been seen to move in at least 24.
    // Example: moved in 30 summaries, never still in one -> stuck at the second still one; 3 still ones in a row known
    // of old -> at the eighth.
    // Source: common practice, no source.
    bool stuck() const;

    // Summaries in a row at one value. Not computed: reads the state.
    std::int32_t length() const { return length_; }
    // That value. Not computed: reads the state.
    double value() const { return value_; }
    // It stands where it had been when it moved; else it went somewhere it never was, and stayed there.
    // Not computed: a comparison.
    bool where_it_had_been() const { return value_ >= lowest_ && value_ <= highest_; }

    // Not computed: the list of fields a checkpoint keeps.
    template <typename Self, typename Io>
    static void each_field(Self& self, Io& io) {
        io(self.value_, self.length_, self.longest_, self.moved_, self.lowest_, self.highest_);
    }

private:
    double value_ = unknown;
    std::int32_t length_ = 0;
    std::int32_t longest_ = 0;  // of runs that were not told as stuck
    std::int32_t moved_ = 0;    // summaries in which it moved
    double lowest_ = unknown;   // in those
    double highest_ = unknown;
};

}  // namespace slipledger::analytics
