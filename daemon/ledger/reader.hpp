// The reading side: a read-only connection of its own with the questions that analyst, reports and exports ask. No
// transaction outlives a call.
#pragma once

#include <array>
#include <functional>
#include <map>
#include <memory>
#include <optional>
#include <string>
#include <string_view>
#include <vector>

#include "analytics/operating_point.hpp"
#include "daemon/ledger/directory.hpp"
#include "daemon/ledger/records.hpp"

namespace slipledger::ledger {

class PointRowsBuilder;
struct Settlement;

// Readings of one point: ascending times, one column per quantity that occurs, NaN where a cell is empty or disputed.
struct PointRows {
    std::vector<Instant> times;
    std::array<std::vector<double>, analytics::quantity_count> columns;  // empty: quantity does not occur
};

struct StoredCount {
    std::uint64_t readings = 0;  // cells with a value, disputed ones included
    std::uint64_t disputed = 0;  // cells with several of which none is believed
};

struct FeedState {
    std::string feed;
    std::uint64_t refused = 0;
    std::map<std::string, std::uint64_t> refused_by_code;
};

struct DeliveryCount {
    std::string target;
    std::uint64_t pending = 0;
    std::uint64_t failed = 0;
    std::string last_error;
};

// Threads: one at a time; each thread opens its own.
class Reader {
public:
    explicit Reader(const std::string& path);  // LedgerFailure: no such ledger, newer schema, not readable
    ~Reader();
    Reader(Reader&&) noexcept;
    Reader& operator=(Reader&&) noexcept;

    Directory directory() const;

    // Readings of [from, to), blocks and recent together.
    PointRows rows(PointId point, Instant from, Instant to) const;
    std::optional<Instant> newest(PumpId pump) const;        // newest reading of the pump
    std::optional<Instant> oldest(PumpId pump) const;
    std::optional<Instant> newest_of_plant() const;
    PointRows last_row(PointId point) const;                 // at most one row
    StoredCount count(PointId point) const;
    // Readings of [from, to) of all points whose hours still fill, in one pass: `recent` is ordered by time, so that asking
    // point by point reads it as often as there are points. What has been moved to blocks is not in it.
    std::map<PointId, PointRows> filling(Instant from, Instant to) const;
    std::optional<Instant> closed_until(PumpId pump) const;  // summaries that end here or before are closed

    std::vector<Mark> marks() const;                         // all raised, oldest generation first
    // Newest checkpoint of the track for a finished day before `date`.
    std::optional<CheckpointRecord> checkpoint_before(TrackId track, std::int32_t date) const;
    std::vector<DayFactsRecord> day_facts(PumpId pump, std::int32_t from_date, std::int32_t to_date) const;

    std::vector<SummaryRecord> summaries(TrackId track, Instant from, Instant to) const;
    std::vector<DayRecord> days(TrackId track, std::int32_t from_date, std::int32_t to_date) const;
    std::optional<DayRecord> last_day(TrackId track) const;
    std::optional<DayRecord> last_day_of_life(TrackId track, std::int32_t life, std::int32_t before_date) const;  // finished
    std::optional<LifePriorRecord> life_prior(TrackId track, std::int32_t life) const;
    std::vector<LifePriorRecord> life_priors_after(std::int32_t date) const;  // of lives that began after that day
    std::array<std::uint64_t, analytics::standing_count> standing_counts(TrackId track, std::int32_t life) const;
    std::vector<analytics::AlarmChange> alarm_changes(TrackId track) const;                 // ascending by `at`
    std::vector<analytics::AlarmChange> alarm_changes_before(TrackId track, Instant at) const;
    bool has_notice(std::string_view id) const;
    std::vector<Notice> notices(std::string_view pump) const;  // empty pump: all; in order told

    // Ascending by `at`, then id: the pump's, and those told of a reservoir or the plant; empty pump: all.
    std::vector<Event> events(std::string_view pump) const;
    std::vector<OutboxRow> due(std::string_view target, Instant now, std::size_t most) const;  // pending; order kept per pump
    std::vector<DeliveryCount> deliveries() const;
    std::vector<FeedState> feeds() const;
    std::vector<RefusedRow> refused(std::string_view feed, std::size_t most) const;  // newest first
    std::optional<Receipt> receipt(std::string_view sha256) const;

private:
    struct Connection;

    // A disputed cell and its believed value.
    using Settled = std::function<void(std::int64_t time, std::size_t quantity, double value)>;

    Settlement settlement_of(PointId point) const;
    void each_settled(PointId point, Instant from, Instant to, const Settled& settled) const;
    void settle(PointRowsBuilder& builder, PointId point, Instant from, Instant to) const;
    std::optional<Instant> instant(const std::string& sql, std::int64_t id) const;

    std::unique_ptr<Connection> connection_;
};

}  // namespace slipledger::ledger
