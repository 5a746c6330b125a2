// The working behind a verdict as one value: every number from the raw reading on, each with its formula, unit and
// source, so that it can be checked with a pocket calculator. working_facts.hpp says what it is made from,
// render_working.hpp lays it out. The numbers come from the functions that judged; a formula here is text about them,
// never a second way to work them out.
#pragma once

#include <optional>
#include <string>
#include <vector>

#include "analytics/instant.hpp"
#include "analytics/regime.hpp"
#include "analytics/section_spec.hpp"

namespace slipledger::report {

inline constexpr int usual_digits = 6;  // significant; as in reports

// One number of the page. Threads: a value, share freely.
struct WorkStep {
    std::string name = {};    // "kinematic viscosity"
    std::string symbol = {};  // "nu"; no two steps of a page share one
    double value = analytics::unknown;
    double sd = analytics::unknown;  // of an estimate: formulas call it "sd_" and the symbol
    std::string unit = {};           // empty: a pure number
    std::string formula = {};        // in the symbols of earlier steps: + - * / ^ sqrt exp ln log10 abs; empty: given
    std::string numbers = {};        // the formula with the numbers as printed; filled in by the sheet
    std::string source = {};         // where the formula or the number comes from
    int digits = usual_digits;       // significant, as printed and as JSON
};

// Threads: a value, share freely.
struct WorkChapter {
    std::string title;
    std::vector<std::string> remarks;  // plain sentences, above the steps
    std::vector<WorkStep> steps;
};

// Threads: a value, share freely.
struct Working {
    std::string pump;
    std::string section;
    std::string pump_name;
    bool only_section = true;
    analytics::Basis basis = analytics::Basis::case_drain;
    std::optional<analytics::Instant> at;  // of the operating point shown
    std::optional<analytics::Instant> summary_from;
    std::optional<analytics::Instant> summary_to;
    std::int32_t life = 1;
    std::vector<WorkChapter> chapters;
    std::vector<analytics::JudgedPoint> points;  // all of the summary's, as they were made again from the raw readings
    std::string ends_because;                    // why the page goes no further; empty: it ends with the level
};

}  // namespace slipledger::report
