#include "daemon/intake/command_socket.hpp"

#include <sys/stat.h>

#include <fstream>
#include <thread>

#include <gmock/gmock.h>
#include <gtest/gtest.h>

#include "daemon/intake/command_client.hpp"
#include "tests/daemon/intake/live_mill.hpp"

namespace slipledger::intake {
namespace {

using namespace std::chrono_literals;
using ::testing::HasSubstr;

class Commands : public LiveMill {
protected:
    Commands() {
        const CommandWorld world{plant_.feeds,   plant_.pumps,   "UTC",
                                 writer(),       clock_,         find_receipt(),
                                 [] { return std::string("{\"marks\":3}"); }, [this] { return ++asked_ >= 3; }};
        socket_ = std::make_unique<CommandSocket>(io_, path_, world);
        socket_->start();
        network_ = std::thread([this] { io_.run(); });
    }
    ~Commands() override {
        net::post(io_, [this] { socket_->stop(); });
        network_.join();
        socket_.reset();
    }

    static CommandRequest load_of(const std::string& file, const std::string& feed = {}) {
        CommandRequest request;
        request.kind = CommandRequest::Kind::load;
        request.file = file;
        request.feed = feed;
        return request;
    }
    static CommandRequest note() {
        CommandRequest request;
        request.kind = CommandRequest::Kind::event;
        request.event.kind = "note";
        request.event.pump = "press-1";
        request.event.at = mill::noon() - 1h;
        request.event.by = "A. Planner";
        request.event.body = R"({"text":"looked at the coupling"})";
        return request;
    }

    const std::string path_ = command_socket_path(folder_ / "ledger.db");
    int asked_ = 0;
    net::io_context io_;
    std::unique_ptr<CommandSocket> socket_;
    std::thread network_;
};

TEST_F(Commands, AreForOwnerAndGroupOnly) {
    struct stat facts {};
    ASSERT_EQ(::stat(path_.c_str(), &facts), 0);
    EXPECT_EQ(facts.st_mode & 0777, 0660U);
}

TEST_F(Commands, StoreAnEventWithTheUserWhoAsked) {
    auto client = CommandClient::connect(path_);
    ASSERT_TRUE(client);
    const auto said = client->ask(note());
    EXPECT_EQ(said["ok"], true) << said;
    const auto events = reader().events("press-1");
    ASSERT_FALSE(events.empty());
    const ledger::Event& event = events.back();
    EXPECT_EQ(event.kind, "note");
    EXPECT_EQ(event.at, mill::noon() - 1h);
    EXPECT_EQ(event.entered, mill::noon());
    EXPECT_EQ(event.by, "A. Planner");
    EXPECT_FALSE(event.user.empty());
    EXPECT_EQ(event.body, R"({"text":"looked at the coupling"})");
}

TEST_F(Commands, RefuseAnEventOfAPumpThatDoesNotExistAndAnswerTheNext) {
    auto client = CommandClient::connect(path_);
    CommandRequest wrong = note();
    wrong.event.pump = "press-9";
    const auto said = client->ask(wrong);
    EXPECT_EQ(said["ok"], false);
    EXPECT_THAT(said["reason"].get<std::string>(), HasSubstr("unknown-pump"));
    EXPECT_EQ(client->ask(note())["ok"], true);
}

TEST_F(Commands, LoadAFileThatTheClientOpened) {
    std::ofstream(folder_ / "week.csv") << csv_rows(500);
    auto client = CommandClient::connect(path_);
    const auto said = client->load(folder_ / "week.csv", load_of("week.csv"), {});
    EXPECT_EQ(said["ok"], true) << said;
    EXPECT_EQ(said["receipt"]["stored"], 500);
    EXPECT_EQ(said["receipt"]["feed"], "command");
    EXPECT_EQ(stored_readings("press-1"), 500U);
    EXPECT_EQ(client->load(folder_ / "week.csv", load_of("week.csv"), {})["receipt"]["already_taken"], true);
}

TEST_F(Commands, SayThatAFeedToLoadByDoesNotExist) {
    std::ofstream(folder_ / "week.csv") << csv_rows(5);
    auto client = CommandClient::connect(path_);
    EXPECT_EQ(client->load(folder_ / "week.csv", load_of("week.csv", "yard"), {})["ok"], false);
    EXPECT_EQ(client->ask(load_of("week.csv"))["ok"], false) << "no file came along";
}

TEST_F(Commands, AnswerStatusAndDrain) {
    auto client = CommandClient::connect(path_);
    CommandRequest request;
    EXPECT_EQ(client->ask(request)["marks"], 3);
    request.kind = CommandRequest::Kind::drain;
    EXPECT_EQ(client->ask(request)["ok"], true);
    EXPECT_GE(asked_, 3);
}

TEST(CommandClient, FindsNobodyWhereNoDaemonListens) {
    const testing::TempFolder folder;
    EXPECT_FALSE(CommandClient::connect(folder / "ledger.db.sock"));
}

TEST(CommandRequest, RefusesWhatItDoesNotUnderstand) {
    const ledger::Directory directory = mill::directory();
    for (const char* line : {"", "[]", "{}", R"({"do":"dance"})", R"({"do":"load"})", R"({"do":"event"})",
                             R"({"do":"event","event":{"kind":"note"}})"})
        EXPECT_FALSE(read_command(line, directory)) << line;
}

}  // namespace
}  // namespace slipledger::intake
