// Puts a confounder into a plant's drawing: one function a kind, behind one door.
#pragma once

#include "tools/judging/dice.hpp"
#include "tools/judging/pump_yard.hpp"
#include "tools/judging/story.hpp"

namespace slipledger::judging {

// What a pump must be for the confounder to be felt at all.
Wanted wanted_for(Confounder confounder, Dice& dice);
bool can_be_felt(Confounder confounder, const plantsim::PumpDrawing& pump);

// Whether the whole tank shares it.
bool is_of_tank(Confounder confounder);

// Puts it into pump `pump` (or its tank) from `from` on.
void confound(plantsim::PlantDrawing& plant, std::size_t pump, Confounder confounder, Millis from, Dice& dice);

}  // namespace slipledger::judging
