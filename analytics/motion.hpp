// When a reading last moved faster than a steady state allows. A leakage judged while pressure or speed swings says
// more about hoses and meters than about the pump.
#pragma once

#include <cstddef>

#include "analytics/readings.hpp"

namespace slipledger::analytics {

struct MotionLimit {
    double per_second;  // unit of the series per second, > 0
    Milliseconds base;  // change is taken over at least this long, so that noise between fast readings is no motion
};

// Looks at the rate of change of one series,
//
//   rate at t_i = |v_i - v_j| / (t_i - t_j),   j the newest reading with t_i - t_j >= base
//
// which for sampling slower than `base` is the change between two rows: a press sampled every ten minutes shows another
// pressure in each row and is not moving in any of them. Rows more than half an hour apart are not compared.
// Threads: one at a time. The series must outlive it.
class Motion {
public:
    // Readings before `from` less an hour are not looked at.
    Motion(const Series& series, MotionLimit limit, Instant from);

    // Time of the last reading, at or before `now`, that had moved faster than allowed; Instant::min() if none had.
    // `now` never goes back. Readings in front of `now` have no say: what is known at a time does not depend on what
    // follows. Source: common practice, no source.
    Instant last_until(Instant now);

private:
    bool moved(std::size_t reading);

    const Series* series_;
    MotionLimit limit_;
    std::size_t next_ = 0;
    std::size_t base_ = 0;  // newest reading at least `base` older than the one looked at, or the first
    std::size_t first_ = 0;
    Instant last_ = Instant::min();
};

// Rows further apart than this say nothing about each other.
inline constexpr Milliseconds longest_gap = std::chrono::minutes(30);

}  // namespace slipledger::analytics
