#include "daemon/watch/analyst.hpp"

#include <gtest/gtest.h>

#include "daemon/ledger/open_ledger.hpp"
#include "tests/daemon/watch/demo_pump.hpp"
#include "tests/support/temp_folder.hpp"

namespace slipledger::watch {
namespace {

using namespace std::chrono_literals;

class AnalystAtWork : public ::testing::Test {
protected:
    AnalystAtWork()
        : plant_(demo_plant(folder_.path().string(), {"press-1", "press-2"})),
          writer_(ledger::open_ledger(plant_), 20ms),
          reader_(plant_.store.path) {}

    void submit(const std::string& pump, int days, unsigned seed) {
        ledger::IntakeBatch batch;
        batch.rows = demo_rows(*writer_.directory().point(pump, ""), days, {}, seed);
        batch.sources = static_cast<std::uint32_t>(batch.rows.size());
        for (std::uint32_t i = 0; i < batch.sources; ++i) batch.rows[i].source = i;
        writer_.submit(std::move(batch), {});
    }

    std::size_t judged_days(const std::string& pump) {
        const auto& track = writer_.directory().track(pump, "A", analytics::Basis::case_drain);
        return reader_.days(track.id, 0, 1000000).size();
    }

    testing::TempFolder folder_;
    config::Plant plant_;
    ledger::Writer writer_;
    ledger::Reader reader_;
};

TEST_F(AnalystAtWork, JudgesEverythingThatWasStoredWhenAsked) {
    Analyst analyst(plant_, writer_, plant_.store.path);
    submit("press-1", 4, 1);
    submit("press-2", 3, 2);
    writer_.drain();
    ASSERT_TRUE(analyst.wait_until_judged(60s));
    EXPECT_EQ(judged_days("press-1"), 4U);
    EXPECT_EQ(judged_days("press-2"), 3U);
    EXPECT_TRUE(reader_.marks().empty());
}

TEST_F(AnalystAtWork, FindsWhatWasLeftByTheProcessBefore) {
    submit("press-1", 2, 1);
    writer_.drain();
    EXPECT_FALSE(reader_.marks().empty());
    Analyst analyst(plant_, writer_, plant_.store.path);
    ASSERT_TRUE(analyst.wait_until_judged(60s));
    EXPECT_EQ(judged_days("press-1"), 2U);
}

TEST_F(AnalystAtWork, JudgesUnaskedOnceRowsRest) {
    Analyst analyst(plant_, writer_, plant_.store.path, {10ms, 1000ms, 10ms});
    submit("press-1", 2, 1);
    for (int i = 0; i < 600 && judged_days("press-1") == 0; ++i) std::this_thread::sleep_for(50ms);
    EXPECT_EQ(judged_days("press-1"), 2U);
}

TEST_F(AnalystAtWork, SurvivesALedgerItCannotReadAndSaysThatNothingWasJudged) {
    Analyst analyst(plant_, writer_, folder_ / "no-such.db", {10ms, 100ms, 150ms});
    submit("press-1", 2, 1);
    writer_.drain();
    EXPECT_FALSE(analyst.wait_until_judged(200ms));
}

}  // namespace
}  // namespace slipledger::watch
