#include "daemon/report/work_sheet.hpp"

#include <fmt/format.h>

#include <cmath>
#include <utility>

namespace slipledger::report {

namespace {

constexpr bool is_letter(char c) {
    return (c >= 'a' && c <= 'z') || (c >= 'A' && c <= 'Z');
}
constexpr bool goes_on(char c) {
    return is_letter(c) || c == '_' || (c >= '0' && c <= '9');
}

// As it stands in a formula: a minus must not run into the sign before it.
std::string bracketed(double value, int digits) {
    const std::string text = written(value, digits);
    return text.starts_with('-') ? "(" + text + ")" : text;
}

}  // namespace

std::string written(double value, int digits) {
    if (!std::isfinite(value)) return "-";
    const std::string text = fmt::format("{:.{}g}", value, digits);
    return text == "-0" ? "0" : text;
}

void WorkSheet::chapter(std::string title) {
    chapters_.push_back({std::move(title), {}, {}});
}

void WorkSheet::remark(std::string text) {
    chapters_.back().remarks.push_back(std::move(text));
}

void WorkSheet::put(WorkStep step) {
    if (!step.formula.empty()) step.numbers = with_numbers(step.formula);
    numbers_[step.symbol] = bracketed(step.value, step.digits);
    if (std::isfinite(step.sd)) numbers_["sd_" + step.symbol] = bracketed(step.sd, step.digits);
    chapters_.back().steps.push_back(std::move(step));
}

// Names of functions (exp, log10, ...) are no symbols of the page and stay.
std::string WorkSheet::with_numbers(std::string_view formula) const {
    std::string out;
    for (std::size_t at = 0; at < formula.size();) {
        const bool begins_name = is_letter(formula[at]) && (at == 0 || !goes_on(formula[at - 1]));
        if (!begins_name) {
            out += formula[at++];
            continue;
        }
        std::size_t end = at;
        while (end < formula.size() && goes_on(formula[end])) ++end;
        const std::string_view name = formula.substr(at, end - at);
        const auto known = numbers_.find(name);
        out += known == numbers_.end() ? name : std::string_view(known->second);
        at = end;
    }
    return out;
}

}  // namespace slipledger::report
