#include "daemon/watch/section_readings.hpp"

#include <gmock/gmock.h>
#include <gtest/gtest.h>

namespace slipledger::watch {
namespace {

using namespace std::chrono_literals;
using analytics::Instant;
using analytics::Quantity;
using analytics::Series;
using testing::ElementsAre;

constexpr Instant noon{1772366400s};

TEST(SectionReadings, TakeTheTanksTemperatureOnlyWhereThePumpsOwnIsTwoHoursOld) {
    Series own{{noon, noon + 1h}, {50.0, 51.0}};
    const Series tank{{noon - 1h, noon + 30min, noon + 150min, noon + 3h, noon + 4h}, {40.0, 41.0, 42.0, 43.0, 44.0}};
    fill_from(own, tank);
    EXPECT_THAT(own.values, ElementsAre(40.0, 50.0, 51.0, 43.0, 44.0));
    EXPECT_THAT(own.times, ElementsAre(noon - 1h, noon, noon + 1h, noon + 3h, noon + 4h));
}

TEST(SectionReadings, LetThePumpsOwnValueStandAtTheSameInstant) {
    Series own{{noon}, {50.0}};
    fill_from(own, {{noon}, {40.0}});
    EXPECT_THAT(own.values, ElementsAre(50.0));
}

class SourcesOf : public testing::Test {
protected:
    SourcesOf() {
        pump_.id = "press-2";
        pump_.reservoir = "tank";
        pump_.sections = {config::Section{}};
        directory_.reservoirs["tank"] = ledger::PointId{9};
        directory_.points[{"press-2", ""}] = ledger::PointId{1};
        directory_.points[{"press-2", "A"}] = ledger::PointId{1};
    }

    static bool gives(const Source& source, Quantity quantity) {
        return (source.quantities >> index_of(quantity) & 1U) != 0;
    }

    std::vector<Source> sources() {
        plant_.pumps = {pump_};
        return sources_of(directory_, plant_, pump_, pump_.sections.front());
    }

    config::Plant plant_;
    config::Pump pump_;
    ledger::Directory directory_;
};

TEST_F(SourcesOf, OfASinglePumpAreThePumpAndItsTank) {
    const auto found = sources();
    ASSERT_EQ(found.size(), 2U);
    EXPECT_TRUE(gives(found[0], Quantity::case_drain_flow));
    EXPECT_TRUE(gives(found[1], Quantity::fluid_temperature));
    EXPECT_FALSE(gives(found[1], Quantity::case_drain_flow));
}

TEST_F(SourcesOf, OfADoublePumpTakeSpeedButNoFlowFromThePump) {
    pump_.sections.push_back(config::Section{});
    pump_.sections.back().id = "B";
    directory_.points[{"press-2", "A"}] = ledger::PointId{2};
    directory_.points[{"press-2", "B"}] = ledger::PointId{3};
    const auto found = sources();
    ASSERT_EQ(found.size(), 3U);
    EXPECT_EQ(found[0].point, ledger::PointId{2});
    EXPECT_EQ(found[1].point, ledger::PointId{1});
    EXPECT_TRUE(gives(found[1], Quantity::shaft_speed));
    EXPECT_FALSE(gives(found[1], Quantity::case_drain_flow));
    EXPECT_TRUE(found[1].shared_drain);
}

TEST_F(SourcesOf, OfADrainGroupGiveItsFlowOnlyToASectionThatIsAloneInIt) {
    pump_.sections.front().drain_group = "sump";
    directory_.drain_groups["sump"] = ledger::PointId{5};
    const auto alone = sources();
    ASSERT_EQ(alone.size(), 3U);
    EXPECT_TRUE(gives(alone[1], Quantity::case_drain_flow));

    config::Pump other = pump_;
    other.id = "press-3";
    plant_.pumps = {pump_, other};
    const auto shared = sources_of(directory_, plant_, pump_, pump_.sections.front());
    EXPECT_FALSE(gives(shared[1], Quantity::case_drain_flow));
    EXPECT_TRUE(shared[1].shared_drain);
}

}  // namespace
}  // namespace slipledger::watch
