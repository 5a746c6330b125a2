// One pass over one pump: from its work mark to everything that is to be stored of it. A pure function of what the ledger
// holds and the plant file says; whatever order or batches the readings came in, the last pass ends at the same result.
#pragma once

#include "config/plant.hpp"
#include "daemon/ledger/directory.hpp"
#include "daemon/ledger/reader.hpp"
#include "daemon/ledger/records.hpp"

namespace slipledger::watch {

ledger::AnalysisResult judge_pump(const ledger::Reader& reader, const config::Plant& plant,
                                  const ledger::Directory& directory, const ledger::Mark& mark);

}  // namespace slipledger::watch
