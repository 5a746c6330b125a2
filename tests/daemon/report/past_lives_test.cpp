// Lives side by side, out of a real ledger with judgements made by hand.
#include "daemon/report/past_lives.hpp"

#include <gmock/gmock.h>
#include <gtest/gtest.h>

#include <nlohmann/json.hpp>
#include <sstream>

#include "daemon/report/render_lives.hpp"
#include "tests/daemon/ledger/ledger_fixture.hpp"

namespace slipledger::report {
namespace {

using analytics::Basis;
using analytics::Hindsight;
using analytics::Level;

class PastLives : public ledger::LedgerTest {
protected:
    PastLives() {
        for (config::Pump& pump : plant_.pumps)
            for (config::Section& section : pump.sections) section.model = pump.id == "lathe" ? "B" : "A71";
    }

    void replace(const std::string& pump, int day, const std::string& body) {
        ledger::Event event;
        event.pump = pump;
        event.kind = "replaced";
        event.at = ledger::day_one + 24h * day;
        event.body = body;
        ledger().store(event);
    }

    // The last finished day of a life.
    static ledger::DayRecord day(std::int32_t date, std::int32_t life, Level level, double ratio, double hours) {
        ledger::DayRecord record{.verdict = {}, .finished = true};
        record.verdict.day = {.date = date, .begin = {}, .end = {}};
        record.verdict.life = life;
        record.verdict.level = level;
        record.verdict.reason = analytics::UnjudgedReason::none;
        record.verdict.leakage_ratio = {ratio, ratio - 0.1, ratio + 0.1};
        record.verdict.life_running_h = hours;
        return record;
    }

    void judge(const std::string& pump, Basis basis, std::vector<ledger::DayRecord> days) {
        ledger::AnalysisResult result;
        result.pump = this->pump(pump);
        for (const ledger::Mark& mark : reader().marks())
            if (mark.pump == result.pump) result.generation = mark.generation;
        ledger::TrackResult track;
        track.track = ledger().directory().track(pump, "A", basis).id;
        track.days = std::move(days);
        result.tracks.push_back(track);
        ASSERT_TRUE(ledger().store(result));
    }

    std::vector<ModelLives> lives(const std::optional<std::string>& model = std::nullopt, const char* pump = nullptr) {
        return query_lives(reader(), plant_, pump == nullptr ? nullptr : plant_.find_pump(pump), model);
    }
};

TEST_F(PastLives, AreComparedWithinTheirModel) {
    replace("press-1", 300, R"({"found":"worn"})");
    replace("press-2", 200, R"({"found":"good"})");
    replace("press-2", 280, R"({"found":"damaged","note":"from stock"})");
    judge("press-1", Basis::case_drain, {day(299, 1, Level::plan, 2.5, 5000.0), day(310, 2, Level::sound, 1.0, 150.0)});
    judge("press-2", Basis::case_drain, {day(199, 1, Level::act, 3.0, 4000.0), day(279, 2, Level::watch, 1.3, 1000.0)});
    const auto models = lives("A71");
    ASSERT_EQ(models.size(), 1U);
    const ModelLives& a71 = models.front();
    EXPECT_EQ(a71.ended, 3U);
    EXPECT_EQ(a71.median_hours, 4000.0);
    // 1.5 in 5000 h, 2 in 4000 h, 0.3 in 1000 h: 0.3, 0.5 and 0.3 per 1000 h.
    EXPECT_NEAR(a71.median_wear_per_1000_h, 0.3, 1e-12);
    EXPECT_EQ(a71.right, 1U);
    EXPECT_EQ(a71.wrong, 1U);
    EXPECT_EQ(a71.late, 1U);
    const auto first = std::ranges::find(a71.lives, Hindsight::right, &PastLife::hindsight);
    ASSERT_NE(first, a71.lives.end());
    EXPECT_EQ(first->pump, "press-1");
    EXPECT_EQ(first->found, "worn");
    EXPECT_FALSE(first->from);
    EXPECT_TRUE(first->to);
    EXPECT_EQ(lives().size(), 2U);
    EXPECT_EQ(lives(std::nullopt, "lathe").front().model, "B");
    EXPECT_TRUE(lives("C").empty());
}

TEST_F(PastLives, AreSpokenForByTheMoreUrgentBasis) {
    replace("press-1", 300, R"({"found":"worn"})");
    judge("press-1", Basis::case_drain, {day(299, 1, Level::sound, 1.1, 5000.0)});
    judge("press-1", Basis::delivery, {day(299, 1, Level::act, 3.1, 5000.0)});
    const auto models = lives(std::nullopt, "press-1");
    EXPECT_EQ(models.front().lives.front().basis, Basis::delivery);
    EXPECT_EQ(models.front().right, 1U);
    EXPECT_FALSE(models.front().lives.back().verdict) << "of the life in service nothing is judged yet";
}

TEST_F(PastLives, FitEightyColumnsAndSpeakJson) {
    replace("press-1", 300, R"({"found":"damaged"})");
    judge("press-1", Basis::case_drain, {day(299, 1, Level::act, 12.34, 123456.0)});
    const auto models = lives();
    const std::string text = lives_text(models, plant_, Paper{});
    std::istringstream lines(text);
    for (std::string line; std::getline(lines, line);) EXPECT_LE(line.size(), page_width) << line;
    EXPECT_THAT(text, testing::HasSubstr("last verdict right in 1 of 1"));
    EXPECT_THAT(text, testing::HasSubstr("in service"));
    const auto json = to_json(models);
    EXPECT_EQ(json["models"][0]["model"], "A71");
    const auto& life = json["models"][0]["lives"];
    const auto ended = std::ranges::find_if(life, [](const auto& each) { return each["verdict_was"] == "right"; });
    ASSERT_NE(ended, life.end());
    EXPECT_EQ((*ended)["found"], "damaged");
    EXPECT_EQ((*ended)["level"], "act");
    EXPECT_TRUE((*ended)["from"].is_null());
}

}  // namespace
}  // namespace slipledger::report
