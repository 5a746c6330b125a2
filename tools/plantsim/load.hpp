// Many like pumps for measuring how much the daemon carries: simpler than the mill (one tank, one kind of pump), quick
// to make, yet with regimes, days and a few pumps that wear, so that the judging side has its usual work.
#pragma once

#include <cstdint>
#include <filesystem>
#include <string>
#include <vector>

#include "tools/plantsim/chance.hpp"
#include "tools/plantsim/drawing.hpp"
#include "tools/plantsim/row.hpp"
#include "tools/plantsim/tcp_logger.hpp"

namespace slipledger::plantsim {

// Threads: immutable once made, share freely.
class LoadPlan {
public:
    LoadPlan(std::size_t pumps, std::uint64_t seed);

    std::size_t pumps() const { return names_.size(); }
    Row row(std::size_t pump, Millis time) const;  // its name is a view into this plan

    // A plant file for these pumps: a TCP feed with replies at `listen` and a drop folder, ledger and alert log beside
    // each other in `folder`. Throws std::runtime_error where it cannot be written.
    void write_plant(const std::filesystem::path& file, const std::string& listen,
                     const std::filesystem::path& folder) const;

private:
    double drain_lpm(std::size_t pump, double pressure_bar, double temperature_c, double speed_rpm, Millis time) const;

    std::vector<std::string> names_;
    std::vector<double> sizes_;  // of a pump's gaps against the drawing's
    std::vector<Gap> gaps_;
    Oil oil_;
    Chance production_;
    Chance noise_;
};

// `rows` lines of CSV, one row a pump and minute, interleaved by time from `from` on.
void write_load_csv(const LoadPlan& plan, Millis from, std::size_t rows, const std::filesystem::path& file);

// One row a pump and second, stamped with the wall clock, spread evenly over each second and over `connections`
// connections, for `seconds`. Returns what the daemon answered; `worst_owed` is the most lines ever unanswered on one
// connection.
struct LiveLoad {
    Answered answered{};
    std::size_t rows = 0;
    std::size_t worst_owed = 0;
};

LiveLoad run_live_load(const LoadPlan& plan, const Address& address, std::size_t connections, int seconds);

}  // namespace slipledger::plantsim
