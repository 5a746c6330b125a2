// How much a section ran, and how much of that could be judged, over the last 30 days: what `seldom judged` and the way
// from running hours to a date rest on.
#pragma once

#include <array>
#include <cstdint>

#include "analytics/section_spec.hpp"

namespace slipledger::analytics {

struct DutyDay {
    double running_h = 0.0;
    double judged_h = 0.0;
};

// Threads: one at a time.
class DutyWindow {
public:
    static constexpr std::int32_t days = 30;

    // Adds a finished day; `date` in days since 1970. Not computed: remembers.
    void add(std::int32_t date, const DutyDay& day);

    // Sums over the 30 days that end with `date`, `so_far` of a day not yet finished added.
    // Not computed: sums.
    DutyDay total(std::int32_t date, const DutyDay& so_far) const;

    // Running hours a day, over the days of the window that were watched.
    // Returns h per calendar day; NaN before the first finished day. Example: 8 h on each of 5 days, 0 on 2 -> 5.71.
    // Source: definition.
    double running_h_per_day(std::int32_t date) const;

    // Not computed: the list of fields a checkpoint keeps.
    template <typename Self, typename Io>
    static void each_field(Self& self, Io& io) {
        io(self.days_);
    }

private:
    struct Entry {
        std::int32_t date = 0;
        std::int32_t known = 0;
        DutyDay day;

        bool inside(std::int32_t last) const { return known != 0 && date <= last && date > last - days; }
        template <typename Self, typename Io>
        static void each_field(Self& self, Io& io) {
            io(self.date, self.known, self.day.running_h, self.day.judged_h);
        }
    };
    std::array<Entry, days> days_{};
};

}  // namespace slipledger::analytics
