// Tells wear from an instrument: leakage of worn gaps grows with what a healthy pump would leak there, a meter's zero
// or a pilot flow does not. Keeps the last hundred judged summaries.
#pragma once

#include <array>
#include <cstdint>
#include <optional>

#include "analytics/wear_filter.hpp"

namespace slipledger::analytics {

// A slope with its standard error and its 90 % interval. Threads: a value, share freely.
struct Slope {
    double value = unknown;
    double standard_error = unknown;
    double low = unknown;
    double high = unknown;
};

// A slope with the 90 % interval of a normal error: value -+ 1.645 standard errors.
// Example: 2 +- 0.1 -> 1.8355 to 2.1645.
// Source: quantile of the standard normal.
Slope slope_of(double value, double standard_error);

// Threads: one at a time.
class ExcessSlope {
public:
    // Not computed: remembers.
    void add(const OwnReading& own);
    // A step: what came before it lies on another line. Not computed: forgets.
    void begin_anew() { count_ = next_ = 0; }

    // Slope of seen leakage on healthy leakage, a line with a constant: the ratio where it is wear, 1 where something
    // was only added. Nothing while fewer than ten are known or operation did not vary at all. Example: seen = 2 x
    // healthy -> 2; seen = healthy + 1 -> 1. Source: least squares; method.md, 7.
    std::optional<Slope> slope() const;

    // Whether the low end of the slope's 90 % interval is above 1.1: what is seen is wear, or at least no zero. False
    // where there is no slope, and where operation varied too little to tell.
    // Source: method.md, 7.
    bool scales_with_leakage() const;

    // Not computed: the list of fields a checkpoint keeps.
    template <typename Self, typename Io>
    static void each_field(Self& self, Io& io) {
        io(self.healthy_, self.seen_, self.count_, self.next_);
    }

private:
    static constexpr std::size_t most = 100;
    std::array<double, most> healthy_{};
    std::array<double, most> seen_{};
    std::uint32_t count_ = 0;
    std::uint32_t next_ = 0;
};

}  // namespace slipledger::analytics
