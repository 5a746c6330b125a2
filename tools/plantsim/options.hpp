// The command line of plantsim.
#pragma once

#include <filesystem>
#include <optional>
#include <string>
#include <vector>

#include "tools/plantsim/span.hpp"
#include "tools/plantsim/tcp_logger.hpp"

namespace slipledger::plantsim {

// Threads: a value, share freely.
struct Options {
    std::uint64_t seed = 1;
    std::string from{};  // empty: where the mill's year begins; for --rows, 1 January 2025
    std::optional<double> days{};
    double interval_s = 600.0;
    std::vector<std::string> pumps{};  // empty: all
    std::filesystem::path csv{};
    std::filesystem::path truth{};
    std::filesystem::path drop{};
    int drop_days = 7;
    std::string tcp{};
    std::vector<std::string> tcp_pumps{};
    std::size_t window = 4000;
    std::string speedup = "max";

    std::size_t rows = 0;  // 0: the mill, not the load measurement
    std::size_t pumps_count = 50;
    std::filesystem::path plant_out{};
    std::string plant_listen = "127.0.0.1:7310";
    std::size_t live_pumps = 0;
    int seconds = 60;
    std::size_t connections = 1;
};

// Threads: a value; thrown to main() alone.
struct EndNow {
    int status;
};

// Wrong use and --help are answered here; EndNow carries the exit status.
Options parse_options(int argc, char** argv);

// These throw std::invalid_argument with a sentence for the user.
Address address_of(const std::string& host_and_port);
std::optional<double> speedup_of(const std::string& text);
Span span_of(const Options& options, const PlantDrawing& plant);
std::vector<std::size_t> pumps_of(const std::vector<std::string>& names, const PlantDrawing& plant);

}  // namespace slipledger::plantsim
