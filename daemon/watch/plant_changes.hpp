// What was edited in the plant file since the ledger was last opened becomes a dated fact before anything is judged by it.
#pragma once

#include "config/plant.hpp"
#include "daemon/clock.hpp"
#include "daemon/ledger/writer.hpp"

namespace slipledger::watch {

// Stores a `plant-changed` event for every pump whose facts differ from those the ledger holds (ledger/lives.hpp says from
// when it holds). Waits until they are durable.
void store_plant_changes(const config::Plant& plant, ledger::Writer& writer, const Clock& clock);

}  // namespace slipledger::watch
