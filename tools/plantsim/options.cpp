#include "tools/plantsim/options.hpp"

#include <fmt/format.h>
#include <fmt/ranges.h>

#include <CLI/CLI.hpp>
#include <algorithm>
#include <cmath>
#include <stdexcept>

namespace slipledger::plantsim {
namespace {

constexpr int wrong_use = 2;

void add_mill_options(CLI::App& app, Options& options) {
    app.add_option("--seed", options.seed, "same seed, same bytes")->capture_default_str();
    app.add_option("--from", options.from, "first moment, RFC 3339 or a date (UTC); default: the year's begin");
    app.add_option("--days", options.days, "how many days; default: to the year's end")->check(CLI::PositiveNumber);
    app.add_option("--interval", options.interval_s, "seconds between rows")
        ->capture_default_str()
        ->check(CLI::Range(0.1, 86400.0));
    app.add_option("--pumps", options.pumps, "ids, separated by commas; default: all")->delimiter(',');
    app.add_option("--csv", options.csv, "write all rows to this CSV file");
    app.add_option("--truth", options.truth, "write the true leakage ratio by day to this CSV file");
    app.add_option("--drop", options.drop, "write drop files into this folder")->check(CLI::ExistingDirectory);
    app.add_option("--drop-days", options.drop_days, "days in one drop file")
        ->capture_default_str()
        ->check(CLI::PositiveNumber);
    app.add_option("--tcp", options.tcp, "HOST:PORT of a feed that takes NDJSON and replies");
    app.add_option("--tcp-pumps", options.tcp_pumps, "with --drop: the pumps that go by TCP, the others are dropped")
        ->delimiter(',');
    app.add_option("--window", options.window, "most lines on a connection not yet answered for")
        ->capture_default_str()
        ->check(CLI::PositiveNumber);
    app.add_option("--speedup", options.speedup, "times the wall clock, or max")->capture_default_str();
}

void add_load_options(CLI::App& app, Options& options) {
    constexpr const char* group = "Measuring load";
    app.add_option("--rows", options.rows, "write so many rows of like pumps, one a minute each, to --csv")
        ->group(group);
    app.add_option("--pumps-count", options.pumps_count, "with --rows or --plant-out: how many pumps")
        ->capture_default_str()
        ->check(CLI::Range(1, 9999))
        ->group(group);
    app.add_option("--plant-out", options.plant_out, "write the plant file of the like pumps")->group(group);
    app.add_option("--plant-listen", options.plant_listen, "address of the feed in that plant file")
        ->capture_default_str()
        ->group(group);
    app.add_option("--live-pumps", options.live_pumps, "send a row a second of so many like pumps to --tcp")
        ->check(CLI::Range(1, 9999))
        ->group(group);
    app.add_option("--seconds", options.seconds, "with --live-pumps: for how long")
        ->capture_default_str()
        ->check(CLI::PositiveNumber)
        ->group(group);
    app.add_option("--connections", options.connections, "with --live-pumps: over so many connections")
        ->capture_default_str()
        ->check(CLI::Range(1, 9999))
        ->group(group);
}

}  // namespace

Options parse_options(int argc, char** argv) {
    CLI::App app{"plantsim: a year of an invented veneer mill's pumps, as their loggers would have written it"};
    app.name("plantsim");
    Options options;
    add_mill_options(app, options);
    add_load_options(app, options);
    try {
        app.parse(argc, argv);
    } catch (const CLI::ParseError& e) {
        throw EndNow{app.exit(e) == 0 ? 0 : wrong_use};
    }
    return options;
}

Address address_of(const std::string& host_and_port) {
    const auto colon = host_and_port.rfind(':');
    if (colon == std::string::npos || colon == 0 || colon + 1 == host_and_port.size())
        throw std::invalid_argument(fmt::format("\"{}\" is not HOST:PORT, e.g. 127.0.0.1:7310", host_and_port));
    return {.host = host_and_port.substr(0, colon), .port = host_and_port.substr(colon + 1)};
}

std::optional<double> speedup_of(const std::string& text) {
    if (text == "max") return std::nullopt;
    char* end = nullptr;
    const double times = std::strtod(text.c_str(), &end);
    if (end == text.c_str() || *end != '\0' || !(times > 0.0))
        throw std::invalid_argument(fmt::format("--speedup \"{}\" is neither a positive number nor max", text));
    return times;
}

Span span_of(const Options& options, const PlantDrawing& plant) {
    Span span{.from = plant.year_begins,
              .to = plant.year_ends,
              .interval = static_cast<Millis>(std::llround(options.interval_s * static_cast<double>(second_ms)))};
    if (!options.from.empty()) {
        const auto from = parse_time(options.from);
        if (!from) throw std::invalid_argument(fmt::format("--from \"{}\" is no time, e.g. 2025-06-01", options.from));
        span.from = *from;
    }
    if (options.days) span.to = span.from + std::llround(*options.days * static_cast<double>(day_ms));
    if (span.from < plant.year_begins || span.to > plant.year_ends)
        throw std::invalid_argument(
            fmt::format("the mill's year lasts from {} to {}", rfc3339(plant.year_begins), rfc3339(plant.year_ends)));
    return span;
}

std::vector<std::size_t> pumps_of(const std::vector<std::string>& names, const PlantDrawing& plant) {
    std::vector<std::size_t> chosen;
    std::vector<std::string> known;
    for (const PumpDrawing& pump : plant.pumps) known.push_back(pump.id);
    if (names.empty())
        for (std::size_t p = 0; p < known.size(); ++p) chosen.push_back(p);
    for (const std::string& name : names) {
        const auto found = std::ranges::find(known, name);
        if (found == known.end())
            throw std::invalid_argument(fmt::format("no pump \"{}\"; there are {}", name, fmt::join(known, ", ")));
        chosen.push_back(static_cast<std::size_t>(found - known.begin()));
    }
    return chosen;
}

}  // namespace slipledger::plantsim
