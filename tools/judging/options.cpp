#include "tools/judging/options.hpp"

#include <fmt/format.h>
#include <fmt/ranges.h>

#include <CLI/CLI.hpp>

#include "tools/judging/floors.hpp"

namespace slipledger::judging {
namespace {

constexpr int fine = 0;
constexpr int wrong_use = 2;
constexpr std::size_t pumps_of_a_fleet = 20;

struct Written {
    bool all = false;
    bool short_one = false;
    std::vector<std::string> fleets{};
    std::optional<std::uint64_t> seed{};
    std::optional<std::size_t> pumps{};
    std::string laws = "tests";
    std::string spoil{};
};

std::string spoils() {
    std::string text;
    for (const SpoilFacts& facts : spoil_table) text += fmt::format("\n    {}: {}", facts.name, facts.what);
    return text;
}

Fleet fleet_of(const std::string& name) {
    if (const auto fleet = fleet_named(name)) return *fleet;
    throw CLI::ValidationError("--fleet",
                               fmt::format("no fleet \"{}\"; one of {}", name, fmt::join(fleet_names, ", ")));
}

std::filesystem::path temporary_folder() {
    const std::filesystem::path in_memory = "/dev/shm";
    return std::filesystem::is_directory(in_memory) ? in_memory : std::filesystem::temp_directory_path();
}

BenchOrder order_of(const Written& written) {
    if (!written.all && !written.short_one && written.fleets.empty())
        throw CLI::RequiredError("--all, --short or --fleet NAME");
    BenchOrder order = written.short_one ? short_order() : full_order();
    if (!written.fleets.empty()) {
        order.fleets.clear();
        for (const std::string& name : written.fleets)
            order.fleets.push_back({fleet_of(name), written.pumps.value_or(pumps_of_a_fleet)});
    } else if (written.pumps) {
        for (FleetOrder& fleet : order.fleets) fleet.pumps = *written.pumps;
    }
    if (written.seed) order.telling.seed = *written.seed;
    order.telling.laws = written.laws == "tuning" ? Laws::tuning : Laws::tests;
    if (!written.spoil.empty()) {
        const auto spoil = spoil_named(written.spoil);
        if (!spoil) throw CLI::ValidationError("--spoil", fmt::format("nothing called \"{}\"", written.spoil));
        order.spoil = *spoil;
    }
    return order;
}

}  // namespace

Options parse_options(int argc, char** argv) {
    CLI::App app{"Judges the judging: simulated fleets of which the truth is known go through the real pipeline.",
                 "judge"};
    Written written;
    Options options;
    int jobs = 2;
    app.add_flag("--all", written.all, "every fleet, hundreds of pump-years");
    app.add_flag("--short", written.short_one, "a small run that must not fall through the floors; ends 1 if it does");
    app.add_option("--fleet", written.fleets, fmt::format("only this one: {}", fmt::join(fleet_names, ", ")));
    app.add_option("--pumps", written.pumps, "pumps of each fleet");
    app.add_option("--seed", written.seed, "another one tells other stories");
    app.add_option("--laws", written.laws, "how pumps wear: those of the tests, or others for tuning")
        ->check(CLI::IsMember({"tests", "tuning"}));
    app.add_option("--spoil", written.spoil, "spoil what the pipeline is given:" + spoils());
    app.add_option("--jobs", jobs, "at a time")->check(CLI::Range(1, 64));
    app.add_flag("--json", options.json, "one JSON value instead of the table");
    app.add_option("--details", options.details, "write a row for each section here, as CSV");
    app.add_option("--number", options.number, "of one --fleet: this story alone, day by day, as CSV");
    app.add_flag("--plant-file", options.show_plant_file, "with --number: the plant file of that story instead");
    try {
        app.parse(argc, argv);
        options.order = order_of(written);
        if (options.number && written.fleets.size() != 1) throw CLI::RequiredError("--number wants one --fleet");
    } catch (const CLI::ParseError& e) {
        throw EndNow{app.exit(e) == 0 ? fine : wrong_use};
    }
    options.order.jobs = jobs;
    options.order.folder = temporary_folder();
    options.holds_floors = written.short_one && written.fleets.empty() && !written.pumps;
    return options;
}

}  // namespace slipledger::judging
