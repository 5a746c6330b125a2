// A sound plant file, to be spoiled in one place per test.
#pragma once

#include <string>

#include "config/plant_reader.hpp"

namespace slipledger::config {

// Two pumps (an axial piston pump "press-2", a double vane pump "saw-1" with sections A and B), a reservoir, a TCP and
// a drop feed, alerts.
std::string sound_plant();

// The sound plant after a JSON Patch (RFC 6902) given as text, read.
PlantReading read_patched(const std::string& patch);

// The faults as one text, for a failing check.
std::string told(const PlantReading& reading);

}  // namespace slipledger::config
