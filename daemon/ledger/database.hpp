// The file itself: opened with the settings that make a commit durable, and brought to this program's schema one migration
// after the other, each in a transaction of its own. A file of a later program is refused, not guessed at.
#pragma once

#include <SQLiteCpp/SQLiteCpp.h>

#include <span>
#include <string>

#include "schema/schema.hpp"

namespace slipledger::ledger {

// Creates or opens for writing, migrated by schema::ledger_migrations(). Throws LedgerFailure.
SQLite::Database open_for_writing(const std::string& path);

// Opens read-only; the file must exist and have exactly this program's schema. Throws LedgerFailure.
SQLite::Database open_for_reading(const std::string& path);

// Number of the last migration applied.
int schema_number(SQLite::Database& database);

// Applies what is missing. Throws LedgerFailure where the file is newer than the last migration.
void migrate(SQLite::Database& database, std::span<const schema::Migration> migrations);

}  // namespace slipledger::ledger
