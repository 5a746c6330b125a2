// Air and water round the tanks: seasons, days, warm and cold spells.
#pragma once

#include "tools/plantsim/calendar.hpp"
#include "tools/plantsim/chance.hpp"

namespace slipledger::plantsim {

// Threads: immutable, share freely.
class Weather {
public:
    // `calendar` must outlive it.
    Weather(const Calendar& calendar, std::uint64_t seed);

    double outdoors_c(Millis time) const;
    double hall_c(Millis time) const;   // heated in winter, not cooled in summer
    double water_c(Millis time) const;  // from the river, so without the days

private:
    double season_c(Millis time) const;

    const Calendar& calendar_;
    Chance spells_;
};

}  // namespace slipledger::plantsim
