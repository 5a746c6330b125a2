// What plants have without us, run on the same rows: a fixed limit on the raw drain share, and a careful engineer's
// notebook. They live here only; the product knows neither.
#pragma once

#include <cstdint>
#include <optional>
#include <span>
#include <string_view>
#include <vector>

#include "analytics/fluid.hpp"
#include "config/pump.hpp"
#include "tools/judging/told.hpp"
#include "tools/plantsim/row.hpp"

namespace slipledger::judging {

// One usable reading: the pump turns and works against more than a third of its rated pressure. Threads: a value.
struct WorkingPoint {
    Millis time = 0;
    float drive = 0.0F;        // pressure over viscosity, bar / (mm2/s)
    float leakage_lpm = 0.0F;  // in the drain, or missing at the outlet
    float share = 0.0F;        // of it in theoretical flow
};

// Gathers a section's readings as they pass: name plate, label of the oil, what the meters show. Threads: one at a
// time.
class Notes {
public:
    Notes(const config::Pump& pump, const config::Section& section, bool by_drain, bool only_section, Millis begins,
          Millis ends);

    void see(std::span<const plantsim::Row> rows_of_a_moment);

    const std::vector<WorkingPoint>& points() const { return points_; }
    std::span<const WorkingPoint> between(Millis from, Millis to) const;
    double running_h(Millis at) const;
    Millis begins() const { return begins_; }
    Millis ends() const { return ends_; }
    bool by_drain() const { return by_drain_; }
    double rated_drive() const;
    double rated_lpm() const;

private:
    std::string_view pump_;
    std::string_view section_;
    bool by_drain_;
    Millis begins_;
    Millis ends_;
    double displacement_cm3_;
    config::Duty rated_;
    double nominal_rpm_;
    analytics::Fluid fluid_;
    double temperature_c_ = not_told;
    double speed_rpm_ = not_told;
    Millis last_ = 0;
    Millis last_row_ = 0;
    double running_h_ = 0.0;
    std::vector<double> running_by_day_;
    std::vector<WorkingPoint> points_{};
};

// Yardstick a: the day's median share of the drain in theoretical flow above a fixed limit, two days in a row.
SectionTold by_fixed_limit(const Notes& notes, double limit_percent);

// Yardstick b: a straight line of leakage over pressure / viscosity through the first 30 days; each week's median of
// leakage over that line is the ratio; an alert above 1.25; Theil-Sen with its 80 % interval through the last 26 weeks
// for what is left until 3. (Theil 1950; Sen 1968; from memory.)
SectionTold by_notebook(const Notes& notes);

}  // namespace slipledger::judging
