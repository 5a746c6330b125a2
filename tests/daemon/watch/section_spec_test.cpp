#include "daemon/watch/section_spec.hpp"

#include <gtest/gtest.h>

#include "daemon/watch/past_facts.hpp"
#include "daemon/watch/stretches.hpp"
#include "tests/daemon/watch/demo_pump.hpp"

namespace slipledger::watch {
namespace {

using namespace std::chrono_literals;
using analytics::Quantity;
using analytics::SectionSpec;

class SpecOfASection : public ::testing::Test {
protected:
    SpecOfASection() : plant_(demo_plant("", {"press-1"})) { section().relief_bar = 320.0; }

    config::Pump& pump() { return plant_.pumps.front(); }
    config::Section& section() { return pump().sections.front(); }
    SectionSpec spec(const SeenSensors& seen = {}) {
        return section_spec_of(plant_, pump(), section(), life_, false, seen, demo_begin);
    }

    config::Plant plant_;
    ledger::Life life_;
};

TEST_F(SpecOfASection, CarriesThePlantFilesFigures) {
    section().sensors[Quantity::case_drain_flow].accuracy = 0.05;
    section().sensors[Quantity::case_drain_flow].accuracy_percent = 2.0;
    section().sensors[Quantity::delivery_flow].measured_at = config::MeasuredAt::return_side;
    const SectionSpec made = spec();
    EXPECT_EQ(made.displacement_cm3, 71.0);
    EXPECT_EQ(made.relief_bar, 320.0);
    EXPECT_TRUE(std::isnan(made.compensator_bar));
    EXPECT_EQ(made.drain_meter.accuracy_lpm, 0.05);
    EXPECT_DOUBLE_EQ(made.drain_meter.gain_error, 0.02);
    EXPECT_FALSE(made.delivery_meter.on_pressure_side);
    EXPECT_EQ(made.limits.leakage_ratio.act, 3.0);
    EXPECT_EQ(made.baseline.least.h, 48.0);
    EXPECT_NEAR(made.fluid.kinematic_cst(40.0), 46.0, 0.01);
}

TEST_F(SpecOfASection, TakesDisplacementAndMakersTestOfTheLife) {
    section().maker_test = {{210.0, 1480.0, 32.0, 1.5, std::nullopt}, {100.0, 1480.0, 32.0, 0.8, std::nullopt}};
    EXPECT_EQ(spec().maker_test->leakage_lpm, 1.5);
    life_.displacement_cm3 = 75.0;
    life_.ended = demo_begin + 24h;
    EXPECT_EQ(spec().displacement_cm3, 75.0);
    EXPECT_FALSE(spec().maker_test) << "the plant file's test is of the part fitted today";
}

TEST_F(SpecOfASection, KnowsASensorByThePlantFileOrByReadings) {
    const SeenSensors none{false, false};
    EXPECT_FALSE(spec(none).has_speed_sensor);
    EXPECT_FALSE(spec(none).has_temperature_sensor);
    section().sensors[Quantity::shaft_speed] = {};
    EXPECT_TRUE(spec(none).has_speed_sensor);
    EXPECT_TRUE(spec().has_temperature_sensor);
}

TEST_F(SpecOfASection, CountsPlannedStopsOfItsAreaFromTheDayOn) {
    pump().area = "hall";
    plant_.planned_stops = {{demo_begin - 24h, demo_begin, {}},
                            {demo_begin + 24h, demo_begin + 30h, {"hall"}},
                            {demo_begin + 48h, demo_begin + 50h, {"yard"}},
                            {demo_begin + 72h, demo_begin + 80h, {}}};
    EXPECT_EQ(spec().second_next_planned_stop, demo_begin + 72h);
    EXPECT_FALSE(second_next_stop(plant_, "hall", demo_begin + 25h));
}

TEST(PastFacts, ComeBackFromTheirTextAsTheyWere) {
    config::Pump before = demo_pump("press-1");
    before.sections.front().compensator_bar = 250.0;
    before.sections.front().sensors[Quantity::case_drain_flow].accuracy = 0.1;
    before.sections.front().sensors[Quantity::case_drain_flow].hold = 20s;
    before.control = analytics::Control::pressure_compensated;
    before.motor.slip_at_rated = 0.02;
    config::Pump today = demo_pump("press-1");
    today.name = "Renamed";
    today.fluid.iso_vg = 68.0;
    const config::Pump then = with_facts(today, config::pump_facts(before));
    EXPECT_EQ(config::pump_facts(then), config::pump_facts(before));
    EXPECT_EQ(then.name, "Renamed");
}

TEST(Stretches, AreCutWhereALifeOrAFactOfTheSectionBegins) {
    const config::Pump before = demo_pump("press-1");
    config::Pump today = before;
    today.sections.front().compensator_bar = 240.0;
    auto first = *ledger::plant_change(before, {}, std::nullopt, demo_begin);
    first.id = 1;
    auto edited = *ledger::plant_change(today, std::vector{first}, demo_begin + 48h, demo_begin + 50h);
    edited.id = 2;
    ledger::Event replaced;
    replaced.id = 3;
    replaced.pump = "press-1";
    replaced.kind = "replaced";
    replaced.at = demo_begin + 24h;
    replaced.body = "{}";
    const auto stretches = stretches_of(today, today.sections.front(), std::vector{first, replaced, edited}, demo_begin);
    ASSERT_EQ(stretches.size(), 3U);
    EXPECT_EQ(stretches[0].life.number, 1);
    EXPECT_FALSE(stretches[0].watched_from_new);
    EXPECT_FALSE(stretches[0].section.compensator_bar);
    EXPECT_EQ(stretches[1].from, demo_begin + 24h);
    EXPECT_EQ(stretches[1].life.number, 2);
    EXPECT_TRUE(stretches[1].watched_from_new);
    EXPECT_EQ(stretches[2].from, demo_begin + 48h);
    EXPECT_EQ(stretches[2].section.compensator_bar, 240.0);
    EXPECT_EQ(stretch_at(stretches, demo_begin + 47h), 1U);
    EXPECT_EQ(stretch_at(stretches, demo_begin + 48h), 2U);
}

}  // namespace
}  // namespace slipledger::watch
