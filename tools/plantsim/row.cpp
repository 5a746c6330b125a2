#include "tools/plantsim/row.hpp"

#include <algorithm>
#include <charconv>
#include <cmath>

namespace slipledger::plantsim {
namespace {

void append_number(std::string& out, double value, Column column) {
    std::array<char, 32> text{};
    const int decimals = column_table[static_cast<std::size_t>(column)].decimals;
    const auto end = std::to_chars(text.begin(), text.end(), value, std::chars_format::fixed, decimals).ptr;
    out.append(text.begin(), end);
}

}  // namespace

bool Row::empty() const {
    return std::ranges::all_of(values, [](double value) { return std::isnan(value); });
}

std::string csv_header(const CsvLayout& layout) {
    std::string header = layout.with_section ? "time,pump,section" : "time,pump";
    for (const Column column : layout.columns) {
        header += ',';
        header += column_table[static_cast<std::size_t>(column)].name;
    }
    return header + '\n';
}

void append_csv(std::string& out, const Row& row, const CsvLayout& layout) {
    append_rfc3339(out, row.time);
    out += ',';
    out += row.pump;
    if (layout.with_section) {
        out += ',';
        out += row.section;
    }
    for (const Column column : layout.columns) {
        out += ',';
        if (!std::isnan(row[column])) append_number(out, row[column], column);
    }
    out += '\n';
}

void append_ndjson(std::string& out, const Row& row) {
    out += R"({"time":")";
    append_rfc3339(out, row.time);
    out += R"(","pump":")";
    out += row.pump;
    if (!row.section.empty()) {
        out += R"(","section":")";
        out += row.section;
    }
    out += '"';
    for (std::size_t i = 0; i < column_count; ++i) {
        if (std::isnan(row.values[i])) continue;
        out += ",\"";
        out += column_table[i].name;
        out += "\":";
        append_number(out, row.values[i], static_cast<Column>(i));
    }
    out += "}\n";
}

}  // namespace slipledger::plantsim
