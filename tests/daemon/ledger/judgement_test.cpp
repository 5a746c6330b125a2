// What the analyst hands over comes back exactly, replaces what it recomputed and nothing before it, and is told once.

#include <gmock/gmock.h>

#include <cmath>
#include <cstring>

#include "daemon/ledger/judgement_rows.hpp"
#include "schema/schema.hpp"
#include "tests/daemon/ledger/ledger_fixture.hpp"

namespace slipledger::ledger {
namespace {

using ::testing::ElementsAre;
using ::testing::IsEmpty;
using ::testing::SizeIs;

// Another number for each field, none of which has a short decimal.
class Numbers {
public:
    double next() { return std::sqrt(static_cast<double>(++count_)); }
    std::uint32_t whole() { return static_cast<std::uint32_t>(++count_); }

private:
    int count_ = 1;
};

analytics::Ranged ranged(Numbers& n) { return {.value = n.next(), .low = n.next(), .high = std::nan("")}; }

SummaryRecord full_summary(Instant start, std::int32_t date) {
    Numbers n;
    SummaryRecord record{.summary = {}, .verdict = {}, .date = date};
    analytics::Summary& s = record.summary;
    s.start = start;
    s.length = 59min;
    s.basis = analytics::Basis::delivery;
    s.life = 3;
    for (auto& count : s.counts) count = n.whole();
    for (double* field : {&s.running_h, &s.judged_h, &s.stop_flow_lpm, &s.drain_share, &s.highest_temperature_c,
                          &s.highest_case_bar, &s.lowest_inlet_bar, &s.mean_flow_lpm, &s.mean_speed_rpm,
                          &s.mean_temperature_c, &s.flow_lpm.low, &s.flow_lpm.high, &s.pressure_bar.low,
                          &s.pressure_bar.high, &s.speed_rpm.low, &s.speed_rpm.high, &s.temperature_c.low,
                          &s.temperature_c.high})
        *field = n.next();
    s.stop_count = n.whole();
    s.mean_pressure_bar = std::nan("");
    analytics::Moments& m = s.judged[1];
    m.count = n.whole();
    for (double* field : {&m.leakage_lpm, &m.standard_error_lpm, &m.dp_bar, &m.temperature_c, &m.dp_variance,
                          &m.dp_temperature_covariance, &m.temperature_variance, &m.viscosity_cst, &m.speed_rpm,
                          &m.delivery_lpm, &m.theoretical_lpm})
        *field = n.next();
    for (double& mean : m.feature) mean = n.next();
    for (double& entry : m.covariance) entry = n.next();
    analytics::SummaryVerdict& v = record.verdict;
    v.start = start;
    v.level = analytics::Level::plan;
    v.reason = analytics::UnjudgedReason::none;
    v.leakage_ratio = ranged(n);
    v.filtered_ratio = ranged(n);
    v.efficiency = ranged(n);
    v.leakage_lpm = n.next();
    v.excess_lpm = n.next();
    v.leakage_kw = n.next();
    v.outside_coverage = true;
    return record;
}

DayRecord full_day(std::int32_t date) {
    Numbers n;
    DayRecord record{.verdict = {}, .finished = true};
    analytics::DayVerdict& v = record.verdict;
    v.day = {.date = date, .begin = day_one, .end = day_one + 23h};
    v.life = 2;
    v.level = analytics::Level::act;
    v.reason = analytics::UnjudgedReason::none;
    v.leakage_ratio = ranged(n);
    v.efficiency = ranged(n);
    v.efficiency_at_rated = false;
    for (double* field : {&v.efficiency_baseline, &v.clearance_growth_percent, &v.leakage_lpm, &v.excess_lpm,
                          &v.leakage_kw, &v.step_ratio, &v.cause_weight, &v.running_h, &v.judged_h, &v.life_running_h,
                          &v.life_judged_h, &v.learning_h_left, &v.share_judged_30d, &v.slip_coefficient, &v.zero_lpm,
                          &v.healthy.laminar, &v.healthy.orifice, &v.healthy.speed, &v.healthy_sd,
                          &v.replacement.ratio_before, &v.replacement.ratio_after})
        *field = n.next();
    v.baseline = analytics::BaselineKind::sisters;
    v.replacement.at = day_one - 24h;
    v.trend = {.per_1000_h = ranged(n), .established = true, .onset = day_one - 240h};
    v.hours_in_hand = {
        .low = n.next(), .mid = n.next(), .high = n.next(), .limit = "efficiency", .duty_h_per_day = n.next()};
    analytics::DayState& s = v.state;
    for (double* field : {&s.wear, &s.drift, &s.disturbance, &s.wear_variance, &s.wear_drift_covariance,
                          &s.drift_variance, &s.wear_disturbance_covariance, &s.drift_disturbance_covariance,
                          &s.disturbance_variance})
        *field = n.next();
    s.let_go = true;
    for (double& weight : s.laws) weight = n.next();
    v.cause = analytics::CauseKind::sudden_damage;
    analytics::RankedCause cause{.kind = v.cause, .weight = n.next(), .in_favour = {}, .against = {}};
    cause.in_favour.push_back({.sign = analytics::Sign::step, .present = true, .value = std::sqrt(2.0F), .adds = 3.0F});
    cause.against.push_back({.sign = analytics::Sign::stuck, .value = 1.1F, .beside = 12.0F,
                             .quantity = Quantity::shaft_speed, .adds = -std::sqrt(3.0F)});
    v.causes = {cause, {.kind = analytics::CauseKind::feed_silent, .weight = n.next(), .in_favour = {}, .against = {}}};
    return record;
}

// A record as the text of its columns: equal text, equal fields.
template <typename Write>
std::string columns_of(const std::string& insert, Write&& write) {
    SQLite::Database database(":memory:", SQLite::OPEN_READWRITE | SQLite::OPEN_CREATE);
    for (const auto& migration : schema::ledger_migrations()) database.exec(std::string(migration.sql));
    SQLite::Statement statement(database, insert);
    write(statement);
    const std::string table = insert.substr(12, insert.find(' ', 12) - 12);
    SQLite::Statement rows(database, "SELECT * FROM " + table);
    std::string text;
    while (rows.executeStep())
        for (int i = 0; i < rows.getColumnCount(); ++i) {
            char exact[64];
            std::snprintf(exact, sizeof exact, "%a", rows.getColumn(i).getDouble());
            text += std::string(rows.getColumnName(i)) + "=" + rows.getColumn(i).getString() + "/" + exact + "\n";
        }
    return text;
}

std::string text_of(const SummaryRecord& record) {
    return columns_of(insert_summary_sql(), [&](auto& row) { write_summary(row, TrackId{1}, record); }) +
           columns_of(insert_moments_sql(),
                      [&](auto& row) { write_moments(row, TrackId{1}, record.summary.start, 1, record.summary.judged[1]); });
}

std::string text_of(const DayRecord& record) {
    return columns_of(insert_day_sql(), [&](auto& row) { write_day(row, TrackId{1}, record); });
}

class Judgement : public LedgerTest {
protected:
    TrackId track() { return ledger().directory().track("press-1", "A", analytics::Basis::delivery).id; }

