// Facts that each look right alone and together describe no pump.
#include <gtest/gtest.h>

#include "tests/config/patched_plant.hpp"

namespace slipledger::config {
namespace {

struct Impossible {
    const char* name;
    const char* patch;
    const char* pointer;
    const char* said;  // a piece of what is wanted, for the person who mends it
};

class ImpossiblePump : public testing::TestWithParam<Impossible> {};

TEST_P(ImpossiblePump, IsRefusedWithAReason) {
    const PlantReading reading = read_patched(GetParam().patch);
    ASSERT_EQ(reading.faults.size(), 1U) << told(reading);
    EXPECT_EQ(reading.faults[0].pointer, GetParam().pointer);
    EXPECT_NE(reading.faults[0].wanted.find(GetParam().said), std::string::npos) << told(reading);
}

// Sources: variable pressure-compensated pumps need an outside drain, vane pumps 600 rpm (common practice, no source);
// the others follow from how such pumps are built.
constexpr Impossible impossible[] = {
    {"PressureCompensatedWithInsideDrain",
     R"([{"op":"add","path":"/pumps/0/drain","value":"internal"},{"op":"remove","path":"/pumps/0/sensors"}])",
     "/pumps/0/drain", "must leave the case by a line of its own"},
    {"PressureCompensatedWithoutSetting", R"([{"op":"remove","path":"/pumps/0/compensator_bar"}])",
     "/pumps/0/compensator_bar", "its setting in bar"},
    {"ReliefBelowCompensator", R"([{"op":"add","path":"/pumps/0/relief_bar","value":240}])", "/pumps/0/relief_bar",
     "above the compensator's setting of 250 bar"},
    {"GearPumpThatChangesItsStroke",
     R"([{"op":"replace","path":"/pumps/1/type","value":"external-gear"},
         {"op":"add","path":"/pumps/1/control","value":"load-sensing"}])",
     "/pumps/1/control", "a gear pump cannot change its stroke"},
    {"GearPumpJudgedByItsDrain",
     R"([{"op":"replace","path":"/pumps/1/type","value":"internal-gear"},
         {"op":"add","path":"/pumps/1/drain","value":"external"},
         {"op":"add","path":"/pumps/1/sensors","value":{"case_drain_flow":{}}}])",
     "/pumps/1/sensors", "can only be judged by delivery"},
    {"MeterInADrainThatIsInside",
     R"([{"op":"add","path":"/pumps/1/drain","value":"internal"},
         {"op":"add","path":"/pumps/1/sections/0/sensors","value":{"case_drain_flow":{}}}])",
     "/pumps/1/sections/0/sensors", "its oil passes no meter"},
    {"FlushedInsideDrain",
     R"([{"op":"add","path":"/pumps/1/drain","value":"internal"},
         {"op":"add","path":"/pumps/1/case_flushing_lpm","value":2}])",
     "/pumps/1/case_flushing_lpm", "nothing flushes"},
    {"FixedPumpWithCompensator", R"([{"op":"add","path":"/pumps/1/sections/1/compensator_bar","value":120}])",
     "/pumps/1/sections/1/compensator_bar", "a fixed pump has no compensator"},
    {"FixedPumpWithVolumeStop", R"([{"op":"add","path":"/pumps/1/max_stroke_fraction","value":0.8}])",
     "/pumps/1/max_stroke_fraction", "a fixed pump has no volume stop"},
    {"StrokeMeasuredByNothing",
     R"([{"op":"replace","path":"/pumps/0/control","value":"stroke-measured"},
         {"op":"remove","path":"/pumps/0/compensator_bar"}])",
     "/pumps/0/sensors", "a stroke sensor"},
    {"VanePumpRatedBelowItsMinimumSpeed",
     R"([{"op":"replace","path":"/pumps/1/rated/speed_rpm","value":500},
         {"op":"remove","path":"/pumps/1/sections/1/rated"}])",
     "/pumps/1/rated", "minimum speed of 600 rpm"},
    {"DrainGroupWithoutDrain",
     R"([{"op":"add","path":"/pumps/1/drain","value":"internal"},
         {"op":"add","path":"/pumps/1/drain_group","value":"saw"}])",
     "/pumps/1/drain_group", "the drain is internal"},
    {"TemperatureMeasuredAtTheReturnSide",
     R"([{"op":"add","path":"/pumps/0/sensors/fluid_temperature","value":{"measured_at":"return-side"}}])",
     "/pumps/0/sensors/fluid_temperature/measured_at", "only delivery_flow"},
};

INSTANTIATE_TEST_SUITE_P(PlantFaults, ImpossiblePump, testing::ValuesIn(impossible),
                         [](const auto& row) { return std::string(row.param.name); });

TEST(PlausiblePump, GearPumpDrainsInsideUnlessToldOtherwise) {
    const PlantReading reading = read_patched(R"([{"op":"replace","path":"/pumps/1/type","value":"external-gear"}])");
    ASSERT_TRUE(reading) << told(reading);
    EXPECT_EQ(reading.plant->pumps[1].drain, Drain::internal);
}

TEST(PlausiblePump, SharesADrainMeterInAGroupOfTwo) {
    const PlantReading reading = read_patched(R"([{"op":"add","path":"/pumps/1/drain_group","value":"saw"}])");
    ASSERT_TRUE(reading) << told(reading);
    EXPECT_EQ(reading.plant->pumps[1].sections[0].drain_group, "saw");
}

}  // namespace
}  // namespace slipledger::config
