// What goes wrong with a plant, or changes in it, beside wear: a fouled cooler, heavier work, a thermometer that reads
// too low. Each is a dated fact of the drawing; mill.cpp lets it act where it belongs.
#pragma once

#include <optional>
#include <vector>

#include "tools/plantsim/clock_time.hpp"
#include "tools/plantsim/row.hpp"

namespace slipledger::plantsim {

// With what `size` is of each.
enum class TroubleKind {
    // Of a reservoir.
    cooler_fouled,  // share of the cooler's conductance that is lost
    air_in_oil,     // volume share of bubbles at atmospheric pressure, beyond the usual
    // Of a pump.
    heavier_work,       // share by which all pressures its products ask for rise; negative: fall
    compensator_moved,  // bar by which the setting has moved
    pilot_flow,         // L/min more through the control to the drain
    inlet_starved,      // bar by which the inlet lies lower
    drain_blocked,      // share of the case leakage that no longer finds its way out
    valve_passes,       // share of theoretical flow, at rated pressure, lost between pump and meter
    vanes_stick,        // share of delivery lost while the oil is thick
    // Of an instrument: the one of `column`.
    stuck,                // shows what it showed when it began; size means nothing
    reads_more_by_share,  // share of the reading
    reads_more_by,        // in the reading's unit
    reads_nothing_but,    // shows this value
    silent,               // sends nothing; size means nothing
    clock_off,            // minutes by which its logger's clock is ahead
};

// Threads: a value, share freely.
struct Trouble {
    TroubleKind kind = TroubleKind::heavier_work;
    Millis from = 0;
    Millis to = 0;    // not itself
    Millis ramp = 0;  // from nothing to its full size
    double size = 0.0;
    std::optional<Column> column{};
    std::size_t section = 0;  // of an instrument

    // 0 before and after, 1 at its full size.
    double strength(Millis time) const;
};

using Troubles = std::vector<Trouble>;

// Sizes of all troubles of a kind at `time`, added up.
double total(const Troubles& troubles, TroubleKind kind, Millis time);

// 1 less each size, multiplied: what is left of something of which each takes a share.
double left_of(const Troubles& troubles, TroubleKind kind, Millis time);

}  // namespace slipledger::plantsim
