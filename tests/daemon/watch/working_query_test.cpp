// The estimate behind a verdict is led again from stored summaries and comes out as it was, to the last bit; the
// readings behind an operating point are joined as they were.
#include "daemon/watch/working_query.hpp"

#include <gmock/gmock.h>
#include <gtest/gtest.h>

#include <algorithm>
#include <cmath>

#include "analytics/wear_filter.hpp"
#include "tests/daemon/watch/judged_mill.hpp"

namespace slipledger::watch {
namespace {

using namespace std::chrono_literals;
using analytics::Basis;
using testing::HasSubstr;

class ShownWorking : public ::testing::Test {
protected:
    report::WorkingFacts ask(WorkingQuestion question = {}) {
        return query_working(reader(), mill_.plant, pump(), pump().sections.front(), question);
    }
    ledger::Reader& reader() {
        if (!reader_) reader_.emplace(mill_.plant.store.path);
        return *reader_;
    }
    const config::Pump& pump() { return mill_.plant.pumps.front(); }

    void fill(int days) {
        mill_.store(demo_rows(mill_.point("press-1"), days, {}, 7));
        mill_.judge();
    }

    std::vector<ledger::SummaryRecord> summaries() {
        return reader().summaries(mill_.track("press-1", Basis::case_drain), demo_begin - 24h, demo_begin + 24h * 400);
    }

    // The estimate led to the end of a summary says the same as was stored of it.
    void expect_the_same(const ledger::SummaryRecord& record) {
        const report::WorkingFacts facts = ask({.at = record.summary.start, .basis = {}});
        ASSERT_TRUE(facts.record && facts.course);
        const double ratio = record.verdict.filtered_ratio.value;
        if (std::isnan(ratio))
            EXPECT_FALSE(facts.course->filter().primed());
        else
            EXPECT_EQ(std::exp(facts.course->filter().wear().ln), ratio);
        EXPECT_EQ(facts.points.size(), 12U);
    }

    Mill mill_;

private:
    std::optional<ledger::Reader> reader_;
};

// Forty days reach over the first of a month, whose checkpoint is kept.
TEST_F(ShownWorking, LeadsTheEstimateToWhereItWasAtEachSummary) {
    fill(40);
    const std::vector<ledger::SummaryRecord> all = summaries();
    ASSERT_GT(all.size(), 900U);
    for (std::size_t i = 0; i < all.size(); i += 37) expect_the_same(all[i]);
    expect_the_same(all.back());
}

TEST_F(ShownWorking, DoesSoAcrossAReplacementAndAChangeOfOil) {
    mill_.tell({.id = 0,
                .pump = "press-1",
                .section = "A",
                .kind = "replaced",
                .at = demo_begin + 24h * 9 + 90min,
                .entered = {},
                .by = "fitter",
                .user = "",
                .body = R"({"displacement_cm3":75})"});
    mill_.tell({.id = 0,
                .pump = "press-1",
                .section = "",
                .kind = "oil-changed",
                .at = demo_begin + 24h * 15 + 10min,
                .entered = {},
                .by = "fitter",
                .user = "",
                .body = "{}"});
    fill(20);
    const std::vector<ledger::SummaryRecord> all = summaries();
    for (std::size_t i = 0; i < all.size(); i += 11) {
        const report::WorkingFacts facts = ask({.at = all[i].summary.start, .basis = {}});
        const double ratio = all[i].verdict.filtered_ratio.value;
        if (std::isfinite(ratio)) EXPECT_EQ(std::exp(facts.course->filter().wear().ln), ratio);
        EXPECT_EQ(facts.record->summary.life, all[i].summary.start < demo_begin + 24h * 9 + 90min ? 1 : 2);
        EXPECT_EQ(facts.spec.displacement_cm3, facts.record->summary.life == 1 ? 71.0 : 75.0);
    }
}

TEST_F(ShownWorking, IsOfTheLastJudgedSummaryUnlessAskedOtherwise) {
    fill(12);
    const report::WorkingFacts facts = ask();
    ASSERT_TRUE(facts.record && facts.point);
    EXPECT_EQ(facts.record->summary.start, summaries().back().summary.start);
    EXPECT_EQ(facts.point->point.time, facts.points.back().time);
    EXPECT_EQ(facts.point->cells.size(), 4U);
    EXPECT_EQ(facts.point->cells.front().place, "press-1");
    EXPECT_EQ(facts.judged_days.size(), 2U);
    const report::WorkingFacts other = ask({.at = demo_begin + 24h * 6 + 17min, .basis = {}});
    EXPECT_EQ(other.point->point.time, demo_begin + 24h * 6 + 15min);
}

TEST_F(ShownWorking, SaysWhyThereIsNothingToShow) {
    fill(3);
    EXPECT_THAT(ask({.at = {}, .basis = Basis::delivery}).nothing_because, HasSubstr("delivery_flow"));
    EXPECT_THAT(ask({.at = demo_begin + 24h * 300, .basis = {}}).nothing_because, HasSubstr("no closed summary"));
}

TEST_F(ShownWorking, TellsHowAFeedWritesWhatIsStoredInAnotherUnit) {
    config::Target target;
    target.pump = "press-1";
    target.quantity = analytics::Quantity::outlet_pressure;
    target.unit = "psi";
    mill_.plant.feeds.front().tags["PT1"] = target;
    fill(3);
    const report::WorkingFacts facts = ask();
    const auto pressure = std::ranges::find_if(facts.point->cells, [](const report::ReadCell& cell) {
        return cell.reading.quantity == analytics::Quantity::outlet_pressure;
    });
    ASSERT_NE(pressure, facts.point->cells.end());
    ASSERT_EQ(pressure->conversions.size(), 1U);
    EXPECT_NEAR(pressure->conversions.front().factor, 0.0689476, 1e-7);
    const report::Working page = report::working_of(facts);
    const auto& steps = page.chapters.front().steps;
    const auto step = std::ranges::find(steps, "p", &report::WorkStep::symbol);
    ASSERT_NE(step, steps.end());
    EXPECT_THAT(step->formula, HasSubstr("y_p * 0.0689"));
}

}  // namespace
}  // namespace slipledger::watch
