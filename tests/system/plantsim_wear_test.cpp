#include "tools/plantsim/wear.hpp"

#include <gtest/gtest.h>

#include <cmath>

#include "tools/plantsim/mill.hpp"
#include "tools/plantsim/veneer_mill.hpp"

namespace slipledger::plantsim {
namespace {

constexpr double span_h = 5000.0;
constexpr std::size_t press_1 = 0;

struct Press {
    PlantDrawing mill = veneer_mill();
    const PumpDrawing& pump = mill.pumps[press_1];
    const Oil& oil = mill.reservoirs[pump.reservoir].oil;
    const Fitted& fitted = pump.sections[0].fitted;

    // Leakage ratio after a share of the span.
    double ratio(const Wear& wear, double share, Millis time = 0) const {
        Life life = pump.sections[0].lives[0];
        life.wear = wear;
        const WearCourse course(life, fitted, oil, pump.rated, span_h);
        return true_ratio(life, seen_by(fitted), oil, pump.rated, course.growth(share * span_h, time));
    }
};

TEST(PlantsimWear, EachLawGoesFromItsFirstRatioToItsLastAndOnFromThere) {
    const Press press;
    for (const WearLaw law :
         {WearLaw::gap_power, WearLaw::ratio_power, WearLaw::ratio_rate, WearLaw::ratio_exponential}) {
        const Wear wear{.end_ratio = 2.4, .begins = 0.2, .bend = 0.7, .law = law, .first_ratio = 1.3};
        EXPECT_NEAR(press.ratio(wear, 0.1), 1.3, 2e-3);
        EXPECT_NEAR(press.ratio(wear, 1.0), 2.4, 2e-3);
        EXPECT_GT(press.ratio(wear, 1.2), 2.45);
    }
}

// By hand at half the wearing hours, from 1 to 3: sqrt(0.5) of the way; (3^0.5 + 1)^2 / 4 for dw/dt ~ w^0.5; and
// (e^1 - 1) / (e^2 - 1) of the way for bend 2.
TEST(PlantsimWear, LawsBendAsTheirFormulasSay) {
    const Press press;
    const auto halfway = [&](WearLaw law, double bend) {
        return press.ratio({.end_ratio = 3.0, .begins = 0.0, .bend = bend, .law = law}, 0.5);
    };
    EXPECT_NEAR(halfway(WearLaw::ratio_power, 0.5), 1.0 + 2.0 * std::sqrt(0.5), 2e-3);
    EXPECT_NEAR(halfway(WearLaw::ratio_rate, 0.5), std::pow(std::sqrt(3.0) + 1.0, 2.0) / 4.0, 2e-3);
    EXPECT_NEAR(halfway(WearLaw::ratio_exponential, 2.0), 1.0 + 2.0 * 0.268941, 2e-3);
}

TEST(PlantsimWear, HealthyStaysHealthyToTheLastDigit) {
    const Press press;
    for (const WearLaw law : {WearLaw::gap_power, WearLaw::ratio_power, WearLaw::ratio_rate})
        EXPECT_DOUBLE_EQ(press.ratio({.law = law}, 3.0), 1.0);
}

TEST(PlantsimTrouble, ComesOnOverItsRampAndGoesAtItsEnd) {
    const Trouble trouble{.kind = TroubleKind::pilot_flow, .from = 100, .to = 500, .ramp = 200, .size = 0.4};
    EXPECT_DOUBLE_EQ(total({trouble}, TroubleKind::pilot_flow, 99), 0.0);
    EXPECT_DOUBLE_EQ(total({trouble}, TroubleKind::pilot_flow, 200), 0.2);
    EXPECT_DOUBLE_EQ(total({trouble}, TroubleKind::pilot_flow, 400), 0.4);
    EXPECT_DOUBLE_EQ(total({trouble}, TroubleKind::pilot_flow, 500), 0.0);
    EXPECT_DOUBLE_EQ(total({trouble}, TroubleKind::drain_blocked, 400), 0.0);
    EXPECT_DOUBLE_EQ(left_of({trouble, trouble}, TroubleKind::pilot_flow, 400), 0.36);
}

// A working day of the press in the mill's first spring, row by row, with and without a trouble.
class TroubledPress : public ::testing::Test {
protected:
    static PlantDrawing with(const Trouble& trouble) {
        PlantDrawing mill = veneer_mill();
        mill.pumps[press_1].troubles.push_back(trouble);
        return mill;
    }
    Trouble always(TroubleKind kind, double size, std::optional<Column> column = {}) const {
        return {.kind = kind, .from = begin(), .to = begin() + day_ms, .size = size, .column = column};
    }
    Millis begin() const { return honest_.plant().year_begins + 90 * day_ms; }

    std::vector<Row> rows(const Mill& mill, Millis time) const {
        std::vector<Row> made;
        mill.sample(press_1, time, made);
        return made;
    }

    Mill honest_{veneer_mill(), 1};
};

TEST_F(TroubledPress, ShowsTheWrongUnitOfOneInstrumentOnly) {
    const Mill mill(with(always(TroubleKind::reads_more_by_share, 13.504, Column::outlet_pressure)), 1);
    const Row told = rows(mill, begin() + 10 * hour_ms).at(0);
    const Row meant = rows(honest_, begin() + 10 * hour_ms).at(0);
    EXPECT_NEAR(told[Column::outlet_pressure], 14.504 * meant[Column::outlet_pressure], 1e-6);
    EXPECT_EQ(told[Column::case_drain_flow], meant[Column::case_drain_flow]);
}

TEST_F(TroubledPress, StuckShowsWhatItShowedWhenItStuck) {
    const Mill mill(with(always(TroubleKind::stuck, 0.0, Column::case_drain_flow)), 1);
    const double first = rows(honest_, begin()).at(0)[Column::case_drain_flow];
    for (const int hour : {1, 9, 15})
        EXPECT_EQ(rows(mill, begin() + hour * hour_ms).at(0)[Column::case_drain_flow], first);
}

TEST_F(TroubledPress, AClockThatIsAheadBringsItsColumnUnderLaterTimes) {
    const Mill mill(with(always(TroubleKind::clock_off, 25.0, Column::case_drain_flow)), 1);
    const Millis time = begin() + 10 * hour_ms;
    const std::vector<Row> told = rows(mill, time);
    ASSERT_EQ(told.size(), 2U);
    EXPECT_TRUE(std::isnan(told[0][Column::case_drain_flow]));
    EXPECT_EQ(told[1].time, time + 25 * minute_ms);
    EXPECT_EQ(told[1][Column::case_drain_flow], rows(honest_, time).at(0)[Column::case_drain_flow]);
}

TEST_F(TroubledPress, ABlockedDrainHoldsBackAndPilotFlowAdds) {
    const auto drain = [&](const Mill& mill) {
        double sum = 0.0;
        for (int i = 0; i < 144; ++i) sum += rows(mill, begin() + i * 10 * minute_ms).at(0)[Column::case_drain_flow];
        return sum / 144.0;
    };
    const Mill blocked(with(always(TroubleKind::drain_blocked, 0.4)), 1);
    const Mill pilot(with(always(TroubleKind::pilot_flow, 0.5)), 1);
    EXPECT_NEAR(drain(blocked) / drain(honest_), 0.6, 0.01);
    EXPECT_GT(drain(pilot) - drain(honest_), 0.3);
}

}  // namespace
}  // namespace slipledger::plantsim
