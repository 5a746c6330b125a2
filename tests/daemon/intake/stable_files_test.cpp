#include "daemon/intake/stable_files.hpp"

#include <gmock/gmock.h>
#include <gtest/gtest.h>

namespace slipledger::intake {
namespace {

using namespace std::chrono_literals;
using testing::ElementsAre;
using testing::IsEmpty;

SeenFile file_of(std::uint64_t size, std::int64_t changed = 1, std::uint64_t inode = 7) {
    SeenFile file;
    file.size = size;
    file.changed_ns = changed;
    file.inode = inode;
    return file;
}

constexpr analytics::Instant start{1772366400000ms};

TEST(StableFiles, AreThoseUnchangedForLongEnoughInOrderOfName) {
    StableFiles files(2s);
    const FolderListing listing{{"b.csv", file_of(10)}, {"a.csv", file_of(20)}};
    EXPECT_THAT(files.finished(listing, start), IsEmpty());
    EXPECT_TRUE(files.waiting());
    EXPECT_THAT(files.finished(listing, start + 1999ms), IsEmpty());
    EXPECT_THAT(files.finished(listing, start + 2s), ElementsAre("a.csv", "b.csv"));
    EXPECT_FALSE(files.waiting());
}

TEST(StableFiles, WaitAnewWhenAFileGrowsIsTouchedOrReplaced) {
    for (const SeenFile& changed : {file_of(11), file_of(10, 2), file_of(10, 1, 8)}) {
        StableFiles files(2s);
        files.finished({{"a.csv", file_of(10)}}, start);
        EXPECT_THAT(files.finished({{"a.csv", changed}}, start + 2s), IsEmpty());
        EXPECT_THAT(files.finished({{"a.csv", changed}}, start + 4s), ElementsAre("a.csv"));
    }
}

TEST(StableFiles, ForgetAFileThatWasTakenSoThatItsNameCanComeAgain) {
    StableFiles files(2s);
    files.finished({{"a.csv", file_of(10)}}, start);
    files.finished({}, start + 1s);
    EXPECT_THAT(files.finished({{"a.csv", file_of(10)}}, start + 3s), IsEmpty());
}

TEST(StableFiles, LeaveHiddenTemporaryAndReceiptFilesAlone) {
    EXPECT_TRUE(is_candidate("mill-week-03.csv"));
    for (const char* name : {".hidden.csv", "a.csv.part", "a.tmp", "a.csv.receipt.json"}) EXPECT_FALSE(is_candidate(name)) << name;
}

}  // namespace
}  // namespace slipledger::intake
