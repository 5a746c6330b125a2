#include "daemon/notify/alert_log.hpp"

#include <gmock/gmock.h>
#include <gtest/gtest.h>
#include <unistd.h>

#include <filesystem>
#include <fstream>
#include <vector>

namespace slipledger::notify {
namespace {

using testing::ElementsAre;

ledger::Notice notice(const std::string& id) {
    ledger::Notice made;
    made.id = id;
    made.body = R"({"id":")" + id + R"(","sentence":"the pump leaks"})";
    return made;
}

class AlertLogFile : public testing::Test {
protected:
    AlertLogFile() {
        std::string pattern = (std::filesystem::temp_directory_path() / "slipledger-XXXXXX").string();
        folder_ = ::mkdtemp(pattern.data());
        path_ = folder_ / "alerts.ndjson";
    }
    ~AlertLogFile() override { std::filesystem::remove_all(folder_); }

    std::vector<std::string> lines(const std::filesystem::path& path) const {
        std::ifstream in(path);
        std::vector<std::string> all;
        for (std::string line; std::getline(in, line);) all.push_back(line);
        return all;
    }

    std::filesystem::path folder_;
    std::filesystem::path path_;
};

TEST_F(AlertLogFile, HoldsALineForEachNotice) {
    AlertLog log(path_);
    EXPECT_EQ(log.deliver(notice("a")).delivery, Delivery::delivered);
    EXPECT_EQ(log.deliver(notice("b")).delivery, Delivery::delivered);
    EXPECT_THAT(lines(path_), ElementsAre(notice("a").body, notice("b").body));
}

TEST_F(AlertLogFile, NeverHoldsANoticeTwiceAlsoAcrossARestart) {
    AlertLog(path_).deliver(notice("a"));
    AlertLog again(path_);
    EXPECT_EQ(again.deliver(notice("a")).delivery, Delivery::delivered);
    EXPECT_EQ(again.deliver(notice("a")).delivery, Delivery::delivered);
    EXPECT_THAT(lines(path_), ElementsAre(notice("a").body));
}

TEST_F(AlertLogFile, LosesTheTornLineOfACrashAndWritesItAnew) {
    std::ofstream(path_) << notice("a").body << '\n' << notice("b").body.substr(0, 9);
    AlertLog log(path_);
    log.deliver(notice("b"));
    EXPECT_THAT(lines(path_), ElementsAre(notice("a").body, notice("b").body));
}

TEST_F(AlertLogFile, GoesOnInANewFileAfterRotation) {
    AlertLog log(path_);
    log.deliver(notice("a"));
    std::filesystem::rename(path_, folder_ / "alerts.1");
    log.deliver(notice("b"));
    log.reopen();
    log.deliver(notice("a"));
    log.deliver(notice("c"));
    EXPECT_THAT(lines(folder_ / "alerts.1"), ElementsAre(notice("a").body, notice("b").body));
    EXPECT_THAT(lines(path_), ElementsAre(notice("c").body));
}

TEST_F(AlertLogFile, SaysWhereItCannotBeOpened) {
    EXPECT_THROW(AlertLog(folder_ / "missing" / "alerts.ndjson"), std::system_error);
}

TEST_F(AlertLogFile, TriesAgainWhereTheDiskIsFull) {
    if (!std::filesystem::exists("/dev/full")) GTEST_SKIP() << "this system has no /dev/full";
    AlertLog log("/dev/full");
    const DeliveryOutcome outcome = log.deliver(notice("a"));
    EXPECT_EQ(outcome.delivery, Delivery::try_again);
    EXPECT_THAT(outcome.error, testing::HasSubstr("/dev/full"));
}

}  // namespace
}  // namespace slipledger::notify