    // Five hours more close with each call.
    Mark raised_mark() {
        store({row_of(point("press-1"), day_one, {{Quantity::outlet_pressure, 180.0}}),
               row_of(point("press-1"), day_one + ++calls_ * 5h, {{Quantity::outlet_pressure, 180.0}})});
        return reader().marks().at(0);
    }

    AnalysisResult result_for(const Mark& mark) {
        AnalysisResult result;
        result.pump = mark.pump;
        result.generation = mark.generation;
        return result;
    }

    bool store_track(TrackResult made) {
        AnalysisResult result = result_for(raised_mark());
        made.track = track();
        result.tracks.push_back(std::move(made));
        return ledger().store(result);
    }

private:
    int calls_ = 0;
};

TEST_F(Judgement, OfASummaryComesBackInEveryField) {
    const SummaryRecord record = full_summary(day_one, 20458);
    TrackResult made;
    made.summaries.push_back(record);
    ASSERT_TRUE(store_track(made));
    const auto back = reader().summaries(track(), day_one, day_one + 1h);
    ASSERT_THAT(back, SizeIs(1));
    EXPECT_EQ(text_of(record), text_of(back[0]));
    EXPECT_EQ(back[0].summary.basis, analytics::Basis::delivery);
    EXPECT_EQ(back[0].verdict.start, day_one);
    EXPECT_EQ(back[0].summary.judged[0].count, 0U);
    EXPECT_TRUE(std::isnan(back[0].summary.mean_pressure_bar));
    EXPECT_EQ(back[0].summary.judged[1].covariance, record.summary.judged[1].covariance);
    EXPECT_EQ(reader().standing_counts(track(), 3)[15], record.summary.counts[15]);
    EXPECT_EQ(reader().standing_counts(track(), 2)[15], 0U);
}

TEST_F(Judgement, OfADayComesBackInEveryField) {
    const DayRecord record = full_day(20458);
    TrackResult made;
    made.days.push_back(record);
    ASSERT_TRUE(store_track(made));
    const auto back = reader().last_day(track());
    ASSERT_TRUE(back);
    EXPECT_EQ(text_of(record), text_of(*back));
    EXPECT_EQ(back->verdict.hours_in_hand.limit, "efficiency");
    EXPECT_EQ(back->verdict.trend.onset, day_one - 240h);
    ASSERT_THAT(back->verdict.causes, SizeIs(2));
    const analytics::Evidence& against = back->verdict.causes[0].against.at(0);
    EXPECT_EQ(against.sign, analytics::Sign::stuck);
    EXPECT_EQ(against.quantity, Quantity::shaft_speed);
    EXPECT_EQ(against.adds, -std::sqrt(3.0F));
    EXPECT_TRUE(std::isnan(back->verdict.causes[0].in_favour.at(0).beside));
    EXPECT_THAT(reader().days(track(), 20458, 20459), SizeIs(1));
    EXPECT_THAT(reader().days(track(), 20459, 20500), IsEmpty());
}

TEST_F(Judgement, FromAnInstantOnReplacesWhatWasThereAndNothingBefore) {
    TrackResult first;
    for (int hour = 0; hour < 4; ++hour) first.summaries.push_back(full_summary(day_one + std::chrono::hours(hour), 20458));
    for (int date = 1; date < 5; ++date) {
        first.days.push_back(full_day(date));
        first.alarm_changes.push_back({.at = day_one + std::chrono::hours(date), .began = day_one});
    }
    ASSERT_TRUE(store_track(first));
    TrackResult second;
    second.from = day_one + 3h;
    second.from_date = 3;
    second.days.push_back(full_day(3));
    ASSERT_TRUE(store_track(second));
    EXPECT_THAT(reader().summaries(track(), day_one, day_one + 24h), SizeIs(3));
    EXPECT_THAT(reader().days(track(), 0, 99), SizeIs(3));
    EXPECT_THAT(reader().alarm_changes(track()), SizeIs(2));
    EXPECT_THAT(reader().alarm_changes_before(track(), day_one + 2h), SizeIs(1));
}

TEST_F(Judgement, KeepsTheNewestThreeCheckpointsAndTheFirstOfEachMonth) {
    TrackResult made;
    const std::int32_t january = 20454;  // 2026-01-01
    for (std::int32_t date = january + 4; date < january + 45; ++date)
        made.checkpoints.push_back({.date = date, .state = std::vector<std::byte>(3, std::byte(date & 0xFF))});
    ASSERT_TRUE(store_track(made));
    std::vector<std::int32_t> kept;
    for (std::int32_t before = january + 99;;) {
        const auto found = reader().checkpoint_before(track(), before);
        if (!found) break;
        EXPECT_EQ(found->state, std::vector<std::byte>(3, std::byte(found->date & 0xFF)));
        kept.push_back(before = found->date);
    }
    EXPECT_THAT(kept, ElementsAre(january + 44, january + 43, january + 42, january + 31, january + 4));
}

TEST_F(Judgement, OfAnAlarmComesBackInEveryField) {
    const analytics::AlarmChange change{.rule = analytics::Rule::drain_share, .edge = analytics::AlarmEdge::eased,
                                        .level = analytics::Level::plan, .at = day_one + 1h, .began = day_one,
                                        .life = 2, .value = std::sqrt(2.0), .limit = std::nan("")};
    TrackResult made;
    made.alarm_changes.push_back(change);
    ASSERT_TRUE(store_track(made));
    const auto back = reader().alarm_changes(track());
    ASSERT_THAT(back, SizeIs(1));
    EXPECT_EQ(back[0].rule, change.rule);
    EXPECT_EQ(back[0].edge, change.edge);
    EXPECT_EQ(back[0].level, change.level);
    EXPECT_EQ(back[0].at, change.at);
    EXPECT_EQ(back[0].began, change.began);
    EXPECT_EQ(back[0].life, change.life);
    EXPECT_EQ(back[0].value, change.value);
    EXPECT_TRUE(std::isnan(back[0].limit));
}

TEST_F(Judgement, KeepsTheFactsOfADay) {
    AnalysisResult result = result_for(raised_mark());
    DayFactsRecord record{.section = "A", .date = 20458, .facts = {}};
    record.facts.interval_s[2] = 60.5;
    record.facts.plateau_bar = 250.25;
    result.day_facts = {record, record};
    ASSERT_TRUE(ledger().store(result));
    const auto back = reader().day_facts(pump("press-1"), 20458, 20459);
    ASSERT_THAT(back, SizeIs(1));
    EXPECT_EQ(back[0].section, "A");
    EXPECT_EQ(back[0].facts, record.facts);
}

TEST_F(Judgement, ThatComesTooLateChangesNothing) {
    AnalysisResult late = result_for(raised_mark());
    store({row_of(point("press-1"), day_one + 1min, {{Quantity::outlet_pressure, 181.0}})});
    late.tracks.push_back({.track = track(), .from = {}, .from_date = 0, .summaries = {full_summary(day_one, 20458)},
                           .days = {}, .checkpoints = {}, .alarm_changes = {}});
    late.notices.push_back({.id = "n1", .pump = "press-1", .section = "A", .episode = "e", .kind = "raised",
                            .level = "watch", .at = day_one, .body = "{}"});
    EXPECT_FALSE(ledger().store(late));
    EXPECT_THAT(reader().summaries(track(), day_one, day_one + 24h), IsEmpty());
    EXPECT_FALSE(reader().has_notice("n1"));
    EXPECT_THAT(reader().marks(), SizeIs(1));
}

TEST_F(Judgement, ClearsItsMarkOrKeepsItFromWhereThePassWasCut) {
    AnalysisResult cut = result_for(raised_mark());
    cut.mark_again_from = day_one + 2h;
    ASSERT_TRUE(ledger().store(cut));
    ASSERT_THAT(reader().marks(), SizeIs(1));
    const Mark again = reader().marks()[0];
    EXPECT_EQ(again.from, day_one + 2h);
    EXPECT_GE(again.to, day_one + 2h);
    EXPECT_FALSE(ledger().store(cut)) << "a mark kept is a new generation";
    EXPECT_TRUE(ledger().store(result_for(again)));
    EXPECT_THAT(reader().marks(), IsEmpty());
}

TEST_F(Judgement, KeepsWhatALifeWasToldOfItsSistersUntilItBeginsAnew) {
    store({row_of(point("press-1"), day_one, {{Quantity::outlet_pressure, 1.0}})});
    const TrackId track = ledger().directory().track("press-1", "A", analytics::Basis::case_drain).id;
    const auto store_result = [&](std::int32_t from_date, std::vector<LifePriorRecord> priors) {
        AnalysisResult result;
        result.pump = pump("press-1");
        result.generation = 0;
        TrackResult judged;
        judged.track = track;
        judged.from = Instant::min();
        judged.from_date = from_date;
        judged.life_priors = std::move(priors);
        result.tracks.push_back(judged);
        ASSERT_TRUE(ledger().store(result));
    };
    store_result(0, {{track, 1, 100, day_one, "A71", "[]"}, {track, 2, 200, day_one + 1h, "A71", "[1]"}});
    ASSERT_TRUE(reader().life_prior(track, 2));
    EXPECT_EQ(reader().life_prior(track, 2)->sisters, "[1]");
    EXPECT_EQ(reader().life_prior(track, 2)->begins, day_one + 1h);
    EXPECT_THAT(reader().life_priors_after(100), SizeIs(1));
    store_result(150, {});
    EXPECT_FALSE(reader().life_prior(track, 2));
    EXPECT_EQ(reader().life_prior(track, 1)->model, "A71");
}

}  // namespace
}  // namespace slipledger::ledger
