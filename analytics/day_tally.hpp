// What a day gathers from its summaries until it is quoted: hours, and means of leakage over its judged hours.
#pragma once

#include "analytics/course.hpp"
#include "analytics/duty.hpp"
#include "analytics/summary.hpp"

namespace slipledger::analytics {

// Threads: one at a time.
class DayTally {
public:
    // Not computed: sums.
    void count(const Summary& summary);
    // The hours of another life on the same day count on. Not computed: remembers.
    void keep_hours_of(const DayTally& earlier) { duty_ = earlier.duty_; }
    // A judged summary, fed to the filter. Not computed: remembers.
    void mark_fed() { fed_ = true; }
    // A step was told, of this ratio after over before. Not computed: remembers.
    void mark_step(double ratio) { step_ratio_ = ratio; }

    // A jump was suspected and wear let go. Not computed: remembers.
    void mark_let_go() { let_go_ = true; }

    // Adds what a summary's verdict says, weighted by its judged hours; its slip coefficient beside it.
    // Not computed: sums.
    void add(const SummaryVerdict& verdict, double slip_coefficient, double judged_h);

    // Fills the day's own fields of a verdict: running and judged hours, and means
    //
    //   leakage, excess, kW, C_s = sum of judged_h x value / sum of judged_h
    //
    // NaN where nothing was judged.
    // Example: 2 L/min for 1 h and 4 L/min for 3 h -> 3.5.
    // Source: definition.
    void fill(DayVerdict& verdict) const;
    // What it knows of the state: whether wear was let go. Not computed: a copy.
    void fill(DayState& state) const { state.let_go = let_go_; }

    // ln of the day's own ratio, ln [sum of leakage / sum of (leakage - excess)], each weighted by judged hours.
    // Returns a pure number; NaN where nothing was judged, or what is left of leakage is not positive.
    // Example: 2 L/min of which 0.5 excess for 1 h, 4 of which 1 for 3 h -> ln (14 / 10.5) = 0.288.
    // Source: definition.
    double ln_ratio() const;

    // Not computed: reads the state.
    const DutyDay& duty() const { return duty_; }
    bool fed() const { return fed_; }

    // Not computed: the list of fields a checkpoint keeps.
    template <typename Self, typename Io>
    static void each_field(Self& self, Io& io) {
        io(self.duty_.running_h, self.duty_.judged_h, self.weight_, self.leakage_, self.excess_, self.power_,
           self.slip_, self.slip_weight_, self.step_ratio_, self.fed_, self.let_go_);
    }

private:
    DutyDay duty_;
    double weight_ = 0.0;  // judged hours; sums beside it are weighted by them
    double leakage_ = 0.0;
    double excess_ = 0.0;
    double power_ = 0.0;
    double slip_ = 0.0;
    double slip_weight_ = 0.0;
    double step_ratio_ = unknown;
    bool fed_ = false;
    bool let_go_ = false;
};

}  // namespace slipledger::analytics
