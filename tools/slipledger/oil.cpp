// Subcommands about the oil: `oil-changed`, `oil-sample`. Both hold for every pump of the reservoir.
#include <fmt/format.h>

#include <nlohmann/json.hpp>
#include <optional>

#include "analytics/fluid.hpp"
#include "config/nearest.hpp"
#include "tools/slipledger/act.hpp"

namespace slipledger::command {

namespace {

// Threads: one.
struct Options : ActOptions {
    std::string fluid;
    std::optional<double> grade;
    std::optional<double> index;
    std::optional<double> viscosity_40_cst;
    std::optional<double> viscosity_100_cst;
    std::optional<double> water_ppm;
    std::string particles;
};

const config::Fluid& fluid_named(const config::Plant& plant, const std::string& name) {
    if (const auto found = plant.fluids.find(name); found != plant.fluids.end()) return found->second;
    std::vector<std::string_view> known;
    for (const auto& [other, fluid] : plant.fluids) known.push_back(other);
    const auto nearest = config::nearest_name(name, known);
    throw WrongUse(fmt::format(
        "no fluid \"{}\", built in or in the plant file's \"fluids\"{}", report::printable(name),
        nearest.empty() ? "; or give --grade and --index" : fmt::format("; did you mean \"{}\"?", nearest)));
}

// What the label says; the rest as it was.
config::Fluid fluid_by_label(const Options& options, config::Fluid fluid) {
    const double index = options.index.value_or(100.0);
    if (!analytics::Fluid::from_grade(*options.grade, index))
        throw WrongUse(
            fmt::format("--grade {:g} with --index {:g} is no oil; wanted an ISO 3448 grade (15, 22, 32, 46, 68, "
                        "100 ...) and an index of 0 to 400",
                        *options.grade, index));
    fluid.name = fmt::format("VG {:g}, VI {:g}", *options.grade, index);
    fluid.iso_vg = *options.grade;
    fluid.viscosity_index = index;
    fluid.points.clear();
    return fluid;
}

std::optional<config::Fluid> new_fluid(const Options& options, const config::Plant& plant, const OilPlace& place) {
    if (!options.fluid.empty() && options.grade)
        throw WrongUse("--fluid and --grade say the same thing; give one of them");
    if (options.index && !options.grade) throw WrongUse("--index wants the --grade it belongs to");
    if (options.grade) return fluid_by_label(options, place.fluid());
    return options.fluid.empty() ? std::nullopt : std::optional(fluid_named(plant, options.fluid));
}

nlohmann::ordered_json body_for(const Options& options, const OilPlace& place) {
    nlohmann::ordered_json body = nlohmann::ordered_json::object();
    if (place.reservoir != nullptr) body["reservoir"] = place.reservoir->id;
    if (!options.note.empty()) body["note"] = report::printable(options.note);
    return body;
}

int oil_changed(const Shared& shared, const Options& options) {
    const config::Plant plant = shared.plant();
    const OilPlace place = oil_place(options, plant);
    const auto fluid = new_fluid(options, plant, place);
    ledger::Event event = oil_event_of(options, plant, place, "oil-changed");
    nlohmann::ordered_json body = body_for(options, place);
    if (fluid) body["fluid"] = nlohmann::ordered_json::parse(config::fluid_facts(*fluid));
    event.body = body.dump();
    const std::string what = fluid ? fluid->name : "the same oil again";
    return keep(
        shared, plant, event,
        fmt::format("oil changed: {} in {}; leakage is judged by its viscosity from then on", what, place.name()));
}

void require_a_figure(const Options& options) {
    if (!options.viscosity_40_cst && !options.water_ppm && options.particles.empty() && options.note.empty())
        throw WrongUse(
            "nothing was measured; give --viscosity-40 and --viscosity-100, --water, --particles or a --note");
    if (options.viscosity_100_cst && !options.viscosity_40_cst)
        throw WrongUse("--viscosity-100 wants --viscosity-40 beside it");
    if (options.water_ppm) require_between("--water", *options.water_ppm, 0.0, 1e6, "ppm");
    if (!options.viscosity_40_cst) return;
    require_between("--viscosity-40", *options.viscosity_40_cst, 2.5, 3200.0, "mm2/s");
    const double at_40 = *options.viscosity_40_cst;
    if (options.viscosity_100_cst && !analytics::Fluid::from_points({40.0, at_40}, {100.0, *options.viscosity_100_cst}))
        throw WrongUse(fmt::format("--viscosity-100 has to be 2 mm2/s or more and below --viscosity-40 {:g}, not {:g}",
                                   at_40, *options.viscosity_100_cst));
}

int oil_sample(const Shared& shared, const Options& options) {
    const config::Plant plant = shared.plant();
    const OilPlace place = oil_place(options, plant);
    require_a_figure(options);
    ledger::Event event = oil_event_of(options, plant, place, "oil-sample");
    nlohmann::ordered_json body = body_for(options, place);
    if (options.viscosity_40_cst) body["viscosity_40_cst"] = *options.viscosity_40_cst;
    if (options.viscosity_100_cst) body["viscosity_100_cst"] = *options.viscosity_100_cst;
    if (options.water_ppm) body["water_ppm"] = *options.water_ppm;
    if (!options.particles.empty()) body["particles"] = told("--particles", options.particles);
    event.body = body.dump();
    return keep(shared, plant, event,
                fmt::format("oil sample kept: {}{}", place.name(),
                            options.viscosity_40_cst ? "; its viscosity holds from then on" : ""));
}

}  // namespace

void add_oil_changed(CLI::App& app, Shared& shared) {
    const auto options = std::make_shared<Options>();
    CLI::App* command = add_command(app, shared, "oil-changed", "another oil was filled in, or the same again", true,
                                    [&shared, options] { return oil_changed(shared, *options); });
    add_oil_options(command, *options);
    command->add_option("--fluid", options->fluid, "the oil, by its name in the plant file or the fluid table")
        ->type_name("NAME");
    command->add_option("--grade", options->grade, "or its ISO viscosity grade")->type_name("VG");
    command->add_option("--index", options->index, "and its viscosity index; default: 100")->type_name("VI");
    add_note_option(command, *options);
}

void add_oil_sample(CLI::App& app, Shared& shared) {
    const auto options = std::make_shared<Options>();
    CLI::App* command = add_command(app, shared, "oil-sample", "what the laboratory measured of the oil", true,
                                    [&shared, options] { return oil_sample(shared, *options); });
    add_oil_options(command, *options);
    command->add_option("--viscosity-40", options->viscosity_40_cst, "at 40 degC")->type_name("MM2/S");
    command
        ->add_option("--viscosity-100", options->viscosity_100_cst,
                     "at 100 degC; without it the index is taken as it was")
        ->type_name("MM2/S");
    command->add_option("--water", options->water_ppm, "water in the oil")->type_name("PPM");
    command->add_option("--particles", options->particles, "particle count, by its code such as 18/16/13")
        ->type_name("CODE");
    add_note_option(command, *options);
}

}  // namespace slipledger::command
