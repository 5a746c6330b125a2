// Reader's answers about what the analyst found.

#include "daemon/ledger/judgement_rows.hpp"
#include "daemon/ledger/reader_connection.hpp"

namespace slipledger::ledger {
namespace {

std::string counts_sql() {
    std::string sums;
    for (const std::string_view name : analytics::standing_names) {
        std::string column(name);
        for (char& letter : column)
            if (letter == '-') letter = '_';
        sums += (sums.empty() ? "coalesce(sum(" : ", coalesce(sum(") + column + "), 0)";
    }
    return "SELECT " + sums + " FROM hour_summary WHERE track = ? AND life = ?";
}

}  // namespace

std::optional<CheckpointRecord> Reader::checkpoint_before(TrackId track, std::int32_t date) const {
    std::optional<CheckpointRecord> found;
    connection_->each(
        "SELECT date, state FROM checkpoint WHERE track = ? AND date < ? ORDER BY date DESC LIMIT 1",
        [&](SQLite::Statement& row) {
            const SQLite::Column state = row.getColumn(1);
            const auto* bytes = static_cast<const std::byte*>(state.getBlob());
            found = CheckpointRecord{.date = row.getColumn(0).getInt(), .state = {bytes, bytes + state.getBytes()}};
        },
        track, date);
    return found;
}

std::vector<DayFactsRecord> Reader::day_facts(PumpId pump, std::int32_t from_date, std::int32_t to_date) const {
    std::vector<DayFactsRecord> records;
    connection_->each(
        select_day_facts_sql() + "WHERE pump = ? AND date >= ? AND date < ? ORDER BY section, date",
        [&](SQLite::Statement& row) { records.push_back(read_day_facts(row)); }, pump, from_date, to_date);
    return records;
}

std::vector<SummaryRecord> Reader::summaries(TrackId track, Instant from, Instant to) const {
    const SQLite::Transaction snapshot(connection_->database);
    auto basis = analytics::Basis::case_drain;
    connection_->each(
        "SELECT basis = 'delivery' FROM track WHERE id = ?",
        [&](SQLite::Statement& row) { ColumnReader(row) >> basis; }, track);
    std::vector<SummaryRecord> records;
    const std::string span = "WHERE track = ? AND start >= ? AND start < ? ORDER BY start";
    connection_->each(
        select_summary_sql() + span,
        [&](SQLite::Statement& row) {
            records.push_back(read_summary(row));
            records.back().summary.basis = basis;
        },
        track, from, to);
    std::size_t at = 0;
    connection_->each(
        select_moments_sql() + span,
        [&](SQLite::Statement& row) {
            const MomentsRow moments = read_moments(row);
            while (records[at].summary.start < moments.start) ++at;
            records[at].summary.judged.at(moments.regime) = moments.moments;
        },
        track, from, to);
    return records;
}

std::vector<DayRecord> Reader::days(TrackId track, std::int32_t from_date, std::int32_t to_date) const {
    std::vector<DayRecord> records;
    connection_->each(
        select_day_sql() + "WHERE track = ? AND date >= ? AND date < ? ORDER BY date",
        [&](SQLite::Statement& row) { records.push_back(read_day(row)); }, track, from_date, to_date);
    return records;
}

std::optional<DayRecord> Reader::last_day(TrackId track) const {
    std::optional<DayRecord> last;
    connection_->each(
        select_day_sql() + "WHERE track = ? ORDER BY date DESC LIMIT 1",
        [&](SQLite::Statement& row) { last = read_day(row); }, track);
    return last;
}

std::optional<DayRecord> Reader::last_day_of_life(TrackId track, std::int32_t life, std::int32_t before_date) const {
    std::optional<DayRecord> last;
    connection_->each(
        select_day_sql() + "WHERE track = ? AND life = ? AND date < ? AND finished = 1 ORDER BY date DESC LIMIT 1",
        [&](SQLite::Statement& row) { last = read_day(row); }, track, life, before_date);
    return last;
}

std::optional<LifePriorRecord> Reader::life_prior(TrackId track, std::int32_t life) const {
    std::optional<LifePriorRecord> found;
    connection_->each(
        select_life_prior_sql() + "WHERE track = ? AND life = ?",
        [&](SQLite::Statement& row) { found = read_life_prior(row); }, track, life);
    return found;
}

std::vector<LifePriorRecord> Reader::life_priors_after(std::int32_t date) const {
    std::vector<LifePriorRecord> priors;
    connection_->each(
        select_life_prior_sql() + "WHERE date > ? ORDER BY track, life",
        [&](SQLite::Statement& row) { priors.push_back(read_life_prior(row)); }, date);
    return priors;
}

std::array<std::uint64_t, analytics::standing_count> Reader::standing_counts(TrackId track, std::int32_t life) const {
    static const std::string sql = counts_sql();
    std::array<std::uint64_t, analytics::standing_count> counts{};
    connection_->each(
        sql,
        [&](SQLite::Statement& row) {
            ColumnReader reader(row);
            for (std::uint64_t& count : counts) reader >> count;
        },
        track, life);
    return counts;
}

std::vector<analytics::AlarmChange> Reader::alarm_changes(TrackId track) const {
    return alarm_changes_before(track, Instant::max());
}

std::vector<analytics::AlarmChange> Reader::alarm_changes_before(TrackId track, Instant at) const {
    std::vector<analytics::AlarmChange> changes;
    connection_->each(
        select_alarm_change_sql() + "WHERE track = ? AND at < ? ORDER BY at, id",
        [&](SQLite::Statement& row) { changes.push_back(read_alarm_change(row)); }, track, at);
    return changes;
}

}  // namespace slipledger::ledger
