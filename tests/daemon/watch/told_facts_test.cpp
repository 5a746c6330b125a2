// What people tell between two edits of the plant file, laid over what it says.
#include "daemon/watch/told_facts.hpp"

#include <gtest/gtest.h>

#include "analytics/fluid.hpp"
#include "daemon/ledger/lives.hpp"
#include "daemon/watch/stretches.hpp"
#include "tests/daemon/watch/demo_pump.hpp"

namespace slipledger::watch {
namespace {

using namespace std::chrono_literals;
using analytics::Instant;

class ToldFacts : public ::testing::Test {
protected:
    ToldFacts() : today_(demo_pump("press-1")) {
        today_.control = analytics::Control::pressure_compensated;
        today_.sections.front().compensator_bar = 250.0;
        events_.push_back(*ledger::plant_change(today_, {}, std::nullopt, demo_begin));
        events_.back().id = 1;
    }

    void tell(const std::string& kind, Instant at, const std::string& body, const std::string& pump = "press-1") {
        ledger::Event event;
        event.id = static_cast<std::int64_t>(events_.size()) + 1;
        event.pump = pump;
        event.kind = kind;
        event.at = at;
        event.body = body;
        events_.push_back(event);
        std::ranges::stable_sort(events_, {}, &ledger::Event::at);
    }

    // The plant file was edited, with its facts from then on.
    void edit(Instant at) {
        const auto told = ledger::plant_change(today_, events_, at, at);
        ASSERT_TRUE(told);
        tell("plant-changed", at, told->body);
    }

    std::vector<Stretch> stretches() const {
        return stretches_of(today_, today_.sections.front(), events_, demo_begin);
    }
    Stretch at(Instant instant) const {
        const auto all = stretches();
        return all[stretch_at(all, instant)];
    }

