// Asks the ledger for alarm episodes, with the acts of people laid over them.
#pragma once

#include <string_view>
#include <vector>

#include "config/plant.hpp"
#include "daemon/ledger/reader.hpp"
#include "daemon/report/episodes.hpp"

namespace slipledger::report {

// Episodes of one section, both bases, oldest first.
std::vector<Episode> query_alarms(const ledger::Reader& reader, const ledger::Directory& directory,
                                  std::string_view pump, std::string_view section);

// Episodes of the whole plant, newest first; `open_only` leaves out what has returned.
std::vector<Episode> query_alarms(const ledger::Reader& reader, const config::Plant& plant, bool open_only);

}  // namespace slipledger::report
