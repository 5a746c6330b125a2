#include "daemon/intake/mapping.hpp"

#include <stdexcept>

#include <gtest/gtest.h>

#include "tests/daemon/intake/mill.hpp"

namespace slipledger::intake {
namespace {

using analytics::Quantity;

Mapping mapping(const config::Feed& feed) { return Mapping(feed, mill::directory(), mill::pumps()); }

TEST(Mapping, ReadsANameThatIsNotListedAsAQuantity) {
    const Mapping names = mapping(mill::ndjson_feed());
    const Measure* measure = names.column("case_drain_flow");
    ASSERT_NE(measure, nullptr);
    EXPECT_EQ(measure->quantity, Quantity::case_drain_flow);
    EXPECT_EQ(measure->place, nullptr);
    EXPECT_EQ(names.column("case_drain"), nullptr);
}

TEST(Mapping, ScalesFirstAndThenConvertsTheUnit) {
    config::Feed feed = mill::ndjson_feed();
    feed.columns["ai7"] = mill::target(Quantity::fluid_temperature, "degF");
    feed.columns["ai7"].scale = 0.1;  // counts of a tenth of a degree
    feed.columns["ai7"].offset = 32.0;
    const Mapping names = mapping(feed);
    const Measure* measure = names.column("ai7");
    ASSERT_NE(measure, nullptr);
    EXPECT_DOUBLE_EQ(1800.0 * measure->factor + measure->offset, 100.0);  // 1800 counts: 212 degF, water boils
}

TEST(Mapping, FindsPointsOfTargets) {
    config::Feed feed = mill::ndjson_feed();
    feed.tags["T1"] = mill::target(Quantity::fluid_temperature);
    feed.tags["T1"].reservoir = "tank";
    feed.tags["Q1"] = mill::target(Quantity::case_drain_flow);
    feed.tags["Q1"].drain_group = "shared";
    feed.tags["P1"] = mill::target(Quantity::outlet_pressure);
    feed.tags["P1"].pump = "press-2";
    feed.tags["P1"].section = "B";
    const Mapping names = mapping(feed);
    EXPECT_EQ(names.tag("T1")->place->point, mill::tank);
    EXPECT_EQ(names.tag("Q1")->place->point, mill::shared_drain);
    EXPECT_EQ(names.tag("P1")->place->point, mill::press_2_b);
}

TEST(Mapping, AllowsFivePercentBesideTheInstrumentsRangeAndNeverMoreThanTheQuantity) {
    const Mapping names = mapping(mill::ndjson_feed());
    const ValueRange gauge = names.pump("press-1")->pump->ranges[analytics::index_of(Quantity::outlet_pressure)];
    EXPECT_DOUBLE_EQ(gauge.low, -10.0);  // 5 % of 250 below zero would be more than a resting gauge errs
    EXPECT_DOUBLE_EQ(gauge.high, 262.5);
    const ValueRange bare = names.pump("press-2")->pump->ranges[analytics::index_of(Quantity::outlet_pressure)];
    EXPECT_DOUBLE_EQ(bare.high, 1000.0);
}

TEST(Mapping, SuggestsTheNearestName) {
    EXPECT_NE(mapping(mill::ndjson_feed()).unknown_pump("pres-2").message().find("perhaps \"press-2\""), std::string::npos);
    EXPECT_NE(mapping(mill::ndjson_feed()).unknown_column("oulet_pressure").message().find("perhaps \"outlet_pressure\""),
              std::string::npos);
}

TEST(Mapping, WillNotStartOnAFeedThatNamesWhatDoesNotExist) {
    config::Feed feed = mill::ndjson_feed();
    feed.pump = "press-9";
    EXPECT_THROW(mapping(feed), std::runtime_error);
    feed = mill::ndjson_feed();
    feed.columns["x"] = mill::target(Quantity::shaft_speed, "bar");
    EXPECT_THROW(mapping(feed), std::runtime_error);
    feed = mill::ndjson_feed();
    feed.id = "nobody";
    EXPECT_THROW(mapping(feed), std::runtime_error);
}

}  // namespace
}  // namespace slipledger::intake
