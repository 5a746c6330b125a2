// Gives everything the plant file names its number in the ledger, for ever: what leaves the plant file keeps its number
// and its history. Feeds are numbered in the order they were first seen.
#pragma once

#include <SQLiteCpp/SQLiteCpp.h>

#include "config/plant.hpp"
#include "daemon/ledger/directory.hpp"

namespace slipledger::ledger {

// Registers what is new, in one transaction, and points names to where the present plant file puts them.
void register_plant(SQLite::Database& database, const config::Plant& plant);

Directory load_directory(SQLite::Database& database);

}  // namespace slipledger::ledger
