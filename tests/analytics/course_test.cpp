#include "analytics/course.hpp"

#include <algorithm>
#include <bit>
#include <chrono>
#include <cmath>
#include <cstdio>
#include <ctime>

#include <gtest/gtest.h>

#include "tests/analytics/simulated_section.hpp"

namespace slipledger::analytics {
namespace {

using testing::run_course;
using testing::simulate;
using testing::simulated_day;
using testing::SimulatedHour;
using testing::SimulatedSection;
using testing::simulation_start;

Course course_of(const SimulatedSection& section) {
    Course course(section.basis);
    course.begin_life({.number = 1, .since = simulation_start}, section.spec());
    return course;
}

int first_day(const std::vector<DayVerdict>& days, Level level) {
    for (std::size_t day = 0; day < days.size(); ++day)
        if (days[day].level >= level) return static_cast<int>(day);
    return -1;
}

Level highest(const std::vector<DayVerdict>& days) {
    Level level = Level::unjudged;
    for (const DayVerdict& day : days) level = std::max(level, day.level);
    return level;
}

// reference: Course::finish_day - outside: truth of the simulation, ratio 1 through a year whose oil swings by 16 K
TEST(Course, OfAHealthySectionStaysSoundThroughTheSeasonsAndANewPressure) {
    for (const Basis basis : {Basis::case_drain, Basis::delivery}) {
        SimulatedSection section{.seed = 31, .basis = basis};
        section.pressure_shift = 1.25;
        Course course = course_of(section);
        EXPECT_EQ(highest(run_course(course, simulate(section), 0, section.days)), Level::sound) << name_of(basis);
        EXPECT_TRUE(course.drain_alarm_changes().empty());
    }
}

// reference: Course::finish_day - outside: truth of the simulation, worn straight to 2.5 in 4992 running hours
TEST(Course, OfASectionThatWearsRisesToPlanWithItsRatioWithinATenth) {
    SimulatedSection section{.seed = 32};
    section.ratio = [](double h) { return 1.0 + 1.5 * h / 5000.0; };
    const auto hours = simulate(section);
    Course course = course_of(section);
    const auto days = run_course(course, hours, 0, section.days);
    EXPECT_NEAR(days.back().leakage_ratio.value / hours.back().true_ratio, 1.0, 0.1);
    EXPECT_EQ(days.back().level, Level::plan);
    EXPECT_GT(days.back().clearance_growth_percent, 25.0);
    // The true ratio passes 1.25 on day 60 and 2 on day 243.
    EXPECT_NEAR(first_day(days, Level::watch), 60, 25);
    EXPECT_NEAR(first_day(days, Level::plan), 243, 45);
    EXPECT_NEAR(days.back().excess_lpm / days.back().leakage_lpm, 0.6, 0.05);
    const auto changes = course.drain_alarm_changes();
    ASSERT_FALSE(changes.empty());
    EXPECT_EQ(changes.front().rule, Rule::leakage_ratio);
    EXPECT_EQ(changes.front().edge, AlarmEdge::raised);
    EXPECT_EQ(changes.front().at, days[static_cast<std::size_t>(first_day(days, Level::watch))].day.end);
}

// reference: Course::finish_day - outside: truth of the simulation, 2.5 (t / 5000)^2 reaches 3 at 5475 running hours
TEST(Course, OfAcceleratingWearHoldsItsTrueRemainingLifeInItsRange) {
    SimulatedSection section{.seed = 33};
    section.ratio = [](double h) { return std::exp(std::log(2.5) * h * h / 25.0e6); };
    Course course = course_of(section);
    const auto days = run_course(course, simulate(section), 0, section.days);
    const DayVerdict& day = days[330];
    ASSERT_TRUE(day.trend.established);
    const double left = 5475.0 - day.life_running_h;
    EXPECT_LT(day.hours_in_hand.low, left);
    EXPECT_GT(day.hours_in_hand.high, left);
    EXPECT_EQ(day.hours_in_hand.limit, "leakage-ratio");
    EXPECT_TRUE(std::isnan(days[60].hours_in_hand.mid));
    EXPECT_GT(days[60].hours_in_hand.low, 0.0);
}

// reference: Course::take - outside: truth of the simulation, a step to 1.6 at running hour 2500
TEST(Course, TellsAStepOnceItHasLastedHalfARunningDayAndNamesIt) {
    SimulatedSection section{.seed = 34, .days = 200};
    section.ratio = [](double h) { return h < 2500.0 ? 1.0 : 1.6; };
    Course course = course_of(section);
    const auto days = run_course(course, simulate(section), 0, section.days);
    const auto changes = course.drain_alarm_changes();
    ASSERT_FALSE(changes.empty());
    EXPECT_EQ(changes.front().rule, Rule::step_change);
    // Hour 2500 is the fourth of day 182 (16 running hours a day, six days a week); 12 running hours fill that day.
    const Instant stepped = simulated_day(182).begin + std::chrono::hours(10);
    EXPECT_GT(changes.front().at, stepped + std::chrono::hours(10));
    EXPECT_LE(changes.front().at, stepped + std::chrono::hours(24));
    const DayVerdict& told = std::isfinite(days[182].step_ratio) ? days[182] : days[183];
    EXPECT_NEAR(told.step_ratio, 1.6, 0.16);
    EXPECT_EQ(told.cause, CauseKind::sudden_damage);
    EXPECT_TRUE(std::isnan(days[183].clearance_growth_percent));
}

// reference: Course::change_facts - hand-worked: the same step in the hour of a change is not called one
TEST(Course, AttributesAStepToTheChangeOfTheSameHour) {
    SimulatedSection section{.seed = 35, .days = 120};
    section.ratio = [](double h) { return h < 1200.0 ? 1.0 : 1.5; };
    Course course = course_of(section);
    double running_h = 0.0;
    for (const SimulatedHour& hour : simulate(section)) {
        if (running_h == 1200.0) course.change_facts(hour.summary.start, section.spec());
        course.take(hour.summary);
        running_h += 1.0;
    }
    for (const AlarmChange& change : course.drain_alarm_changes()) EXPECT_NE(change.rule, Rule::step_change);
    EXPECT_EQ(course.quote(simulated_day(119)).cause, CauseKind::oil_or_operation);
}

// Splices two sections made from one seed: the second from day `day` on, told or not.
std::vector<SimulatedHour> spliced(const SimulatedSection& first, const SimulatedSection& then, int day) {
    std::vector<SimulatedHour> hours = simulate(first);
    const std::vector<SimulatedHour> later = simulate(then);
    for (std::size_t i = 0; i < hours.size(); ++i)
        if (hours[i].day >= day) hours[i] = later[i];
    return hours;
}

const Fluid thinner = *Fluid::from_grade(32.0, 100.0);

struct Told {
    Ranged before;
    Ranged after;
    Level highest_after = Level::unjudged;
};

// Runs to day 100, tells of the change, runs to the end.
Told tell_at_100(const SimulatedSection& section, const std::vector<SimulatedHour>& hours, const SectionSpec& spec,
                 const FactChange& change) {
    Course course = course_of(section);
    Told told;
    told.before = run_course(course, hours, 0, 100).back().leakage_ratio;
    course.change_facts(simulated_day(100).begin, spec, change);
    const auto days = run_course(course, hours, 100, section.days);
    told.after = days.back().leakage_ratio;
    told.highest_after = highest(days);
    return told;
}

// reference: Course::change_facts - outside: truth of the simulation, ratio 1 whatever the oil: VG 46 before, VG 32 after
TEST(Course, TakesAnotherOilForAnotherViscosityAndNotForWear) {
    SimulatedSection before{.seed = 51, .days = 160};
    SimulatedSection after = before;
    after.oil = after.told_oil = thinner;
    const Told told = tell_at_100(before, spliced(before, after, 100), after.spec(), {.oil = true, .oil_by_label = true});
    EXPECT_NEAR(told.after.value / told.before.value, 1.0, 0.03);
    EXPECT_EQ(told.highest_after, Level::sound);

    SimulatedSection unknowing = before;  // the same oil, and nobody says so
    unknowing.oil = thinner;
    const Told silent = tell_at_100(before, spliced(before, unknowing, 100), before.spec(), {});
    EXPECT_GT(silent.after.value, 1.3);
}

// reference: Course::change_facts - outside: truth of the simulation, an oil 7 % thinner than its label, within the grade
TEST(Course, LearnsHowThickANewOilReallyIs) {
    SimulatedSection before{.seed = 52, .days = 160};
    SimulatedSection after = before;
    after.told_oil = thinner;
    after.oil = *Fluid::from_points({40.0, 0.93 * 32.0}, {100.0, thinner.kinematic_cst(100.0) * 0.95});
    const auto hours = spliced(before, after, 100);
    const Told told = tell_at_100(before, hours, after.spec(), {.oil = true, .oil_by_label = true});
    EXPECT_NEAR(told.after.value / told.before.value, 1.0, 0.03);
    EXPECT_EQ(told.highest_after, Level::sound);
    const Told measured = tell_at_100(before, hours, after.spec(), {.oil = true});  // as if the figure were measured
    EXPECT_GT(measured.after.value / measured.before.value, told.after.value / told.before.value + 0.01);
}

// reference: Course::change_facts - outside: truth of the simulation, ratio 1 under a meter that shows 25 % more
TEST(Course, LearnsANewMetersGainInsteadOfWear) {
    SimulatedSection before{.seed = 53, .days = 160};
    SimulatedSection after = before;
    after.meter_gain = 1.25;
    const auto hours = spliced(before, after, 100);
    FactChange meter;
    meter.instruments = static_cast<std::uint16_t>(1U << index_of(Quantity::case_drain_flow));
    const Told told = tell_at_100(before, hours, before.spec(), meter);
    EXPECT_NEAR(told.after.value / told.before.value, 1.0, 0.04);
    EXPECT_EQ(told.highest_after, Level::sound);
    EXPECT_GE(tell_at_100(before, hours, before.spec(), {}).highest_after, Level::watch);
}

// The meter shows 40 % more from day 100 on, and somebody holds a bucket under the drain on day 120: 2.6 L/min, as healthy.
// reference: Course::reference_test - outside: truth of the simulation, ratio 1 throughout
TEST(Course, BelievesABucketBeforeTheMeterAndSaysThatTheMeterIsSuspect) {
    SimulatedSection before{.seed = 54, .days = 180};
    SimulatedSection after = before;
    after.meter_gain = 1.4;
    const auto hours = spliced(before, after, 100);
    Course course = course_of(before);
    run_course(course, hours, 0, 120);
    ASSERT_GT(course.quote(simulated_day(119)).leakage_ratio.value, 1.3);
    course.drain_alarm_changes();
    course.reference_test(simulated_day(120).begin, {.flow_lpm = 2.6, .at = before.spec().reference});
    EXPECT_NEAR(course.quote(simulated_day(120)).leakage_ratio.value, 1.0, 0.05);
    const auto days = run_course(course, hours, 120, before.days);
    EXPECT_NEAR(days.back().leakage_ratio.value, 1.0, 0.06);
    EXPECT_EQ(days.back().level, Level::sound);
    const auto changes = course.drain_alarm_changes();
    EXPECT_TRUE(std::ranges::any_of(changes, [](const AlarmChange& change) {
        return change.rule == Rule::instrument_suspect && change.edge == AlarmEdge::raised;
    }));
}

// reference: Course::reference_test - hand-worked: a bucket that agrees leaves the ratio, another basis' test is not heard
TEST(Course, IsConfirmedByATestThatAgrees) {
    SimulatedSection section{.seed = 55, .days = 150};
    section.ratio = [](double h) { return 1.0 + h / 4000.0; };
    const auto hours = simulate(section);
    Course course = course_of(section);
    run_course(course, hours, 0, section.days);
    const DayVerdict before = course.quote(simulated_day(150));
    course.reference_test(simulated_day(150).begin, {.of = Basis::delivery, .flow_lpm = 90.0, .at = section.spec().reference});
    EXPECT_EQ(course.quote(simulated_day(150)).leakage_ratio.value, before.leakage_ratio.value);
    course.reference_test(simulated_day(150).begin,
                          {.flow_lpm = 2.6 * hours.back().true_ratio, .at = section.spec().reference});
    const DayVerdict after = course.quote(simulated_day(150));
    EXPECT_NEAR(after.leakage_ratio.value, before.leakage_ratio.value, 0.05);
    EXPECT_LT(after.leakage_ratio.high - after.leakage_ratio.low, before.leakage_ratio.high - before.leakage_ratio.low);
}

// A pump worn to 1.6 is taken over: beside itself it looks healthy, beside the maker's figure it does not.
// reference: Course::begin_life - outside: truth of the simulation, ratio 1.6, the maker's 2.6 L/min when new
TEST(Course, OfAWornPumpThatIsTakenOverIsHeldAgainstWhatIsToldOfNew) {
    SimulatedSection section{.seed = 56, .days = 60};
    section.ratio = [](double) { return 1.6; };
    const auto hours = simulate(section);
    Course alone = course_of(section);
    const DayVerdict beside_itself = run_course(alone, hours, 0, section.days).back();
    EXPECT_NEAR(beside_itself.leakage_ratio.value, 1.0, 0.05);
    EXPECT_EQ(beside_itself.baseline, BaselineKind::watching_began);

    SectionSpec told = section.spec();
    told.sisters = SistersFigure{.leakage_lpm = 2.6, .sd = 0.16, .count = 4};
    Course beside_sisters(section.basis);
    beside_sisters.begin_life({.number = 1, .since = simulation_start}, told);
    const DayVerdict day = run_course(beside_sisters, hours, 0, section.days).back();
    EXPECT_EQ(day.baseline, BaselineKind::sisters);
    EXPECT_GT(day.leakage_ratio.value, 1.35);
    EXPECT_GT(day.leakage_ratio.high, 1.6);
    EXPECT_LT(day.leakage_ratio.low, 1.6);
}

// reference: Course::finish_day - hand-worked: the law at the reference point is the healthy leakage there, 2.6 L/min
TEST(Course, QuotesTheLawOfItsHealthyLeakage) {
    const SimulatedSection section{.seed = 57, .days = 60};
    Course course = course_of(section);
    const DayVerdict day = run_course(course, simulate(section), 0, section.days).back();
    EXPECT_NEAR(leakage_lpm(day.healthy, reference_state(section.spec())), 2.6, 0.1);
    EXPECT_LT(day.healthy_sd, 0.1);
}

// reference: Course::take - outside: truth of the simulation, worn to 1.9 and replaced at running hour 1800 in silence
TEST(Course, NoticesAReplacementThatNobodyTold) {
    SimulatedSection section{.seed = 58, .days = 160};
    section.ratio = [](double h) { return h < 1800.0 ? 1.0 + h / 2000.0 : 1.0; };
    const auto hours = simulate(section);
    const Instant replaced = hours[1800].summary.start;
    Course course = course_of(section);
    const auto days = run_course(course, hours, 0, section.days);
    const LikelyReplacement likely = days.back().replacement;
    ASSERT_TRUE(likely.at);
    EXPECT_LE(std::chrono::abs(*likely.at - replaced), std::chrono::hours(2));
    EXPECT_NEAR(likely.ratio_before, 1.85, 0.15);
    EXPECT_LT(likely.ratio_after, 1.2);
    const auto changes = course.drain_alarm_changes();
    const auto told = std::ranges::find(changes, Rule::unrecorded_replacement, &AlarmChange::rule);
    ASSERT_NE(told, changes.end());
    EXPECT_EQ(told->edge, AlarmEdge::raised);
    EXPECT_LE(told->at, replaced + std::chrono::hours(24));
    EXPECT_FALSE(days[100].replacement.at);

    Course other = course_of(section);
    for (const SimulatedHour& hour : hours) {
        if (hour.summary.start == replaced) other.change_facts(replaced, section.spec());
        other.take(hour.summary);
    }
    EXPECT_FALSE(other.quote(simulated_day(159)).replacement.at) << "the change of the same hour explains it";
}

// reference: Course::begin_life - hand-worked: after a replacement the new life learns from 1 and old episodes are over
TEST(Course, OfANewLifeBeginsAnew) {
    SimulatedSection section{.seed = 36, .days = 300};
    section.ratio = [](double h) { return h < 2400.0 ? 1.0 + h / 2000.0 : 1.0; };
    const auto hours = simulate(section);
    Course course = course_of(section);
    run_course(course, hours, 0, 175);
    EXPECT_EQ(course.quote(simulated_day(174)).level, Level::plan);
    course.drain_alarm_changes();
    course.begin_life({.number = 2, .since = simulated_day(175).begin}, section.spec());
    const auto ended = course.drain_alarm_changes();
    ASSERT_FALSE(ended.empty());
    for (const AlarmChange& change : ended) {
        EXPECT_EQ(change.edge, AlarmEdge::returned);
        EXPECT_EQ(change.life, 1);
        EXPECT_EQ(change.at, simulated_day(175).begin);
    }
    const auto days = run_course(course, hours, 175, section.days);
    EXPECT_EQ(days.front().reason, UnjudgedReason::learning);
    EXPECT_EQ(days.front().life, 2);
    EXPECT_EQ(days.back().level, Level::sound);
    EXPECT_NEAR(days.back().leakage_ratio.value, 1.0, 0.08);
}

void expect_same(const DayVerdict& a, const DayVerdict& b) {
    EXPECT_EQ(a.level, b.level);
    EXPECT_EQ(a.reason, b.reason);
    const auto bits = [](const DayVerdict& day) {
        return std::vector<std::uint64_t>{std::bit_cast<std::uint64_t>(day.leakage_ratio.value),
                                          std::bit_cast<std::uint64_t>(day.leakage_ratio.low),
                                          std::bit_cast<std::uint64_t>(day.efficiency.value),
                                          std::bit_cast<std::uint64_t>(day.excess_lpm),
                                          std::bit_cast<std::uint64_t>(day.trend.per_1000_h.value),
                                          std::bit_cast<std::uint64_t>(day.hours_in_hand.low),
                                          std::bit_cast<std::uint64_t>(day.life_running_h)};
    };
    EXPECT_EQ(bits(a), bits(b));
}

// reference: Course::checkpoint, Course::restore - hand-worked: taken up at any day, the rest is the same to the bit
TEST(Course, PutDownAndTakenUpAtAnyDayGoesOnBitForBit) {
    SimulatedSection section{.seed = 37, .days = 90};
    section.ratio = [](double h) { return h < 600.0 ? 1.0 : 1.5 + h / 3000.0; };
    const auto hours = simulate(section);
    Course whole = course_of(section);
    const auto expected = run_course(whole, hours, 0, section.days);
    const auto end = whole.checkpoint();
    for (const int day : {0, 1, 5, 43, 44, 45, 60, 89}) {
        Course first = course_of(section);
        run_course(first, hours, 0, day);
        const auto bytes = first.checkpoint();
        auto second = Course::restore(bytes, section.spec());
        ASSERT_TRUE(second);
        EXPECT_EQ(second->checkpoint(), bytes);
        const auto days = run_course(*second, hours, day, section.days);
        for (std::size_t i = 0; i < days.size() && !HasFailure(); ++i)
            expect_same(days[i], expected[static_cast<std::size_t>(day) + i]);
        EXPECT_EQ(second->checkpoint(), end) << "taken up on day " << day;
    }
}

TEST(Course, IsNotTakenUpFromBytesOfAnotherVersion) {
    const SimulatedSection section;
    auto bytes = course_of(section).checkpoint();
    bytes.pop_back();
    EXPECT_FALSE(Course::restore(bytes, section.spec()));
    bytes[0] ^= std::byte{0xff};
    EXPECT_FALSE(Course::restore(bytes, section.spec()));
    EXPECT_FALSE(Course::restore({}, section.spec()));
}

// reference: Course::quote - hand-worked: a day quoted many times changes nothing
TEST(Course, QuotedInTheMiddleOfADayIsNotMoved) {
    const SimulatedSection section{.seed = 38, .days = 20};
    Course plain = course_of(section);
    Course quoted_often = course_of(section);
    for (const SimulatedHour& hour : simulate(section)) {
        plain.take(hour.summary);
        quoted_often.take(hour.summary);
        quoted_often.quote(simulated_day(hour.day));
    }
    EXPECT_EQ(plain.checkpoint(), quoted_often.checkpoint());
}

TEST(Course, SaysWhyItHasNoLevelYet) {
    const SimulatedSection section{.seed = 39, .days = 10};
    const auto hours = simulate(section);
    Course course = course_of(section);
    EXPECT_EQ(course.finish_day(simulated_day(0)).reason, UnjudgedReason::no_data);
    course.take(hours.front().summary);
    const DayVerdict learning = course.finish_day(simulated_day(1));
    EXPECT_EQ(learning.reason, UnjudgedReason::learning);
    EXPECT_EQ(learning.level, Level::unjudged);
    EXPECT_DOUBLE_EQ(learning.learning_h_left, 50.0);  // the run-in does not count
    SectionSpec blind = section.spec();
    blind.has_temperature_sensor = false;
    Course without(Basis::case_drain);
    without.begin_life({}, blind);
    EXPECT_EQ(without.quote(simulated_day(0)).reason, UnjudgedReason::no_temperature);
}

// reference: Course::finish_day - hand-worked: 3 judged of 48 running hours are under a tenth
TEST(Course, OfASectionThatIsSeldomJudgedIsNeverSound) {
    const SimulatedSection section{.seed = 40, .days = 80};
    Course course = course_of(section);
    auto hours = simulate(section);
    int count = 0;
    for (SimulatedHour& hour : hours) {
        if (hour.day < 20 || count++ % 16 == 0) continue;
        hour.summary.judged = {};
        hour.summary.judged_h = 0.0;
    }
    const auto days = run_course(course, hours, 0, section.days);
    EXPECT_EQ(days[19].level, Level::sound);
    EXPECT_EQ(days.back().level, Level::unjudged);
    EXPECT_EQ(days.back().reason, UnjudgedReason::seldom_judged);
}

// reference: Course::take, Course::drain_alarm_changes - hand-worked: raw rules go by each summary, with their delays
TEST(Course, RaisesWhatASummaryShowsBySelf) {
    const SimulatedSection section{.seed = 41, .days = 1};
    SectionSpec spec = section.spec();
    spec.limits.over_temperature_c = {.watch = 80.0, .on_delay = std::chrono::hours(1)};
    Course course(Basis::case_drain);
    course.begin_life({}, spec);
    Summary hot = simulate(section).front().summary;
    hot.highest_temperature_c = 85.0;
    course.take(hot);
    EXPECT_TRUE(course.drain_alarm_changes().empty());
    hot.start += std::chrono::hours(1);
    const SummaryVerdict verdict = course.take(hot);
    const auto changes = course.drain_alarm_changes();
    ASSERT_EQ(changes.size(), 1u);
    EXPECT_EQ(changes[0].rule, Rule::over_temperature);
    EXPECT_EQ(changes[0].at, hot.start + std::chrono::hours(1));
    EXPECT_EQ(verdict.level, Level::unjudged);  // it raises an alarm, not the level
}

// reference: Course::take - hand-worked: what no pump can do is refused, told, and moves nothing
TEST(Course, DistrustsTheInstrumentWhenReadingsContradict) {
    const SimulatedSection section{.seed = 42, .days = 20};
    Course course = course_of(section);
    const auto hours = simulate(section);
    run_course(course, hours, 0, section.days);
    const double before = course.quote(simulated_day(20)).leakage_ratio.value;
    Summary wrong = hours.back().summary;
    wrong.start += std::chrono::hours(10);
    wrong.judged[0].leakage_lpm = 300.0;
    course.drain_alarm_changes();
    EXPECT_TRUE(std::isnan(course.take(wrong).leakage_ratio.value));
    EXPECT_EQ(course.quote(simulated_day(20)).leakage_ratio.value, before);
    const auto changes = course.drain_alarm_changes();
    ASSERT_EQ(changes.size(), 1u);
    EXPECT_EQ(changes[0].rule, Rule::instrument_suspect);
}

TEST(Course, CostsLittlePerSummary) {
    const SimulatedSection section{.seed = 43};
    const auto hours = simulate(section);
    Course course = course_of(section);
    const auto began = std::clock();
    run_course(course, hours, 0, section.days);
    const double us =
        1e6 * static_cast<double>(std::clock() - began) / CLOCKS_PER_SEC / static_cast<double>(hours.size());
    std::printf("course: %.1f us of processor time per summary\n", us);
    EXPECT_LT(us, 500.0);  // a debug build under a sanitizer; the release build is meant to be under 10
}

}  // namespace
}  // namespace slipledger::analytics
