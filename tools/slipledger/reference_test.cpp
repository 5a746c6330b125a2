// `slipledger reference-test PUMP`: drain or delivery flow by bucket and stopwatch.
#include <fmt/format.h>

#include <nlohmann/json.hpp>
#include <optional>

#include "tools/slipledger/act.hpp"

namespace slipledger::command {

namespace {

// Threads: one.
struct Options : ActOptions {
    std::string of = "drain";
    double flow_lpm = 0.0;
    double pressure_bar = 0.0;
    double speed_rpm = 0.0;
    std::optional<double> temperature_c;
    std::optional<double> viscosity_cst;
    std::optional<double> accuracy_percent;
    bool as_new = false;
};

void require_a_whole_test(const Options& options, const config::Section& section) {
    require_between("--pressure", options.pressure_bar, 1.0, 1000.0, "bar");
    require_between("--speed", options.speed_rpm, 10.0, 10000.0, "rpm");
    const double theoretical_lpm = section.displacement_cm3 * options.speed_rpm / 1000.0;
    require_between("--flow", options.flow_lpm, 0.001, 1.05 * theoretical_lpm, "L/min (theoretical flow and a little)");
    if (options.temperature_c.has_value() == options.viscosity_cst.has_value())
        throw WrongUse("give --temperature of the oil at the inlet, or its --viscosity, one of them");
    if (options.temperature_c) require_between("--temperature", *options.temperature_c, -40.0, 150.0, "degC");
    if (options.viscosity_cst) require_between("--viscosity", *options.viscosity_cst, 2.0, 1000.0, "mm2/s");
    if (options.accuracy_percent) require_between("--accuracy", *options.accuracy_percent, 0.1, 30.0, "percent");
}

int reference_test(const Shared& shared, const Options& options) {
    const config::Plant plant = shared.plant();
    const config::Pump& pump = pump_named(plant, options.place);
    require_a_whole_test(options, section_named(pump, options.section));
    ledger::Event event = section_event_of(options, plant, pump, "reference-test");
    nlohmann::ordered_json body{{"of", options.of},
                                {"flow_lpm", options.flow_lpm},
                                {"pressure_bar", options.pressure_bar},
                                {"speed_rpm", options.speed_rpm}};
    if (options.temperature_c) body["temperature_c"] = *options.temperature_c;
    if (options.viscosity_cst) body["viscosity_cst"] = *options.viscosity_cst;
    if (options.accuracy_percent) body["accuracy_percent"] = *options.accuracy_percent;
    if (options.as_new) body["as_new"] = true;
    if (!options.note.empty()) body["note"] = report::printable(options.note);
    event.body = body.dump();
    return keep(shared, plant, event,
                fmt::format("reference test kept: {:g} L/min of {} of {} section {}", options.flow_lpm, options.of,
                            pump.id, event.section));
}

}  // namespace

void add_reference_test(CLI::App& app, Shared& shared) {
    const auto options = std::make_shared<Options>();
    CLI::App* command =
        add_command(app, shared, "reference-test",
                    "flow by bucket and stopwatch; mind pressure and hot oil, lock out before opening a line", true,
                    [&shared, options] { return reference_test(shared, *options); });
    add_pump_options(command, *options);
    command->add_option("--of", options->of, "which flow: drain or delivery; default: drain")
        ->check(CLI::IsMember({"drain", "delivery"}));
    command->add_option("--flow", options->flow_lpm, "what ran into the bucket")->required()->type_name("L/MIN");
    command->add_option("--pressure", options->pressure_bar, "at the outlet")->required()->type_name("BAR");
    command->add_option("--speed", options->speed_rpm, "of the shaft")->required()->type_name("RPM");
    command->add_option("--temperature", options->temperature_c, "of the oil at the inlet")->type_name("DEGC");
    command->add_option("--viscosity", options->viscosity_cst, "or its viscosity there")->type_name("MM2/S");
    command->add_option("--accuracy", options->accuracy_percent, "one standard deviation of the flow; default: 3")
        ->type_name("PERCENT");
    command->add_flag("--as-new", options->as_new, "the part was as new then: this is its baseline");
    add_note_option(command, *options);
}

}  // namespace slipledger::command
