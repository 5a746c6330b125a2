// The pump as the plant file told of it at an earlier time. Limits, names and the like are always today's; what a judgement
// rests on (oil, displacement, settings, sensors) is what held then.
#pragma once

#include <string_view>

#include "config/plant.hpp"

namespace slipledger::watch {

// `today` with the dated facts of `facts`, the text of an earlier config::pump_facts, laid over it. What the text does not
// tell stays as it is today.
config::Pump with_facts(config::Pump today, std::string_view facts);

// `fluid` with what `facts`, the fluid's part of such a text, tells of another oil laid over it.
config::Fluid with_fluid_facts(config::Fluid fluid, std::string_view facts);

}  // namespace slipledger::watch
