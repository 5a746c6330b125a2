#include "daemon/intake/refusal.hpp"

#include <utility>

namespace slipledger::intake {

std::string_view code_of(Reason reason) {
    switch (reason) {
        case Reason::bad_syntax: return "bad-syntax";
        case Reason::bad_quote: return "bad-quote";
        case Reason::duplicate_key: return "duplicate-key";
        case Reason::line_too_long: return "line-too-long";
        case Reason::unfinished_line: return "unfinished-line";
        case Reason::wrong_field_count: return "wrong-field-count";
        case Reason::bad_header: return "bad-header";
        case Reason::unknown_column: return "unknown-column";
        case Reason::missing_time: return "missing-time";
        case Reason::bad_time: return "bad-time";
        case Reason::ambiguous_time: return "ambiguous-time";
        case Reason::implausible_time: return "implausible-time";
        case Reason::future: return "future";
        case Reason::missing_pump: return "missing-pump";
        case Reason::unknown_pump: return "unknown-pump";
        case Reason::unknown_section: return "unknown-section";
        case Reason::missing_tag: return "missing-tag";
        case Reason::unknown_tag: return "unknown-tag";
        case Reason::bad_number: return "bad-number";
        case Reason::out_of_range: return "out-of-range";
        case Reason::no_value: return "no-value";
    }
    return "refused";
}

Refusal::Refusal(Reason reason_, std::string where_, std::string found_, std::string wanted_)
    : reason(reason_), where(std::move(where_)), found(std::move(found_)), wanted(std::move(wanted_)) {}

std::string Refusal::message() const {
    std::string text = where;
    if (!text.empty() && !found.empty()) text += ' ';
    text += found;
    if (!wanted.empty()) text += "; wanted " + wanted;
    text += " (";
    text += code_of(reason);
    return text += ')';
}

std::string in_quotes(std::string_view text, std::size_t most) {
    std::string shown = "\"";
    for (const char c : text.substr(0, most)) shown += c >= ' ' && c <= '~' && c != '"' ? c : '?';
    return shown += text.size() > most ? "...\"" : "\"";
}

}  // namespace slipledger::intake
