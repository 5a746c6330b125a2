#include "analytics/onset.hpp"

#include <cmath>

#include <gtest/gtest.h>

#include "tests/analytics/simulated_section.hpp"

namespace slipledger::analytics {
namespace {

using testing::simulate;
using testing::simulated_day;
using testing::SimulatedSection;

std::vector<DayVerdict> days_of(const SimulatedSection& section) {
    Course course(section.basis);
    course.begin_life({.number = 1, .since = testing::simulation_start}, section.spec());
    return testing::run_course(course, simulate(section), 0, section.days);
}

// Sixteen running hours a day, six days a week: hour 1400 is on day 102, hour 2000 on day 145.
int day_of_hour(double running_h) {
    const int worked = static_cast<int>(running_h / 16.0);
    return worked / 6 * 7 + worked % 6;
}

// reference: onset_of - outside: truth of the simulation, a step to 1.5 at running hour 2000
TEST(Onset, OfAStepIsItsDay) {
    SimulatedSection section{.seed = 61, .days = 200};
    section.ratio = [](double h) { return h < 2000.0 ? 1.0 : 1.5; };
    const auto onset = onset_of(days_of(section), section.basis);
    ASSERT_TRUE(onset);
    EXPECT_NEAR(onset->date - simulated_day(0).date, day_of_hour(2000.0), 2);
    EXPECT_LE(onset->low, onset->date);
    EXPECT_GE(onset->high, onset->date);
    EXPECT_LE(onset->high - onset->low, 14);
    EXPECT_FALSE(onset->earlier);
}

// The ratio passes 1.05 a hundred hours after wear began at hour 1400.
//
// reference: onset_of - outside: truth of the simulation, ten sections that begin to wear at hour 1400
TEST(Onset, OfSlowWearIsInItsRange) {
    int held = 0;
    double off = 0.0;
    for (unsigned seed = 1; seed <= 10; ++seed) {
        SimulatedSection section{.seed = 600 + seed, .days = 200};
        section.ratio = [](double h) { return 1.0 + std::fmax(0.0, h - 1400.0) / 2000.0; };
        const auto onset = onset_of(days_of(section), section.basis);
        ASSERT_TRUE(onset) << seed;
        const int truth = simulated_day(0).date + day_of_hour(1500.0);
        held += onset->low <= truth && truth <= onset->high ? 1 : 0;
        off += (onset->date - truth) / 10.0;
        EXPECT_NEAR(onset->date, truth, 40) << seed;
    }
    EXPECT_GE(held, 6);
    EXPECT_NEAR(off, 0.0, 15.0);  // wear that has just begun is taken for the slow disturbance for some days
}

TEST(Onset, OfAHealthySectionThereIsNone) {
    EXPECT_FALSE(onset_of(days_of({.seed = 62, .days = 120}), Basis::case_drain));
    EXPECT_FALSE(onset_of({}, Basis::case_drain));
}

// reference: onset_of - hand-worked: what was before the life, or before the newest 180 judged days, is not looked at
TEST(Onset, LooksAtNoOtherLifeAndNoFurtherBackThanItMay) {
    SimulatedSection section{.seed = 63, .days = 330};
    section.ratio = [](double h) { return 1.0 + h / 2000.0; };
    std::vector<DayVerdict> days = days_of(section);
    const auto onset = onset_of(days, section.basis);
    ASSERT_TRUE(onset);
    EXPECT_TRUE(onset->earlier);
    EXPECT_EQ(onset->date - simulated_day(0).date, 330 - 211 + 1);  // 180 working days are 30 weeks less a Sunday
    for (std::size_t i = 0; i < 300; ++i) days[i].life = 0;
    EXPECT_EQ(onset_of(days, section.basis)->date - simulated_day(0).date, 300);
}

}  // namespace
}  // namespace slipledger::analytics
