#include "daemon/report/paragraph.hpp"

#include <gtest/gtest.h>

#include <sstream>

namespace slipledger::report {
namespace {

TEST(Paragraph, BreaksAtSpacesAndIndentsWhatFollows) {
    EXPECT_EQ(paragraph("! ", "one two three four", 10), "! one two\n  three\n  four\n");
}

TEST(Paragraph, KeepsAWordLongerThanTheLineWhole) {
    EXPECT_EQ(paragraph("", "abc defghijklmnop q", 8), "abc\ndefghijklmnop\nq\n");
}

TEST(Paragraph, CountsLettersNotBytes) {
    EXPECT_EQ(paragraph("", "ää öö üü", 5), "ää öö\nüü\n");
}

TEST(Cell, CutsAndFillsToTheWidth) {
    EXPECT_EQ(cell("pump", 6), "pump  ");
    EXPECT_EQ(cell("press-pump", 5), "press");
    EXPECT_EQ(cell("größe", 4), "größ");
}

TEST(LevelWord, TellsTheLevelWithoutColour) {
    EXPECT_EQ(level_word(analytics::Level::act, Paper{}), "*** act     ");
    EXPECT_EQ(level_word(analytics::Level::unjudged, Paper{}), "?   unjudged");
    EXPECT_EQ(level_word(analytics::Level::sound, Paper{}).find('\033'), std::string::npos);
    EXPECT_NE(level_word(analytics::Level::act, Paper{.colour = true}).find('\033'), std::string::npos);
}

TEST(Printable, TakesControlCharactersOutOfForeignText) {
    EXPECT_EQ(printable("tag\033[31m\n\x7f"), "tag?[31m??");
}

}  // namespace
}  // namespace slipledger::report
