// The truth about one section, asked of the simulator: what the judging side is held against (method.md, 3 and 9).
#pragma once

#include <limits>
#include <optional>

#include "config/pump.hpp"
#include "tools/judging/story.hpp"
#include "tools/plantsim/mill.hpp"

namespace slipledger::judging {

using plantsim::Seen;

// Where a life ends: the act limits. NaN: none.
struct ActLimits {
    double ratio = 3.0;
    double points_lost = 10.0;
    double drain_share_percent = std::numeric_limits<double>::quiet_NaN();
};

ActLimits act_limits_of(const config::Section& section);

// Threads: immutable, share freely. Its mill must outlive it.
class Truth {
public:
    Truth(const plantsim::Mill& mill, const SectionStory& story);

    Seen seen() const {
        return seen_;
    }  // by the meter that counts: the drain's, where there is one and it sees the wear

    double ratio(Seen seen, Millis at) const;
    double efficiency(Seen seen, bool at_rated, Millis at) const;  // fraction
    double points_lost(Seen seen, bool at_rated, Millis at) const;
    double running_h(Millis at) const { return mill_.running_hours(pump_, at); }

    // First moment at which ratio, or points lost at the rated point, pass the value; none within the simulated span.
    std::optional<Millis> ratio_passes(double value) const;
    std::optional<Millis> points_pass(double value) const;

    // First moment by which the pump has run so long; none within the span.
    std::optional<Millis> hours_pass(double running_h) const;

    // Running hours from `at` to the first act limit; infinite where wear never gets there.
    double life_h(Seen seen, bool at_rated, const ActLimits& limits, Millis at) const;

    double healthy_slip(Seen seen) const;  // leakage at the reference point over theoretical flow

private:
    double efficiency_at(Seen seen, bool at_rated, Millis at, double growth) const;
    bool is_over(Seen seen, bool at_rated, const ActLimits& limits, Millis at, double growth) const;
    template <typename Passed>
    std::optional<Millis> first(Passed passed) const;

    const plantsim::Mill& mill_;
    std::size_t pump_;
    std::size_t section_;
    Millis begins_;  // of the life that is watched
    Seen seen_;
    const plantsim::PumpDrawing& drawing_;
    const plantsim::Oil& oil_;
};

}  // namespace slipledger::judging
