#include "daemon/report/sentence.hpp"

#include <gtest/gtest.h>

namespace slipledger::report {
namespace {

using analytics::CauseKind;
using analytics::Level;
using analytics::UnjudgedReason;

SentenceFacts worn() {
    SentenceFacts facts;
    facts.only_section = false;
    facts.verdict.level = Level::plan;
    facts.verdict.reason = UnjudgedReason::none;
    facts.verdict.leakage_ratio = {2.13, 1.87, 2.34};
    facts.verdict.hours_in_hand = {310.0, 523.0, 900.0, "leakage-ratio"};
    facts.verdict.trend.established = true;
    facts.verdict.cause = CauseKind::wear;
    return facts;
}

SentenceFacts unjudged(UnjudgedReason reason) {
    SentenceFacts facts;
    facts.verdict.reason = reason;
    return facts;
}

TEST(Sentence, OfAWornSectionIsWhatAnEngineerWouldSay) {
    EXPECT_EQ(sentence(worn()),
              "Section A leaks 2.1 times (1.9 to 2.3) what it did when new, at the same pressure, speed and oil; about 520 "
              "running hours to its limit of 3. Order a rotating group.");
}

// 523 h at 16 h a day are 32.7 days, 310 h are 19.4.
TEST(Sentence, TurnsHoursInHandIntoDatesAtThePlantsDuty) {
    SentenceFacts facts = worn();
    facts.time_zone = "Europe/Berlin";
    facts.verdict.day.end = std::chrono::sys_days{std::chrono::year{2026} / 3 / 1};
    facts.verdict.hours_in_hand.duty_h_per_day = 16.0;
    EXPECT_NE(sentence(facts).find("to its limit of 3, around 2026-04-02 and hardly before 2026-03-20. Order"),
              std::string::npos)
        << sentence(facts);
    facts.verdict.hours_in_hand.duty_h_per_day = 0.0;
    EXPECT_EQ(sentence(facts).find("around"), std::string::npos);
}

TEST(Sentence, NamesTheDateWhereWatchingBeganOnAUsedPump) {
    SentenceFacts facts = worn();
    facts.compared_with = compared_with(analytics::BaselineKind::watching_began, false, "2026-01-05");
    EXPECT_NE(sentence(facts).find("what it did when watching began (2026-01-05),"), std::string::npos);
}

TEST(Sentence, SaysWhatElseItIsComparedWith) {
    using analytics::BaselineKind;
    EXPECT_EQ(compared_with(BaselineKind::from_new, true, ""), "what it did when new");
    EXPECT_EQ(compared_with(BaselineKind::maker_test, true, ""), "what it did when new") << "watched from new, it says so itself";
    EXPECT_EQ(compared_with(BaselineKind::maker_test, false, ""), "what its maker measured when it was new");
    EXPECT_EQ(compared_with(BaselineKind::reference_test, false, ""), "what a reference test showed when it was as new");
    SentenceFacts facts = worn();
    facts.compared_with = compared_with(BaselineKind::sisters, false, "2026-01-05");
    EXPECT_NE(sentence(facts).find("leaks 2.1 times (1.9 to 2.3) what its sisters do when healthy, at the same"),
              std::string::npos);
}

TEST(Sentence, OfASoundPumpClaimsNoTrend) {
    SentenceFacts facts = worn();
    facts.only_section = true;
    facts.verdict.level = Level::sound;
    facts.verdict.leakage_ratio = {1.02, 0.95, 1.10};
    facts.verdict.hours_in_hand = {4210.0, analytics::unknown, analytics::unknown, ""};
    facts.verdict.trend.established = false;
    EXPECT_EQ(sentence(facts),
              "The pump leaks what it did when new (ratio 1.02, 0.95 to 1.10), at the same pressure, speed and oil; no wear "
              "trend, at least 4200 running hours in hand. Nothing to do.");
}

TEST(Sentence, WhileLearningCountsTheHours) {
    SentenceFacts facts = unjudged(UnjudgedReason::learning);
    facts.verdict.learning_h_left = 16.0;
    EXPECT_EQ(sentence(facts), "The pump is still being learned: 34 of 50 judged running hours. Keep its readings coming.");
}

TEST(Sentence, OfEveryReasonForNotJudgingSaysIt) {
    EXPECT_NE(sentence(unjudged(UnjudgedReason::no_basis)).find("neither a case drain flow"), std::string::npos);
    EXPECT_NE(sentence(unjudged(UnjudgedReason::shared_drain)).find("one drain meter"), std::string::npos);
    EXPECT_NE(sentence(unjudged(UnjudgedReason::no_data)).find("no steady operating point"), std::string::npos);
    SentenceFacts seldom = unjudged(UnjudgedReason::seldom_judged);
    seldom.verdict.share_judged_30d = 0.04;
    EXPECT_NE(sentence(seldom).find("only 4 %"), std::string::npos);
}

TEST(Sentence, OfASilentPumpSpeaksOfItsFeedAlone) {
    SentenceFacts facts = worn();
    facts.silent_since = "2026-03-01 07:00 CET";
    EXPECT_EQ(sentence(facts), "Section A has sent no readings since 2026-03-01 07:00 CET. Check its feed.");
}

TEST(Sentence, DoesNotOrderAPartWhereAnInstrumentIsInDoubt) {
    SentenceFacts facts = worn();
    facts.verdict.cause = CauseKind::wear_or_instrument;
    EXPECT_EQ(sentence(facts).find("Order"), std::string::npos);
    EXPECT_EQ(what_to_do(facts), "Wear or instrument, not yet separable: check the flow meter with a reference test.");
}

TEST(Sentence, BeyondTheLimitSaysSoAndSendsToTheShelf) {
    SentenceFacts facts = worn();
    facts.type = analytics::PumpType::vane;
    facts.spare_in_stock = true;
    facts.basis = analytics::Basis::delivery;
    facts.verdict.level = Level::act;
    facts.verdict.leakage_ratio = {3.4, 3.1, 3.8};
    facts.verdict.step_ratio = 1.6;
    EXPECT_EQ(sentence(facts),
              "Section A leaks 3.4 times (3.1 to 3.8) what it did when new, at the same pressure, speed and oil, by its "
              "delivery flow; that is beyond its limit of 3. It rose at one step, 1.6 times. Replace the cartridge at the next "
              "stop; one is in stock.");
}

}  // namespace
}  // namespace slipledger::report
