// Told held against truth, on a pump of which every number is known.
#include "tools/judging/marks.hpp"

#include <gtest/gtest.h>

#include <cmath>

#include "tools/plantsim/gap_sets.hpp"

namespace slipledger::judging {
namespace {

using plantsim::day_ms;
using plantsim::WearLaw;

constexpr int span_days = 200;

// Runs from the first day to the last but for breaks and weekends; its ratio goes straight from 1 to 3.
plantsim::PlantDrawing plant_of(plantsim::Wear wear) {
    plantsim::PlantDrawing plant{.time_zone = "UTC", .year_begins = 1704067200000};
    plant.year_ends = plant.year_begins + span_days * day_ms;
    plant.reservoirs = {{.id = "tank"}};
    plant.pumps = {
        {.id = "pump-1",
         .rated = {280.0, 1480.0, 50.0},
         .sections = {{.id = "A",
                       .fitted = {.drain = true},
                       .product_bar = {160.0, 200.0},
                       .lives = {{.displacement_cm3 = 140.0, .gaps = plantsim::axial_piston_gaps(), .wear = wear}}}}}};
    return plant;
}

constexpr plantsim::Wear straight{.end_ratio = 3.0, .begins = 0.0, .bend = 1.0, .law = WearLaw::ratio_power};

class Marked : public ::testing::Test {
protected:
    Millis day(int number) const { return mill_.plant().year_begins + number * day_ms; }

    // Sound, true to the last digit, and silent.
    SectionTold perfect() const {
        SectionTold told;
        for (int number = 1; number <= span_days; ++number)
            told.days.push_back({.end = day(number),
                                 .judged = true,
                                 .ratio = truth_.ratio(Seen::drain, day(number)),
                                 .efficiency = truth_.efficiency(Seen::drain, true, day(number))});
        return told;
    }

    Marks marks_of(const SectionTold& told) const { return mark(story_, truth_, {}, told); }

