// Tells wear from an instrument: leakage of worn gaps grows with what a healthy pump would leak there, a meter's zero
// or a pilot flow does not. Keeps the last hundred judged summaries.
#pragma once

#include <array>
#include <cstdint>

#include "analytics/wear_filter.hpp"

namespace slipledger::analytics {

// Threads: one at a time.
class ExcessSlope {
public:
    // Not computed: remembers.
    void add(const OwnReading& own);

    // Seen leakage on healthy leakage, a line with a constant: is the low end of the slope's 90 % interval above 1.1?
    // False while fewer than ten are known, and where operation varied too little to tell.
    // Example: seen = 2 x healthy -> true; seen = healthy + 1 -> false.
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
