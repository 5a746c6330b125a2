// A reading that from one hour to the next is another by the factor between two units: not the pump, but whoever set up
// the logger.
#pragma once

#include <cstdint>

#include "analytics/quantity.hpp"
#include "analytics/section_spec.hpp"

namespace slipledger::analytics {

// What a reading went through: its mean before, its mean after, and by which factor of units it is told (0: degF taken
// for degC).
struct UnitJump {
    double before = unknown;
    double after = unknown;
    double factor = unknown;
};

// Threads: one at a time.
class UnitJumpWatch {
public:
    explicit UnitJumpWatch(Quantity quantity) : quantity_(quantity) {}

    // Takes the mean of a summary; NaN says nothing, and neither does a value of another sign. Told once two summaries
    // in a row are off by one factor, and over once a summary lies nearer to what was before than to what came.
    //
    //   |ln(value / before) - ln f| < 0.25,   ln f > 4 s
    //
    //   before   mean of the last 24 summaries that were none, s the standard deviation of their logarithm
    //   f        flow 3.785, 10, 60, 1000; pressure 10, 14.504, 100; speed 60; or one over that
    //
    // and for a temperature |value - (1.8 before + 32)| < 10 (or the other way round). The summary before must have
    // been nearer to `before` than half that step: a slow change passes every factor some day. Example: 3.0, 3.1, ...
    // L/min, then 0.80, 0.82 -> told, one over 3.785; 44, 45 -> not told, 14.5 is no unit of flow. Source: units in use
    // beside the canonical ones (definitions); limits are common practice, no source.
    void add(double mean);

    // Not computed: reads the state.
    bool told() const { return in_a_row_ >= 2; }
    // Not computed: reads the state.
    const UnitJump& jump() const { return jump_; }

    // Not computed: the list of fields a checkpoint keeps.
    template <typename Self, typename Io>
    static void each_field(Self& self, Io& io) {
        io(self.seen_, self.before_, self.last_, self.ln_variance_, self.in_a_row_, self.jump_.before, self.jump_.after,
           self.jump_.factor);
    }

private:
    // The factor that a step from what was before to `mean` is off by; NaN: none.
    double factor_of(double mean) const;
    // Whether the summary before this one was still as usual: a slow change passes every factor some day.
    bool was_usual(double factor) const;
    bool gone_back(double mean) const;

    Quantity quantity_;
    std::int32_t seen_ = 0;
    double before_ = unknown;
    double last_ = unknown;
    double ln_variance_ = 0.0;
    std::int32_t in_a_row_ = 0;
    UnitJump jump_;
};

}  // namespace slipledger::analytics
