#include "daemon/ledger/outbox_table.hpp"

#include "daemon/ledger/statement.hpp"

namespace slipledger::ledger {

OutboxTable::OutboxTable(SQLite::Database& database, std::vector<std::string> targets)
    : database_(database),
      targets_(std::move(targets)),
      notice_(database,
              "INSERT INTO notice (id, pump, section, episode, kind, level, at, body) VALUES (?, ?, ?, ?, ?, ?, ?, ?) "
              "ON CONFLICT (id) DO NOTHING"),
      row_(database, "INSERT INTO outbox (target, notice) VALUES (?, ?)"),
      update_(database, "UPDATE outbox SET state = ?, attempts = ?, next_try = ?, last_error = ? WHERE id = ?") {}

void OutboxTable::tell(std::span<const Notice> notices) {
    for (const Notice& notice : notices) {
        Binder(notice_) << notice.id << notice.pump << notice.section << notice.episode << notice.kind << notice.level
                        << notice.at << notice.body;
        const int inserted = notice_.exec();
        notice_.reset();
        if (inserted == 0) continue;
        const std::int64_t number = database_.getLastInsertRowid();
        for (const std::string& target : targets_) {
            Binder(row_) << target << number;
            run(row_);
        }
    }
}

void OutboxTable::update(const DeliveryUpdate& update) {
    Binder(update_) << update.state << update.attempts << update.next_try << update.last_error << update.id;
    run(update_);
}

}  // namespace slipledger::ledger
