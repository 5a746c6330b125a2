#include "tools/judging/stories.hpp"

#include <gtest/gtest.h>

#include <algorithm>
#include <set>

#include "config/plant_reader.hpp"
#include "tools/judging/confounding.hpp"

namespace slipledger::judging {
namespace {

std::string first_fault(const std::string& plant_file) {
    const config::PlantReading reading = config::read_plant(plant_file);
    return reading ? std::string() : config::format_fault(reading.faults.front());
}

class EveryFleet : public ::testing::TestWithParam<std::size_t> {
protected:
    Fleet fleet() const { return static_cast<Fleet>(GetParam()); }
};

TEST_P(EveryFleet, WritesPlantFilesThatTheReaderTakes) {
    for (std::size_t number = 0; number < 60; ++number) {
        const Story story = tell(fleet(), number, {.seed = 3});
        EXPECT_EQ(first_fault(story.plant_file), "") << story.name();
        if (story.plant_file_after.empty()) continue;
        EXPECT_EQ(first_fault(story.plant_file_after), "") << story.name();
    }
}

TEST_P(EveryFleet, TellsTheSameStoryAgainAndAnotherWithAnotherSeed) {
    const Story once = tell(fleet(), 5, {.seed = 3});
    EXPECT_EQ(once.plant_file, tell(fleet(), 5, {.seed = 3}).plant_file);
    EXPECT_NE(once.plant_file, tell(fleet(), 5, {.seed = 4}).plant_file);
}

INSTANTIATE_TEST_SUITE_P(Stories, EveryFleet, ::testing::Range(std::size_t{0}, fleet_names.size()),
                         [](const auto& fleet) {
                             std::string name(fleet_names[fleet.param]);
                             std::erase(name, '-');
                             return name;
                         });

TEST(Stories, EveryConfounderIsFeltByThePumpItIsPutInto) {
    for (std::size_t number = 0; number < 10 * confounder_names.size(); ++number) {
        const Story story = tell(Fleet::confounded, number, {.seed = 3});
        EXPECT_TRUE(can_be_felt(confounder_of(number), story.plant.pumps.front())) << story.name();
        EXPECT_EQ(story.sections.front().confounders, std::vector<Confounder>{confounder_of(number)});
    }
}

TEST(Stories, TestsWearByOtherLawsThanTuning) {
    const auto laws_of = [](Laws laws) {
        std::set<plantsim::WearLaw> seen;
        for (std::size_t number = 0; number < 60; ++number)
            for (const auto& pump : tell(Fleet::wear, number, {.seed = 3, .laws = laws}).plant.pumps)
                seen.insert(pump.sections.front().lives.front().wear.law);
        return seen;
    };
    const auto tests = laws_of(Laws::tests);
    const auto tuning = laws_of(Laws::tuning);
    EXPECT_TRUE(std::ranges::none_of(tests, [&](plantsim::WearLaw law) { return tuning.contains(law); }));
    EXPECT_EQ(tests.size(), 3U);
}

TEST(Stories, OnlyOneCartridgeOfADoublePumpWears) {
    for (std::size_t number = 0; number < 20; ++number) {
        const Story story = tell(Fleet::double_pumps, number, {.seed = 3});
        ASSERT_EQ(story.sections.size(), 2U);
        EXPECT_NE(story.sections[0].wears(), story.sections[1].wears());
    }
}

TEST(Stories, ATakenOverPumpWasWornAndNobodySaysSince) {
    for (std::size_t number = 0; number < 20; ++number) {
        const Story story = tell(Fleet::taken_over, number, {.seed = 3});
        EXPECT_TRUE(story.sections.front().taken_over);
        EXPECT_GE(story.plant.pumps.front().sections.front().lives.front().wear.first_ratio, 1.3);
        const config::PlantReading reading = config::read_plant(story.plant_file);
        EXPECT_FALSE(reading.plant->pumps.front().since.has_value());
    }
}

}  // namespace
}  // namespace slipledger::judging
