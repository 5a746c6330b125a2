// Where the leakage ratio departs from what it was: was it what was seen that moved, or only what is expected? A pump
// that breaks leaks more; a thermometer or a pressure sensor that jumps moves the expectation, and the flow knows
// nothing of it.
#pragma once

#include <array>
#include <cstdint>

#include "analytics/instant.hpp"
#include "analytics/own_usual.hpp"
#include "analytics/wear_filter.hpp"

namespace slipledger::analytics {

// Changes over a departure, as logarithms; NaN before there is one.
struct DepartureChanges {
    double seen = unknown;              // of the leakage read
    double expected = unknown;          // of what a healthy pump would leak there
    double expected_scatter = unknown;  // standard deviation of that from hour to hour, when learned
};

// Threads: one at a time.
class DepartureLook {
public:
    DepartureLook();

    // Takes what one summary says of leakage; anything not above 0 says nothing. Not computed: remembers.
    void add(Instant start, const OwnReading& own, double hours);

    // The ratio has departed, from that summary on; false where that is known. Not computed: remembers.
    bool begin(Instant began);

    // Means after the departure less means before it: at first the summaries on either side, eight at most; once a
    // day's running hours have passed, those against the days before. Example: leakage 2, 2, then 4, 4 where 2 is
    // expected throughout -> seen ln 2, expected 0. Source: definition.
    DepartureChanges changes() const;

    // Not computed: the list of fields a checkpoint keeps.
    template <typename Self, typename Io>
    static void each_field(Self& self, Io& io) {
        io(self.began_, self.starts_, self.seen_, self.expected_, self.next_, self.count_, self.usual_seen_,
           self.usual_expected_, self.after_seen_, self.after_expected_, self.first_.seen, self.first_.expected,
           self.before_seen_, self.before_expected_);
    }

private:
    static constexpr std::size_t kept = 16;
    struct Side {
        double sum = 0.0;
        int count = 0;

        void add(double value) {
            sum += value;
            ++count;
        }
        double mean() const { return count > 0 ? sum / count : unknown; }
    };

    std::array<Instant, kept> starts_{};  // of the newest summaries, a ring
    std::array<double, kept> seen_{};
    std::array<double, kept> expected_{};
    Instant began_ = Instant::min();
    std::uint32_t next_ = 0;
    std::uint32_t count_ = 0;
    OwnUsual usual_seen_;
    OwnUsual usual_expected_;
    OwnUsual after_seen_;
    OwnUsual after_expected_;
    DepartureChanges first_;  // by the summaries on either side
    double before_seen_ = unknown;
    double before_expected_ = unknown;
};

}  // namespace slipledger::analytics
