// The command line of the bench.
#pragma once

#include <filesystem>
#include <string>
#include <vector>

#include "tools/judging/bench.hpp"

namespace slipledger::judging {

// Threads: a value, share freely.
struct Options {
    BenchOrder order{};
    bool holds_floors = false;  // the short judge
    bool json = false;
    std::filesystem::path details{};
    std::optional<std::size_t> number{};  // of one story, to be traced
    bool show_plant_file = false;
};

// Threads: a value; thrown to main() alone.
struct EndNow {
    int status;
};

// Wrong use and --help are answered here; EndNow carries the exit status.
Options parse_options(int argc, char** argv);

}  // namespace slipledger::judging
