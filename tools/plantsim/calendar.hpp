// The mill's clock on the wall: local time with its two changes a year, shifts, breaks and days off.
#pragma once

#include <vector>

#include "tools/plantsim/drawing.hpp"

namespace slipledger::plantsim {

// What the timetable asks of a pump.
enum class Timetable { off, pause, work };

// Local times are worked out once, hour by hour, for the span that is simulated; a moment outside it is treated like
// its nearest hour. Threads: immutable, share freely.
class Calendar {
public:
    Calendar(const PlantDrawing& plant, Millis from, Millis to);

    Millis local(Millis time) const;  // milliseconds of the wall clock since 1970-01-01 00:00 on it
    bool day_off(Millis time) const;
    Timetable timetable(Shifts shifts, Millis time) const;
    double year_share(Millis time) const;  // years since the simulation began
    double season(Millis time) const;      // share of the calendar year that is over, 0 to 1

private:
    Millis from_;
    Millis year_begins_;
    double season_at_begin_;
    std::vector<Millis> offsets_;  // of the wall clock against UTC, one an hour
    std::vector<std::array<Millis, 2>> stops_;
};

}  // namespace slipledger::plantsim
