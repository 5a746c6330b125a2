#include "daemon/ledger/judgement_rows.hpp"

#include <algorithm>

#include "daemon/ledger/cause_text.hpp"
#include "daemon/ledger/statement.hpp"

namespace slipledger::ledger {
namespace {

// Column lists; the `*_fields` below go through the same order.
constexpr const char* summary_columns =
    "track, start, length_ms, date, life, full_flow, compensating, stopped, below_minimum_speed, cold, "
    "thin, transient, part_stroke, relieving, motoring, variable_speed, no_pressure, no_speed, "
    "no_temperature, below_least_flow, impossible, running_h, judged_h, stop_count, stop_flow_lpm, "
    "drain_share, highest_temperature_c, highest_case_bar, lowest_inlet_bar, mean_pressure_bar, level, "
    "reason, leakage_ratio, leakage_ratio_low, leakage_ratio_high, filtered_ratio, filtered_ratio_low, "
    "filtered_ratio_high, efficiency, efficiency_low, efficiency_high, leakage_lpm, excess_lpm, "
    "leakage_kw, outside_coverage, mean_flow_lpm, mean_speed_rpm, mean_temperature_c, lowest_flow_lpm, "
    "highest_flow_lpm, lowest_pressure_bar, highest_pressure_bar, lowest_speed_rpm, highest_speed_rpm, "
    "lowest_running_c, highest_running_c";

constexpr const char* moments_columns =
    "track, start, regime, count, leakage_lpm, f1, f2, f3, cov_yy, cov_1y, cov_11, cov_2y, cov_21, "
    "cov_22, cov_3y, cov_31, cov_32, cov_33, standard_error_lpm, dp_bar, temperature_c, dp_variance, "
    "dp_temperature_covariance, temperature_variance, viscosity_cst, speed_rpm, delivery_lpm, "
    "theoretical_lpm";

constexpr const char* day_columns =
    "track, date, begin_time, end_time, finished, life, level, reason, leakage_ratio, leakage_ratio_low, "
    "leakage_ratio_high, efficiency, efficiency_low, efficiency_high, efficiency_baseline, "
    "efficiency_at_rated, clearance_growth_percent, leakage_lpm, excess_lpm, leakage_kw, "
    "trend_per_1000_h, trend_low, trend_high, trend_established, onset, hours_low, hours_mid, hours_high, "
    "hours_limit, step_ratio, cause, cause_weight, running_h, judged_h, life_running_h, life_judged_h, "
    "learning_h_left, share_judged_30d, slip_coefficient, zero_lpm, baseline, healthy_laminar, healthy_orifice, "
    "healthy_speed, healthy_sd, replacement_at, replacement_before, replacement_after, causes, duty_h_per_day, wear, "
    "drift, disturbance, wear_variance, wear_drift_covariance, drift_variance, wear_disturbance_covariance, "
    "drift_disturbance_covariance, disturbance_variance, wear_let_go, law_slowing, law_straight, law_speeding, law_racing";

constexpr const char* day_facts_columns =
    "pump, section, date, outlet_pressure_s, shaft_speed_s, case_drain_flow_s, fluid_temperature_s, "
    "delivery_flow_s, inlet_pressure_s, case_pressure_s, stroke_s, shaft_power_s, drain_temperature_s, "
    "running_s, hour_meter_s, particle_count_s, filter_dp_s, plateau_bar";

constexpr const char* alarm_change_columns = "track, at, began, life, rule, edge, level, value, \"limit\"";

constexpr const char* life_prior_columns = "track, life, date, begins, model, sisters";

std::string insert_sql(const char* table, const std::string& columns) {
    std::string marks = "?";
    for (const char letter : columns)
        if (letter == ',') marks += ", ?";
    return std::string("INSERT INTO ") + table + " (" + columns + ") VALUES (" + marks + ")";
}

std::string select_sql(const char* table, const char* columns) {
    return std::string("SELECT ") + columns + " FROM " + table + " ";
}

// `Io` is Binder or ColumnReader, `Record` const or not: one list for both directions.

template <typename Io, typename Ranged>
void ranged_fields(Io& io, Ranged& ranged) {
    io & ranged.value & ranged.low & ranged.high;
}

template <typename Io, typename Record>
void summary_fields(Io& io, Record& record) {
    auto& summary = record.summary;
    auto& verdict = record.verdict;
    io & summary.start & summary.length & record.date & summary.life;
    for (auto& count : summary.counts) io & count;
    io & summary.running_h & summary.judged_h & summary.stop_count & summary.stop_flow_lpm & summary.drain_share;
    io & summary.highest_temperature_c & summary.highest_case_bar & summary.lowest_inlet_bar;
    io & summary.mean_pressure_bar & verdict.level & verdict.reason;
    ranged_fields(io, verdict.leakage_ratio);
    ranged_fields(io, verdict.filtered_ratio);
    ranged_fields(io, verdict.efficiency);
    io & verdict.leakage_lpm & verdict.excess_lpm & verdict.leakage_kw & verdict.outside_coverage;
    io & summary.mean_flow_lpm & summary.mean_speed_rpm & summary.mean_temperature_c;
    for (auto* extent : {&summary.flow_lpm, &summary.pressure_bar, &summary.speed_rpm, &summary.temperature_c})
        io & extent->low & extent->high;
}

template <typename Io, typename Moments>
void moments_fields(Io& io, Moments& moments) {
    io & moments.count & moments.leakage_lpm;
    for (auto& mean : moments.feature) io & mean;
    for (auto& entry : moments.covariance) io & entry;
    io & moments.standard_error_lpm & moments.dp_bar & moments.temperature_c & moments.dp_variance;
    io & moments.dp_temperature_covariance & moments.temperature_variance & moments.viscosity_cst;
    io & moments.speed_rpm & moments.delivery_lpm & moments.theoretical_lpm;
}

// Names of rules live as long as the program, and so must what HoursInHand points to.
std::string_view lasting_rule_name(const std::string& name) {
    const auto found = std::ranges::find(analytics::rule_names, name);
    return found == analytics::rule_names.end() ? std::string_view{} : *found;
}

void rule_name_field(Binder& io, std::string_view name) { io << name; }
void rule_name_field(ColumnReader& io, std::string_view& name) {
    std::string text;
    io >> text;
    name = lasting_rule_name(text);
}

void causes_field(Binder& io, const std::vector<analytics::RankedCause>& causes) {
    io << std::string_view(text_of(causes));  // copied: the text ends here
}
void causes_field(ColumnReader& io, std::vector<analytics::RankedCause>& causes) {
    std::string text;
    io >> text;
    causes = causes_of(text);
}

template <typename Io, typename State>
void state_fields(Io& io, State& state) {
    io & state.wear & state.drift & state.disturbance & state.wear_variance & state.wear_drift_covariance;
    io & state.drift_variance & state.wear_disturbance_covariance & state.drift_disturbance_covariance;
    io & state.disturbance_variance & state.let_go;
    for (auto& weight : state.laws) io & weight;
}

template <typename Io, typename Record>
void day_fields(Io& io, Record& record) {
    auto& verdict = record.verdict;
    io & verdict.day.date & verdict.day.begin & verdict.day.end & record.finished & verdict.life & verdict.level;
    io & verdict.reason;
    ranged_fields(io, verdict.leakage_ratio);
    ranged_fields(io, verdict.efficiency);
    io & verdict.efficiency_baseline & verdict.efficiency_at_rated & verdict.clearance_growth_percent;
    io & verdict.leakage_lpm & verdict.excess_lpm & verdict.leakage_kw;
    ranged_fields(io, verdict.trend.per_1000_h);
    io & verdict.trend.established & verdict.trend.onset;
    io & verdict.hours_in_hand.low & verdict.hours_in_hand.mid & verdict.hours_in_hand.high;
    rule_name_field(io, verdict.hours_in_hand.limit);
    io & verdict.step_ratio & verdict.cause & verdict.cause_weight & verdict.running_h & verdict.judged_h;
    io & verdict.life_running_h & verdict.life_judged_h & verdict.learning_h_left & verdict.share_judged_30d;
    io & verdict.slip_coefficient & verdict.zero_lpm & verdict.baseline;
    io & verdict.healthy.laminar & verdict.healthy.orifice & verdict.healthy.speed & verdict.healthy_sd;
    io & verdict.replacement.at & verdict.replacement.ratio_before & verdict.replacement.ratio_after;
    causes_field(io, verdict.causes);
    io & verdict.hours_in_hand.duty_h_per_day;
    state_fields(io, verdict.state);
}

template <typename Io, typename Record>
void day_facts_fields(Io& io, Record& record) {
    io & record.section & record.date;
    for (auto& interval : record.facts.interval_s) io & interval;
    io & record.facts.plateau_bar;
}

template <typename Io, typename Record>
void life_prior_fields(Io& io, Record& record) {
    io & record.track & record.life & record.date & record.begins & record.model & record.sisters;
}

template <typename Io, typename Change>
void alarm_change_fields(Io& io, Change& change) {
    io & change.edge & change.level & change.value & change.limit;
}

}  // namespace

std::string insert_summary_sql() { return insert_sql("hour_summary", summary_columns); }
std::string insert_moments_sql() { return insert_sql("regime_moments", moments_columns); }
std::string insert_day_sql() { return insert_sql("day", day_columns); }
std::string insert_day_facts_sql() {
    std::string sql = insert_sql("day_facts", day_facts_columns);
    return sql.replace(0, 6, "REPLACE");
}
std::string insert_alarm_change_sql() { return insert_sql("alarm_change", alarm_change_columns); }

std::string insert_life_prior_sql() {
    std::string sql = insert_sql("life_prior", life_prior_columns);
    return sql.replace(0, 6, "REPLACE");
}

std::string select_summary_sql() { return select_sql("hour_summary", summary_columns); }
std::string select_moments_sql() { return select_sql("regime_moments", moments_columns); }
std::string select_day_sql() { return select_sql("day", day_columns); }
std::string select_day_facts_sql() { return select_sql("day_facts", day_facts_columns); }
std::string select_alarm_change_sql() { return select_sql("alarm_change", alarm_change_columns); }

std::string select_life_prior_sql() { return select_sql("life_prior", life_prior_columns); }

void write_summary(SQLite::Statement& statement, TrackId track, const SummaryRecord& record) {
    Binder binder(statement);
    binder << track;
    summary_fields(binder, record);
    run(statement);
}

void write_moments(SQLite::Statement& statement, TrackId track, Instant start, std::size_t regime,
                   const analytics::Moments& moments) {
    Binder binder(statement);
    binder << track << start << regime;
    moments_fields(binder, moments);
    run(statement);
}

void write_day(SQLite::Statement& statement, TrackId track, const DayRecord& record) {
    Binder binder(statement);
    binder << track;
    day_fields(binder, record);
    run(statement);
}

void write_day_facts(SQLite::Statement& statement, PumpId pump, const DayFactsRecord& record) {
    Binder binder(statement);
    binder << pump;
    day_facts_fields(binder, record);
    run(statement);
}

void write_alarm_change(SQLite::Statement& statement, TrackId track, const analytics::AlarmChange& change) {
    Binder binder(statement);
    binder << track << change.at << change.began << change.life << name_of(change.rule);
    alarm_change_fields(binder, change);
    run(statement);
}

void write_life_prior(SQLite::Statement& statement, const LifePriorRecord& record) {
    Binder binder(statement);
    life_prior_fields(binder, record);
    run(statement);
}

SummaryRecord read_summary(SQLite::Statement& statement) {
    SummaryRecord record;
    TrackId track{};
    ColumnReader reader(statement);
    reader >> track;
    summary_fields(reader, record);
    record.verdict.start = record.summary.start;
    return record;
}

MomentsRow read_moments(SQLite::Statement& statement) {
    MomentsRow row;
    TrackId track{};
    ColumnReader reader(statement);
    reader >> track >> row.start >> row.regime;
    moments_fields(reader, row.moments);
    return row;
}

DayRecord read_day(SQLite::Statement& statement) {
    DayRecord record;
    TrackId track{};
    ColumnReader reader(statement);
    reader >> track;
    day_fields(reader, record);
    return record;
}

DayFactsRecord read_day_facts(SQLite::Statement& statement) {
    DayFactsRecord record;
    PumpId pump{};
    ColumnReader reader(statement);
    reader >> pump;
    day_facts_fields(reader, record);
    return record;
}

analytics::AlarmChange read_alarm_change(SQLite::Statement& statement) {
    analytics::AlarmChange change;
    TrackId track{};
    std::string rule;
    ColumnReader reader(statement);
    reader >> track >> change.at >> change.began >> change.life >> rule;
    const auto found = std::ranges::find(analytics::rule_names, rule);
    if (found != analytics::rule_names.end())
        change.rule = static_cast<analytics::Rule>(found - analytics::rule_names.begin());
    alarm_change_fields(reader, change);
    return change;
}

LifePriorRecord read_life_prior(SQLite::Statement& statement) {
    LifePriorRecord record;
    ColumnReader reader(statement);
    life_prior_fields(reader, record);
    return record;
}

}  // namespace slipledger::ledger
