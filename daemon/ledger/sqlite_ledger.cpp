#include "daemon/ledger/sqlite_ledger.hpp"

#include <SQLiteCpp/Backup.h>
#include <sqlite3.h>

#include <algorithm>
#include <filesystem>

#include "daemon/ledger/event_marks.hpp"
#include "daemon/ledger/open_ledger.hpp"
#include "daemon/ledger/registry.hpp"
#include "daemon/ledger/statement.hpp"

namespace slipledger::ledger {
namespace {

constexpr int pages_a_backup_step = 256;  // a megabyte: some milliseconds

Directory registered(SQLite::Database& database, const config::Plant& plant) try {
    register_plant(database, plant);
    return load_directory(database);
} catch (const SQLite::Exception& fault) {
    throw LedgerFailure("cannot register the plant in the ledger " + plant.store.path + ": " + fault.what());
}

std::vector<std::string> targets_of(const config::Alerts& alerts) {
    std::vector<std::string> targets;
    if (!alerts.log.empty()) targets.emplace_back("log");
    for (const config::Webhook& webhook : alerts.webhooks) targets.push_back(webhook.name);
    return targets;
}

std::vector<const Row*> all_rows(std::span<const IntakeBatch> batches) {
    std::vector<const Row*> rows;
    std::size_t count = 0;
    for (const IntakeBatch& batch : batches) count += batch.rows.size();
    rows.reserve(count);
    for (const IntakeBatch& batch : batches)
        for (const Row& row : batch.rows) rows.push_back(&row);
    return rows;
}

// On the writer's own connection: from a second one a backup begins anew at every commit.
// Threads: as the ledger it copies.
class SqliteCopying {
public:
    SqliteCopying(const std::string& path, SQLite::Database& from)
        : path_(path), copy_(std::in_place, path, SQLite::OPEN_READWRITE | SQLite::OPEN_CREATE), copying_(std::in_place, *copy_, from) {}
    SqliteCopying(const SqliteCopying&) = delete;
    SqliteCopying& operator=(const SqliteCopying&) = delete;
    ~SqliteCopying() {
        copying_.reset();
        copy_.reset();
        std::error_code ignored;
        if (!whole_) std::filesystem::remove(path_, ignored);
    }

    bool step() try {
        whole_ = copying_->executeStep(pages_a_backup_step) == SQLITE_DONE;
        return !whole_;
    } catch (const SQLite::Exception& fault) {
        throw failed(path_, fault);
    }

