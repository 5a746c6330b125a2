#include "daemon/ledger/block_table.hpp"

#include "daemon/ledger/statement.hpp"

namespace slipledger::ledger {
namespace {

std::span<const std::byte> bytes_of(const SQLite::Column& column) {
    return {static_cast<const std::byte*>(column.getBlob()), static_cast<std::size_t>(column.getBytes())};
}

}  // namespace

BlockTable::BlockTable(SQLite::Database& database)
    : find_(database, "SELECT id, readings, disputed, data FROM hour_block WHERE point = ? AND hour = ?"),
      insert_(database, "INSERT INTO hour_block (point, hour, readings, disputed, data) VALUES (?, ?, ?, ?, ?)"),
      update_(database, "UPDATE hour_block SET readings = ?, disputed = ?, data = ? WHERE id = ?"),
      totals_(database,
              "UPDATE point SET block_readings = block_readings + ?, block_disputed = block_disputed + ? WHERE id = ?") {}

BlockAt BlockTable::load(PointId point, HourCells& cells) {
    BlockAt at;
    Binder(find_) << point << cells.hour();
    const Resetting reset(find_);
    if (!find_.executeStep()) return at;
    ColumnReader(find_) >> at.id >> at.readings >> at.disputed;
    codec_.decode(bytes_of(find_.getColumn(3)), cells);
    return at;
}

void BlockTable::save(PointId point, const BlockAt& before, const HourCells& cells) {
    const auto data = codec_.encode(cells);
    const std::uint64_t readings = cells.readings();
    const std::uint64_t disputed = cells.disputed();
    SQLite::Statement& row = before.id == 0 ? insert_ : update_;
    if (before.id == 0) {
        Binder(row) << point << cells.hour() << readings << disputed;
        row.bindNoCopy(5, data.data(), static_cast<int>(data.size()));
    } else {
        Binder(row) << readings << disputed;
        row.bindNoCopy(3, data.data(), static_cast<int>(data.size()));
        row.bind(4, before.id);
    }
    run(row);
    if (readings == before.readings && disputed == before.disputed) return;
    Binder(totals_) << readings - before.readings << disputed - before.disputed << point;
    run(totals_);
}

BlockScan::BlockScan(SQLite::Database& database)
    : count_(database, "SELECT count(*) FROM hour_block WHERE point = ? AND hour >= ? AND hour < ?"),
      rows_(database, "SELECT hour, data FROM hour_block WHERE point = ? AND hour >= ? AND hour < ? ORDER BY hour") {}

std::size_t BlockScan::count(PointId point, std::int64_t from, std::int64_t to) {
    Binder(count_) << point << floor_to(from, hour_ms) << to;
    const Resetting reset(count_);
    count_.executeStep();
    return static_cast<std::size_t>(count_.getColumn(0).getInt64());
}

void BlockScan::each(PointId point, std::int64_t from, std::int64_t to,
                     const std::function<void(const HourCells&)>& visit) {
    Binder(rows_) << point << floor_to(from, hour_ms) << to;
    const Resetting reset(rows_);
    HourCells cells(0);
    while (rows_.executeStep()) {
        cells.clear(rows_.getColumn(0).getInt64());
        codec_.decode(bytes_of(rows_.getColumn(1)), cells);
        visit(cells);
    }
}

}  // namespace slipledger::ledger
