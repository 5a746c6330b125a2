// The ledger in SQLite. Holds the lock and the one writing connection, and puts together what each table's own file does
// into transactions; after a failed one, what is kept in memory is read anew.
#pragma once

#include <SQLiteCpp/SQLiteCpp.h>

#include <map>
#include <string>
#include <vector>

#include "daemon/ledger/database.hpp"
#include "daemon/ledger/judgement_store.hpp"
#include "daemon/ledger/ledger.hpp"
#include "daemon/ledger/ledger_lock.hpp"
#include "daemon/ledger/outbox_table.hpp"
#include "daemon/ledger/reading_store.hpp"
#include "daemon/ledger/work_marks.hpp"

namespace slipledger::ledger {

// Threads: one at a time.
class SqliteLedger final : public Ledger {
public:
    explicit SqliteLedger(const config::Plant& plant);

    const Directory& directory() const override { return directory_; }
    std::vector<IntakeOutcome> store(std::span<const IntakeBatch> batches) override;
    bool close_hours() override;
    bool store(const AnalysisResult& result) override;
    std::int64_t store(const Event& event) override;
    void store(std::span<const Notice> notices) override;
    void store(std::span<const DeliveryUpdate> updates) override;
    CopyStep begin_backup(const std::string& path) override;

private:
    // Runs `work` in one transaction; on any failure rolls back, forgets what memory held of it and throws LedgerFailure.
    template <typename Work>
    auto in_transaction(Work&& work);
    void forget();

    void store_refused(const RefusedRow& row);
    void store_receipt(const IntakeBatch& batch, const IntakeOutcome& outcome);

    LedgerLock lock_;
    SQLite::Database database_;
    Directory directory_;
    WorkMarks marks_;
    ReadingStore readings_;
    JudgementStore judgements_;
    OutboxTable outbox_;
    SQLite::Statement refused_;
    SQLite::Statement receipt_;
    SQLite::Statement event_;
    bool stale_ = false;  // memory is not what the file says: read it before the next transaction
};

}  // namespace slipledger::ledger
