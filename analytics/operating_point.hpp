// Operating points: everything needed to judge one section, aligned to one instant by an as-of join in which each
// quantity takes its last value not older than its hold. A point stands at each time the section's flow quantity has a
// value.
#pragma once

#include <array>
#include <cstddef>
#include <vector>

#include "analytics/instant.hpp"
#include "analytics/quantity.hpp"
#include "analytics/readings.hpp"
#include "analytics/section_spec.hpp"
#include "analytics/usual.hpp"

namespace slipledger::analytics {

// A field stays NaN where its quantity has no value, or none young enough.
struct OperatingPoint {
    Instant time;
    double flow_lpm = unknown;  // drain or delivery, as the basis says
    double outlet_bar = unknown;
    double case_bar = unknown;   // NaN where unmeasured: counts as 0 bar gauge
    double inlet_bar = unknown;  // the same
    double speed_rpm = unknown;
    double temperature_c = unknown;
    double stroke = unknown;
    double power_kw = unknown;
    double running = unknown;
};

// Gives the points one by one, so that a year of them need not stand in memory. The readings must outlive it.
// Threads: one at a time.
class Aligner {
public:
    Aligner(const SectionReadings& readings, Basis basis, const Usual& usual, Instant from, Instant to);

    // The next point with time in [from, to), ascending; null after the last. Valid until the next call.
    // Not computed: a join.
    const OperatingPoint* next();

private:
    struct Joined {
        const Series* series = nullptr;
        Milliseconds hold{0};
        std::size_t passed = 0;  // readings at or before the point
        double OperatingPoint::*field = nullptr;
    };

    const Series& flow_;
    std::size_t next_ = 0;
    std::size_t end_ = 0;
    std::array<Joined, 8> joined_;
    std::size_t joined_count_ = 0;
    OperatingPoint point_;
};

// Points with time in [from, to), ascending.
// Not computed: a join.
std::vector<OperatingPoint> align(const SectionReadings& readings, Basis basis, const Usual& usual, Instant from,
                                  Instant to);

// A reading on which an operating point rests.
struct JoinedReading {
    Quantity quantity = Quantity::outlet_pressure;
    Instant taken;
    double value = unknown;
    Milliseconds hold{0};  // how long it stands; 0 for the flow, which was read at the point's own time
};

// What the operating point at `time` rests on, for showing the working behind it: the flow read then and, of every
// other quantity, the last reading that still stands. Quantities without one are left out.
// Not computed: a join.
std::vector<JoinedReading> readings_behind(const SectionReadings& readings, Basis basis, const Usual& usual,
                                           Instant time);

// The quantity whose readings the points of a basis stand at.
// Not computed: a name.
constexpr Quantity flow_quantity(Basis basis) {
    return basis == Basis::case_drain ? Quantity::case_drain_flow : Quantity::delivery_flow;
}

}  // namespace slipledger::analytics
