// The writing thread: what it acknowledges is stored, what fails is said to have failed, and it lives on.

#include "daemon/ledger/writer.hpp"

#include <gmock/gmock.h>
#include <sys/resource.h>

#include <SQLiteCpp/SQLiteCpp.h>
#include <atomic>
#include <csignal>
#include <future>

#include "tests/daemon/ledger/ledger_fixture.hpp"
#include "tests/support/failing_ledger.hpp"

namespace slipledger::ledger {
namespace {

using ::testing::IsEmpty;
using ::testing::SizeIs;

class Writing : public LedgerTest {
protected:
    static constexpr int batches = 40;

    // A row of each of two pumps, two hours further on with each batch.
    IntakeBatch batch(const Directory& directory, int number) {
        const Instant time = day_one + number * 2h;
        return batch_of({row_of(*directory.point("press-1", ""), time, {{Quantity::outlet_pressure, 180.0 + number}}),
                         row_of(*directory.point("lathe", ""), time, {{Quantity::outlet_pressure, 90.0}})});
    }

    static IntakeOutcome submit_and_wait(Writer& writer, IntakeBatch batch) {
        std::promise<IntakeOutcome> outcome;
        writer.submit(std::move(batch), [&](const IntakeOutcome& told) { outcome.set_value(told); });
        return outcome.get_future().get();
    }

    std::uint64_t stored() {
        const Reader read = reader();
        return read.count(*read.directory().point("press-1", "")).readings;
    }

