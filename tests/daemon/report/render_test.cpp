// What the outer contract of `health --json` and the 80-column text promise, on a value made by hand.
#include <gmock/gmock.h>
#include <gtest/gtest.h>

#include <nlohmann/json.hpp>
#include <sstream>

#include "daemon/report/number.hpp"
#include "daemon/report/render_json.hpp"
#include "daemon/report/render_page.hpp"
#include "daemon/report/render_text.hpp"

namespace slipledger::report {
namespace {

using analytics::Level;

SectionHealth worn_section(const std::string& section) {
    SectionHealth health;
    health.pump = "press-2";
    health.section = section;
    health.pump_name = "press pump <2>";
    health.model = "A71";
    health.part = "rotating group";
    health.only_section = false;
    health.level = Level::plan;
    health.sentence = "Section A leaks 2.1 times what it did when new, at the same pressure, speed and oil. Order a rotating group.";
    health.basis = analytics::Basis::case_drain;
    analytics::DayVerdict day;
    day.leakage_ratio = {2.1, 1.9, 2.3};
    day.efficiency = {0.912345678, 0.90, 0.92};
    day.efficiency_baseline = 0.96;
    day.hours_in_hand = {410.0, 520.0, 770.0, "leakage-ratio"};
    health.verdict = day;
    health.data.set_aside["stopped"] = 12;
    return health;
}

// Every field that design section 8 names.
TEST(HealthJson, HasEveryFieldOfTheContract) {
    const auto json = to_json(worn_section("A"));
    for (const char* key : {"pump", "section", "as_of", "level", "reason", "sentence", "leakage_ratio",
                            "volumetric_efficiency", "clearance_growth_percent", "leakage_lpm", "excess_lpm", "leakage_kw",
                            "yearly_cost", "trend", "hours_in_hand", "causes", "data", "life", "alarms", "cautions"})
        EXPECT_TRUE(json.contains(key)) << key;
    for (const char* key : {"value", "low", "high", "baseline", "basis", "at"})
        EXPECT_TRUE(json["volumetric_efficiency"].contains(key)) << key;
    for (const char* key : {"low", "mid", "high", "limit"}) EXPECT_TRUE(json["hours_in_hand"].contains(key)) << key;
    for (const char* key : {"readings", "used", "disputed", "set_aside"}) EXPECT_TRUE(json["data"].contains(key)) << key;
    for (const char* key : {"number", "started", "running_hours", "baseline", "compared_with", "events",
                            "unrecorded_replacement"})
        EXPECT_TRUE(json["life"].contains(key)) << key;
}

// 1000 h in hand at 16 h a day, worn since a day in a range, and what the days say by themselves.
SectionHealth looked_back_on() {
    SectionHealth health = worn_section("A");
    const analytics::Instant march = std::chrono::sys_days{std::chrono::year{2026} / 3 / 1};
    health.verdict->trend.onset = march;
    health.verdict->hours_in_hand.duty_h_per_day = 16.0;
    health.onset_range = {std::nullopt, march + std::chrono::days(9)};
    health.dates_in_hand = {march + std::chrono::days(100), march + std::chrono::days(130), std::nullopt};
    analytics::Witnesses witnesses;
    witnesses.days = 90;
    witnesses.slope_per_1000_h = {0.21, 0.12, 0.33};
    witnesses.rank_z = 2.4;
    witnesses.rank_p = 0.0164;
    witnesses.cumulative_sum = 1.24;
    witnesses.sum_passed = 20530;
    witnesses.weighted_mean = {2.0, 1.9, 2.2};
    witnesses.shape = analytics::stats::Shape::ramp;
    witnesses.changed = 20513;
    health.witnesses = witnesses;
    return health;
}

TEST(HealthJson, TellsOnsetWithItsRangeDatesInHandAndSecondWitnesses) {
    const auto json = to_json(looked_back_on());
    EXPECT_EQ(json["trend"]["onset"], "2026-03-01T00:00:00Z");
    EXPECT_TRUE(json["trend"]["onset_range"]["low"].is_null());
    EXPECT_EQ(json["trend"]["onset_range"]["high"], "2026-03-10T00:00:00Z");
    EXPECT_EQ(json["hours_in_hand"]["duty_h_per_week"], 112.0);
    EXPECT_EQ(json["hours_in_hand"]["date"]["low"], "2026-06-09T00:00:00Z");
    EXPECT_TRUE(json["hours_in_hand"]["date"]["high"].is_null());
    const auto& told = json["trend"]["witnesses"];
    EXPECT_EQ(told["theil_sen"]["high"], 0.33);
    EXPECT_EQ(told["mann_kendall"]["p"], 0.0164);
    EXPECT_EQ(told["cumulative_sum"]["limit"], 0.25);
    EXPECT_EQ(told["cumulative_sum"]["passed"], "2026-03-18");
    EXPECT_EQ(told["shape"]["name"], "ramp");
    EXPECT_EQ(told["shape"]["changed"], "2026-03-01");
    EXPECT_TRUE(to_json(worn_section("A"))["trend"]["witnesses"].is_null());
}

TEST(HealthText, TellsOnsetDatesAndSecondWitnessesWithinThePage) {
    config::Plant plant;
    plant.time_zone = "Europe/Berlin";
    const std::string text = health_text(looked_back_on(), plant, Paper{});
    std::istringstream lines(text);
    for (std::string line; std::getline(lines, line);) EXPECT_LE(line.size(), page_width) << line;
    EXPECT_THAT(text, testing::HasSubstr("2026-03-01 (earlier to 2026-03-10)"));
    EXPECT_THAT(text, testing::HasSubstr("2026-07-09"));
    EXPECT_THAT(text, testing::HasSubstr("robust slope +0.21 (+0.12 to +0.33) per 1000 h"));
    EXPECT_THAT(text, testing::HasSubstr("passed 2026-03-18"));
}

TEST(HealthJson, GivesNullForWhatIsNotKnownAndSixDigitsForTheRest) {
    const auto json = to_json(worn_section("A"));
    EXPECT_TRUE(json["yearly_cost"].is_null());
    EXPECT_EQ(json["volumetric_efficiency"]["value"].dump(), "0.912346");
    EXPECT_EQ(number(-0.0).dump(), "0.0");
}

TEST(HealthJson, PutsTheMostUrgentSectionFirstAndListsAllOfADoublePump) {
    PumpHealth health{"press-2", {worn_section("A"), worn_section("B")}};
    health.sections[0].level = Level::sound;
    const auto json = to_json(health);
    EXPECT_EQ(json["section"], "B");
    EXPECT_EQ(json["sections"].size(), 2U);
}

TEST(HealthText, FitsEightyColumnsAndCarriesTheCautions) {
    const std::string text = health_text(PumpHealth{"press-2", {worn_section("A")}}, config::Plant{}, Paper{});
    std::istringstream lines(text);
    for (std::string line; std::getline(lines, line);) EXPECT_LE(line.size(), page_width) << line;
    for (const std::string& caution : cautions()) EXPECT_THAT(text, testing::HasSubstr(caution.substr(0, 30)));
    EXPECT_THAT(text, testing::HasSubstr("**  plan"));
}

TEST(HealthText, TellsTheNewestEventsAndMakesThemPrintable) {
    SectionHealth health = worn_section("A");
    health.events.assign(7, {analytics::Instant{} + std::chrono::hours(24), "note", "", "fitter", "strainer\033[2J cleaned"});
    const std::string text = health_text(health, config::Plant{}, Paper{});
    EXPECT_THAT(text, testing::HasSubstr("  1970-01-02  note, by fitter: strainer?[2J cleaned\n"));
    EXPECT_THAT(text, testing::Not(testing::HasSubstr("\033")));
    EXPECT_EQ(to_json(health)["events"].size(), 7U);
}

TEST(Health, OffersAReplacementThatNobodyTold) {
    SectionHealth health = worn_section("A");
    EXPECT_TRUE(to_json(health)["life"]["unrecorded_replacement"].is_null());
    const analytics::Instant at = analytics::Instant{} + std::chrono::hours(24 * 365);
    health.verdict->replacement = {at, 1.93, 1.02};
    const std::string text = health_text(health, config::Plant{}, Paper{});
    EXPECT_THAT(text, testing::HasSubstr("Looks like a replacement on 1971-01-01: the ratio fell from 1.9 to 1.0."));
    EXPECT_THAT(text, testing::HasSubstr("slipledger replaced press-2 --section A --at 1971-01-01T00:00:00Z --by NAME"));
    const auto json = to_json(health)["life"]["unrecorded_replacement"];
    EXPECT_EQ(json["at"], "1971-01-01T00:00:00Z");
    EXPECT_EQ(json["ratio_before"], 1.93);
    EXPECT_EQ(json["if_so"], "slipledger replaced press-2 --section A --at 1971-01-01T00:00:00Z --by NAME");
}

TEST(HealthJson, ListsTheEventsOfTheLifeInService) {
    SectionHealth health = worn_section("A");
    const auto day = [](int n) { return analytics::Instant{} + std::chrono::hours(24 * n); };
    health.events = {{day(30), "oil-changed", "", "fitter", "VG 32, VI 150"}, {day(3), "note", "", "fitter", "of the life before"}};
    health.life.started = day(10);
    const auto json = to_json(health);
    EXPECT_EQ(json["events"].size(), 2U);
    ASSERT_EQ(json["life"]["events"].size(), 1U);
    EXPECT_EQ(json["life"]["events"][0]["text"], "VG 32, VI 150");
}

TEST(HistoryText, DrawsEventsBetweenTheDays) {
    HistoryRow day;
    day.section = "A";
    day.level = Level::sound;
    HistoryRow changed = day;
    changed.time = analytics::Instant{} + std::chrono::hours(24);
    changed.stood_still = true;
    changed.events = {{changed.time + std::chrono::hours(7), "oil-changed", "", "fitter", "VG 32, VI 150, in press-tank"}};
    const std::string text = history_text({day, changed, day}, config::Plant{}, Paper{});
    EXPECT_THAT(text, testing::HasSubstr("1970-01-02 07:00 - oil-changed, by fitter: VG 32, VI 150, in press-tank\n"));
    EXPECT_EQ(to_json(std::vector{day, changed})[1]["events"][0]["kind"], "oil-changed");
    EXPECT_FALSE(to_json(std::vector{day, changed})[0].contains("events"));
}

TEST(AlertsText, SaysWhoAcknowledgedAndWhy) {
    Episode episode;
    episode.pump = "press-2";
    episode.acknowledged_by = "fitter";
    episode.why = "part ordered";
    EXPECT_THAT(alerts_text({episode}, config::Plant{}, Paper{}), testing::HasSubstr("acknowledged by fitter: part ordered\n"));
}

TEST(HistoryText, PutsDaysWithoutAVerdictIntoOneLine) {
    HistoryRow still;
    still.section = "A";
    still.stood_still = true;
    HistoryRow judged = still;
    judged.stood_still = false;
    judged.level = Level::sound;
    const std::string text = history_text({still, still, still, judged, still}, config::Plant{}, Paper{});
    EXPECT_THAT(text, testing::HasSubstr("... 3 days without a verdict\n"));
    EXPECT_THAT(text, testing::HasSubstr("sound"));
    EXPECT_THAT(text, testing::HasSubstr("... 1 day without a verdict\n"));
}

TEST(FleetText, FitsEightyColumns) {
    std::istringstream lines(fleet_text({worn_section("A")}, config::Plant{}, Paper{}));
    for (std::string line; std::getline(lines, line);) EXPECT_LE(line.size(), page_width) << line;
}

TEST(Page, ShowsForeignTextAsText) {
    EXPECT_EQ(escaped("<b a='1' c=\"2\">&"), "&lt;b a=&#39;1&#39; c=&quot;2&quot;&gt;&amp;");
    const std::string html = health_page(PumpHealth{"press-2", {worn_section("A")}}, config::Plant{});
    EXPECT_THAT(html, testing::HasSubstr("press pump &lt;2&gt;"));
    EXPECT_THAT(html, testing::Not(testing::HasSubstr("pump <2>")));
}

}  // namespace
}  // namespace slipledger::report
