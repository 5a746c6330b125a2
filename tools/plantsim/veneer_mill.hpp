// The invented veneer mill of the demonstration: nine pumps, made up so that every kind of verdict has its case. It is
// no real plant; sizes are what such pumps usually have. config/examples/veneer-mill.json is the same mill as its
// maintenance office would write it down, with name plates instead of truths.
#pragma once

#include "tools/plantsim/drawing.hpp"

namespace slipledger::plantsim {

PlantDrawing veneer_mill();

}  // namespace slipledger::plantsim