    std::size_t blocks() {
        SQLite::Database database(plant_.store.path, SQLite::OPEN_READONLY);
        return static_cast<std::size_t>(database.execAndGet("SELECT count(*) FROM hour_block").getInt());
    }
};

TEST_F(Writing, StoresWhatIsQueuedAndMovesClosedHoursBeforeItIsDrained) {
    Writer writer(open_ledger(plant_), 1ms);
    for (int i = 0; i < batches; ++i) writer.submit(batch(writer.directory(), i), {});
    writer.drain();
    EXPECT_EQ(stored(), 40U);
    EXPECT_EQ(blocks(), 2U * 39U) << "the newest hour of each pump is open";
}

TEST_F(Writing, StoresWhatIsQueuedBeforeItEnds) {
    {
        Writer writer(open_ledger(plant_), 10s);
        for (int i = 0; i < batches; ++i) writer.submit(batch(writer.directory(), i), {});
    }
    EXPECT_EQ(stored(), 40U);
}

TEST_F(Writing, PutsManyBatchesIntoOneCommitAndAnswersEach) {
    auto counted = std::make_unique<testing::FailingLedger>(open_ledger(plant_), 0, testing::FailsWhen::before_storing);
    const testing::FailingLedger& calls = *counted;
    std::atomic<int> answers = 0;
    {
        Writer writer(std::move(counted), 300ms);
        for (int i = 0; i < batches; ++i)
            writer.submit(batch(writer.directory(), i), [&](const IntakeOutcome& told) {
                if (told.stored == 2 && !told.failed) ++answers;
            });
        writer.drain();
        EXPECT_LT(calls.calls(), batches);
    }
    EXPECT_EQ(answers, batches);
}

TEST_F(Writing, RefusesABatchWhenTheQueueIsFullAndLeavesItUntouched) {
    Writer writer(open_ledger(plant_), 1ms);
    std::promise<void> go_on;
    std::shared_future<void> released = go_on.get_future().share();
    writer.submit(batch(writer.directory(), 0), [released](const IntakeOutcome&) { released.wait(); });
    IntakeBatch large;
    large.rows.resize(100'000, row_of(*writer.directory().point("press-1", ""), day_one, {{Quantity::stroke, 1.0}}));
    large.sources = 1;
    IntakeBatch second = large;
    writer.submit(std::move(large), {});
    bool accepted = true;
    for (int tries = 0; tries < 3 && accepted; ++tries) {
        IntakeBatch more = second;
        accepted = writer.try_submit(more, {});
        EXPECT_THAT(more.rows, SizeIs(accepted ? 0 : 100'000));
    }
    EXPECT_FALSE(accepted);
    go_on.set_value();
    writer.drain();
    EXPECT_TRUE(writer.try_submit(second, {}));
}

TEST_F(Writing, SaysThatACommitFailedAndLivesOn) {
    Writer writer(std::make_unique<testing::FailingLedger>(open_ledger(plant_), 1, testing::FailsWhen::before_storing,
                                                           testing::Counts::storing),
                  1ms);
    const IntakeOutcome failed = submit_and_wait(writer, batch(writer.directory(), 0));
    EXPECT_TRUE(failed.failed);
    EXPECT_THAT(failed.failure, ::testing::HasSubstr("disk is full"));
    EXPECT_EQ(stored(), 0U);
    const IntakeOutcome again = submit_and_wait(writer, batch(writer.directory(), 0));
    EXPECT_FALSE(again.failed);
    EXPECT_EQ(again.stored, 2U);
    EXPECT_EQ(stored(), 1U);
}

// Called at every n until nothing fails any more: whatever was acknowledged is in the ledger, and a sender who repeats what was
// not leaves the same readings and marks as an undisturbed run.
class Failing : public Writing, public ::testing::WithParamInterface<testing::FailsWhen> {
protected:
    // What a sender who repeats until acknowledged leaves behind. Returns whether the n-th call was reached.
    bool send_all(int fail_at) {
        std::filesystem::remove_all(folder_.path());
        std::filesystem::create_directory(folder_.path());
        auto wrapped = std::make_unique<testing::FailingLedger>(open_ledger(plant_), fail_at, GetParam());
        const testing::FailingLedger& calls = *wrapped;
        Writer writer(std::move(wrapped), 1ms);
        for (int i = 0; i < 6; ++i) {
            IntakeOutcome outcome = submit_and_wait(writer, batch(writer.directory(), i));
            if (outcome.failed) outcome = submit_and_wait(writer, batch(writer.directory(), i));
            EXPECT_FALSE(outcome.failed);
            EXPECT_GE(stored(), static_cast<std::uint64_t>(i + 1));
        }
        writer.drain();
        return calls.calls() >= fail_at;
    }

    std::string left_behind() {
        const Reader read = reader();
        const Directory directory = read.directory();
        std::string text;
        for (const char* id : {"press-1", "lathe"})
            for (const Instant time : read.rows(*directory.point(id, ""), day_one, day_one + 99h).times)
                text += std::to_string(time.time_since_epoch().count()) + " ";
        for (const Mark& mark : read.marks())
            text += std::to_string(mark.from.time_since_epoch().count()) + "-" +
                    std::to_string(mark.to.time_since_epoch().count()) + " ";
        return text;
    }
};

TEST_P(Failing, AtAnyCallLosesNothingAcknowledgedAndStoresNothingTwice) {
    send_all(0);
    const std::string undisturbed = left_behind();
    int n = 1;
    for (; send_all(n); ++n) EXPECT_EQ(left_behind(), undisturbed) << "failed at call " << n;
    EXPECT_GT(n, 6);
}

INSTANTIATE_TEST_SUITE_P(When, Failing,
                         ::testing::Values(testing::FailsWhen::before_storing, testing::FailsWhen::after_storing),
                         [](const auto& tested) {
                             return tested.param == testing::FailsWhen::before_storing ? "BeforeStoring" : "AfterStoring";
                         });

TEST_F(Writing, TellsOfMarksAndOfNoticesOnceTheyCanBeRead) {
    std::promise<std::size_t> marks_seen;
    std::promise<std::size_t> notices_seen;
    bool told = false;
    Writer writer(open_ledger(plant_), 1ms);
    writer.on_marks([&] {
        if (!std::exchange(told, true)) marks_seen.set_value(reader().marks().size());
    });
    writer.on_outbox([&] { notices_seen.set_value(reader().due("log", day_one, 9).size()); });
    writer.submit(batch(writer.directory(), 0), {});
    writer.submit(batch(writer.directory(), 1), {});
    EXPECT_EQ(marks_seen.get_future().get(), 2U);
    const Mark mark = reader().marks().at(0);
    AnalysisResult result;
    result.pump = mark.pump;
    result.generation = mark.generation;
    result.notices.push_back({.id = "n1", .pump = "press-1", .section = "A", .episode = "e", .kind = "raised",
                              .level = "watch", .at = day_one, .body = "{}"});
    EXPECT_TRUE(writer.store(result));
    EXPECT_EQ(notices_seen.get_future().get(), 1U);
    EXPECT_FALSE(writer.store(AnalysisResult{.pump = mark.pump, .generation = mark.generation + 999, .tracks = {},
                                             .day_facts = {}, .notices = {}, .mark_again_from = {}}));
}

TEST_F(Writing, PassesAFailureOnToWhoWaits) {
    Writer writer(open_ledger(plant_), 1ms);
    EXPECT_THROW(writer.backup(folder_ / "no/folder/copy.db"), LedgerFailure);
    EXPECT_NO_THROW(writer.backup(folder_ / "copy.db"));
}

// Lets no file of this process grow beyond a size, as a full disk would not.
class FileSizeLimit {
public:
    explicit FileSizeLimit(rlim_t bytes) : ignored_(std::signal(SIGXFSZ, SIG_IGN)) {
        getrlimit(RLIMIT_FSIZE, &before_);
        const rlimit limit{.rlim_cur = bytes, .rlim_max = before_.rlim_max};
        setrlimit(RLIMIT_FSIZE, &limit);
    }
    ~FileSizeLimit() {
        setrlimit(RLIMIT_FSIZE, &before_);
        std::signal(SIGXFSZ, ignored_);
    }
    FileSizeLimit(const FileSizeLimit&) = delete;
    FileSizeLimit& operator=(const FileSizeLimit&) = delete;

private:
    rlimit before_{};
    void (*ignored_)(int);
};

TEST_F(Writing, FailsWholeWhereTheFileCannotGrowAndRecoversWhenThereIsRoomAgain) {
    Writer writer(open_ledger(plant_), 1ms);
    ASSERT_FALSE(submit_and_wait(writer, batch(writer.directory(), 0)).failed);
    writer.drain();
    {
        const FileSizeLimit full(std::filesystem::file_size(plant_.store.path + "-wal"));
        EXPECT_TRUE(submit_and_wait(writer, batch(writer.directory(), 1)).failed);
        EXPECT_EQ(stored(), 1U);
    }
    EXPECT_EQ(submit_and_wait(writer, batch(writer.directory(), 1)).stored, 2U);
    EXPECT_EQ(submit_and_wait(writer, batch(writer.directory(), 1)).repeated, 2U);
    EXPECT_EQ(stored(), 2U);
}

}  // namespace
}  // namespace slipledger::ledger
