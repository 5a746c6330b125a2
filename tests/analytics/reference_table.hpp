// Reads the tables of tests/reference: a header line, then rows of numbers.
#pragma once

#include <cstdlib>
#include <fstream>
#include <sstream>
#include <stdexcept>
#include <string>
#include <vector>

namespace slipledger::analytics::testing {

inline std::vector<std::vector<double>> reference_table(const std::string& name) {
    std::ifstream file(std::string(SLIPLEDGER_SOURCE_DIR) + "/tests/reference/" + name);
    if (!file) throw std::runtime_error("no tests/reference/" + name);
    std::vector<std::vector<double>> rows;
    std::string line;
    std::getline(file, line);
    while (std::getline(file, line)) {
        std::vector<double>& row = rows.emplace_back();
        std::istringstream cells(line);
        for (std::string cell; std::getline(cells, cell, ',');) row.push_back(std::strtod(cell.c_str(), nullptr));
    }
    return rows;
}

}  // namespace slipledger::analytics::testing
