#include "daemon/intake/csv_line.hpp"

namespace slipledger::intake {

Checked<std::span<const std::string_view>> CsvLine::split(std::string_view line) {
    fields_.clear();
    unescaped_.clear();
    for (;;) {
        if (line.starts_with('"')) {
            const auto field = take_quoted(line);
            if (!field) return field.error();
            fields_.push_back(*field);
        } else {
            const std::size_t end = line.find(delimiter_);
            fields_.push_back(line.substr(0, end));
            line.remove_prefix(end == std::string_view::npos ? line.size() : end);
        }
        if (line.empty()) return std::span<const std::string_view>(fields_);
        line.remove_prefix(1);  // the delimiter; a field follows, if an empty one
    }
}

Checked<std::string_view> CsvLine::take_quoted(std::string_view& rest) {
    rest.remove_prefix(1);
    std::string* joined = nullptr;
    for (;;) {
        const std::size_t end = rest.find('"');
        if (end == std::string_view::npos)
            return Refusal(Reason::bad_quote, {}, "a quoted field does not end on its line", "one row a line");
        const std::string_view piece = rest.substr(0, end);
        rest.remove_prefix(end + 1);
        const bool doubled = rest.starts_with('"');
        if (joined != nullptr) joined->append(piece);
        if (!doubled) {
            if (!rest.empty() && rest.front() != delimiter_)
                return Refusal(Reason::bad_quote, {}, "text follows the closing quote: " + in_quotes(rest, 20),
                               "quotes inside a quoted field doubled");
            return joined == nullptr ? piece : std::string_view(*joined);
        }
        if (joined == nullptr) joined = &unescaped_.emplace_back(piece);
        joined->push_back('"');
        rest.remove_prefix(1);
    }
}

}  // namespace slipledger::intake