    plantsim::Mill mill_{plant_of(straight), 1};
    SectionStory story_{.shape = WearShape::linear};
    Truth truth_{mill_, story_};
};

TEST_F(Marked, TruthPassesTheRatiosOfAStraightLineWhereItShould) {
    const double year_h = truth_.running_h(mill_.plant().year_ends);
    EXPECT_NEAR(truth_.running_h(truth_.ratio_passes(2.0).value()), 0.5 * year_h, 0.01 * year_h);
    EXPECT_NEAR(truth_.running_h(truth_.ratio_passes(1.25).value()), 0.125 * year_h, 0.01 * year_h);
    EXPECT_FALSE(truth_.ratio_passes(3.1).has_value());
}

TEST_F(Marked, LifeGoesOnBeyondTheSimulatedSpan) {
    const double year_h = truth_.running_h(mill_.plant().year_ends);
    const ActLimits far{.ratio = 5.0, .points_lost = std::nan(""), .drain_share_percent = std::nan("")};
    EXPECT_NEAR(truth_.life_h(Seen::drain, true, far, mill_.plant().year_ends), year_h, 0.01 * year_h);
}

TEST_F(Marked, PerfectDaysHaveNoError) {
    for (const ErrorMark& error : marks_of(perfect()).errors) {
        EXPECT_TRUE(std::isnan(error.ratio) || std::abs(error.ratio) < 1e-9);
        EXPECT_NEAR(error.efficiency, 0.0, 1e-9);
    }
}

TEST_F(Marked, SilenceIsNeverInTime) {
    const Marks marks = marks_of(perfect());
    EXPECT_EQ(marks.told_before_2, false);
    EXPECT_TRUE(std::isinf(marks.delay_days.value()));
    EXPECT_EQ(marks.false_alerts, 0);
}

TEST_F(Marked, AnAlertFiveDaysBeforeTheCrossingCountsAsMinusFive) {
    SectionTold told = perfect();
    told.alerts = {{.raised = truth_.ratio_passes(1.25).value() - 5 * day_ms}};
    const Marks marks = marks_of(told);
    EXPECT_NEAR(marks.delay_days.value(), -5.0, 1e-6);
    EXPECT_EQ(marks.told_before_2, true);
    EXPECT_EQ(marks.false_alerts, 0);
}

TEST_F(Marked, AnAlertBeforeRatioOnePointOneIsFalseAndATakenBackOneTellsNothing) {
    const Millis wears = truth_.ratio_passes(1.1).value();
    SectionTold told = perfect();
    told.alerts = {{.raised = wears - 5 * day_ms, .cleared = wears - 2 * day_ms}};
    const Marks marks = marks_of(told);
    EXPECT_EQ(marks.false_alerts, 1);
    EXPECT_EQ(marks.told_before_2, false);
}

TEST_F(Marked, RangesHoldWhereTheTrueLifeLiesInThem) {
    const Millis when = day(60);
    const double life = truth_.life_h(Seen::drain, true, {}, when);
    const auto with_range = [&](double low, double high) {
        SectionTold told = perfect();
        DayTold& given = told.days.at(59);
        given.life_given = true;
        given.life_low_h = low * life;
        given.life_high_h = high * life;
        return marks_of(told).first_life.value();
    };
    EXPECT_TRUE(with_range(0.8, 1.5).holds);
    EXPECT_NEAR(with_range(0.8, 1.5).width, 0.7, 1e-9);
    EXPECT_NEAR(with_range(0.8, 1.5).score, 0.7, 1e-9);
    EXPECT_FALSE(with_range(1.2, 1.5).holds);
    EXPECT_NEAR(with_range(1.2, 1.5).score, 0.3 + 10.0 * 0.2, 1e-9);  // width, and 2 / alpha times the miss
}

TEST_F(Marked, AHealthyPumpsEveryAlertIsFalse) {
    story_.shape = WearShape::none;
    SectionTold told = perfect();
    told.alerts = {{.raised = day(20), .cleared = day(30)}, {.raised = day(150)}};
    const Marks marks = marks_of(told);
    EXPECT_EQ(marks.false_alerts, 2);
    EXPECT_NEAR(marks.sound_years, span_days / 365.25, 1e-9);
}

TEST_F(Marked, ATakenOverPumpCalledSoundMustSaySinceWhen) {
    story_.taken_over = true;
    SectionTold told = perfect();
    told.sound_at_end = true;
    told.compared_with = "when watching began (2024-01-01)";
    told.sentence = "The pump leaks what it did when watching began (2024-01-01).";
    EXPECT_FALSE(marks_of(told).hides_what_it_is_compared_with);
    told.compared_with = "when new";
    told.sentence = "The pump leaks what it did when new.";
    EXPECT_TRUE(marks_of(told).hides_what_it_is_compared_with);
}

class Broken : public ::testing::Test {
protected:
    static constexpr Millis at = 1704067200000 + 100 * day_ms + 10 * plantsim::hour_ms;
    plantsim::Mill mill_{plant_of({.step_at = at, .step_ratio = 1.8}), 1};
    Truth truth_{mill_, {.steps = true}};
};

TEST_F(Broken, StepIsToldWithinADaysRunningAndCalledByItsName) {
    const SectionStory story{.steps = true};
    SectionTold told;
    told.days = {{.end = at + day_ms, .judged = true}};
    told.alerts = {{.raised = at + 12 * plantsim::hour_ms}};
    EXPECT_EQ(mark(story, truth_, {}, told).step_told, true);
    EXPECT_EQ(mark(story, truth_, {}, told).step_called, false);
    told.alerts = {{.raised = at + 4 * day_ms}};
    told.steps = {at + 4 * day_ms};
    EXPECT_EQ(mark(story, truth_, {}, told).step_told, false);
    EXPECT_EQ(mark(story, truth_, {}, told).step_called, true);
}

}  // namespace
}  // namespace slipledger::judging
