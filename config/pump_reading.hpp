// One entry of `pumps`, with its sections resolved.
#pragma once

#include <string>

#include "config/names.hpp"
#include "config/object_reader.hpp"
#include "config/plant.hpp"

namespace slipledger::config {

// What a pump needs to know of the rest of the plant file. Threads: one thread; lives within read_plant.
struct PumpSurroundings {
    const Plant& plant;            // its reservoirs, areas and time zone are already read
    const Node* limits = nullptr;  // the plant's own limits, already checked
    Names reservoirs;
    Names taken;  // ids of the pumps read so far
};

Pump read_pump(const ObjectReader& reader, PumpSurroundings& surroundings);

}  // namespace slipledger::config
