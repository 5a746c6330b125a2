#include "daemon/ledger/database.hpp"

#include <filesystem>

#include "daemon/ledger/ledger.hpp"

namespace slipledger::ledger {
namespace {

constexpr int busy_timeout_ms = 10'000;      // a reader's checkpoint or a backup tool may hold the file for a moment
constexpr int writer_cache_kib = 24 * 1024;  // a bulk load touches each pump's newest pages again and again
constexpr int reader_cache_kib = 4 * 1024;
constexpr int checkpoint_pages = 4'000;      // 16 MB of log: fewer rewrites of the same page, short enough to recover
constexpr int journal_limit_bytes = 64 * 1024 * 1024;

void set(SQLite::Database& database, const char* name, int value) {
    database.exec(std::string("PRAGMA ") + name + " = " + std::to_string(value));
}

[[noreturn]] void refuse_newer(int found, int known) {
    throw LedgerFailure("the ledger has schema " + std::to_string(found) + ", this program knows up to " +
                        std::to_string(known) + ": it was written by a later version; install that version or take "
                        "another ledger file");
}

int last_number(std::span<const schema::Migration> migrations) {
    return migrations.empty() ? 0 : migrations.back().number;
}

}  // namespace

int schema_number(SQLite::Database& database) { return database.execAndGet("PRAGMA user_version").getInt(); }

void migrate(SQLite::Database& database, std::span<const schema::Migration> migrations) {
    const int found = schema_number(database);
    if (found > last_number(migrations)) refuse_newer(found, last_number(migrations));
    for (const schema::Migration& migration : migrations) {
        if (migration.number <= found) continue;
        SQLite::Transaction transaction(database, SQLite::TransactionBehavior::IMMEDIATE);
        database.exec(std::string(migration.sql));
        set(database, "user_version", migration.number);
        transaction.commit();
    }
}

SQLite::Database open_for_writing(const std::string& path) try {
    SQLite::Database database(path, SQLite::OPEN_READWRITE | SQLite::OPEN_CREATE, busy_timeout_ms);
    database.exec("PRAGMA journal_mode = WAL");
    database.exec("PRAGMA synchronous = FULL");  // NORMAL may lose an acknowledged commit when the power fails
    set(database, "foreign_keys", 1);
    set(database, "secure_delete", 0);
    set(database, "cache_size", -writer_cache_kib);
    set(database, "wal_autocheckpoint", checkpoint_pages);
    set(database, "journal_size_limit", journal_limit_bytes);
    migrate(database, schema::ledger_migrations());
    return database;
} catch (const SQLite::Exception& fault) {
    throw LedgerFailure("cannot open the ledger " + path + " for writing: " + fault.what());
}

SQLite::Database open_for_reading(const std::string& path) try {
    if (!std::filesystem::exists(path)) throw LedgerFailure("there is no ledger at " + path);
    SQLite::Database database(path, SQLite::OPEN_READONLY, busy_timeout_ms);
    set(database, "cache_size", -reader_cache_kib);
    const int known = last_number(schema::ledger_migrations());
    const int found = schema_number(database);
    if (found > known) refuse_newer(found, known);
    if (found < known)
        throw LedgerFailure("the ledger " + path + " has schema " + std::to_string(found) + " and this program wants " +
                            std::to_string(known) + ": start the daemon, or any command that writes, to migrate it");
    return database;
} catch (const SQLite::Exception& fault) {
    throw LedgerFailure("cannot read the ledger " + path + ": " + fault.what());
}

}  // namespace slipledger::ledger
