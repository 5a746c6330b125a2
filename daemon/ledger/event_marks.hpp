// What an event makes to be judged anew: acts on alarms and remarks nothing, a settled dispute its own span, everything
// else from its time on; told of a pump that pump, told of a reservoir every pump that draws from it or ever did.
#pragma once

#include <SQLiteCpp/SQLiteCpp.h>

#include "daemon/ledger/directory.hpp"
#include "daemon/ledger/records.hpp"
#include "daemon/ledger/work_marks.hpp"

namespace slipledger::ledger {

// Raises the marks of a stored event. Threads: one at a time, within the caller's transaction.
void raise_marks(SQLite::Database& database, const Directory& directory, const Event& event, WorkMarks& marks);

}  // namespace slipledger::ledger
