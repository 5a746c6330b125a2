// The service. One run of the plant file at a time: SIGHUP ends a run in good order and begins the next with what was
// read anew.
#include <fmt/format.h>
#include <spdlog/sinks/stdout_sinks.h>
#include <spdlog/spdlog.h>

#include <CLI/CLI.hpp>
#include <boost/asio/io_context.hpp>
#include <exception>
#include <memory>
#include <string>
#include <utility>

#include "config/plant_reader.hpp"
#include "daemon/clock.hpp"
#include "daemon/http/server.hpp"
#include "daemon/intake/command_socket.hpp"
#include "daemon/intake/intake.hpp"
#include "daemon/ledger/open_ledger.hpp"
#include "daemon/ledger/reader.hpp"
#include "daemon/ledger/writer.hpp"
#include "daemon/notify/notify.hpp"
#include "daemon/signals.hpp"
#include "daemon/silence_round.hpp"
#include "daemon/status.hpp"
#include "daemon/timed_ledger.hpp"
#include "daemon/watch/analyst.hpp"
#include "daemon/watch/plant_changes.hpp"

namespace {

using namespace slipledger;
using SharedPlant = std::shared_ptr<const config::Plant>;

constexpr std::chrono::milliseconds judged_wait{250};

// Null where the file has faults, which are then in the log.
SharedPlant read_plant(const std::string& path) {
    config::PlantReading reading = config::read_plant_file(path);
    for (const config::Fault& fault : reading.faults) spdlog::error("{}: {}", path, config::format_fault(fault));
    return reading ? std::make_shared<const config::Plant>(std::move(*reading.plant)) : nullptr;
}

intake::FindReceipt receipts_of(std::string ledger_path) {
    return [path = std::move(ledger_path)](std::string_view sha256) { return ledger::Reader(path).receipt(sha256); };
}

// Serves until a signal says otherwise. Returns the plant file to go on with, or null.
SharedPlant serve(const SharedPlant& plant, const std::string& plant_file) {
    const std::string& ledger_path = plant->store.path;
    const SystemClock clock;
    CommitTimes commits;
    ledger::Writer writer(std::make_unique<TimedLedger>(ledger::open_ledger(*plant), commits), plant->store.commit_interval);
    watch::store_plant_changes(*plant, writer, clock);
    watch::Analyst analyst(*plant, writer, ledger_path);

    boost::asio::io_context network;
    notify::Notify notify(network.get_executor(), *plant, writer, ledger_path, clock);
    intake::Intake intake(network, plant->feeds, plant->pumps, writer, clock, receipts_of(ledger_path));
    http::HttpServer http(network, plant);
    const intake::CommandWorld world{plant->feeds, plant->pumps, plant->time_zone, writer, clock, receipts_of(ledger_path),
                                     [&] { return status_json(intake.status(), commits.longest(), ledger_path, http.port()); },
                                     [&] { return analyst.wait_until_judged(judged_wait); }};
    intake::CommandSocket commands(network, intake::command_socket_path(ledger_path), world);
    SilenceRound silence(network, *plant, intake, writer, clock);

    SharedPlant next;
    SignalActions actions;
    actions.stop = [&] {
        spdlog::info("stopping: what has arrived is stored and answered first");
        intake.stop(plant->stop_grace);
        commands.stop();
        http.stop();
        silence.stop();
        notify.stop();
    };
    actions.reload = [&] {
        next = read_plant(plant_file);
        if (!next) spdlog::error("{} has faults: going on with what was read before", plant_file);
        return next != nullptr;
    };
    actions.reopen_logs = [&] { notify.reopen_log(); };
    Signals signals(network, actions);

    intake.start();
    commands.start();
    for (const auto& [feed, port] : intake.ports()) spdlog::info("feed {} listens on port {}", feed, port);
    if (http.port() != 0) spdlog::info("pages on port {}", http.port());
    spdlog::info("ready: {} pumps, ledger {}", plant->pumps.size(), ledger_path);
    network.run();
    return next;
}

// A plant file without faults may still name what cannot be had: a port in use, a folder that cannot be made. At start that
// is the end; after a SIGHUP the daemon comes up again with what it had.
void serve_in_turn(SharedPlant plant, const std::string& plant_file) {
    SharedPlant served;
    while (plant) try {
            SharedPlant next = serve(plant, plant_file);
            served = std::exchange(plant, std::move(next));
        } catch (const std::exception& e) {
            if (!served) throw;
            spdlog::error("{} cannot be served: {}; going on with what was read before", plant_file, e.what());
            plant = std::exchange(served, nullptr);
        }
}

int run(int argc, char** argv) {
    CLI::App app{
        "The Slipledger service: takes readings, judges pumps, tells whom it may concern.\n"
        "Decision support, not a safety function."};
    app.name("slipledgerd");
    std::string plant_file = "/etc/slipledger/plant.json";
    app.add_option("--plant", plant_file, "plant file")->envname("SLIPLEDGER_PLANT")->type_name("FILE")->capture_default_str();
    try {
        app.parse(argc, argv);
    } catch (const CLI::ParseError& e) {
        return app.exit(e) == 0 ? 0 : 2;
    }
    spdlog::set_default_logger(spdlog::stderr_logger_mt("slipledgerd"));
    const SharedPlant plant = read_plant(plant_file);
    if (!plant) return 3;
    serve_in_turn(plant, plant_file);
    return 0;
}

}  // namespace

int main(int argc, char** argv) try {
    return run(argc, argv);
} catch (const std::exception& e) {
    fmt::print(stderr, "slipledgerd: {}\n", e.what());
    return 3;
}
