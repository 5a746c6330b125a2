#include "daemon/ledger/reading_store.hpp"

#include <algorithm>

#include "daemon/ledger/statement.hpp"

namespace slipledger::ledger {
namespace {

constexpr std::size_t bulk_rows = 512;  // so many rows of hours that close at once are worth going straight to blocks
constexpr std::size_t points_a_move = 64;  // at a reading a second, 64 hours of cells are about 10 MB
constexpr std::size_t crowded_rows = 60'000;  // in `recent`: from here on it is moved every few minutes of data time
constexpr std::int64_t crowded_slice_ms = 600'000;
// A little more than comes in is deleted, so that an hour's end does not burst upon the disk (SQLite writes the pages it
// empties), and a few thousand rows at a time, so that no page is written twice.
constexpr std::size_t ghosts_at_once = 4'000;
constexpr std::int64_t laggard_ms = 3 * hour_ms;  // a point so far behind the plant does not hold up deletion

std::int64_t time_of(const Row& row) { return ms_of(row.time); }

}  // namespace

ReadingStore::ReadingStore(SQLite::Database& database, const Directory& directory, WorkMarks& marks,
                           std::chrono::milliseconds lateness)
    : database_(database),
      directory_(directory),
      marks_(marks),
      lateness_ms_(lateness.count()),
      recent_(database),
      blocks_(database),
      disputes_(database),
      watermark_(database, "UPDATE point SET moved_until = ? WHERE id = ?") {
    load();
}

void ReadingStore::load() {
    points_.clear();
    SQLite::Statement rows(database_, "SELECT id, kind IN ('pump', 'section'), moved_until FROM point");
    while (rows.executeStep()) {
        PointId id{};
        std::optional<Instant> moved;
        Point point;
        ColumnReader(rows) >> id >> point.own >> moved;
        if (moved) point.moved_until = ms_of(*moved);
        if (const auto pumps = directory_.pumps_of_point.find(id); pumps != directory_.pumps_of_point.end())
            point.pumps = pumps->second;
        points_.emplace(id, std::move(point));
    }
    recent_rows_ = 0;
    for (const auto& extent : recent_.extents()) {
        recent_rows_ += extent.rows;
        points_.at(extent.point).recent_from = extent.first;
        points_.at(extent.point).recent_to = extent.last;
    }
    const SQLite::Column first = database_.execAndGet("SELECT min(time) FROM recent");
    ghosts_from_ = first.isNull() ? never : first.getInt64();
}

std::vector<ReadingStore::PointRowsNow> ReadingStore::sort_by_point(std::span<const Row* const> rows) {
    std::vector<PointRowsNow> touched;
    Point* point = nullptr;
    PointId id{};
    for (std::uint32_t i = 0; i < rows.size(); ++i) {
        if (point == nullptr || rows[i]->point != id) {
            id = rows[i]->point;
            point = &points_.at(id);
        }
        if (point->rows.empty()) touched.push_back({id, point});
        point->rows.push_back(i);
    }
    const auto earlier = [&](std::uint32_t a, std::uint32_t b) { return rows[a]->time < rows[b]->time; };
    for (const PointRowsNow& at : touched)
        if (!std::ranges::is_sorted(at.point->rows, earlier)) std::ranges::stable_sort(at.point->rows, earlier);
    return touched;
}

std::int64_t ReadingStore::slice() const { return recent_rows_ > crowded_rows ? crowded_slice_ms : hour_ms; }

std::int64_t ReadingStore::boundary_now(const Point& point) const {
    const bool own = point.own && !point.pumps.empty();
    const auto newest = own ? marks_.state(point.pumps.front()).newest : marks_.newest_of_plant();
    return newest ? floor_to(*newest - lateness_ms_, slice()) : always;
}

// As they will stand when these rows are stored: whether a row is new or repeated, its time counts.
void ReadingStore::set_boundaries(std::span<const Row* const> rows, std::span<const PointRowsNow> points) {
    std::map<PumpId, std::int64_t> newest;
    std::int64_t plant = marks_.newest_of_plant().value_or(always);
    for (const PointRowsNow& at : points) {
        if (!at.point->own || at.point->pumps.empty()) continue;
        const std::int64_t last = time_of(*rows[at.point->rows.back()]);
        std::int64_t& reached = newest.try_emplace(at.point->pumps.front(), last).first->second;
        reached = std::max(reached, last);
        plant = std::max(plant, last);
    }
    for (const PointRowsNow& at : points) {
        at.point->boundary = boundary_now(*at.point);
        const bool own = at.point->own && !at.point->pumps.empty();
        const std::int64_t reached = own ? newest.at(at.point->pumps.front()) : plant;
        if (reached != always)
            at.point->boundary = std::max(at.point->boundary, floor_to(reached - lateness_ms_, slice()));
    }
}

bool ReadingStore::goes_straight(std::span<const Row* const> rows, std::span<const PointRowsNow> points) const {
    std::size_t closing = 0;
    for (const PointRowsNow& at : points)
        for (const std::uint32_t i : at.point->rows) {
            const std::int64_t time = time_of(*rows[i]);
            if (time >= at.point->boundary) break;
            if (time >= at.point->moved_until) ++closing;
        }
    return closing >= bulk_rows;
}

std::vector<Change> ReadingStore::store(std::span<const Row* const> rows) {
    std::vector<Change> changes(rows.size(), Change::none);
    const auto points = sort_by_point(rows);
    set_boundaries(rows, points);
    if (goes_straight(rows, points)) {
        std::vector<PointId> closing;
        for (const PointRowsNow& at : points)
            if (at.point->boundary > at.point->moved_until) closing.push_back(at.id);
        move(closing);
    }
    for (const PointRowsNow& at : points) {
        store_point(rows, at, changes);
        at.point->rows.clear();
    }
    delete_ghosts(rows.size() + rows.size() / 4);
    return changes;
}

void ReadingStore::store_point(std::span<const Row* const> rows, const PointRowsNow& at, std::span<Change> changes) {
    Point& point = *at.point;
    std::vector<const Row*> told;
    for (const std::uint32_t i : point.rows) told.push_back(rows[i]);
    std::vector<Change> made(told.size(), Change::none);
    std::size_t i = 0;
    while (i < told.size() && time_of(*told[i]) < point.moved_until) {
        const std::int64_t hour = floor_to(time_of(*told[i]), hour_ms);
        std::size_t end = i;
        while (end < told.size() && time_of(*told[end]) < hour + hour_ms) ++end;
        store_hour(at.id, hour, std::span(told).subspan(i, end - i), std::span(made).subspan(i, end - i));
        i = end;
    }
    const AddDisputed add = disputes_.adder(at.id);
    for (; i < told.size(); ++i) {
        made[i] = recent_.enter(*told[i], add);
        if (made[i] == Change::added) ++recent_rows_;
        point.recent_from = std::min(point.recent_from, time_of(*told[i]));
        point.recent_to = std::max(point.recent_to, time_of(*told[i]));
    }
    touch(point, told, made);
    for (std::size_t k = 0; k < made.size(); ++k) changes[point.rows[k]] = made[k];
}

void ReadingStore::store_hour(PointId id, std::int64_t hour, std::span<const Row* const> rows,
                              std::span<Change> changes) {
    cells_.clear(hour);
    const BlockAt block = blocks_.load(id, cells_);
    if (cells_.merge(rows, changes, disputes_.adder(id)) != Change::none) blocks_.save(id, block, cells_);
}

void ReadingStore::touch(const Point& point, std::span<const Row* const> rows, std::span<const Change> changes) {
    for (std::size_t i = 0; i < rows.size(); ++i) {
        if (changes[i] == Change::none) continue;
        const std::int64_t time = time_of(*rows[i]);
        for (const PumpId pump : point.pumps) marks_.touch(pump, {time, time}, point.own);
    }
}

void ReadingStore::set_watermark(PointId id, std::int64_t moved_until) {
    points_.at(id).moved_until = moved_until;
    Binder(watermark_) << moved_until << id;
    run(watermark_);
}

// Where the watermark stood within this hour, its block has begun already.
void ReadingStore::save_moved(PointId id, HourCells& cells) {
    if (cells.empty()) return;
    recent_rows_ -= std::min(recent_rows_, cells.offsets().size());
    if (points_.at(id).moved_until <= cells.hour()) return blocks_.save(id, {}, cells);
    moved_.clear(cells.hour());
    const BlockAt block = blocks_.load(id, moved_);
    moved_.merge(cells, disputes_.adder(id));
    blocks_.save(id, block, moved_);
}

// Brings the points' watermarks up to their boundaries.
void ReadingStore::move(std::span<const PointId> ids) {
    std::int64_t from = never;
    std::int64_t to = always;
    std::map<PointId, HourCells> open;
    for (const PointId id : ids) {
        const Point& point = points_.at(id);
        if (point.recent_from >= point.boundary || point.moved_until >= point.boundary) continue;
        from = std::min(from, std::max(point.recent_from, point.moved_until));
        to = std::max(to, point.boundary);
        open.emplace(id, HourCells(always));
    }
    const auto wanted = [&](PointId id) { return open.contains(id); };
    if (!open.empty()) recent_.scan(from, to, wanted, [&](const RecentRow& row) {
        const Point& point = points_.at(row.point);
        if (row.time < point.moved_until || row.time >= point.boundary) return;
        HourCells& cells = open.at(row.point);
        const std::int64_t hour = floor_to(row.time, hour_ms);
        if (cells.hour() != hour) {
            save_moved(row.point, cells);
            cells.clear(hour);
        }
        cells.append(static_cast<std::int32_t>(row.time - hour), row.cells);
    });
    for (auto& [id, cells] : open) save_moved(id, cells);
    for (const PointId id : ids) {
        Point& point = points_.at(id);
        if (point.moved_until >= point.boundary) continue;
        if (point.recent_from < point.boundary) {
            ghosts_from_ = std::min(ghosts_from_, point.recent_from);
            point.recent_from = point.recent_to >= point.boundary ? point.boundary : never;
        }
        set_watermark(id, point.boundary);
    }
}

// Up to where nothing but ghosts (and what laggards left) can be.
std::int64_t ReadingStore::ghosts_end() const {
    const std::int64_t plant = marks_.newest_of_plant().value_or(always);
    std::int64_t end = never;
    for (const auto& [id, point] : points_)
        if (point.recent_from != never && point.recent_to >= plant - laggard_ms) end = std::min(end, point.recent_from);
    return end;
}

bool ReadingStore::wants_move() const {
    return std::ranges::any_of(points_, [this](const auto& entry) {
        return entry.second.recent_from < boundary_now(entry.second);
    });
}

void ReadingStore::move_step() {
    std::vector<PointId> closing;
    for (auto& [id, point] : points_) {
        point.boundary = boundary_now(point);
        if (point.recent_from < point.boundary && closing.size() < points_a_move) closing.push_back(id);
    }
    move(closing);
}

void ReadingStore::delete_ghosts(std::size_t allowed) {
    ghosts_allowed_ += allowed;
    const std::int64_t end = ghosts_end();
    if (ghosts_allowed_ < ghosts_at_once || ghosts_from_ >= end) return;
    const std::int64_t reached = recent_.delete_ghosts(ghosts_from_, end, ghosts_allowed_);
    ghosts_from_ = reached >= end ? never : reached;
    ghosts_allowed_ = 0;
}

}  // namespace slipledger::ledger
