#include "daemon/intake/line_splitter.hpp"

#include <random>
#include <string>
#include <vector>

#include <gmock/gmock.h>
#include <gtest/gtest.h>

namespace slipledger::intake {
namespace {

using testing::ElementsAre;

std::vector<std::string> lines_of(LineSplitter& splitter, std::string_view bytes) {
    std::vector<std::string> lines;
    while (const auto line = splitter.next(bytes)) lines.emplace_back(line->text);
    return lines;
}

TEST(LineSplitter, TakesSeveralLinesOutOfOnePacketAndKeepsTheRest) {
    LineSplitter splitter;
    EXPECT_THAT(lines_of(splitter, "one\ntwo\nthr"), ElementsAre("one", "two"));
    EXPECT_THAT(lines_of(splitter, "ee\n"), ElementsAre("three"));
    EXPECT_FALSE(splitter.rest());
}

TEST(LineSplitter, EndsALineAtCrLfEvenWhenThePacketEndsBetween) {
    LineSplitter splitter;
    EXPECT_THAT(lines_of(splitter, "one\r"), ElementsAre());
    EXPECT_THAT(lines_of(splitter, "\ntwo\r\n\r\n"), ElementsAre("one", "two", ""));
}

TEST(LineSplitter, PassesOverAByteOrderMarkBeforeTheFirstLineOnly) {
    LineSplitter splitter;
    EXPECT_THAT(lines_of(splitter, "\xEF\xBB"), ElementsAre());
    EXPECT_THAT(lines_of(splitter, "\xBFone\n\xEF\xBB\xBFtwo\n"), ElementsAre("one", "\xEF\xBB\xBFtwo"));
}

TEST(LineSplitter, HandsOutTheLastLineWithoutItsEndOnce) {
    LineSplitter splitter;
    lines_of(splitter, "one\ntwo");
    const auto rest = splitter.rest();
    ASSERT_TRUE(rest);
    EXPECT_EQ(rest->text, "two");
    EXPECT_EQ(rest->number, 2U);
    EXPECT_FALSE(splitter.rest());
}

TEST(LineSplitter, TakesALineOf64KiBAndMarksALongerOne) {
    LineSplitter splitter;
    const std::string longest(longest_line, 'x');
    std::string bytes = longest + "\r\n" + longest + "x\nnext\n";
    std::string_view left = bytes;
    const auto first = splitter.next(left);
    ASSERT_TRUE(first);
    EXPECT_FALSE(first->too_long);
    EXPECT_EQ(first->text.size(), longest_line);
    const auto second = splitter.next(left);
    ASSERT_TRUE(second);
    EXPECT_TRUE(second->too_long);
    const auto third = splitter.next(left);
    ASSERT_TRUE(third);
    EXPECT_EQ(third->text, "next");
    EXPECT_EQ(third->number, 3U);
}

TEST(LineSplitter, ForgetsWhatIsBeyondTheLongestLineHoweverMuchComes) {
    LineSplitter splitter;
    const std::string piece(1 << 16, 'x');
    for (int i = 0; i < 1000; ++i) EXPECT_THAT(lines_of(splitter, piece), ElementsAre());
    std::string_view end = "\nshort\n";
    const auto line = splitter.next(end);
    ASSERT_TRUE(line);
    EXPECT_TRUE(line->too_long);
    EXPECT_LE(line->text.size(), 1024U);
    EXPECT_EQ(splitter.next(end)->text, "short");
}

TEST(LineSplitter, GivesTheSameLinesHoweverTheBytesAreCut) {
    const std::string bytes = "\xEF\xBB\xBFtime,pump\r\na,b\n\n\r\nlong long line of text\r\nlast\n";
    LineSplitter whole;
    const auto wanted = lines_of(whole, bytes);
    std::mt19937 random(42);  // the seed of this test
    for (int round = 0; round < 500; ++round) {
        LineSplitter splitter;
        std::vector<std::string> lines;
        for (std::size_t at = 0; at < bytes.size();) {
            const std::size_t size = 1 + random() % 9;
            for (auto& line : lines_of(splitter, std::string_view(bytes).substr(at, size))) lines.push_back(line);
            at += size;
        }
        ASSERT_EQ(lines, wanted) << "round " << round;
    }
}

}  // namespace
}  // namespace slipledger::intake
