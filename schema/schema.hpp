// The texts of this folder as the executables carry them: the ledger's migrations in their order, and the published
// schemas of the plant file, of readings and of the alert log. No file of schema/ is needed at run time.
#pragma once

#include <string_view>
#include <vector>

namespace slipledger::schema {

// Threads: immutable, share freely.
struct Migration {
    int number = 0;         // 1, 2, ... as the file's name begins
    std::string_view name;  // "0001_begin.sql"
    std::string_view sql;
};

// Every ledger/NNNN_*.sql, in ascending order.
std::vector<Migration> ledger_migrations();

// JSON Schema (draft 2020-12).
std::string_view plant_schema();
std::string_view reading_schema();
std::string_view alert_schema();

// Any embedded text by its path below schema/; empty where there is none of that name.
std::string_view text_named(std::string_view name);

}  // namespace slipledger::schema
