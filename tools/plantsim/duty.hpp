// What production asks of a pump at a moment: whether it runs, at what pressure, at what stroke. Everything here
// follows from the time and the seed alone, so it can be asked for any moment in any order.
#pragma once

#include <vector>

#include "tools/plantsim/calendar.hpp"
#include "tools/plantsim/chance.hpp"

namespace slipledger::plantsim {

enum class Doing { standing, idling, working, holding };  // holding: its compensator keeps the pressure

// Threads: a value, share freely.
struct Demand {
    Doing doing = Doing::standing;
    double pressure_bar = 0.0;
    double stroke = 1.0;  // share of full displacement that goes out
};

// The duty of one pump. Threads: immutable, share freely.
class DutyPlan {
public:
    // `pump` and `calendar` must outlive it.
    DutyPlan(const PumpDrawing& pump, const Calendar& calendar, std::uint64_t seed);

    bool running(Millis time) const;
    Demand demand(std::size_t section, Millis time) const;

private:
    Demand working(std::size_t section, Millis time) const;
    double season(std::size_t section, Millis time) const;

    const PumpDrawing& pump_;
    const Calendar& calendar_;
    Chance stops_;
    std::vector<Chance> production_;  // by section
};

}  // namespace slipledger::plantsim