    config::Pump today_;
    std::vector<ledger::Event> events_;
};

const std::string vg32 = R"({"reservoir":"tank","fluid":{"name":"VG 32","iso_vg":32,"viscosity_index":100}})";

TEST_F(ToldFacts, OfAnotherOilHoldFromTheirTimeOnForTheReservoirAlone) {
    tell("oil-changed", demo_begin + 10h, vg32, "");
    tell("oil-changed", demo_begin + 20h, R"({"reservoir":"other","fluid":{"iso_vg":68,"viscosity_index":100}})", "");
    EXPECT_EQ(at(demo_begin + 9h).pump.fluid.iso_vg, 46.0);
    EXPECT_EQ(at(demo_begin + 10h).pump.fluid.iso_vg, 32.0);
    EXPECT_EQ(at(demo_begin + 30h).pump.fluid.iso_vg, 32.0);
    EXPECT_TRUE(at(demo_begin + 10h).begins_with.oil_by_label);
    EXPECT_EQ(at(demo_begin + 30h).pump.fluid.maximum_cst, 400.0) << "what is not told of the oil stays";
}

TEST_F(ToldFacts, OfAnOilAreOutrankedByThePlantFileOnceItsOilIsEdited) {
    tell("oil-changed", demo_begin + 10h, vg32, "");
    today_.sections.front().relief_bar = 320.0;
    edit(demo_begin + 20h);
    EXPECT_EQ(at(demo_begin + 25h).pump.fluid.iso_vg, 32.0) << "an edit of something else says nothing of the oil";
    today_.fluid.iso_vg = 68.0;
    edit(demo_begin + 30h);
    EXPECT_EQ(at(demo_begin + 25h).pump.fluid.iso_vg, 32.0);
    EXPECT_EQ(at(demo_begin + 30h).pump.fluid.iso_vg, 68.0);
    tell("oil-changed", demo_begin + 40h, R"({"reservoir":"tank"})", "");
    EXPECT_EQ(at(demo_begin + 41h).pump.fluid.iso_vg, 68.0) << "the same oil again";
    EXPECT_TRUE(at(demo_begin + 41h).begins_with.oil);
}

TEST_F(ToldFacts, OfASampleReplaceTheViscosityAndLeaveItOpenOnlyTheFirstTime) {
    tell("oil-sample", demo_begin + 10h, R"({"reservoir":"tank","viscosity_40_cst":42.0,"viscosity_100_cst":6.4})", "");
    tell("oil-sample", demo_begin + 20h, R"({"reservoir":"tank","viscosity_40_cst":41.0,"viscosity_100_cst":6.3})", "");
    tell("oil-sample", demo_begin + 30h, R"({"reservoir":"tank","viscosity_40_cst":5.0,"viscosity_100_cst":6.3})", "");
    tell("oil-sample", demo_begin + 40h, R"({"reservoir":"tank","water_ppm":120})", "");
    ASSERT_EQ(at(demo_begin + 11h).pump.fluid.points.size(), 2U);
    EXPECT_EQ(at(demo_begin + 11h).pump.fluid.points[0].viscosity_cst, 42.0);
    EXPECT_FALSE(at(demo_begin + 11h).pump.fluid.iso_vg);
    EXPECT_TRUE(at(demo_begin + 11h).begins_with.oil_by_label) << "until then it was known by its label";
    EXPECT_TRUE(at(demo_begin + 21h).begins_with.oil);
    EXPECT_FALSE(at(demo_begin + 21h).begins_with.oil_by_label);
    EXPECT_EQ(at(demo_begin + 50h).pump.fluid.points[0].viscosity_cst, 41.0) << "no oil is thicker when hot";
}

// reference value: an oil of grade 46 and index 100; ASTM D2270 inverted gives 6.36 mm2/s at 100 degC for 42 at 40.
TEST_F(ToldFacts, OfASampleAtOneTemperatureKeepTheIndex) {
    tell("oil-sample", demo_begin + 10h, R"({"reservoir":"tank","viscosity_40_cst":42.0})", "");
    const auto points = at(demo_begin + 11h).pump.fluid.points;
    ASSERT_EQ(points.size(), 2U);
    EXPECT_NEAR(points[1].viscosity_cst, analytics::viscosity_at_100_cst(42.0, 100.0), 0.01);
}

TEST_F(ToldFacts, OfACompensatorMoveItsSettingUntilThePlantFilesIsEdited) {
    tell("compensator-set", demo_begin + 10h, R"({"bar":228})");
    EXPECT_EQ(at(demo_begin + 9h).section.compensator_bar, 250.0);
    EXPECT_FALSE(at(demo_begin + 9h).setting_since);
    EXPECT_EQ(at(demo_begin + 11h).section.compensator_bar, 228.0);
    EXPECT_EQ(at(demo_begin + 11h).pump.sections.front().compensator_bar, 228.0);
    EXPECT_EQ(at(demo_begin + 11h).setting_since, demo_begin + 10h);
    EXPECT_TRUE(at(demo_begin + 11h).begins_with.setting);
    today_.sections.front().compensator_bar = 240.0;
    edit(demo_begin + 20h);
    EXPECT_EQ(at(demo_begin + 21h).section.compensator_bar, 240.0);
    EXPECT_EQ(at(demo_begin + 21h).setting_since, demo_begin + 20h);
}

TEST_F(ToldFacts, OfAnInstrumentNameWhatItMeasures) {
    tell("instrument-changed", demo_begin + 10h, R"({"quantity":"case_drain_flow"})");
    tell("instrument-changed", demo_begin + 20h, R"({"quantity":"nonsense"})");
    EXPECT_TRUE(at(demo_begin + 10h).begins_with.changes(analytics::Quantity::case_drain_flow));
    EXPECT_FALSE(at(demo_begin + 10h).begins_with.changes(analytics::Quantity::delivery_flow));
    EXPECT_EQ(at(demo_begin + 20h).begins_with, analytics::FactChange{});
}

TEST_F(ToldFacts, OfReferenceTestsAreReadOnTheirSection) {
    tell(
        "reference-test", demo_begin + 10h,
        R"({"of":"delivery","flow_lpm":101,"pressure_bar":200,"speed_rpm":1480,"viscosity_cst":32,"accuracy_percent":1})");
    tell("reference-test", demo_begin + 20h,
         R"({"flow_lpm":3.1,"pressure_bar":210,"speed_rpm":1480,"temperature_c":50,"as_new":true})");
    const auto tests = tests_of(events_, "A");
    ASSERT_EQ(tests.size(), 2U);
    EXPECT_EQ(tests[0].test.of, analytics::Basis::delivery);
    EXPECT_DOUBLE_EQ(tests[0].test.accuracy, 0.01);
    EXPECT_EQ(tests[0].test.viscosity_cst, 32.0);
    EXPECT_FALSE(tests[0].test.as_new);
    EXPECT_EQ(tests[1].test.of, analytics::Basis::case_drain);
    EXPECT_DOUBLE_EQ(tests[1].test.accuracy, 0.03);
    EXPECT_TRUE(tests[1].test.as_new);
    EXPECT_EQ(tests[1].at, demo_begin + 20h);
}

}  // namespace
}  // namespace slipledger::watch
