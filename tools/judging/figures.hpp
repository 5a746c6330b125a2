// The figures by which the bench is read: each with its name, the aim it is held against and the way in which it is
// better. The table, the JSON and the floors all take them from here.
#pragma once

#include <string>
#include <string_view>
#include <vector>

#include "tools/judging/tally.hpp"

namespace slipledger::judging {

enum class Better : std::uint8_t { lower, higher, inside };

// Threads: a value, share freely.
struct Figure {
    std::string name{};
    std::string what{};
    double value = not_told;
    Better better = Better::lower;
    double aim = not_told;
    double aim_high = not_told;  // of a figure that should lie inside
    double fixed_limit = not_told;
    double notebook = not_told;

    bool meets_aim() const;
};

std::vector<Figure> figures_of(const std::vector<SectionOutcome>& all);

// Which sections a figure is about.
bool is_healthy_fleet(const SectionOutcome& section);
bool is_confounded_alone(const SectionOutcome& section);  // one confounder that can be told from wear, no wear
bool is_hard_alone(const SectionOutcome& section);        // several, no wear
bool is_worn_plainly(const SectionOutcome& section);      // wear without confounders, watched from healthy on
bool is_honest(const SectionOutcome& section);            // no confounder, not taken over

}  // namespace slipledger::judging
