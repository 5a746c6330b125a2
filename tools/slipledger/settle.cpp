// `slipledger settle PLACE`: says which feed to believe where two told different values.
#include <fmt/format.h>

#include <nlohmann/json.hpp>

#include "analytics/quantity.hpp"
#include "config/nearest.hpp"
#include "tools/slipledger/act.hpp"
#include "tools/slipledger/given_time.hpp"

namespace slipledger::command {

namespace {

// Threads: one.
struct Options : ActOptions {
    std::string to;
    std::string quantity;
    std::string believe;
};

// A feed that has left the plant file has still told what it told, so the ledger is asked.
void require_feed(const config::Plant& plant, const std::string& feed) {
    const ledger::Directory directory = ledger::Reader(plant.store.path).directory();
    if (directory.feeds.contains(feed)) return;
    std::vector<std::string_view> known;
    for (const auto& [name, id] : directory.feeds) known.push_back(name);
    const auto nearest = config::nearest_name(feed, known);
    throw WrongUse(fmt::format("no feed \"{}\" has ever told anything{}", report::printable(feed),
                               nearest.empty() ? std::string() : fmt::format("; did you mean \"{}\"?", nearest)));
}

int settle(const Shared& shared, const Options& options) {
    const config::Plant plant = shared.plant();
    nlohmann::ordered_json body{{"believe", options.believe}};
    ledger::Event event = place_event_of(options, plant, "settled", body);
    const analytics::Instant to = given_time(options.to, plant);
    if (to < event.at) throw WrongUse("--to lies before --from");
    if (!options.quantity.empty() && !analytics::quantity_named(options.quantity))
        throw WrongUse(
            fmt::format("--quantity \"{}\" is not known; e.g. outlet_pressure", report::printable(options.quantity)));
    require_feed(plant, options.believe);
    body["to_ms"] = to.time_since_epoch().count();
    if (!options.quantity.empty()) body["quantity"] = options.quantity;
    if (!options.note.empty()) body["note"] = report::printable(options.note);
    event.body = body.dump();
    return keep(shared, plant, event,
                fmt::format("settled: of {} feed {} is believed in that span where values differ", options.place,
                            options.believe));
}

}  // namespace

void add_settle(CLI::App& app, Shared& shared) {
    const auto options = std::make_shared<Options>();
    CLI::App* command = add_command(app, shared, "settle", "say which feed to believe where values are disputed", true,
                                    [&shared, options] { return settle(shared, *options); });
    add_place_options(command, *options);
    command->add_option("--from", options->at, "first instant of the span")->required()->type_name("TIME");
    command->add_option("--to", options->to, "last instant of it; may be the same")->required()->type_name("TIME");
    command->add_option("--quantity", options->quantity, "values of this quantity alone")->type_name("NAME");
    command->add_option("--believe", options->believe, "feed whose values hold")->required()->type_name("FEED");
    command->add_option("--by", options->by, "who says so")->required()->type_name("NAME");
    add_note_option(command, *options);
}

}  // namespace slipledger::command
