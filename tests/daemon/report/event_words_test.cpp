#include "daemon/report/event_words.hpp"

#include <gtest/gtest.h>

namespace slipledger::report {
namespace {

std::string words(const std::string& body) {
    ledger::Event event;
    event.body = body;
    return event_words(event);
}

TEST(EventWords, SayWhatEachKindOfEventCarries) {
    EXPECT_EQ(words(R"({"text":"strainer cleaned"})"), "strainer cleaned");
    EXPECT_EQ(words(R"({"reservoir":"press-tank","fluid":{"name":"VG 32, VI 150","iso_vg":32}})"),
              "VG 32, VI 150, in press-tank");
    EXPECT_EQ(
        words(
            R"({"reservoir":"tank","viscosity_40_cst":42.1,"viscosity_100_cst":6.4,"water_ppm":120,"particles":"18/16/13"})"),
        "42.1 mm2/s at 40 degC, 6.4 mm2/s at 100 degC, water 120 ppm, particles 18/16/13, in tank");
    EXPECT_EQ(words(R"({"bar":240})"), "240 bar");
    EXPECT_EQ(words(R"({"quantity":"case_drain_flow","note":"calibrated"})"), "calibrated, case_drain_flow");
    EXPECT_EQ(
        words(R"({"of":"drain","flow_lpm":3.3,"pressure_bar":210,"speed_rpm":1480,"temperature_c":50,"as_new":true})"),
        "3.3 L/min, at 210 bar, 1480 rpm, 50 degC, of drain, as new");
    EXPECT_EQ(words(R"({"believe":"lab","to_ms":1772366400000})"), "believe lab, until 2026-03-01T12:00:00Z");
    EXPECT_EQ(words(R"({"found":"worn","maker_test":{"leakage_lpm":1.2,"pressure_bar":210,"viscosity_cst":32}})"),
              "found worn, maker's test 1.2 L/min, at 210 bar, 32 mm2/s");
}

TEST(EventWords, PassOverWhatIsOfAnotherKind) {
    EXPECT_EQ(words("not json"), "");
    EXPECT_EQ(words(R"({"bar":"high","text":7,"as_new":"yes","fluid":[],"maker_test":3})"), "");
}

}  // namespace
}  // namespace slipledger::report
