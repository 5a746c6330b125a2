// Sudden change of a section: sums the evidence in the filter's surprises, says when wear must be let go, and
// afterwards whether what it did was a step. Slow wear never shows here; the filter's drift follows it.
#pragma once

#include <cstdint>

#include "analytics/instant.hpp"
#include "analytics/section_spec.hpp"
#include "analytics/wear_filter.hpp"

namespace slipledger::analytics {

// A step in force: from when, from what ratio, and whether something else explains it first.
struct Step {
    bool active = false;
    bool attributed = false;     // oil, sensor, setting or operating range changed at the same hour
    Instant began;               // of the first summary that departed
    double ln_before = unknown;  // ln of the ratio before it
    double ln_size = unknown;    // ln of ratio after over before, when it was told

    // Not computed: the list of fields a checkpoint keeps.
    template <typename Self, typename Io>
    static void each_field(Self& self, Io& io) {
        io(self.active, self.attributed, self.began, self.ln_before, self.ln_size);
    }
};

// Threads: one at a time.
class ChangeDetector {
public:
    // Adds one summary's surprise, as a log likelihood ratio of a departure of 3 standard deviations against none, in
    // each direction:
    //
    //   g = max(0, g + 3 r - 4.5),   r = surprise, held within -+4 so that no summary can decide alone
    //
    // True when g passes 8: wear is to be let go before this summary is fed. NaN adds nothing; nor does what lies low while
    // the ratio before is under 1.3, since wear does not heal.
    // Example: surprises 3, 3 -> true at the second; 2.5, 2.5, 2.5 -> false; 9 once -> false.
    // Source: E. S. Page, Continuous inspection schemes (1954) (from memory); limits from method.md, 5.
    bool add(double surprise, Instant at, double running_h, LogEstimate wear_before);

    // Facts or operating range changed: a departure beginning within an hour of it is attributed to it.
    // Not computed: bookkeeping.
    void explain(Instant at);

    // After each feed: follows an opened departure for 8 running hours, in which ln ratio must grow by at least ln 1.3 with
    // its low end past half of that, and then for `lasting_h` more from its beginning, in which it must not go back by half
    // of the least size. True when it has just become a step; one that goes back so far later is over. Damage stays; a
    // pilot valve, a meter's zero or air in the oil mostly does not. Example: before 0, then 0.5 +- 0.05 two hours later
    // and still at 0.5 after 12 -> a step of ratio 1.65, told after 12. Source: method.md, 5; that it must last: our own.
    bool follow(LogEstimate wear, Instant at, double running_h, double lasting_h);

    // Not computed: reads the state.
    const Step& step() const { return step_; }

    // First summary of the last departure upwards, told as a step or not. Not computed: reads the state.
    Instant departed() const { return departure_.began; }

    // Not computed: the list of fields a checkpoint keeps.
    template <typename Self, typename Io>
    static void each_field(Self& self, Io& io) {
        io(self.up_, self.down_, self.before_, self.departure_, self.following_, self.explained_, self.explained_at_,
           self.step_, self.waiting_, self.waiting_from_h_);
    }

private:
    struct Outset {
        Instant began;
        double running_h = 0.0;
        double ln_wear = 0.0;

        template <typename Self, typename Io>
        static void each_field(Self& self, Io& io) {
            io(self.began, self.running_h, self.ln_wear);
        }
    };

    void look_for_step(LogEstimate wear, Instant at, double running_h);

    double up_ = 0.0;
    double down_ = 0.0;
    Outset before_;     // since there was any evidence
    Outset departure_;  // of the departure being followed
    bool following_ = false;
    bool explained_ = false;
    Instant explained_at_;
    Step step_;
    Step waiting_;  // to be told if it lasts
    double waiting_from_h_ = 0.0;
};

}  // namespace slipledger::analytics
