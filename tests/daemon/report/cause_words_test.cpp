#include "daemon/report/cause_words.hpp"

#include <gmock/gmock.h>
#include <gtest/gtest.h>

#include <set>

namespace slipledger::report {
namespace {

using analytics::Basis;
using analytics::CauseKind;
using analytics::Evidence;
using analytics::PumpType;
using analytics::Quantity;
using analytics::RankedCause;
using analytics::Sign;
using ::testing::ElementsAre;
using ::testing::HasSubstr;

RankedCause worn() {
    RankedCause cause{.kind = CauseKind::wear, .weight = 0.8, .in_favour = {}, .against = {}};
    cause.in_favour.push_back({.sign = Sign::ratio_up, .present = true, .value = 2.1F, .beside = 1.9F, .adds = 1.5F});
    cause.in_favour.push_back({.sign = Sign::excess_scales, .present = true, .value = 2.0F, .beside = 1.7F, .adds = 1.5F});
    cause.against.push_back({.sign = Sign::step, .present = true, .value = 1.4F, .adds = -1.5F});
    return cause;
}

TEST(CauseWords, SayWhatAnEngineerWouldSay) {
    const auto words = words_of({worn()}, {});
    ASSERT_EQ(words.size(), 1U);
    EXPECT_EQ(words[0].title, "wear of the rotating group");
    EXPECT_THAT(words[0].in_favour,
                ElementsAre("It leaks 2.1 times what it did when healthy (low end 1.9), at the same pressure, speed and oil.",
                            "What it leaks above healthy grows with pressure and thin oil as open gaps do (slope 2, low end "
                            "1.7; 1 would be something added)."));
    EXPECT_THAT(words[0].against, ElementsAre("Leakage rose at one step, 1.4 times."));
    EXPECT_THAT(words[0].settles, HasSubstr("Compare drain flow by bucket and stopwatch at 200 bar"));
    EXPECT_THAT(words[0].settles, HasSubstr("Case oil is hot"));
}

TEST(CauseWords, NameTheInstrumentAndSpeakThePlantsUnits) {
    RankedCause cause{.kind = CauseKind::sensor_stuck, .weight = 0.9, .in_favour = {}, .against = {}};
    cause.in_favour.push_back({.sign = Sign::stuck, .present = true, .value = 50.0F, .beside = 6.0F,
                               .quantity = Quantity::fluid_temperature, .adds = 6.5F});
    const auto words = words_of({cause}, {.units = config::DisplayUnits::us});
    EXPECT_EQ(words[0].title, "fluid thermometer standing still");
    EXPECT_EQ(words[0].in_favour[0],
              "The fluid thermometer has stood at 122 degF to the last digit over 6 summaries, while the duty moved.");
    EXPECT_THAT(words_of({worn()}, {.units = config::DisplayUnits::us})[0].settles, HasSubstr("2901 psi"));
}

TEST(CauseWords, AreThereForEverySignPresentAndAbsent) {
    for (std::size_t i = 0; i < analytics::sign_count; ++i)
        for (const bool present : {true, false}) {
            RankedCause cause{.kind = CauseKind::wear, .weight = 1.0, .in_favour = {}, .against = {}};
            cause.in_favour.push_back({.sign = static_cast<Sign>(i), .present = present, .value = 1.0F, .beside = 2.0F});
            const std::string sentence = words_of({cause}, {})[0].in_favour[0];
            EXPECT_THAT(sentence, HasSubstr(" ")) << analytics::sign_names[i];
            EXPECT_EQ(sentence.back(), '.') << sentence;
            EXPECT_EQ(sentence.find('?'), std::string::npos) << sentence;
        }
}

TEST(CauseWords, HaveATitleAndSomethingThatSettlesEveryCause) {
    std::set<std::string> titles;
    for (std::size_t i = 1; i < analytics::cause_count; ++i) {
        const RankedCause cause{.kind = static_cast<CauseKind>(i), .weight = 1.0, .in_favour = {}, .against = {}};
        const auto words = words_of({cause}, {.type = PumpType::vane, .basis = Basis::delivery});
        EXPECT_FALSE(words[0].settles.empty());
        titles.insert(words[0].title);
    }
    EXPECT_EQ(titles.size(), analytics::cause_count - 1);
}

TEST(CauseWords, SayWhenWearAndInstrumentAreNotSeparable) {
    RankedCause cause = worn();
    EXPECT_FALSE(wear_or_instrument({cause}));
    cause.in_favour.pop_back();
    EXPECT_TRUE(wear_or_instrument({cause}));
    EXPECT_FALSE(wear_or_instrument({}));
}

}  // namespace
}  // namespace slipledger::report
