#include "daemon/ledger/reader.hpp"

#include "daemon/ledger/database.hpp"
#include "daemon/ledger/reader_connection.hpp"
#include "daemon/ledger/registry.hpp"

namespace slipledger::ledger {

Reader::Connection::Connection(const std::string& path) : database(open_for_reading(path)), blocks(database) {}

SQLite::Statement& Reader::Connection::prepared(const std::string& sql) {
    const auto found = statements.find(sql);
    if (found != statements.end()) return found->second;
    return statements.try_emplace(sql, database, sql).first->second;
}

Reader::Reader(const std::string& path) : connection_(std::make_unique<Connection>(path)) {}
Reader::~Reader() = default;
Reader::Reader(Reader&&) noexcept = default;
Reader& Reader::operator=(Reader&&) noexcept = default;

Directory Reader::directory() const {
    const SQLite::Transaction snapshot(connection_->database);
    return load_directory(connection_->database);
}

}  // namespace slipledger::ledger
