// Each cause has a scenario in which it comes first, and one beside it in which the tempting wrong cause must not.
#include "analytics/sign_watch.hpp"

#include <algorithm>
#include <functional>

#include <gtest/gtest.h>

#include "tests/analytics/simulated_section.hpp"

namespace slipledger::analytics {
namespace {

using testing::Shown;
using testing::simulate;
using testing::simulated_day;
using testing::SimulatedSection;
using testing::simulation_start;

constexpr double begins = 1200.0;  // running hours: day 87

struct Outcome {
    std::vector<DayVerdict> days;
    std::vector<AlarmChange> changes;

    CauseKind last() const { return days.back().cause; }
    bool raised(Rule rule) const {
        return std::any_of(changes.begin(), changes.end(), [&](const AlarmChange& change) {
            return change.rule == rule && change.edge == AlarmEdge::raised;
        });
    }
    bool told_as_wear() const {
        return raised(Rule::leakage_ratio) || raised(Rule::efficiency) || raised(Rule::step_change);
    }
};

SimulatedSection section_of(Basis basis, std::uint32_t seed = 7) {
    SimulatedSection section{.seed = seed, .basis = basis, .days = 95};
    section.season_c = 3.0;
    return section;
}

SimulatedSection with_instruments(Basis basis, const std::function<void(Shown&, double)>& fail) {
    SimulatedSection section = section_of(basis);
    section.instruments = [fail](Shown& shown, double running_h) {
        if (running_h >= begins) fail(shown, running_h);
    };
    return section;
}

using OtherAt = std::function<OtherBasis(double running_h)>;

Outcome run(const SimulatedSection& section, const SectionSpec& spec, const OtherAt& other = {}) {
    Outcome outcome;
    Course course(section.basis);
    course.begin_life({.number = 1, .since = simulation_start}, spec);
    const auto hours = simulate(section);
    auto hour = hours.begin();
    double running_h = 0.0;
    for (int day = 0; day < section.days; ++day) {
        for (; hour != hours.end() && hour->day == day; ++hour, running_h += 1.0) course.take(hour->summary);
        outcome.days.push_back(course.finish_day(simulated_day(day)));
        if (!other) continue;
        constexpr double healthy = 3.0;
        const OtherBasis seen = other(running_h);
        DayVerdict verdict;
        verdict.leakage_lpm = healthy + seen.excess_lpm;
        verdict.excess_lpm = seen.excess_lpm;
        verdict.leakage_ratio = {.value = 1.0 + seen.excess_lpm / healthy,
                                 .low = 1.0 + seen.excess_low / healthy,
                                 .high = 1.0 + seen.excess_high / healthy};
        course.hear_other_basis(verdict);
    }
    outcome.changes = course.drain_alarm_changes();
    return outcome;
}

Outcome run(const SimulatedSection& section) {
    return run(section, section.spec());
}

double grows(double running_h) {
    return running_h < begins ? 1.0 : 1.0 + 4.0 * (running_h - begins) / 1000.0;
}

// reference: SignWatch::signs - outside: truth of the simulation, nothing but a season, a disturbance and heavier work
TEST(SignWatch, NamesNoCauseWhereThereIsNothingToExplain) {
    for (const Basis basis : {Basis::case_drain, Basis::delivery}) {
        SimulatedSection section = section_of(basis);
        section.pressure_shift = 1.2;
        const Outcome outcome = run(section);
        for (const DayVerdict& day : outcome.days) EXPECT_EQ(day.cause, CauseKind::none) << name_of(basis);
        EXPECT_TRUE(outcome.changes.empty());
    }
}

// reference: SignWatch::signs - outside: truth of the simulation
TEST(SignWatch, KnowsWearAndDoesNotBlameTheMeter) {
    for (const Basis basis : {Basis::case_drain, Basis::delivery}) {
        SimulatedSection section = section_of(basis);
        section.days = 110;
        section.ratio = grows;
        const Outcome outcome = run(section);
        EXPECT_EQ(outcome.last(), CauseKind::wear) << name_of(basis);
        EXPECT_TRUE(outcome.raised(Rule::leakage_ratio));
        EXPECT_FALSE(outcome.raised(Rule::instrument_suspect));
    }
}

// reference: SignWatch::signs - outside: truth of the simulation
TEST(SignWatch, KnowsSuddenDamageFromWearAndFromAMeterThatJumped) {
    SimulatedSection section = section_of(Basis::case_drain);
    section.ratio = [](double h) { return h < begins ? 1.0 : 1.7; };
    const Outcome broken = run(section);
    EXPECT_EQ(broken.last(), CauseKind::sudden_damage);
    EXPECT_TRUE(broken.raised(Rule::step_change));
    const Outcome jumped = run(with_instruments(Basis::case_drain, [](Shown& s, double) { s.flow_lpm += 1.3; }));
    EXPECT_EQ(jumped.last(), CauseKind::sensor_drifting);
    EXPECT_FALSE(jumped.told_as_wear());
    EXPECT_TRUE(jumped.raised(Rule::instrument_suspect));
}

// reference: SignWatch::signs - outside: truth of the simulation, the thermometer reads 8 K low at once
TEST(SignWatch, DoesNotTakeAThermometerThatJumpedForDamage) {
    const Outcome outcome = run(with_instruments(Basis::case_drain, [](Shown& s, double) { s.temperature_c -= 8.0; }));
    EXPECT_EQ(outcome.last(), CauseKind::sensor_drifting);
    EXPECT_FALSE(outcome.told_as_wear());
}

// reference: SignWatch::signs - outside: truth of the simulation, oil 15 K hotter, as thin as that makes it
TEST(SignWatch, KnowsHotOilFromWear) {
    SimulatedSection section = section_of(Basis::case_drain);
    section.heat = [](double h) { return h < begins ? 0.0 : 15.0; };
    const Outcome outcome = run(section);
    EXPECT_EQ(outcome.last(), CauseKind::thin_oil);
    EXPECT_FALSE(outcome.told_as_wear());
}

// reference: SignWatch::signs - outside: truth of the simulation: what each instrument does wrong from hour 1200 on
TEST(SignWatch, KnowsEachFaultOfAnInstrumentAndTellsNoneAsWear) {
    struct Case {
        const char* what;
        CauseKind cause;
        std::function<void(Shown&, double)> fail;
    };
    for (const Basis basis : {Basis::case_drain, Basis::delivery}) {
        const double flow = basis == Basis::case_drain ? 2.0 : 101.0;
        for (const Case& c :
             {Case{"meter stuck", CauseKind::sensor_stuck, [flow](Shown&s, double) { s.flow_lpm = flow; }},
              Case{"gauge stuck", CauseKind::sensor_stuck, [](Shown&s, double) { s.pressure_bar = 170.0; }},
              Case{"thermometer stuck", CauseKind::sensor_stuck, [](Shown&s, double) { s.temperature_c = 49.0; }},
              Case{"gallons", CauseKind::sensor_unit, [](Shown&s, double) { s.flow_lpm /= 3.785; }},
              Case{"degF", CauseKind::sensor_unit,
                   [](Shown&s, double) { s.temperature_c = 1.8 * s.temperature_c + 32.0; }},
              Case{"dead meter", CauseKind::sensor_off_scale, [](Shown&s, double) { s.flow_lpm = 0.0; }}}) {
            const Outcome outcome = run(with_instruments(basis, c.fail));
            EXPECT_EQ(outcome.last(), c.cause) << c.what << ", " << name_of(basis);
            EXPECT_FALSE(outcome.told_as_wear()) << c.what << ", " << name_of(basis);
            EXPECT_TRUE(outcome.raised(Rule::instrument_suspect)) << c.what << ", " << name_of(basis);
            EXPECT_EQ(outcome.days.back().reason, UnjudgedReason::instrument) << c.what;
        }
    }
}

// reference: SignWatch::signs - outside: truth of the simulation: pressures are those of three points before
TEST(SignWatch, KnowsALoggerWhoseClockIsOffFromAirInTheOil) {
    std::vector<double> past;
    SimulatedSection section = section_of(Basis::delivery);
    section.instruments = [&past](Shown& s, double running_h) {
        past.push_back(s.pressure_bar);
        if (running_h >= begins) s.pressure_bar = past[past.size() - 4];
    };
    EXPECT_EQ(run(section).last(), CauseKind::clock_off);
}

// reference: SignWatch::signs - hand-worked: no temperature for any point from hour 1200 on
TEST(SignWatch, KnowsAReadingThatStaysAway) {
    SimulatedSection section = section_of(Basis::case_drain);
    section.spoil = [](Summary& hour, double running_h) {
        if (running_h < begins) return;
        hour.judged = {};
        hour.judged_h = 0.0;
        hour.mean_temperature_c = unknown;
        hour.temperature_c = {};
        hour.counts = {};
        hour.counts[static_cast<std::size_t>(Standing::no_temperature)] = 6;
    };
    EXPECT_EQ(run(section).last(), CauseKind::feed_silent);
}

// reference: SignWatch::signs - hand-worked: case pressure 0.4 to 2 bar, three tenths of the drain gone
TEST(SignWatch, KnowsABlockedDrainFromAMeterThatReadsLow) {
    const auto less = [](Shown& s, double) { s.flow_lpm *= 0.7; };
    SimulatedSection section = with_instruments(Basis::case_drain, less);
    section.spoil = [](Summary& hour, double h) {
        hour.highest_case_bar = (h < begins ? 0.4 : 2.0) + 0.02 * std::sin(h);
    };
    EXPECT_EQ(run(section).last(), CauseKind::blocked_drain);
    section.spoil = [](Summary& hour, double h) { hour.highest_case_bar = 0.4 + 0.02 * std::sin(h); };
    EXPECT_NE(run(section).last(), CauseKind::blocked_drain);
}

// reference: SignWatch::signs - hand-worked: the plateau 12 bar above its 250
TEST(SignWatch, KnowsACompensatorOutOfAdjustment) {
    SimulatedSection section = section_of(Basis::case_drain);
    section.spoil = [](Summary& hour, double h) {
        hour.pressure_bar.high = h < begins ? 250.0 : 262.0;
        std::swap(hour.judged[0], hour.judged[1]);
        std::swap(hour.counts[0], hour.counts[1]);
    };
    SectionSpec spec = section.spec();
    spec.control = Control::pressure_compensated;
    spec.compensator_bar = 250.0;
    const Outcome outcome = run(section, spec);
    EXPECT_EQ(outcome.last(), CauseKind::compensator);
    EXPECT_FALSE(outcome.told_as_wear());
}

// reference: SignWatch::signs - hand-worked: 2 L/min +-1.5 gone from point to point, inlet 0.2 bar lower or not
TEST(SignWatch, KnowsAStarvedInletFromAirInTheOil) {
    for (const bool starved : {true, false}) {
        std::mt19937 random(11);
        std::normal_distribution<double> normal(2.0, 1.5);
        SimulatedSection section =
            with_instruments(Basis::delivery, [&](Shown& s, double) { s.flow_lpm -= std::abs(normal(random)); });
        section.spoil = [starved](Summary& hour, double h) {
            hour.lowest_inlet_bar = (starved && h >= begins ? -0.28 : -0.08) + 0.01 * std::sin(h);
        };
        const Outcome outcome = run(section);
        EXPECT_EQ(outcome.days[91].cause, starved ? CauseKind::inlet_starvation : CauseKind::air_in_oil);
    }
}

// reference: SignWatch::signs - hand-worked: 2.5 L/min gone at 190 bar that the case drain knows nothing of
TEST(SignWatch, LeavesAValveThatPassesAndAReturnInsideThePumpTheSameWeight) {
    const Outcome outcome = [] {
        SimulatedSection section = with_instruments(
            Basis::delivery, [](Shown& s, double) { s.flow_lpm -= 2.5 * std::sqrt(s.pressure_bar / 190.0); });
        return run(section, section.spec(), [](double) { return OtherBasis{0.0, -0.1, 0.1}; });
    }();
    ASSERT_GE(outcome.days.back().causes.size(), 2u);
    const RankedCause& first = outcome.days.back().causes[0];
    const RankedCause& second = outcome.days.back().causes[1];
    EXPECT_EQ(first.kind, CauseKind::internal_return);
    EXPECT_EQ(second.kind, CauseKind::bypass);
    EXPECT_DOUBLE_EQ(first.weight, second.weight);
}

// reference: SignWatch::signs, Course::hear_other_basis - hand-worked: the other flow agrees, or knows nothing of it
TEST(SignWatch, HearsTheOtherBasis) {
    SimulatedSection section = section_of(Basis::case_drain);
    section.days = 110;
    section.ratio = grows;
    const Outcome agrees = run(section, section.spec(), [](double h) {
        const double excess = 3.0 * (grows(h) - 1.0);
        return OtherBasis{excess, 0.8 * excess, 1.2 * excess};
    });
    EXPECT_EQ(agrees.last(), CauseKind::wear);
    const Outcome differs = run(section, section.spec(), [](double) { return OtherBasis{0.0, -0.1, 0.1}; });
    EXPECT_EQ(differs.last(), CauseKind::sensor_drifting);
}

// reference: other_basis_of - hand-worked: 4 L/min at ratio 2 (1.5 to 2.5), 2 of it healthy
TEST(SignWatch, TakesTheExcessOfTheOtherBasisFromItsVerdict) {
    DayVerdict verdict;
    verdict.leakage_lpm = 4.0;
    verdict.excess_lpm = 2.0;
    verdict.leakage_ratio = {.value = 2.0, .low = 1.5, .high = 2.5};
    const OtherBasis other = other_basis_of(verdict);
    EXPECT_DOUBLE_EQ(other.excess_lpm, 2.0);
    EXPECT_DOUBLE_EQ(other.excess_low, 1.0);
    EXPECT_DOUBLE_EQ(other.excess_high, 3.0);
}

// reference: SignWatch::signs - hand-worked: a meter that stuck and was mended is judged again, its wear alert comes
TEST(SignWatch, LetsTheWearAlertComeWhenTheDoubtGoes) {
    SimulatedSection section = section_of(Basis::case_drain);
    section.days = 130;
    section.ratio = grows;
    section.instruments = [](Shown& s, double h) {
        if (h >= begins && h < begins + 200.0) s.flow_lpm = 2.0;
    };
    const Outcome outcome = run(section);
    const auto suspect = std::find_if(outcome.changes.begin(), outcome.changes.end(), [](const AlarmChange& change) {
        return change.rule == Rule::instrument_suspect;
    });
    const auto wear = std::find_if(outcome.changes.begin(), outcome.changes.end(),
                                   [](const AlarmChange& change) { return decides_level(change.rule); });
    ASSERT_NE(suspect, outcome.changes.end());
    ASSERT_NE(wear, outcome.changes.end());
    EXPECT_LT(suspect->at, wear->at);
    EXPECT_GT(outcome.days.back().level, Level::sound);
}

}  // namespace
}  // namespace slipledger::analytics
