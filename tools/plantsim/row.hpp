// One row of readings, and how it is written as a line of CSV or NDJSON.
#pragma once

#include <array>
#include <limits>
#include <string>
#include <string_view>
#include <vector>

#include "tools/plantsim/clock_time.hpp"

namespace slipledger::plantsim {

enum class Column {
    outlet_pressure,
    shaft_speed,
    case_drain_flow,
    fluid_temperature,
    delivery_flow,
    running,
    inlet_pressure,
    case_pressure,
};

inline constexpr std::size_t column_count = 8;
inline constexpr double no_value = std::numeric_limits<double>::quiet_NaN();

struct ColumnFacts {
    std::string_view name;
    int decimals;
};

inline constexpr std::array<ColumnFacts, column_count> column_table{{
    {"outlet_pressure", 1},
    {"shaft_speed", 0},
    {"case_drain_flow", 2},
    {"fluid_temperature", 1},
    {"delivery_flow", 2},
    {"running", 0},
    {"inlet_pressure", 3},
    {"case_pressure", 2},
}};

// Threads: a value; the names it views belong to the plant's drawing or the load plan.
struct Row {
    Millis time = 0;
    std::string_view pump{};
    std::string_view section{};  // empty: the pump has one only
    std::array<double, column_count> values = {no_value, no_value, no_value, no_value,
                                               no_value, no_value, no_value, no_value};

    double& operator[](Column column) { return values[static_cast<std::size_t>(column)]; }
    double operator[](Column column) const { return values[static_cast<std::size_t>(column)]; }
    bool empty() const;  // no value at all: a logger would not send it
};

// What a CSV file's columns are. Threads: a value, share freely.
struct CsvLayout {
    bool with_section = false;
    std::vector<Column> columns{};
};

std::string csv_header(const CsvLayout& layout);  // with its line end
void append_csv(std::string& out, const Row& row, const CsvLayout& layout);

// One JSON object and a line end; what has no value is not named.
void append_ndjson(std::string& out, const Row& row);

}  // namespace slipledger::plantsim
