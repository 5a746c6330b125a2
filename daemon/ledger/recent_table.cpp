#include "daemon/ledger/recent_table.hpp"

#include <algorithm>
#include <cmath>
#include <cstring>
#include <string>

#include "daemon/ledger/statement.hpp"

namespace slipledger::ledger {
namespace {

using analytics::quantity_count;
using Feeds = std::array<std::uint16_t, quantity_count>;

std::string quantity_names(const char* after_each) {
    std::string names;
    for (const auto& facts : analytics::quantity_table) names.append(facts.name).append(after_each).append(", ");
    return names;
}

std::string insert_sql() {
    std::string marks;
    for (std::size_t q = 0; q < quantity_count; ++q) marks += "?, ";
    return "INSERT INTO recent (time, point, feed, " + quantity_names("") + "disputed) VALUES (?, ?, ?, " + marks +
           "0) ON CONFLICT DO NOTHING";
}

std::string update_sql() {
    return "UPDATE recent SET " + quantity_names(" = ?") + "feed = ?, feeds = ?, disputed = ? WHERE time = ? AND point = ?";
}

bool usable(const Row& row, std::size_t quantity) {
    return (row.present >> quantity & 1U) != 0 && std::isfinite(row.value[quantity]);
}

// The feed of the whole row, or none where cells came by different ones.
std::optional<std::uint16_t> common_feed(std::span<const Cell> cells) {
    std::optional<std::uint16_t> common;
    for (const Cell& cell : cells) {
        if (std::isnan(cell.value)) continue;
        if (common && *common != cell.feed) return std::nullopt;
        common = cell.feed;
    }
    return common.value_or(std::uint16_t{0});
}

}  // namespace

const std::string& recent_columns() {
    static const std::string columns = "time, point, feed, disputed, feeds, " + quantity_names("") + "0";
    return columns;
}

void read_recent_row(SQLite::Statement& statement, RecentRow& row) {
    std::uint16_t feed = 0;
    unsigned disputed = 0;
    ColumnReader(statement) >> row.time >> row.point >> feed >> disputed;
    Feeds feeds;
    feeds.fill(feed);
    const SQLite::Column several = statement.getColumn(4);
    if (several.isBlob() && several.getBytes() == static_cast<int>(sizeof feeds))
        std::memcpy(feeds.data(), several.getBlob(), sizeof feeds);
    for (std::size_t q = 0; q < quantity_count; ++q) {
        const SQLite::Column column = statement.getColumn(static_cast<int>(5 + q));
        Cell& cell = row.cells[q];
        cell = {};
        cell.disputed = (disputed >> q & 1U) != 0;
        if (column.isNull()) continue;
        cell.value = column.getDouble();
        cell.feed = feeds[q];
    }
}

RecentTable::RecentTable(SQLite::Database& database)
    : database_(database),
      insert_(database, insert_sql()),
      find_(database, "SELECT " + recent_columns() + " FROM recent WHERE time = ? AND point = ?"),
      update_(database, update_sql()),
      scan_(database, "SELECT " + recent_columns() + " FROM recent WHERE time >= ? AND time < ? ORDER BY time"),
      chunk_end_(database, "SELECT time FROM recent WHERE time >= ? AND time < ? ORDER BY time LIMIT 1 OFFSET ?"),
      delete_(database,
              "DELETE FROM recent WHERE time >= ? AND time < ? "
              "AND time < (SELECT moved_until FROM point WHERE point.id = recent.point)") {}

Change RecentTable::enter(const Row& row, const AddDisputed& add) {
    Binder binder(insert_);
    binder << row.time << row.point << row.feed;
    for (std::size_t q = 0; q < quantity_count; ++q)
        binder << (usable(row, q) ? row.value[q] + 0.0 : std::numeric_limits<double>::quiet_NaN());
    const int inserted = insert_.exec();
    insert_.reset();
    return inserted > 0 ? Change::added : merge(row, add);
}

Change RecentTable::merge(const Row& row, const AddDisputed& add) {
    RecentRow stored;
    {
        Binder(find_) << row.time << row.point;
        const Resetting reset(find_);
        find_.executeStep();
        read_recent_row(find_, stored);
    }
    Change change = Change::none;
    for (std::size_t q = 0; q < quantity_count; ++q)
        if (usable(row, q))
            change = std::max(change, ledger::enter(stored.cells[q],
                                                    {.time = stored.time,
                                                     .quantity = q,
                                                     .value = row.value[q] + 0.0,
                                                     .feed = static_cast<std::uint16_t>(row.feed)},
                                                    add));
    if (change == Change::none) return change;
    const auto feed = common_feed(stored.cells);
    Feeds feeds{};
    std::int64_t disputed = 0;
    Binder binder(update_);
    for (std::size_t q = 0; q < quantity_count; ++q) {
        binder << stored.cells[q].value;
        feeds[q] = stored.cells[q].feed;
        if (stored.cells[q].disputed) disputed |= std::int64_t{1} << q;
    }
    const int after = static_cast<int>(quantity_count);
    update_.bind(after + 1, static_cast<std::int64_t>(feed.value_or(0)));
    if (feed)
        update_.bind(after + 2);
    else
        update_.bindNoCopy(after + 2, feeds.data(), static_cast<int>(sizeof feeds));
    update_.bind(after + 3, disputed);
    update_.bind(after + 4, stored.time);
    update_.bind(after + 5, static_cast<std::int64_t>(stored.point));
    run(update_);
    return change;
}

void RecentTable::scan(std::int64_t from, std::int64_t to, const std::function<bool(PointId)>& wanted,
                       const std::function<void(const RecentRow&)>& each) {
    Binder(scan_) << from << to;
    const Resetting reset(scan_);
    RecentRow row;
    while (scan_.executeStep()) {
        if (!wanted(static_cast<PointId>(scan_.getColumn(1).getInt()))) continue;
        read_recent_row(scan_, row);
        each(row);
    }
}

std::int64_t RecentTable::delete_ghosts(std::int64_t from, std::int64_t to, std::size_t most) {
    std::int64_t end = to;
    {
        Binder(chunk_end_) << from << to << most;
        const Resetting reset(chunk_end_);
        if (chunk_end_.executeStep()) end = std::max(chunk_end_.getColumn(0).getInt64(), from + 1);
    }
    Binder(delete_) << from << end;
    run(delete_);
    return end;
}

std::vector<RecentTable::Extent> RecentTable::extents() {
    SQLite::Statement rows(database_,
                           "SELECT r.point, min(r.time), max(r.time), count(*) FROM recent r JOIN point p ON p.id = r.point "
                           "WHERE p.moved_until IS NULL OR r.time >= p.moved_until GROUP BY r.point");
    std::vector<Extent> extents;
    while (rows.executeStep()) {
        Extent extent;
        ColumnReader(rows) >> extent.point >> extent.first >> extent.last >> extent.rows;
        extents.push_back(extent);
    }
    return extents;
}

}  // namespace slipledger::ledger
