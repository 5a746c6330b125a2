#include "daemon/ledger/dispute_table.hpp"

#include "daemon/ledger/statement.hpp"

namespace slipledger::ledger {

DisputeTable::DisputeTable(SQLite::Database& database)
    : find_(database, "SELECT feed FROM dispute WHERE point = ? AND time = ? AND quantity = ? AND value = ?"),
      insert_(database, "INSERT INTO dispute (point, time, quantity, value, feed) VALUES (?, ?, ?, ?, ?)"),
      lower_feed_(database,
                  "UPDATE dispute SET feed = ? WHERE point = ? AND time = ? AND quantity = ? AND value = ?") {}

AddDisputed DisputeTable::adder(PointId point) {
    return [this, point](const DisputedValue& told) { return add(point, told); };
}

bool DisputeTable::add(PointId point, const DisputedValue& told) {
    Binder(find_) << point << told.time << told.quantity << told.value;
    const Resetting reset(find_);
    if (!find_.executeStep()) {
        Binder(insert_) << point << told.time << told.quantity << told.value << told.feed;
        run(insert_);
        return true;
    }
    if (told.feed < find_.getColumn(0).getInt()) {
        Binder(lower_feed_) << told.feed << point << told.time << told.quantity << told.value;
        run(lower_feed_);
    }
    return false;
}

}  // namespace slipledger::ledger
