// What every subcommand shares: the plant file, the way to say no, and how one is added. A new subcommand is one file
// with an `add_...` function and one row in main.cpp.
#pragma once

#include <CLI/CLI.hpp>
#include <functional>
#include <memory>
#include <stdexcept>
#include <string>

#include "config/plant.hpp"
#include "daemon/ledger/reader.hpp"
#include "daemon/report/paragraph.hpp"

namespace slipledger::command {

// What a subcommand ends with.
enum Exit : int { fine = 0, answer_is_no = 1, wrong_use = 2, could_not = 3 };

// The command line makes no sense (an unknown pump, say). Ends with 2.
class WrongUse : public std::runtime_error {
public:
    using std::runtime_error::runtime_error;
};

// Options of all subcommands, and what the chosen one does. Threads: one.
struct Shared {
    std::string plant_file = "/etc/slipledger/plant.json";
    bool json = false;
    std::function<int()> chosen;

    // The plant file, read and checked; its faults go to standard error and end the command (std::runtime_error).
    config::Plant plant() const;
    report::Paper paper() const;
};

// A subcommand with `--plant` (and `--json` where `prints_json`) whose work is `run`.
CLI::App* add_command(CLI::App& app, Shared& shared, const std::string& name, const std::string& what, bool prints_json,
                      std::function<int()> run);

// The pump of that id. WrongUse, with the nearest known id, where there is none.
const config::Pump& pump_named(const config::Plant& plant, const std::string& id);

// "1 pump", "2 pumps".
std::string counted(std::size_t count, std::string_view what);

// The section of that id; with none given the pump's only one, else WrongUse.
const config::Section& section_named(const config::Pump& pump, const std::string& id);

void add_fleet(CLI::App& app, Shared& shared);
void add_health(CLI::App& app, Shared& shared);
void add_explain(CLI::App& app, Shared& shared);
void add_history(CLI::App& app, Shared& shared);
void add_alerts(CLI::App& app, Shared& shared);
void add_lives(CLI::App& app, Shared& shared);
void add_acknowledge(CLI::App& app, Shared& shared);
void add_replaced(CLI::App& app, Shared& shared);
void add_oil_changed(CLI::App& app, Shared& shared);
void add_oil_sample(CLI::App& app, Shared& shared);
void add_compensator_set(CLI::App& app, Shared& shared);
void add_instrument_changed(CLI::App& app, Shared& shared);
void add_reference_test(CLI::App& app, Shared& shared);
void add_settle(CLI::App& app, Shared& shared);
void add_note(CLI::App& app, Shared& shared);
void add_load(CLI::App& app, Shared& shared);
void add_export(CLI::App& app, Shared& shared);
void add_status(CLI::App& app, Shared& shared);
void add_backup(CLI::App& app, Shared& shared);
void add_check_plant(CLI::App& app, Shared& shared);

}  // namespace slipledger::command
