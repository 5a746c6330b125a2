// What a life is told of its sisters, whatever order their readings come in.
#include "daemon/watch/sisters.hpp"

#include <gtest/gtest.h>

#include <algorithm>

#include "tests/daemon/watch/judged_mill.hpp"

namespace slipledger::watch {
namespace {

using analytics::BaselineKind;

// press-1 is fitted new on day 0 and healthy; press-2, of the same model, comes into the plant on day 14, worn to 1.6
// before; press-3 is of another model.
class SisterPumps : public ::testing::Test {
protected:
    static std::unique_ptr<Mill> mill() {
        return std::make_unique<Mill>(std::vector<std::string>{"press-1", "press-2", "press-3"},
                                      [](config::Plant& plant) {
                                          for (config::Pump& pump : plant.pumps)
                                              pump.sections.front().model = pump.id == "press-3" ? "B" : "A71";
                                      });
    }

    static void fit_new(Mill& mill, const std::string& pump, analytics::Instant at) {
        ledger::Event event;
        event.pump = pump;
        event.section = "A";
        event.kind = "replaced";
        event.at = at;
        event.body = "{}";
        mill.tell(event);
    }

    static std::vector<Row> healthy(Mill& mill, const std::string& pump = "press-1") {
        return demo_rows(mill.point(pump), 26, {1000.0, 0.0}, 7);
    }
    static std::vector<Row> worn(Mill& mill, const std::string& pump = "press-2") {
        std::vector<Row> rows = demo_rows(mill.point(pump), 12, {-100.0, 0.006}, 8);
        for (Row& row : rows) row.time += 24h * 14;
        return rows;
    }
};

TEST_F(SisterPumps, TellAPumpThatIsTakenOverWornWhatNewIs) {
    const auto pumps = mill();
    fit_new(*pumps, "press-1", demo_begin);
    pumps->store(healthy(*pumps));
    pumps->store(worn(*pumps));
    std::vector<Row> stranger = worn(*pumps, "press-3");
    pumps->store(stranger);
    pumps->judge();
    const auto& first = pumps->days("press-1").back().verdict;
    EXPECT_EQ(first.baseline, BaselineKind::from_new);
    const auto& second = pumps->days("press-2").back().verdict;
    EXPECT_EQ(second.baseline, BaselineKind::sisters);
    EXPECT_GT(second.leakage_ratio.value, 1.3);  // one sister is known to a fifth
    const auto& third = pumps->days("press-3").back().verdict;
    EXPECT_EQ(third.baseline, BaselineKind::watching_began);
    EXPECT_NEAR(third.leakage_ratio.value, 1.05, 0.1) << "beside itself it looks healthy";
}

// Only what had settled by the end of the day before counts: on day 3 press-1 is still learning.
TEST_F(SisterPumps, SayNothingBeforeTheirOwnBaselineHasSettled) {
    const auto pumps = mill();
    fit_new(*pumps, "press-1", demo_begin);
    pumps->store(healthy(*pumps));
    std::vector<Row> early = worn(*pumps);
    for (Row& row : early) row.time -= 24h * 12;
    pumps->store(early);
    pumps->judge();
    EXPECT_EQ(pumps->days("press-2").back().verdict.baseline, BaselineKind::watching_began);
}

TEST_F(SisterPumps, WhoWereTakenOverThemselvesSayNothing) {
    const auto pumps = mill();
    pumps->store(healthy(*pumps));
    pumps->store(worn(*pumps));
    pumps->judge();
    EXPECT_EQ(pumps->days("press-2").back().verdict.baseline, BaselineKind::watching_began);
}

TEST_F(SisterPumps, AreTheSameInWhateverOrderTheirReadingsCome) {
    const auto in_time = mill();
    fit_new(*in_time, "press-1", demo_begin);
    in_time->store(healthy(*in_time));
    in_time->judge();
    in_time->store(worn(*in_time));
    in_time->judge();
    const std::string wanted = in_time->history();
    ASSERT_NE(wanted.find("sisters"), std::string::npos);

    const auto younger_first = mill();
    younger_first->store(worn(*younger_first));
    younger_first->judge();
    const std::vector<Row> rows = healthy(*younger_first);
    for (std::size_t i = 0; i < rows.size(); i += 2000) {
        younger_first->store(std::span(rows).subspan(i, std::min<std::size_t>(2000, rows.size() - i)));
        younger_first->judge();
    }
    fit_new(*younger_first, "press-1", demo_begin);
    younger_first->judge();
    EXPECT_EQ(younger_first->history(), wanted);

    const auto late_row = mill();
    fit_new(*late_row, "press-1", demo_begin);
    std::vector<Row> most = healthy(*late_row);
    const Row late = most[5 * 288 + 11];
    most.erase(most.begin() + 5 * 288 + 11);
    late_row->store(most);
    late_row->store(worn(*late_row));
    late_row->judge();
    EXPECT_NE(late_row->history(), wanted) << "or this tests nothing";
    late_row->store(std::vector{late});
    late_row->judge();
    EXPECT_EQ(late_row->history(), wanted);
}

// An earlier life in the same housing is a sister too, and is told within the same pass.
TEST_F(SisterPumps, OfTheSameHousingTellTheNextLife) {
    const auto pumps = mill();
    fit_new(*pumps, "press-1", demo_begin);
    fit_new(*pumps, "press-1", demo_begin + 24h * 14);
    pumps->store(healthy(*pumps));
    pumps->judge();
    const auto prior =
        ledger::Reader(pumps->plant.store.path).life_prior(pumps->track("press-1", Basis::case_drain), 3);
    ASSERT_TRUE(prior);
    EXPECT_EQ(sisters_in(prior->sisters).size(), 1U);
    EXPECT_EQ(prior->begins, demo_begin + 24h * 14);
    EXPECT_NEAR(pumps->days("press-1").back().verdict.leakage_ratio.value, 1.0, 0.1);
}

// A life that is over tells how long it lasted and how it wore; one in service only what new is.
TEST_F(SisterPumps, OfWhomOneIsOverTellHowLongItLasted) {
    const auto pumps = mill();
    fit_new(*pumps, "press-1", demo_begin);
    fit_new(*pumps, "press-1", demo_begin + 24h * 20);
    pumps->store(demo_rows(pumps->point("press-1"), 26, {8.0, 0.12}, 7));
    pumps->store(worn(*pumps));
    pumps->judge();
    const ledger::Reader reader(pumps->plant.store.path);
    const auto own = reader.life_prior(pumps->track("press-1", Basis::case_drain), 3);
    ASSERT_TRUE(own);
    const auto lives = past_lives_in(own->sisters);
    ASSERT_EQ(lives.size(), 1U);
    const auto days = pumps->days("press-1");
    const auto last = std::ranges::find_if(days, [](const auto& day) { return day.verdict.life == 3; }) - 1;
    const analytics::DayVerdict& verdict = last->verdict;
    ASSERT_TRUE(verdict.trend.established);
    EXPECT_DOUBLE_EQ(lives[0].life_h, verdict.life_running_h + verdict.hours_in_hand.mid);
    EXPECT_LT(lives[0].ln_sd, 0.5);
    EXPECT_EQ(lives[0].laws, verdict.state.laws);
    const auto other = reader.life_prior(pumps->track("press-2", Basis::case_drain), 1);  // begins on day 14
    ASSERT_TRUE(other);
    EXPECT_TRUE(past_lives_in(other->sisters).empty());
    EXPECT_EQ(sisters_in(other->sisters).size(), 1U);
}

TEST_F(SisterPumps, ArePartOfTheBlankSheetOfALifeWithoutThem) {
    const auto pumps = mill();
    pumps->store(healthy(*pumps));
    pumps->judge();
    const auto prior =
        ledger::Reader(pumps->plant.store.path).life_prior(pumps->track("press-1", Basis::case_drain), 1);
    ASSERT_TRUE(prior);
    EXPECT_EQ(prior->sisters, "[]");
    EXPECT_EQ(prior->model, "A71");
}

}  // namespace
}  // namespace slipledger::watch
