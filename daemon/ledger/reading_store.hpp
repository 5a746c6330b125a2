// Where a reading goes: into `recent` while its hour fills, into its hour's block once that has been moved, or, where a bulk
// load brings an hour that closes within the same commit, straight into a block. Each point has a watermark: below it all
// is in blocks, above it all is in `recent`. Where `recent` is crowded (a reading a second) the watermark moves in smaller
// steps than an hour, so that no step takes long. None of this can be seen from outside; rows() gives both together.
#pragma once

#include <SQLiteCpp/SQLiteCpp.h>

#include <chrono>
#include <limits>
#include <map>
#include <span>
#include <vector>

#include "daemon/ledger/block_table.hpp"
#include "daemon/ledger/directory.hpp"
#include "daemon/ledger/dispute_table.hpp"
#include "daemon/ledger/recent_table.hpp"
#include "daemon/ledger/records.hpp"
#include "daemon/ledger/work_marks.hpp"

namespace slipledger::ledger {

// Threads: one at a time, within the caller's transaction.
class ReadingStore {
public:
    ReadingStore(SQLite::Database& database, const Directory& directory, WorkMarks& marks,
                 std::chrono::milliseconds lateness);

    void load();  // also after a rollback

    // Stores the rows; one Change per row, in order. Touches the marks.
    std::vector<Change> store(std::span<const Row* const> rows);

    // Whether move_step() has something to do; cheap.
    bool wants_move() const;
    // Moves some points' closed hours into blocks.
    void move_step();

private:
    static constexpr std::int64_t never = std::numeric_limits<std::int64_t>::max();
    static constexpr std::int64_t always = std::numeric_limits<std::int64_t>::min();

    struct Point {
        std::vector<PumpId> pumps;      // whose judgement a reading here touches
        bool own = false;               // of one pump itself: can close its hours
        std::int64_t moved_until = always;
        std::int64_t recent_from = never;  // no row of this point in `recent` is older (but for ghosts)
        std::int64_t recent_to = always;
        std::vector<std::uint32_t> rows;   // of the present call
        std::int64_t boundary = always;    // hours before it are closed, the present call included
    };

    // Rows of one point in time order, told order kept among equal times.
    struct PointRowsNow {
        PointId id{};
        Point* point = nullptr;
    };

    std::vector<PointRowsNow> sort_by_point(std::span<const Row* const> rows);
    void set_boundaries(std::span<const Row* const> rows, std::span<const PointRowsNow> points);
    std::int64_t boundary_now(const Point& point) const;
    std::int64_t slice() const;
    bool goes_straight(std::span<const Row* const> rows, std::span<const PointRowsNow> points) const;
    void move(std::span<const PointId> points);
    void save_moved(PointId id, HourCells& cells);
    void set_watermark(PointId id, std::int64_t moved_until);
    void store_point(std::span<const Row* const> rows, const PointRowsNow& at, std::span<Change> changes);
    void store_hour(PointId id, std::int64_t hour, std::span<const Row* const> rows, std::span<Change> changes);
    void touch(const Point& point, std::span<const Row* const> rows, std::span<const Change> changes);
    std::int64_t ghosts_end() const;
    void delete_ghosts(std::size_t allowed);

    SQLite::Database& database_;
    const Directory& directory_;
    WorkMarks& marks_;
    std::int64_t lateness_ms_;
    std::map<PointId, Point> points_;
    RecentTable recent_;
    BlockTable blocks_;
    DisputeTable disputes_;
    SQLite::Statement watermark_;
    HourCells cells_{0};
    HourCells moved_{0};
    std::int64_t ghosts_from_ = never;
    std::size_t ghosts_allowed_ = 0;
    std::size_t recent_rows_ = 0;  // about: rows in `recent` that are no ghosts
};

}  // namespace slipledger::ledger
