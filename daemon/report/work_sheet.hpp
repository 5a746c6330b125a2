// Where a page of working is written, step by step. A step names its formula in the symbols of the steps before it; the
// sheet puts their numbers in, as they are printed, so that a reader works with exactly what stands on the page.
#pragma once

#include <map>
#include <string>
#include <string_view>
#include <vector>

#include "daemon/report/working.hpp"

namespace slipledger::report {

// A number as the page writes it: "212.4", "8.85e-09"; digits are significant ones. "-" where it is not known.
std::string written(double value, int digits = usual_digits);

// Threads: one at a time.
class WorkSheet {
public:
    void chapter(std::string title);
    // Both go into the chapter begun last.
    void remark(std::string text);
    void put(WorkStep step);
    bool has(std::string_view symbol) const { return numbers_.contains(symbol); }

    std::vector<WorkChapter> take() { return std::move(chapters_); }

private:
    std::string with_numbers(std::string_view formula) const;

    std::vector<WorkChapter> chapters_;
    std::map<std::string, std::string, std::less<>> numbers_;  // symbol -> as printed, ready to stand in a formula
};

}  // namespace slipledger::report
