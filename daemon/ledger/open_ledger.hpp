// The way to a ledger that can be written. To read one, whether or not a daemon runs, use reader.hpp.
#pragma once

#include <memory>

#include "config/plant.hpp"
#include "daemon/ledger/ledger.hpp"

namespace slipledger::ledger {

// Takes the lock beside `plant.store.path`, creates or migrates the file, and registers what the plant file names. Throws
// LedgerFailure with what to do: another process holds it, the file is of a later version, the folder cannot be written.
std::unique_ptr<Ledger> open_ledger(const config::Plant& plant);

}  // namespace slipledger::ledger
