// What no pump can be: combinations of facts that each look right alone. A plant file that passes here describes pumps
// that could be built and readings that could be judged.
#pragma once

#include "config/object_reader.hpp"
#include "config/pump.hpp"

namespace slipledger::config {

// Checks a section, complete, against its pump. Faults point to the section where the fact stands there, else to the
// pump; for a pump without sections both readers are the pump's.
void check_section(const Pump& pump, const Section& section, const ObjectReader& pump_reader,
                   const ObjectReader& section_reader);

}  // namespace slipledger::config
