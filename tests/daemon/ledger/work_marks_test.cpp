// When a pump must be judged anew, and from when on.

#include <gmock/gmock.h>

#include "tests/daemon/ledger/ledger_fixture.hpp"

namespace slipledger::ledger {
namespace {

using ::testing::IsEmpty;
using ::testing::SizeIs;

class WorkMark : public LedgerTest {
protected:
    IntakeOutcome tell(const std::string& pump, Instant time, double bar = 180.0) {
        return store({row_of(point(pump), time, {{Quantity::outlet_pressure, bar}})});
    }

    void judge_all() {
        for (const Mark& mark : reader().marks()) {
            AnalysisResult result;
            result.pump = mark.pump;
            result.generation = mark.generation;
            ASSERT_TRUE(ledger().store(result));
        }
    }
};

TEST_F(WorkMark, IsRaisedWhenAReadingLateEnoughClosesAnHourAndNotBefore) {
    EXPECT_FALSE(tell("press-1", day_one + 20min).marked);
    EXPECT_FALSE(tell("press-1", day_one + 1h + 9min).marked);
    EXPECT_THAT(reader().marks(), IsEmpty());
    EXPECT_TRUE(tell("press-1", day_one + 1h + 10min).marked);
    const auto marks = reader().marks();
    ASSERT_THAT(marks, SizeIs(1));
    EXPECT_EQ(marks[0].pump, pump("press-1"));
    EXPECT_EQ(marks[0].from, day_one);
    EXPECT_EQ(marks[0].to, day_one + 1h);
    EXPECT_EQ(reader().closed_until(pump("press-1")), day_one + 1h);
}

TEST_F(WorkMark, CoversOnlyTheHoursThatClosedSinceTheLast) {
    tell("press-1", day_one);
    tell("press-1", day_one + 2h + 30min);
    judge_all();
    tell("press-1", day_one + 3h + 30min);
    const auto marks = reader().marks();
    ASSERT_THAT(marks, SizeIs(1));
    EXPECT_EQ(marks[0].from, day_one + 2h);
    EXPECT_EQ(marks[0].to, day_one + 3h);
}

TEST_F(WorkMark, GoesBackToTheHourOfALateReadingAndNotForARepeat) {
    tell("press-1", day_one);
    tell("press-1", day_one + 30h);
    judge_all();
    EXPECT_FALSE(tell("press-1", day_one).marked);
    EXPECT_FALSE(tell("press-1", day_one + 30h + 1s).marked) << "the open hour is nobody's past";
    EXPECT_TRUE(tell("press-1", day_one + 7h + 59min).marked);
    const auto marks = reader().marks();
    ASSERT_THAT(marks, SizeIs(1));
    EXPECT_EQ(marks[0].from, day_one + 7h);
    EXPECT_EQ(marks[0].to, day_one + 7h + 59min);
    EXPECT_TRUE(tell("press-1", day_one, 181.0).marked) << "a dispute takes a value away";
    EXPECT_EQ(reader().marks()[0].from, day_one);
}

TEST_F(WorkMark, IsRaisedByTheReservoirForEveryPumpOnIt) {
    for (const char* id : {"press-1", "press-2"}) {
        tell(id, day_one);
        tell(id, day_one + 5h);
    }
    judge_all();
    store({row_of(ledger().directory().reservoirs.at("tank-1"), day_one + 2h, {{Quantity::fluid_temperature, 48.0}})});
    EXPECT_THAT(reader().marks(), SizeIs(2));
    EXPECT_EQ(reader().marks()[0].from, day_one + 2h);
    EXPECT_FALSE(reader().closed_until(pump("lathe")));
}

TEST_F(WorkMark, IsRaisedByAnEventThatChangesWhatIsJudgedAndNotByARemark) {
    tell("press-1", day_one);
    tell("press-1", day_one + 9h);
    judge_all();
    Event event;
    event.pump = "press-1";
    event.at = day_one + 90min;
    for (const char* kind : {"note", "acknowledged", "shelved"}) {
        event.kind = kind;
        ledger().store(event);
    }
    EXPECT_THAT(reader().marks(), IsEmpty());
    event.kind = "replaced";
    const std::int64_t id = ledger().store(event);
    ASSERT_THAT(reader().marks(), SizeIs(1));
    EXPECT_EQ(reader().marks()[0].from, day_one + 1h);
    EXPECT_THAT(reader().events("press-1"), SizeIs(4));
    EXPECT_EQ(reader().events("").back().id, id);
}

TEST_F(WorkMark, NeverUsesAGenerationTwice) {
    tell("press-1", day_one);
    tell("press-1", day_one + 5h);
    const std::int64_t first = reader().marks().at(0).generation;
    judge_all();
    close();
    tell("press-1", day_one + 1h);
    EXPECT_GT(reader().marks().at(0).generation, first);
}

TEST_F(WorkMark, RemembersHowFarEachPumpHasCome) {
    tell("press-1", day_one + 5h);
    tell("press-1", day_one + 1h);
    tell("lathe", day_one + 6h);
    close();
    EXPECT_EQ(reader().newest(pump("press-1")), day_one + 5h);
    EXPECT_EQ(reader().oldest(pump("press-1")), day_one + 1h);
    EXPECT_EQ(reader().newest_of_plant(), day_one + 6h);
    EXPECT_FALSE(reader().newest(pump("press-2")));
}

class EventMark : public WorkMark {
protected:
    std::vector<Mark> marks_of(const std::string& kind, const std::string& pump, Instant at, const std::string& body) {
        judge_all();
        Event event;
        event.pump = pump;
        event.kind = kind;
        event.at = at;
        event.body = body;
        ledger().store(event);
        return reader().marks();
    }
};

TEST_F(EventMark, OfASettledDisputeSpansAllOfIt) {
    tell("press-1", day_one);
    tell("press-1", day_one + 30h);
    const auto to = std::to_string((day_one + 9h).time_since_epoch().count());
    const auto marks = marks_of("settled", "press-1", day_one + 2h + 20min, R"({"believe":"plc","to_ms":)" + to + "}");
    ASSERT_THAT(marks, SizeIs(1));
    EXPECT_EQ(marks[0].from, day_one + 2h);
    EXPECT_EQ(marks[0].to, day_one + 9h);
}

TEST_F(EventMark, OfAReservoirIsRaisedForThePumpsThatDrawFromItOrOnceDid) {
    plant_.reservoirs.push_back({.id = "tank-2", .name = "Tank 2", .fluid = {}, .volume_l = {}});
    plant_.pumps[2].reservoir = "tank-2";  // lathe
    for (const char* id : {"press-1", "press-2", "lathe"}) {
        tell(id, day_one);
        tell(id, day_one + 30h);
    }
    const auto two = marks_of("oil-changed", "", day_one + 5h, R"({"reservoir":"tank-2"})");
    ASSERT_THAT(two, SizeIs(1));
    EXPECT_EQ(two[0].pump, pump("lathe"));
    EXPECT_EQ(two[0].from, day_one + 5h);
    EXPECT_THAT(marks_of("oil-changed", "", day_one + 5h, R"({"reservoir":"tank-1"})"), SizeIs(2));
    marks_of("plant-changed", "press-2", Instant{}, R"({"now":{"reservoir":"tank-2"}})");
    EXPECT_THAT(marks_of("oil-sample", "", day_one + 5h, R"({"reservoir":"tank-2"})"), SizeIs(2));
    EXPECT_THAT(marks_of("oil-changed", "", day_one + 5h, R"({"reservoir":["tank-2"]})"), SizeIs(3)) << "of nobody knows whom";
    EXPECT_THAT(marks_of("note", "press-1", day_one + 5h, "{}"), IsEmpty());
}

TEST_F(EventMark, OfALifeToldOtherwiseIsRaisedWithTheResultThatToldIt) {
    tell("press-1", day_one);
    tell("press-1", day_one + 30h);
    tell("press-2", day_one);
    tell("press-2", day_one + 30h);
    const auto marks = reader().marks();
    AnalysisResult result;
    result.pump = marks[0].pump;
    result.generation = marks[0].generation;
    ledger().store(result);
    result.pump = marks[1].pump;
    result.generation = marks[1].generation;
    result.told_otherwise = {{marks[0].pump, day_one + 3h}};
    ledger().store(result);
    const auto left = reader().marks();
    ASSERT_THAT(left, SizeIs(1));
    EXPECT_EQ(left[0].pump, marks[0].pump);
    EXPECT_EQ(left[0].from, day_one + 3h);
}

}  // namespace
}  // namespace slipledger::ledger
