// What a figure of a section was while it was learned, and what it is of late. The measure by which a sign is a sign:
// a case pressure is high against the section's own, not against a number in a book.
#pragma once

#include "analytics/section_spec.hpp"

namespace slipledger::analytics {

// How much of a figure is learned and how long of late is, in the unit of the weights given to `add`.
struct Pace {
    double learn = 50.0;
    double memory = 12.0;
};

// Threads: one at a time.
class OwnUsual {
public:
    explicit OwnUsual(Pace pace = {}) : pace_(pace) {}

    // Adds a value that stands for `weight` (running hours, or 1 for each stop). NaN and weight 0 add nothing. Until
    // `learn` is together it moves both:
    //
    //   learned = weighted mean of the first values   recent += (value - recent) min(1, weight / memory)
    //
    // Example: learn 2, memory 2: 1, 1, 5 at weight 1 -> learned 1, recent 3.
    // Source: definition; exponential weights as in any textbook on control charts.
    void add(double value, double weight);

    // All has been learned. Not computed: a comparison.
    bool known() const { return learned_weight_ >= pace_.learn; }
    // Not computed: reads the state.
    double learned() const { return mean_; }
    // Not computed: reads the state.
    double recent() const { return recent_; }

    // Standard deviation of what was learned. Returns the value's unit, 0 before two values.
    // Example: 1 and 3 at equal weight -> 1.
    // Source: definition.
    double learned_sd() const;

    // Recent less learned; NaN until all is learned. Returns the value's unit. Example: 1 learned, 3 of late -> 2.
    // Source: definition.
    double moved() const;

    // Learns anew. Not computed: forgets.
    void forget() { *this = OwnUsual(pace_); }

    // Not computed: the list of fields a checkpoint keeps.
    template <typename Self, typename Io>
    static void each_field(Self& self, Io& io) {
        io(self.learned_weight_, self.mean_, self.squares_, self.recent_weight_, self.recent_);
    }

private:
    Pace pace_;
    double learned_weight_ = 0.0;
    double mean_ = unknown;
    double squares_ = 0.0;  // weighted sum of squared departures from the mean
    double recent_weight_ = 0.0;
    double recent_ = unknown;
};

}  // namespace slipledger::analytics
