// Reader's answers about readings, and how far each pump has come.

#include <algorithm>

#include "daemon/ledger/point_rows.hpp"
#include "daemon/ledger/reader_connection.hpp"
#include "daemon/ledger/recent_table.hpp"

namespace slipledger::ledger {
namespace {

constexpr std::int64_t always = std::numeric_limits<std::int64_t>::min();

// Words of people on disputed cells of a point, the newest first. Said of a pump they hold for all its points, said of one
// of its sections for that section's, said of a reservoir for its point.
constexpr const char* believed_sql =
    "SELECT e.at, json_extract(e.body, '$.to_ms'), coalesce(json_extract(e.body, '$.quantity'), ''), f.id "
    "FROM dated_event e JOIN feed f ON f.name = json_extract(e.body, '$.believe') "
    "WHERE e.kind = 'settled' AND (EXISTS (SELECT 1 FROM point_name n JOIN pump p ON p.id = n.pump WHERE p.name = e.pump "
    "AND n.point = ?1 AND e.section IN ('', n.section)) OR EXISTS (SELECT 1 FROM point t WHERE t.id = ?1 AND "
    "t.kind = 'reservoir' AND e.pump = '' AND t.name = json_extract(e.body, '$.reservoir'))) ORDER BY e.id DESC";

std::string recent_sql(const char* rest) { return "SELECT " + recent_columns() + " FROM recent WHERE " + rest; }

}  // namespace

PointRows Reader::rows(PointId point, Instant from, Instant to) const {
    const SQLite::Transaction snapshot(connection_->database);
    PointRowsBuilder builder(ms_of(from), ms_of(to), connection_->blocks.count(point, ms_of(from), ms_of(to)));
    connection_->blocks.each(point, ms_of(from), ms_of(to), [&](const HourCells& cells) { builder.add(cells); });

    std::int64_t moved_until = always;
    connection_->each(
        "SELECT moved_until FROM point WHERE id = ? AND moved_until IS NOT NULL",
        [&](SQLite::Statement& row) { ColumnReader(row) >> moved_until; }, point);
    RecentRow stored;
    if (moved_until < ms_of(to))
        connection_->each(
            recent_sql("time >= ? AND time < ? AND point = ? ORDER BY time"),
            [&](SQLite::Statement& row) {
                read_recent_row(row, stored);
                builder.add(stored);
            },
            std::max(moved_until, ms_of(from)), to, point);
    settle(builder, point, from, to);
    return builder.finish();
}

Settlement Reader::settlement_of(PointId point) const {
    Settlement settlement;
    connection_->each("SELECT f.id, c.id FROM feed f JOIN feed c ON c.name = f.corrects", [&](SQLite::Statement& row) {
        std::uint16_t feed = 0;
        ColumnReader(row) >> feed >> settlement.corrections[feed];
    });
    connection_->each(
        believed_sql,
        [&](SQLite::Statement& row) {
            Believed& word = settlement.believed.emplace_back();
            std::string quantity;
            ColumnReader(row) >> word.from >> word.to >> quantity >> word.feed;
            if (const auto known = analytics::quantity_named(quantity)) word.quantity = analytics::index_of(*known);
        },
        point);
    return settlement;
}

void Reader::each_settled(PointId point, Instant from, Instant to, const Settled& settled) const {
    const Settlement settlement = settlement_of(point);
    if (settlement.empty()) return;
    std::vector<DisputedValue> cell;
    const auto close = [&] {
        if (const auto value = settled_value(cell, settlement)) settled(cell.front().time, cell.front().quantity, *value);
        cell.clear();
    };
    connection_->each(
        "SELECT time, quantity, value, feed FROM dispute WHERE point = ? AND time >= ? AND time < ? "
        "ORDER BY time, quantity, value",
        [&](SQLite::Statement& row) {
            DisputedValue value;
            ColumnReader(row) >> value.time >> value.quantity >> value.value >> value.feed;
            if (!cell.empty() && (cell.front().time != value.time || cell.front().quantity != value.quantity)) close();
            cell.push_back(value);
        },
        point, from, to);
    close();
}

void Reader::settle(PointRowsBuilder& builder, PointId point, Instant from, Instant to) const {
    each_settled(point, from, to, [&](std::int64_t time, std::size_t quantity, double value) {
        builder.settle(time, quantity, value);
    });
}

std::map<PointId, PointRows> Reader::filling(Instant from, Instant to) const {
    const SQLite::Transaction snapshot(connection_->database);
    std::map<PointId, std::int64_t> moved;
    connection_->each("SELECT id, moved_until FROM point WHERE moved_until IS NOT NULL", [&](SQLite::Statement& row) {
        PointId point{};
        ColumnReader(row) >> point >> moved[point];
    });
    std::map<PointId, PointRowsBuilder> builders;
    RecentRow stored;
    connection_->each(
        recent_sql("time >= ? AND time < ? ORDER BY time"),
        [&](SQLite::Statement& row) {
            read_recent_row(row, stored);
            const auto until = moved.find(stored.point);
            if (until != moved.end() && stored.time < until->second) return;
            builders.try_emplace(stored.point, ms_of(from), ms_of(to), 0).first->second.add(stored);
        },
        from, to);
    std::map<PointId, PointRows> rows;
    for (auto& [point, builder] : builders) {
        settle(builder, point, from, to);
        rows.emplace(point, builder.finish());
    }
    return rows;
}

// Backwards from the newest reading the point can have: the first row met is the last.
PointRows Reader::last_row(PointId point) const {
    std::optional<Instant> last;
    const auto take = [&](SQLite::Statement& row) { ColumnReader(row) >> last; };
    {
        const SQLite::Transaction snapshot(connection_->database);
        connection_->each(
            "SELECT time FROM recent WHERE point = ?1 AND time >= (SELECT coalesce(moved_until, -1 << 62) FROM point "
            "WHERE id = ?1) AND time <= (SELECT max(newest) FROM pump_state) ORDER BY time DESC LIMIT 1",
            take, point);
        if (!last) {
            std::optional<Instant> hour;
            connection_->each(
                "SELECT hour FROM hour_block WHERE point = ? ORDER BY hour DESC LIMIT 1",
                [&](SQLite::Statement& row) { ColumnReader(row) >> hour; }, point);
            if (hour)
                connection_->blocks.each(point, ms_of(*hour), ms_of(*hour) + 1, [&](const HourCells& cells) {
                    last = *hour + std::chrono::milliseconds(cells.offsets().back());
                });
        }
    }
    return last ? rows(point, *last, *last + std::chrono::milliseconds(1)) : PointRows{};
}

StoredCount Reader::count(PointId point) const {
    const SQLite::Transaction snapshot(connection_->database);
    StoredCount count;
    connection_->each(
        "SELECT block_readings, block_disputed FROM point WHERE id = ?",
        [&](SQLite::Statement& row) { ColumnReader(row) >> count.readings >> count.disputed; }, point);
    RecentRow stored;
    connection_->each(
        recent_sql("point = ?1 AND time >= (SELECT coalesce(moved_until, -1 << 62) FROM point WHERE id = ?1)"),
        [&](SQLite::Statement& row) {
            read_recent_row(row, stored);
            for (const Cell& cell : stored.cells) {
                if (cell.disputed) ++count.disputed;
                if (cell.disputed || !std::isnan(cell.value)) ++count.readings;
            }
        },
        point);
    each_settled(point, Instant::min(), Instant::max(), [&](auto...) { --count.disputed; });
    return count;
}

std::optional<Instant> Reader::instant(const std::string& sql, std::int64_t id) const {
    std::optional<Instant> found;
    connection_->each(sql, [&](SQLite::Statement& row) { ColumnReader(row) >> found; }, id);
    return found;
}

std::optional<Instant> Reader::newest(PumpId pump) const {
    return instant("SELECT newest FROM pump_state WHERE pump = ?", static_cast<std::int64_t>(pump));
}

std::optional<Instant> Reader::oldest(PumpId pump) const {
    return instant("SELECT oldest FROM pump_state WHERE pump = ?", static_cast<std::int64_t>(pump));
}

std::optional<Instant> Reader::closed_until(PumpId pump) const {
    return instant("SELECT closed_until FROM pump_state WHERE pump = ?", static_cast<std::int64_t>(pump));
}

std::optional<Instant> Reader::newest_of_plant() const {
    return instant("SELECT max(newest) FROM pump_state WHERE pump > ?", 0);
}

std::vector<Mark> Reader::marks() const {
    std::vector<Mark> marks;
    connection_->each(
        "SELECT pump, mark_from, mark_to, generation FROM pump_state WHERE mark_from IS NOT NULL ORDER BY generation",
        [&](SQLite::Statement& row) {
            Mark& mark = marks.emplace_back();
            ColumnReader(row) >> mark.pump >> mark.from >> mark.to >> mark.generation;
        });
    return marks;
}

}  // namespace slipledger::ledger
