// Summaries, day verdicts, facts and alarm changes as rows: which field stands in which column, said once for writing and
// once for reading, side by side, so that a field added to one is missed in the other by no test.
#pragma once

#include <SQLiteCpp/SQLiteCpp.h>

#include <string>

#include "daemon/ledger/records.hpp"

namespace slipledger::ledger {

// "INSERT INTO table (columns) VALUES (?, ...)" for the columns that write_* binds after `key_columns`.
std::string insert_summary_sql();
std::string insert_moments_sql();
std::string insert_day_sql();
std::string insert_day_facts_sql();
std::string insert_alarm_change_sql();
std::string insert_life_prior_sql();

// "SELECT columns FROM table" to go on with WHERE; read_* reads them.
std::string select_summary_sql();
std::string select_moments_sql();
std::string select_day_sql();
std::string select_day_facts_sql();
std::string select_alarm_change_sql();
std::string select_life_prior_sql();

void write_summary(SQLite::Statement& statement, TrackId track, const SummaryRecord& record);
void write_moments(SQLite::Statement& statement, TrackId track, Instant start, std::size_t regime,
                   const analytics::Moments& moments);
void write_day(SQLite::Statement& statement, TrackId track, const DayRecord& record);
void write_day_facts(SQLite::Statement& statement, PumpId pump, const DayFactsRecord& record);
void write_alarm_change(SQLite::Statement& statement, TrackId track, const analytics::AlarmChange& change);

void write_life_prior(SQLite::Statement& statement, const LifePriorRecord& record);

SummaryRecord read_summary(SQLite::Statement& statement);  // its basis and moments are the caller's
// One row of moments: whose it is, and into which place of the two it goes.
struct MomentsRow {
    Instant start;
    std::size_t regime = 0;
    analytics::Moments moments;
};
MomentsRow read_moments(SQLite::Statement& statement);
DayRecord read_day(SQLite::Statement& statement);
DayFactsRecord read_day_facts(SQLite::Statement& statement);
analytics::AlarmChange read_alarm_change(SQLite::Statement& statement);
LifePriorRecord read_life_prior(SQLite::Statement& statement);

}  // namespace slipledger::ledger
