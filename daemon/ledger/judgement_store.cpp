#include "daemon/ledger/judgement_store.hpp"

#include <chrono>
#include <vector>

#include "daemon/ledger/judgement_rows.hpp"
#include "daemon/ledger/statement.hpp"

namespace slipledger::ledger {
namespace {

constexpr std::size_t newest_checkpoints = 3;  // late data mostly come within days; older ones are kept one a month

std::chrono::year_month month_of(std::int32_t date) {
    const std::chrono::year_month_day day{std::chrono::sys_days(std::chrono::days(date))};
    return day.year() / day.month();
}

}  // namespace

JudgementStore::JudgementStore(SQLite::Database& database)
    : delete_summaries_(database, "DELETE FROM hour_summary WHERE track = ? AND start >= ?"),
      delete_days_(database, "DELETE FROM day WHERE track = ? AND date >= ?"),
      delete_checkpoints_(database, "DELETE FROM checkpoint WHERE track = ? AND date >= ?"),
      delete_changes_(database, "DELETE FROM alarm_change WHERE track = ? AND at >= ?"),
      delete_priors_(database, "DELETE FROM life_prior WHERE track = ? AND date >= ?"),
      summary_(database, insert_summary_sql()),
      moments_(database, insert_moments_sql()),
      day_(database, insert_day_sql()),
      day_facts_(database, insert_day_facts_sql()),
      change_(database, insert_alarm_change_sql()),
      prior_(database, insert_life_prior_sql()),
      checkpoint_(database, "INSERT INTO checkpoint (track, date, state) VALUES (?, ?, ?)"),
      checkpoint_dates_(database, "SELECT date FROM checkpoint WHERE track = ? ORDER BY date"),
      delete_checkpoint_(database, "DELETE FROM checkpoint WHERE track = ? AND date = ?") {}

void JudgementStore::remove_from(const TrackResult& result) {
    for (SQLite::Statement* statement : {&delete_summaries_, &delete_changes_}) {
        Binder(*statement) << result.track << result.from;
        run(*statement);
    }
    for (SQLite::Statement* statement : {&delete_days_, &delete_checkpoints_, &delete_priors_}) {
        Binder(*statement) << result.track << result.from_date;
        run(*statement);
    }
}

void JudgementStore::store(const TrackResult& result) {
    remove_from(result);
    for (const SummaryRecord& record : result.summaries) {
        write_summary(summary_, result.track, record);
        for (std::size_t regime = 0; regime < analytics::judged_regimes; ++regime) {
            const analytics::Moments& moments = record.summary.judged[regime];
            if (moments.count > 0) write_moments(moments_, result.track, record.summary.start, regime, moments);
        }
    }
    for (const DayRecord& record : result.days) write_day(day_, result.track, record);
    for (const analytics::AlarmChange& change : result.alarm_changes) write_alarm_change(change_, result.track, change);
    for (const LifePriorRecord& record : result.life_priors) write_life_prior(prior_, record);
    for (const CheckpointRecord& record : result.checkpoints) {
        Binder(checkpoint_) << result.track << record.date;
        checkpoint_.bindNoCopy(3, record.state.data(), static_cast<int>(record.state.size()));
        run(checkpoint_);
    }
    if (!result.checkpoints.empty()) keep_few_checkpoints(result.track);
}

void JudgementStore::keep_few_checkpoints(TrackId track) {
    std::vector<std::int32_t> dates;
    Binder(checkpoint_dates_) << track;
    while (checkpoint_dates_.executeStep()) dates.push_back(checkpoint_dates_.getColumn(0).getInt());
    checkpoint_dates_.reset();
    for (std::size_t i = 1; i + newest_checkpoints < dates.size(); ++i) {
        if (month_of(dates[i]) != month_of(dates[i - 1])) continue;  // the first of its month
        Binder(delete_checkpoint_) << track << dates[i];
        run(delete_checkpoint_);
    }
}

void JudgementStore::store(PumpId pump, const DayFactsRecord& record) { write_day_facts(day_facts_, pump, record); }

}  // namespace slipledger::ledger
