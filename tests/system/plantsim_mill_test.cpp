#include <gtest/gtest.h>

#include <unistd.h>

#include <algorithm>
#include <cmath>
#include <filesystem>
#include <fstream>
#include <numeric>
#include <sstream>

#include "tools/plantsim/files.hpp"
#include "tools/plantsim/mill.hpp"
#include "tools/plantsim/veneer_mill.hpp"

namespace slipledger::plantsim {
namespace {

constexpr std::uint64_t seed = 1;
constexpr std::size_t press_1 = 0;
constexpr std::size_t press_2 = 1;
constexpr std::size_t lathe = 2;
constexpr std::size_t barker = 5;
constexpr std::size_t scarfer = 6;
constexpr std::size_t stacker = 8;

const Mill& mill() {
    static const Mill made(veneer_mill(), seed);
    return made;
}

Millis new_year() {
    return mill().plant().year_begins;
}

std::string csv(const std::vector<std::size_t>& pumps, const Span& span) {
    const auto file = std::filesystem::temp_directory_path() / ("plantsim-" + std::to_string(::getpid()) + ".csv");
    write_csv(mill(), pumps, span, file);
    std::stringstream text;
    text << std::ifstream(file).rdbuf();
    std::filesystem::remove(file);
    return text.str();
}

// Mean drain over a month of the rows in which the compensator holds the pressure.
double drain_while_holding(std::size_t pump, int first_day) {
    std::vector<Row> rows;
    const Millis from = new_year() + first_day * day_ms;
    for (Millis time = from; time < from + 30 * day_ms; time += 10 * minute_ms) mill().sample(pump, time, rows);
    std::vector<double> drains;
    for (const Row& row : rows)
        if (row[Column::outlet_pressure] > 240.0 && row[Column::case_drain_flow] > 0.0)
            drains.push_back(row[Column::case_drain_flow]);
    return std::reduce(drains.begin(), drains.end()) / static_cast<double>(drains.size());
}

TEST(PlantsimMill, WearsWhatItsStorySaysAndNothingElse) {
    const Millis end = mill().plant().year_ends - 1;
    EXPECT_NEAR(mill().ratio(press_1, 0, end), 2.6, 0.01);
    EXPECT_NEAR(mill().ratio(lathe, 0, end), 2.5, 0.01);
    EXPECT_NEAR(mill().ratio(barker, 0, end), 1.85, 0.01);
    EXPECT_NEAR(mill().ratio(barker, 0, new_year() + 230 * day_ms), 1.0, 1e-9);
    for (const std::size_t healthy : {press_2, std::size_t{3}, std::size_t{4}, scarfer, std::size_t{7}, stacker})
        EXPECT_NEAR(mill().ratio(healthy, 0, end), 1.0, 1e-9) << mill().plant().pumps[healthy].id;
    EXPECT_NEAR(mill().ratio(lathe, 1, end), 1.0, 1e-9);
}

TEST(PlantsimMill, WearSpeedsUpByItself) {
    const auto ratio = [](int day) { return mill().ratio(press_1, 0, new_year() + day * day_ms); };
    EXPECT_LT(ratio(240) - ratio(180), ratio(300) - ratio(240));
}

TEST(PlantsimMill, HotSummerRaisesTheRawDrainOfAHealthyPump) {
    const double winter = drain_while_holding(press_2, 10);
    const double summer = drain_while_holding(press_2, 190);
    EXPECT_GT(summer, 1.25 * winter);
}

TEST(PlantsimMill, OnePumpsRowsAreTheSameWhoeverElseIsAsked) {
    const Span span{.from = new_year() + 40 * day_ms, .to = new_year() + 41 * day_ms};
    const std::string alone = csv({stacker}, span);
    std::vector<Row> rows;
    for (Millis time = span.from; time < span.to; time += span.interval) {
        std::vector<Row> others;
        mill().sample(press_1, time, others);
        mill().sample(stacker, time, rows);
    }
    std::string expected = csv_header(layout_for(mill().plant(), {stacker}));
    for (const Row& row : rows) append_csv(expected, row, layout_for(mill().plant(), {stacker}));
    EXPECT_EQ(alone, expected);
}

TEST(PlantsimMill, SameSeedSameBytesAndAnotherSeedOthers) {
    const Span span{.from = new_year() + 40 * day_ms, .to = new_year() + 42 * day_ms};
    const Mill again(veneer_mill(), seed);
    const Mill other(veneer_mill(), seed + 1);
    int different = 0;
    for (Millis time = span.from; time < span.to; time += span.interval) {
        std::vector<Row> rows;
        for (const Mill* asked : {&mill(), &again, &other}) asked->sample(press_1, time, rows);
        std::string a;
        std::string b;
        std::string c;
        append_ndjson(a, rows[0]);
        append_ndjson(b, rows[1]);
        append_ndjson(c, rows[2]);
        EXPECT_EQ(a, b);
        different += a != c ? 1 : 0;
    }
    EXPECT_GT(different, 100);
}

TEST(PlantsimMill, ValueAtAMomentDoesNotDependOnTheInterval) {
    const Span fine{.from = new_year(), .to = new_year() + 2 * day_ms, .interval = 5 * minute_ms};
    const Span coarse{.from = new_year(), .to = new_year() + 2 * day_ms, .interval = 15 * minute_ms};
    std::istringstream fine_lines(csv({press_1}, fine));
    std::istringstream coarse_lines(csv({press_1}, coarse));
    std::string fine_line;
    std::string coarse_line;
    for (int n = 0; std::getline(coarse_lines, coarse_line); ++n) {
        for (int skip = 0; skip < (n < 2 ? 1 : 3); ++skip) std::getline(fine_lines, fine_line);
        EXPECT_EQ(fine_line, coarse_line);
    }
}

TEST(PlantsimMill, DropFilesHoldTheRowsOfTheCsvAndNoHalfFileIsLeft) {
    const Span span{.from = new_year() + 20 * day_ms, .to = new_year() + 37 * day_ms};
    const auto folder = std::filesystem::temp_directory_path() / ("plantsim-drop-" + std::to_string(::getpid()));
    std::filesystem::create_directories(folder);
    drop_files(mill(), barker, span, 7, Pace(span.from, std::nullopt), folder);
    std::vector<std::filesystem::path> files;
    for (const auto& entry : std::filesystem::directory_iterator(folder)) files.push_back(entry.path());
    std::ranges::sort(files);
    EXPECT_EQ(files.size(), 3U);
    std::string together = csv_header(layout_for(mill().plant(), {barker}));
    for (const auto& file : files) {
        EXPECT_EQ(file.extension(), ".csv");
        std::ifstream in(file);
        std::string line;
        std::getline(in, line);
        while (std::getline(in, line)) together += line + '\n';
    }
    std::filesystem::remove_all(folder);
    EXPECT_EQ(together, csv({barker}, span));
}

TEST(PlantsimMill, NewPumpBeginsLateAndTheSilentOneEndsEarly) {
    const Millis end = mill().plant().year_ends;
    const auto writes = [](std::size_t pump, Millis time) {
        std::vector<Row> rows;
        mill().sample(pump, time, rows);
        return !rows.empty();
    };
    EXPECT_FALSE(writes(scarfer, end - 2 * day_ms - minute_ms));
    EXPECT_TRUE(writes(scarfer, end - 2 * day_ms));
    EXPECT_TRUE(writes(stacker, end - 5 * day_ms - minute_ms));
    EXPECT_FALSE(writes(stacker, end - 5 * day_ms));
}

TEST(PlantsimMill, DoublePumpWritesSharedValuesInItsFirstSectionsRowOnly) {
    std::vector<Row> rows;
    mill().sample(lathe, new_year() + 40 * day_ms + 10 * hour_ms, rows);
    ASSERT_EQ(rows.size(), 2U);
    EXPECT_EQ(rows[0].section, "A");
    EXPECT_EQ(rows[1].section, "B");
    EXPECT_FALSE(std::isnan(rows[0][Column::shaft_speed]));
    EXPECT_TRUE(std::isnan(rows[1][Column::shaft_speed]));
    EXPECT_TRUE(std::isnan(rows[1][Column::fluid_temperature]));
    EXPECT_FALSE(std::isnan(rows[1][Column::case_drain_flow]));
}

// Summer time began on 30 March 2025 and ended on 26 October (Europe/Helsinki, tz database).
TEST(PlantsimTruth, EndsEachOfThePlantsDaysAtItsOwnMidnight) {
    const auto file = std::filesystem::temp_directory_path() / ("plantsim-truth-" + std::to_string(::getpid()));
    write_truth(mill(), {press_1}, {.from = new_year(), .to = mill().plant().year_ends}, file);
    std::ifstream in(file);
    std::vector<std::string> ends;
    for (std::string line; std::getline(in, line);) ends.push_back(line.substr(0, 20));
    std::filesystem::remove(file);
    ASSERT_EQ(ends.size(), 366U);
    EXPECT_EQ(ends[1], "2025-01-01T22:00:00Z");
    EXPECT_EQ(ends[88], "2025-03-29T22:00:00Z");
    EXPECT_EQ(ends[89], "2025-03-30T21:00:00Z");
    EXPECT_EQ(ends[299], "2025-10-26T22:00:00Z");
}

}  // namespace
}  // namespace slipledger::plantsim
