#include "daemon/ledger/lives.hpp"

#include <gtest/gtest.h>

namespace slipledger::ledger {
namespace {

using namespace std::chrono_literals;

constexpr Instant fitted{1772366400s};

Event event(std::int64_t id, const std::string& kind, Instant at, const std::string& body, const std::string& section = "") {
    Event made;
    made.id = id;
    made.pump = "press-2";
    made.section = section;
    made.kind = kind;
    made.at = at;
    made.body = body;
    return made;
}

TEST(Lives, BeginWithWhatWasInServiceBeforeAnythingWasTold) {
    const auto lives = lives_of({}, "A");
    ASSERT_EQ(lives.size(), 1U);
    EXPECT_EQ(lives[0].number, 1);
    EXPECT_FALSE(lives[0].since);
    EXPECT_TRUE(lives[0].covers(fitted));
}

TEST(Lives, ChangeWhereAPartWasReplacedInThisSection) {
    const std::vector events{
        event(1, "replaced", fitted,
              R"({"displacement_cm3":75,"model":"C-75","found":"scored","note":"new",
                  "maker_test":{"leakage_lpm":1.2,"pressure_bar":210,"viscosity_cst":32}})",
              "A"),
        event(2, "replaced", fitted + 1h, "{}", "B"), event(3, "note", fitted + 2h, "{}", "A")};
    const auto lives = lives_of(events, "A");
    ASSERT_EQ(lives.size(), 2U);
    EXPECT_EQ(lives[0].ended, fitted);
    EXPECT_EQ(lives[0].found, "scored");
    EXPECT_EQ(lives[1].number, 2);
    EXPECT_EQ(lives[1].since, fitted);
    EXPECT_EQ(lives[1].displacement_cm3, 75.0);
    EXPECT_EQ(lives[1].model, "C-75");
    ASSERT_TRUE(lives[1].maker_test);
    EXPECT_EQ(lives[1].maker_test->leakage_lpm, 1.2);
    EXPECT_FALSE(lives[0].covers(fitted));
    EXPECT_TRUE(lives[1].covers(fitted));
    EXPECT_EQ(lives_of(events, "B").size(), 2U);
}

TEST(Lives, AreCorrectedByAReplacementToldAgainForTheSameTime) {
    const std::vector events{event(1, "replaced", fitted, R"({"displacement_cm3":75})"),
                             event(2, "replaced", fitted, R"({"displacement_cm3":80})")};
    const auto lives = lives_of(events, "A");
    ASSERT_EQ(lives.size(), 2U);
    EXPECT_EQ(lives[1].number, 2);
    EXPECT_EQ(lives[1].displacement_cm3, 80.0);
}

config::Pump pump(double displacement_cm3) {
    config::Pump made;
    made.id = "press-2";
    config::Section section;
    section.displacement_cm3 = displacement_cm3;
    made.sections = {section};
    return made;
}

TEST(PlantChange, IsStoredAtFirstSightFromTheBeginningOfTimeAndNotAgain) {
    auto first = plant_change(pump(71), {}, std::nullopt, fitted);
    ASSERT_TRUE(first);
    EXPECT_EQ(first->at, Instant{});
    EXPECT_EQ(first->kind, "plant-changed");
    first->id = 1;
    EXPECT_FALSE(plant_change(pump(71), std::vector{*first}, fitted, fitted + 1h));
}

TEST(PlantChange, HoldsFromTheNewestReadingUnlessSinceWasEditedToo) {
    auto first = *plant_change(pump(71), {}, std::nullopt, fitted);
    first.id = 1;
    const auto edited = plant_change(pump(75), std::vector{first}, fitted + 5h, fitted + 9h);
    ASSERT_TRUE(edited);
    EXPECT_EQ(edited->at, fitted + 5h);

    config::Pump dated = pump(75);
    dated.since = fitted + 2h;
    EXPECT_EQ(plant_change(dated, std::vector{first}, fitted + 5h, fitted + 9h)->at, fitted + 2h);
}

TEST(PlantFacts, DatedBackReplaceWhatWasSaidOfTheTimeAfter) {
    const std::vector events{event(1, "plant-changed", Instant{}, R"({"now":{"v":1}})"),
                             event(3, "plant-changed", fitted, R"({"now":{"v":3}})"),
                             event(2, "plant-changed", fitted + 1h, R"({"now":{"v":2}})")};
    const auto facts = facts_of(events);
    ASSERT_EQ(facts.size(), 2U);
    EXPECT_EQ(facts[1].at, fitted);
    EXPECT_EQ(facts[1].facts, R"({"v":3})");
}

TEST(WatchedFromNew, IsAPartFittedByAnEventOrAPumpWatchedWithinAWeekOfItsSince) {
    const Life first;
    Life second;
    second.since = fitted;
    EXPECT_TRUE(watched_from_new(second, {}, fitted));
    EXPECT_FALSE(watched_from_new(first, {}, fitted));
    const std::vector<FactsFrom> facts{{Instant{}, "{}", fitted}};
    EXPECT_TRUE(watched_from_new(first, facts, fitted + 24h * 7));
    EXPECT_FALSE(watched_from_new(first, facts, fitted + 24h * 8));
    EXPECT_FALSE(watched_from_new(first, facts, fitted - 1h));
}

TEST(Lives, AreOfTheModelTheyTellOrThePlantFileToldWhenTheyWereFitted) {
    const std::vector<FactsFrom> facts{{Instant{}, R"({"sections":{"A":{"model":"A71"}}})", std::nullopt},
                                       {fitted, R"({"sections":{"A":{"model":"B71"}}})", std::nullopt}};
    config::Section today;
    today.model = "B71";
    Life life;
    EXPECT_EQ(model_of(life, facts, today), "A71");
    life.since = fitted + 1h;
    EXPECT_EQ(model_of(life, facts, today), "B71");
    life.model = "C71";
    EXPECT_EQ(model_of(life, facts, today), "C71");
    EXPECT_EQ(model_of(Life{}, {}, today), "B71");
}

TEST(Events, ConcernAPumpWhenTheyAreItsOwnOrOfAReservoirThatEverWasIts) {
    Event own = event(1, "note", fitted, "{}");
    Event moved = event(2, "plant-changed", fitted, R"({"now":{"reservoir":"old-tank"}})");
    const auto of_tank = [](std::int64_t id, const std::string& tank) {
        Event made = event(id, "oil-changed", fitted, R"({"reservoir":")" + tank + R"("})");
        made.pump.clear();
        return made;
    };
    config::Pump press = pump(71);
    press.reservoir = "tank";
    const auto kept = events_concerning(press, {own, moved, of_tank(3, "tank"), of_tank(4, "old-tank"), of_tank(5, "other")});
    ASSERT_EQ(kept.size(), 4U);
    EXPECT_EQ(kept.back().id, 4);
}

}  // namespace
}  // namespace slipledger::ledger
