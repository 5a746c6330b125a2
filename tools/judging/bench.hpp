// Runs stories, two at a time, and marks what was told: by our pipeline and by both yardsticks, on the same rows.
#pragma once

#include <array>
#include <filesystem>
#include <functional>
#include <vector>

#include "tools/judging/marks.hpp"
#include "tools/judging/spoil.hpp"
#include "tools/judging/stories.hpp"

namespace slipledger::judging {

enum class Teller : std::uint8_t { ours, fixed_limit, notebook };
inline constexpr std::array<std::string_view, 3> teller_names{"slipledger", "fixed limit", "notebook"};

// Threads: a value, share freely.
struct SectionOutcome {
    Fleet fleet = Fleet::healthy;
    std::size_t number = 0;
    SectionStory story{};
    std::array<Marks, 3> marks{};  // by teller

    const Marks& of(Teller teller) const { return marks[static_cast<std::size_t>(teller)]; }
};

// Threads: a value, share freely.
struct StoryOutcome {
    std::vector<SectionOutcome> sections{};
    double pump_years = 0.0;
    std::uint64_t rows = 0;
};

// One fleet's share of a run: stories until it has so many pumps.
struct FleetOrder {
    Fleet fleet = Fleet::healthy;
    std::size_t pumps = 0;
};

// Threads: a value, share freely.
struct BenchOrder {
    std::vector<FleetOrder> fleets{};
    Telling telling{};
    Spoil spoil = Spoil::nothing;
    int jobs = 2;
    std::filesystem::path folder{};  // for temporary ledgers
};

// Threads: a value, share freely.
struct BenchResult {
    std::vector<SectionOutcome> sections{};  // in the order of fleets and numbers, whatever ran first
    double pump_years = 0.0;
    std::uint64_t rows = 0;
};

StoryOutcome run_story(const Story& story, Spoil spoil, const std::filesystem::path& folder);

// `progress` is called, one call at a time, after each story with how many of all are done. Throws what a story threw.
BenchResult run_bench(const BenchOrder& order, const std::function<void(std::size_t done, std::size_t of)>& progress);

}  // namespace slipledger::judging
