// What leaks in a healthy pump of each kind, gap by gap, as its maker's drawings would give it.
#pragma once

#include <vector>

#include "tools/plantsim/gap.hpp"

namespace slipledger::plantsim {

// A swash plate pump of `size` 140 cm3/rev.
std::vector<Gap> axial_piston_gaps(double size = 1.0);

// A radial piston pump of 90 cm3/rev on a pintle.
std::vector<Gap> radial_piston_gaps();

// A vane cartridge. At width 1 it moves 67 cm3/rev; a wider one moves more and leaks more along its vanes, not at its
// sides.
std::vector<Gap> vane_gaps(double width);

// A gear pump of 63 cm3/rev whose bearing blocks are pressed on by the delivery pressure.
std::vector<Gap> external_gear_gaps();

// A gear pump of 80 cm3/rev with a filler piece.
std::vector<Gap> internal_gear_gaps();

}  // namespace slipledger::plantsim