    static LedgerFailure failed(const std::string& path, const SQLite::Exception& fault) {
        return LedgerFailure("cannot back up to " + path + ": " + fault.what());
    }

private:
    std::string path_;
    std::optional<SQLite::Database> copy_;
    std::optional<SQLite::Backup> copying_;  // before the file it writes to
    bool whole_ = false;
};

IntakeOutcome outcome_of(const IntakeBatch& batch, std::span<const Change> changes) {
    IntakeOutcome outcome;
    outcome.added.assign(batch.sources, 0);
    for (std::size_t i = 0; i < batch.rows.size(); ++i)
        if (changes[i] == Change::added) outcome.added.at(batch.rows[i].source) = 1;
    outcome.stored = static_cast<std::uint64_t>(std::ranges::count(outcome.added, std::uint8_t{1}));
    outcome.repeated = outcome.added.size() - outcome.stored;
    return outcome;
}

}  // namespace

std::unique_ptr<Ledger> open_ledger(const config::Plant& plant) { return std::make_unique<SqliteLedger>(plant); }

SqliteLedger::SqliteLedger(const config::Plant& plant)
    : lock_(plant.store.path),
      database_(open_for_writing(plant.store.path)),
      directory_(registered(database_, plant)),
      marks_(database_, std::chrono::minutes(plant.summary_minutes), plant.lateness),
      readings_(database_, directory_, marks_, plant.lateness),
      judgements_(database_),
      outbox_(database_, targets_of(plant.alerts)),
      refused_(database_,
               "INSERT INTO refused (feed, place, code, message, text, received) VALUES (?, ?, ?, ?, ?, ?)"),
      receipt_(database_,
               "INSERT INTO receipt (sha256, feed, file, rows, stored, repeated, refused, taken) "
               "VALUES (?, ?, ?, ?, ?, ?, ?, ?) ON CONFLICT DO UPDATE SET (feed, file, rows, stored, repeated, refused, taken) = "
               "(excluded.feed, excluded.file, excluded.rows, excluded.stored, excluded.repeated, excluded.refused, "
               "excluded.taken) WHERE stored + repeated = 0"),  // refused whole before, and taken now
      event_(database_,
             "INSERT INTO dated_event (pump, section, kind, at, entered, \"by\", user, body) "
             "VALUES (?, ?, ?, ?, ?, ?, ?, ?)") {}

void SqliteLedger::forget() {
    stale_ = true;
    marks_.load();
    readings_.load();
    stale_ = false;
}

template <typename Work>
auto SqliteLedger::in_transaction(Work&& work) {
    try {
        if (stale_) forget();
        SQLite::Transaction transaction(database_, SQLite::TransactionBehavior::IMMEDIATE);
        stale_ = true;  // until the commit has gone through
        auto result = work();
        transaction.commit();
        stale_ = false;
        return result;
    } catch (const SQLite::Exception& fault) {
        throw LedgerFailure(std::string("cannot store in the ledger: ") + fault.what());
    }
}

std::vector<IntakeOutcome> SqliteLedger::store(std::span<const IntakeBatch> batches) {
    const std::vector<const Row*> rows = all_rows(batches);
    return in_transaction([&] {
        const std::vector<Change> changes = readings_.store(rows);
        std::vector<IntakeOutcome> outcomes;
        std::size_t from = 0;
        for (const IntakeBatch& batch : batches) {
            outcomes.push_back(outcome_of(batch, std::span(changes).subspan(from, batch.rows.size())));
            from += batch.rows.size();
            for (const RefusedRow& row : batch.refused) store_refused(row);
            if (batch.receipt) store_receipt(batch, outcomes.back());
        }
        const bool marked = marks_.save();
        for (IntakeOutcome& outcome : outcomes) outcome.marked = marked;
        return outcomes;
    });
}

void SqliteLedger::store_refused(const RefusedRow& row) {
    Binder(refused_) << row.feed << row.place << row.code << row.message << row.text << row.received;
    run(refused_);
}

void SqliteLedger::store_receipt(const IntakeBatch& batch, const IntakeOutcome& outcome) {
    const Receipt& receipt = *batch.receipt;
    Binder(receipt_) << receipt.sha256 << receipt.feed << receipt.file << receipt.rows << receipt.stored + outcome.stored
                     << receipt.repeated + outcome.repeated << receipt.refused << receipt.taken;
    run(receipt_);
}

bool SqliteLedger::close_hours() {
    if (!stale_ && !readings_.wants_move()) return false;
    return in_transaction([&] {
        readings_.move_step();
        return true;
    });
}

bool SqliteLedger::store(const AnalysisResult& result) {
    return in_transaction([&] {
        if (!marks_.settle(result.pump, result.generation, result.mark_again_from)) return false;
        for (const TrackResult& track : result.tracks) judgements_.store(track);
        for (const DayFactsRecord& record : result.day_facts) judgements_.store(result.pump, record);
        outbox_.tell(result.notices);
        for (const ToldOtherwise& told : result.told_otherwise) marks_.raise(told.pump, ms_of(told.from), ms_of(told.from));
        marks_.save();
        return true;
    });
}

std::int64_t SqliteLedger::store(const Event& event) {
    return in_transaction([&] {
        Binder(event_) << event.pump << event.section << event.kind << event.at << event.entered << event.by << event.user
                       << event.body;
        run(event_);
        const std::int64_t id = database_.getLastInsertRowid();
        raise_marks(database_, directory_, event, marks_);
        marks_.save();
        return id;
    });
}

void SqliteLedger::store(std::span<const Notice> notices) {
    in_transaction([&] {
        outbox_.tell(notices);
        return true;
    });
}

void SqliteLedger::store(std::span<const DeliveryUpdate> updates) {
    in_transaction([&] {
        for (const DeliveryUpdate& update : updates) outbox_.update(update);
        return true;
    });
}

CopyStep SqliteLedger::begin_backup(const std::string& path) try {
    return [copying = std::make_shared<SqliteCopying>(path, database_)] { return copying->step(); };
} catch (const SQLite::Exception& fault) {
    throw SqliteCopying::failed(path, fault);
}

}  // namespace slipledger::ledger
