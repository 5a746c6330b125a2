#include <fmt/format.h>

#include <algorithm>
#include <cstdio>
#include <stdexcept>

#include "tools/plantsim/delivery.hpp"
#include "tools/plantsim/files.hpp"
#include "tools/plantsim/load.hpp"
#include "tools/plantsim/options.hpp"
#include "tools/plantsim/veneer_mill.hpp"

namespace slipledger::plantsim {
namespace {

constexpr int fine = 0;
constexpr int not_all_taken = 1;
constexpr int wrong_use = 2;
constexpr int could_not = 3;

int tell(std::size_t rows, const Answered& answered) {
    fmt::print(stderr, "{} rows by TCP: {} stored, {} repeated, {} refused, {} reconnects\n", rows, answered.stored,
               answered.repeated, answered.refused, answered.reconnects);
    for (const std::string& fault : answered.faults) fmt::print(stderr, "  {}\n", fault);
    return answered.refused == 0 ? fine : not_all_taken;
}

int run_load(const Options& options) {
    const bool live = options.live_pumps > 0;
    const LoadPlan plan(live ? options.live_pumps : options.pumps_count, options.seed);
    if (!options.plant_out.empty()) {
        const auto folder = std::filesystem::absolute(options.plant_out).parent_path();
        plan.write_plant(options.plant_out, options.plant_listen, folder);
    }
    if (options.rows > 0) {
        const auto from = parse_time(options.from.empty() ? "2025-01-01" : options.from);
        if (!from || options.csv.empty()) throw std::invalid_argument("--rows wants --csv, and --from a time");
        write_load_csv(plan, *from, options.rows, options.csv);
    }
    if (!live || options.tcp.empty()) return fine;
    const LiveLoad load = run_live_load(plan, address_of(options.tcp), options.connections, options.seconds);
    fmt::print(stderr, "at most {} lines unanswered on one connection\n", load.worst_owed);
    return tell(load.rows, load.answered);
}

Delivery delivery_of(const Options& options, const PlantDrawing& plant, const std::vector<std::size_t>& pumps) {
    Delivery delivery{.patience = {.window = options.window},
                      .drop_folder = options.drop,
                      .drop_days = options.drop_days,
                      .speedup = speedup_of(options.speedup)};
    if (!options.tcp.empty()) delivery.tcp = address_of(options.tcp);
    if (delivery.tcp && !options.drop.empty() && options.tcp_pumps.empty())
        throw std::invalid_argument("--tcp and --drop together want --tcp-pumps, else which pump goes where?");
    const auto named = options.tcp_pumps.empty() ? std::vector<std::size_t>{} : pumps_of(options.tcp_pumps, plant);
    for (const std::size_t pump : pumps) {
        const bool by_tcp = delivery.tcp && (named.empty() || std::ranges::find(named, pump) != named.end());
        if (by_tcp) delivery.tcp_pumps.push_back(pump);
        if (!by_tcp && !options.drop.empty()) delivery.drop_pumps.push_back(pump);
    }
    return delivery;
}

int run_mill(const Options& options) {
    PlantDrawing drawing = veneer_mill();
    const Span span = span_of(options, drawing);
    const std::vector<std::size_t> pumps = pumps_of(options.pumps, drawing);
    const Delivery delivery = delivery_of(options, drawing, pumps);
    const Mill mill(std::move(drawing), options.seed);
    if (!options.truth.empty()) write_truth(mill, pumps, span, options.truth);
    if (!options.csv.empty()) fmt::print(stderr, "{} rows written\n", write_csv(mill, pumps, span, options.csv));

    const Delivered delivered = deliver(mill, span, delivery);
    if (!delivery.drop_pumps.empty()) fmt::print(stderr, "{} rows by drop files\n", delivered.drop_rows);
    const int status = delivery.tcp_pumps.empty() ? fine : tell(delivered.tcp_rows, delivered.answered);
    for (const std::string& failure : delivered.failures) fmt::print(stderr, "plantsim: {}\n", failure);
    return delivered.failures.empty() ? status : could_not;
}

int run(int argc, char** argv) {
    const Options options = parse_options(argc, argv);
    const bool load = options.rows > 0 || options.live_pumps > 0 || !options.plant_out.empty();
    const bool nothing = options.csv.empty() && options.truth.empty() && options.drop.empty() && options.tcp.empty();
    if (!load && nothing) throw std::invalid_argument("nowhere to write: give --csv, --truth, --drop or --tcp");
    return load ? run_load(options) : run_mill(options);
}

}  // namespace
}  // namespace slipledger::plantsim

int main(int argc, char** argv) try {
    return slipledger::plantsim::run(argc, argv);
} catch (const slipledger::plantsim::EndNow& end) {
    return end.status;
} catch (const std::invalid_argument& e) {
    fmt::print(stderr, "plantsim: {}\n", e.what());
    return slipledger::plantsim::wrong_use;
} catch (const std::exception& e) {
    fmt::print(stderr, "plantsim: {}\n", e.what());
    return slipledger::plantsim::could_not;
}
