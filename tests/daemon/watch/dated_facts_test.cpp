// Facts told after the fact: whatever comes of them must be as if they had been told in time, from their time on and
// not before.
#include <gmock/gmock.h>
#include <gtest/gtest.h>

#include "tests/daemon/watch/judged_mill.hpp"

namespace slipledger::watch {
namespace {

using analytics::Instant;
using analytics::Level;
using analytics::Quantity;

constexpr int days_watched = 24;
const Wear none{1000.0, 0.0};

ledger::Event event(const std::string& kind, Instant at, const std::string& body, const std::string& pump = "press-1") {
    ledger::Event made;
    made.pump = pump;
    made.kind = kind;
    made.at = at;
    made.body = body;
    return made;
}

std::vector<Row> rows_of(Mill& mill, const std::string& pump, const Wear& wear) {
    return demo_rows(mill.point(pump), days_watched, wear, 7);
}

// The history of a pump whose facts were told before its readings came, and of one where they were told last.
class DatedFacts : public ::testing::TestWithParam<ledger::Event> {};

std::string told_first(const ledger::Event& told) {
    Mill mill;
    mill.tell(told);
    mill.store(rows_of(mill, "press-1", none));
    mill.judge();
    return mill.history();
}

std::string told_last(const ledger::Event& told) {
    Mill mill;
    mill.store(rows_of(mill, "press-1", none));
    mill.judge();
    const std::string before = mill.history();
    mill.tell(told);
    mill.judge();
    EXPECT_NE(mill.history(), before) << "or this tests nothing";
    return mill.history();
}

TEST_P(DatedFacts, ToldLateCountAsIfToldInTime) {
    EXPECT_EQ(told_last(GetParam()), told_first(GetParam()));
}

const Instant half_time = demo_begin + 24h * 12 + 40min;

INSTANTIATE_TEST_SUITE_P(
    Each, DatedFacts,
    ::testing::Values(
        event("oil-changed", half_time,
              R"({"reservoir":"tank","fluid":{"name":"VG 32","iso_vg":32,"viscosity_index":100}})", ""),
        event("oil-sample", half_time, R"({"reservoir":"tank","viscosity_40_cst":42,"viscosity_100_cst":6.4})", ""),
        event("instrument-changed", half_time, R"({"quantity":"case_drain_flow"})"),
        event("reference-test", half_time,
              R"({"flow_lpm":4.0,"pressure_bar":210,"speed_rpm":1480,"temperature_c":50})"),
        event("replaced", half_time,
              R"({"maker_test":{"leakage_lpm":2.3,"pressure_bar":210,"speed_rpm":1480,"viscosity_cst":30.8}})")),
    [](const auto& info) {
        std::string name = info.param.kind;
        std::erase(name, '-');
        return name;
    });

std::vector<ledger::SummaryRecord> summaries(Mill& mill, const std::string& pump) {
    return ledger::Reader(mill.plant.store.path)
        .summaries(mill.track(pump, Basis::case_drain), Instant::min(), Instant::max());
}

// The demo's readings are made with VG 46 throughout. Told VG 32 from half time on, the summaries after it, and those
// alone, must be made anew by the thinner oil.
TEST(AnotherOil, IsInEverySummaryFromItsTimeOnOfAllPumpsOfTheReservoir) {
    Mill mill({"press-1", "press-2"});
    for (const std::string pump : {"press-1", "press-2"}) mill.store(rows_of(mill, pump, none));
    mill.judge();
    const auto before = summaries(mill, "press-2");
    mill.tell(event("oil-changed", demo_begin + 24h * 12,
                    R"({"reservoir":"tank","fluid":{"iso_vg":32,"viscosity_index":100}})", ""));
    mill.judge();
    const auto after = summaries(mill, "press-2");
    ASSERT_EQ(after.size(), before.size());
    const auto old_oil = *analytics::Fluid::from_grade(46.0, 100.0);
    const auto new_oil = *analytics::Fluid::from_grade(32.0, 100.0);
    for (std::size_t i = 0; i < after.size(); ++i) {
        const analytics::Moments& was = before[i].summary.judged[0];
        const analytics::Moments& is = after[i].summary.judged[0];
        if (was.count == 0) continue;
        const bool changed = after[i].summary.start >= demo_begin + 24h * 12;
        const double thinner = new_oil.kinematic_cst(was.temperature_c) / old_oil.kinematic_cst(was.temperature_c);
        EXPECT_NEAR(is.viscosity_cst / was.viscosity_cst, changed ? thinner : 1.0, changed ? 0.002 : 0.0) << i;
    }
}

TEST(ReferenceTest, MovesTheRatioFromItsTimeOnAndNoDayBefore) {
    Mill mill;
    mill.store(rows_of(mill, "press-1", none));
    mill.judge();
    const auto before = mill.days("press-1");
    mill.tell(event("reference-test", half_time,
                    R"({"flow_lpm":4.6,"pressure_bar":210,"speed_rpm":1480,"temperature_c":50})"));
    mill.judge();
    const auto after = mill.days("press-1");
    ASSERT_EQ(after.size(), before.size());
    EXPECT_EQ(after[11].verdict.leakage_ratio.value, before[11].verdict.leakage_ratio.value);
    EXPECT_GT(after[13].verdict.leakage_ratio.value, 1.7);  // twice the demo's 2.3 L/min
    EXPECT_GT(after.back().verdict.leakage_ratio.value, 1.7);
}

TEST(ReferenceTest, OfAPartAsNewIsTheBaselineOfALifeWatchedLater) {
    Mill mill;
    mill.tell(event("reference-test", demo_begin - 24h * 90,
                    R"({"flow_lpm":2.3,"pressure_bar":210,"speed_rpm":1480,"temperature_c":50,"as_new":true})"));
    mill.store(rows_of(mill, "press-1", {-100.0, 0.006}));  // 1.6 when watching begins
    mill.judge();
    const auto& last = mill.days("press-1").back().verdict;
    EXPECT_EQ(last.baseline, analytics::BaselineKind::reference_test);
    EXPECT_GT(last.leakage_ratio.value, 1.5);
    EXPECT_LT(last.leakage_ratio.value, 2.0);
}

// Pressure stands on the compensator's plateau every other half hour.
std::vector<Row> plateau_rows(ledger::PointId point, double plateau_bar, int from_day, int to_day) {
    std::vector<Row> rows = demo_rows(point, to_day, none, 9);
    std::erase_if(rows, [&](const Row& row) { return row.time < demo_begin + 24h * from_day; });
    for (std::size_t i = 0; i < rows.size(); ++i)
        rows[i].value[index_of(Quantity::outlet_pressure)] =
            i / 6 % 2 == 0 ? 150.0 : plateau_bar + 0.1 * static_cast<double>(i % 3);
    return rows;
}

std::uint32_t compensating_on(Mill& mill, int day) {
    std::uint32_t count = 0;
    for (const auto& record : summaries(mill, "press-1"))
        if (record.summary.start >= demo_begin + 24h * day && record.summary.start < demo_begin + 24h * (day + 1))
            count += record.summary.counts[static_cast<std::size_t>(analytics::Standing::compensating)];
    return count;
}

TEST(ACompensator, SetLowerIsHeldAgainstItsNewSettingAndNotThePlateauOfTheWeekBefore) {
    Mill mill({"press-1"}, [](config::Plant& plant) {
        plant.pumps.front().control = analytics::Control::pressure_compensated;
        plant.pumps.front().sections.front().compensator_bar = 240.0;
    });
    mill.store(plateau_rows(mill.point("press-1"), 240.0, 0, 10));
    mill.store(plateau_rows(mill.point("press-1"), 228.0, 10, 14));
    mill.judge();
    EXPECT_GT(compensating_on(mill, 8), 100U);
    EXPECT_EQ(compensating_on(mill, 11), 0U) << "nobody told: 228 bar is below 97 % of the plateau seen at 240";
    mill.tell(event("compensator-set", demo_begin + 24h * 10, R"({"bar":228})"));
    mill.judge();
    EXPECT_GT(compensating_on(mill, 8), 100U);
    EXPECT_GT(compensating_on(mill, 11), 100U);
}

// Two feeds, the second wrong for two days.
TEST(ASettledDispute, IsJudgedAsIfTheWrongFeedHadNeverTold) {
    const auto wrong_rows = [](std::vector<Row> rows) {
        std::erase_if(
            rows, [](const Row& row) { return row.time < demo_begin + 24h * 14 || row.time >= demo_begin + 24h * 16; });
        for (Row& row : rows) {
            row.feed = ledger::FeedId{2};  // "command"
            row.value[index_of(Quantity::case_drain_flow)] *= 1.7;
        }
        return rows;
    };
    const ledger::Event settled = event(
        "settled", demo_begin + 24h * 14,
        R"({"believe":"plc","to_ms":)" + std::to_string((demo_begin + 24h * 16).time_since_epoch().count()) + "}");

    Mill clean;
    clean.store(rows_of(clean, "press-1", {}));
    clean.judge();

    Mill told_last;
    const std::vector<Row> rows = rows_of(told_last, "press-1", {});
    told_last.store(rows);
    told_last.store(wrong_rows(rows));
    told_last.judge();
    EXPECT_NE(told_last.history(), clean.history()) << "or this tests nothing";
    told_last.tell(settled);
    told_last.judge();
    EXPECT_EQ(told_last.history(), clean.history());

    Mill told_first;
    told_first.tell(settled);
    told_first.store(wrong_rows(rows));
    told_first.judge();
    told_first.store(rows);
    told_first.judge();
    EXPECT_EQ(told_first.history(), clean.history());
}

}  // namespace
}  // namespace slipledger::watch
