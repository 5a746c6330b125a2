// `slipledger explain PUMP`: the working behind a verdict, from raw reading to level, to be checked with a pocket
// calculator.
#include <fmt/format.h>

#include <nlohmann/json.hpp>

#include "daemon/report/render_working.hpp"
#include "daemon/watch/working_query.hpp"
#include "tools/slipledger/command.hpp"
#include "tools/slipledger/given_time.hpp"

namespace slipledger::command {

namespace {

// Threads: one.
struct Options {
    std::string pump;
    std::string section;
    std::string at;
    std::string basis;
    bool points = false;
};

watch::WorkingQuestion question_of(const Options& options, const config::Plant& plant) {
    watch::WorkingQuestion question;
    if (!options.at.empty()) question.at = given_time(options.at, plant);
    if (!options.basis.empty())
        question.basis = options.basis == name_of(analytics::Basis::delivery) ? analytics::Basis::delivery
                                                                              : analytics::Basis::case_drain;
    return question;
}

int run(const Shared& shared, const Options& options) {
    const config::Plant plant = shared.plant();
    const config::Pump& pump = pump_named(plant, options.pump);
    const config::Section& section = section_named(pump, options.section);
    const watch::WorkingQuestion question = question_of(options, plant);
    const ledger::Reader reader(plant.store.path);
    const report::WorkingFacts facts = watch::query_working(reader, plant, pump, section, question);
    const report::Working working = report::working_of(facts);
    if (shared.json)
        fmt::print("{}\n", report::to_json(working).dump(2));
    else
        fmt::print("{}", report::working_text(working, plant, options.points));
    return facts.record || !question.at ? fine : answer_is_no;
}

}  // namespace

void add_explain(CLI::App& app, Shared& shared) {
    const auto options = std::make_shared<Options>();
    CLI::App* command = add_command(app, shared, "explain", "the working behind a verdict, from raw reading to level",
                                    true, [&shared, options] { return run(shared, *options); });
    command->add_option("pump", options->pump, "id of the pump")->required()->type_name("PUMP");
    command->add_option("--section", options->section, "which section, of a pump with several")->type_name("ID");
    command->add_option("--at", options->at, "an instant of the summary to explain; default: the last judged one")
        ->type_name("TIME");
    command->add_option("--basis", options->basis, "where both are fitted; default: the one that speaks")
        ->check(CLI::IsMember({"case-drain", "delivery"}));
    command->add_flag("--points", options->points, "list every operating point of the summary");
}

}  // namespace slipledger::command
