#include <gtest/gtest.h>

#include "tests/config/patched_plant.hpp"

namespace slipledger::config {
namespace {

std::string facts_after(const std::string& patch) {
    const PlantReading reading = read_patched(patch);
    EXPECT_TRUE(reading) << told(reading);
    return reading ? pump_facts(reading.plant->pumps[0]) : "";
}

TEST(PumpFacts, AreTheSameForTheSameStory) {
    EXPECT_EQ(facts_after("[]"), facts_after(R"([{"op":"add","path":"/pumps/0/name","value":"Main pump"},
        {"op":"add","path":"/pumps/0/limits","value":{"leakage_ratio":{"act":4}}},
        {"op":"replace","path":"/duty_h_per_week","value":60}])"));
}

TEST(PumpFacts, ChangeWithOilDisplacementSettingVolumeStopAndSensors) {
    const std::string before = facts_after("[]");
    for (const char* patch : {R"([{"op":"replace","path":"/reservoirs/0/fluid","value":"HVLP 46"}])",
                              R"([{"op":"replace","path":"/pumps/0/displacement_cm3","value":100}])",
                              R"([{"op":"replace","path":"/pumps/0/compensator_bar","value":240}])",
                              R"([{"op":"add","path":"/pumps/0/max_stroke_fraction","value":0.9}])",
                              R"([{"op":"replace","path":"/pumps/0/sensors/case_drain_flow/range","value":[0, 20]}])",
                              R"([{"op":"add","path":"/pumps/0/sensors/shaft_speed","value":{}}])"})
        EXPECT_NE(facts_after(patch), before) << patch;
}

TEST(PumpFacts, AreCanonicalJson) {
    const std::string facts = facts_after("[]");
    EXPECT_EQ(facts.find(' '), facts.find(" 46"));  // only the space in the oil's name
    EXPECT_LT(facts.find("\"control\""), facts.find("\"drain\""));
    EXPECT_NE(facts.find(R"("compensator_bar":250.0)"), std::string::npos) << facts;
}

}  // namespace
}  // namespace slipledger::config
