// `slipledger replaced PUMP`: a new cartridge, rotating group or gear set, and so a new life.
#include <fmt/format.h>

#include <array>
#include <cmath>
#include <map>
#include <nlohmann/json.hpp>
#include <optional>

#include "daemon/intake/number_text.hpp"
#include "tools/slipledger/act.hpp"

namespace slipledger::command {

namespace {

// Threads: one.
struct Options : ActOptions {
    std::string model;
    std::string found;
    std::vector<std::string> maker_test;
    std::optional<double> displacement_cm3;
    bool displacement_is_right = false;
};

// A slip of the pen here (71 for 17, or cubic inches) would make every later ratio wrong.
void require_likely_displacement(const Options& options, const config::Section& section) {
    const double cm3 = *options.displacement_cm3;
    if (!std::isfinite(cm3) || cm3 <= 0.0) throw WrongUse("--displacement has to be a number of cm3 above 0");
    const double name_plate_cm3 = section.displacement_cm3;
    if (options.displacement_is_right || (cm3 >= 0.5 * name_plate_cm3 && cm3 <= 2.0 * name_plate_cm3)) return;
    throw WrongUse(
        fmt::format("--displacement {:g} is far from the name plate's {:g} cm3; where it is right, add "
                    "--displacement-is-right",
                    cm3, name_plate_cm3));
}

// A figure of the maker's test: as it is written, as the event keeps it, and what it can be.
// Threads: immutable, share freely.
struct Figure {
    std::string_view written;
    const char* kept;
    double least;
    double most;
    std::string_view unit;
};
constexpr std::array<Figure, 5> figures{{{"leakage", "leakage_lpm", 0.001, 200.0, "L/min"},
                                         {"pressure", "pressure_bar", 1.0, 1000.0, "bar"},
                                         {"speed", "speed_rpm", 10.0, 10000.0, "rpm"},
                                         {"temperature", "temperature_c", -40.0, 150.0, "degC"},
                                         {"viscosity", "viscosity_cst", 2.0, 1000.0, "mm2/s"}}};
constexpr std::string_view wanted_test =
    "leakage=L/min pressure=bar speed=rpm and temperature=degC or viscosity=mm2/s, e.g. leakage=1.2 pressure=210 "
    "speed=1480 viscosity=32";

void take_figure(nlohmann::ordered_json& test, const std::string& text) {
    const std::size_t equals = std::min(text.find('='), text.size());
    for (const Figure& figure : figures) {
        if (text.substr(0, equals) != figure.written || equals == text.size()) continue;
        const auto number = intake::read_number(text.substr(equals + 1));
        if (!number) break;
        require_between(fmt::format("--maker-test {}", figure.written), number->value, figure.least, figure.most,
                        figure.unit);
        test[figure.kept] = number->value;
        return;
    }
    throw WrongUse(
        fmt::format("--maker-test \"{}\" is not understood; wanted {}", report::printable(text), wanted_test));
}

// Less than all of it would say nothing, and in silence.
nlohmann::ordered_json read_maker_test(const Options& options, const config::Section& section) {
    nlohmann::ordered_json test;
    for (const std::string& text : options.maker_test) take_figure(test, text);
    const bool whole = test.contains("leakage_lpm") && test.contains("pressure_bar") && test.contains("speed_rpm") &&
                       (test.contains("temperature_c") || test.contains("viscosity_cst"));
    if (!whole) throw WrongUse(fmt::format("--maker-test lacks a figure; wanted {}", wanted_test));
    const double flow_lpm =
        options.displacement_cm3.value_or(section.displacement_cm3) * test["speed_rpm"].get<double>() / 1000.0;
    if (test["leakage_lpm"].get<double>() > 0.5 * flow_lpm)
        throw WrongUse(
            fmt::format("--maker-test leakage={:g} is more than half of the theoretical flow of {:.0f} L/min; "
                        "wanted what leaks, not what is delivered",
                        test["leakage_lpm"].get<double>(), flow_lpm));
    return test;
}

int replaced(const Shared& shared, const Options& options) {
    const config::Plant plant = shared.plant();
    const config::Pump& pump = pump_named(plant, options.place);
    const config::Section& section = section_named(pump, options.section);
    if (options.displacement_cm3) require_likely_displacement(options, section);
    ledger::Event event = section_event_of(options, plant, pump, "replaced");
    nlohmann::ordered_json body{{"note", report::printable(options.note)}};
    if (options.displacement_cm3) body["displacement_cm3"] = *options.displacement_cm3;
    if (!options.model.empty()) body["model"] = report::printable(options.model);
    if (!options.found.empty()) body["found"] = options.found;
    if (!options.maker_test.empty()) body["maker_test"] = read_maker_test(options, section);
    event.body = body.dump();
    return keep(shared, plant, event,
                fmt::format("replaced: {} section {} begins a new life; what was learned of the old one stays with it",
                            pump.id, section.id));
}

}  // namespace

void add_replaced(CLI::App& app, Shared& shared) {
    const auto options = std::make_shared<Options>();
    CLI::App* command =
        add_command(app, shared, "replaced", "a cartridge, rotating group or gear set was replaced: a new life begins",
                    true, [&shared, options] { return replaced(shared, *options); });
    add_pump_options(command, *options);
    command->add_option("--displacement", options->displacement_cm3, "of the new part, where it differs")
        ->type_name("CM3");
    command->add_flag("--displacement-is-right", options->displacement_is_right,
                      "take it although it is far from the name plate's");
    command->add_option("--model", options->model, "of the new part, where it differs")->type_name("TEXT");
    command
        ->add_option("--maker-test", options->maker_test,
                     "what the maker measured of the new part: leakage=1.2 pressure=210 speed=1480 and temperature=50 "
                     "or viscosity=32 (L/min, bar, rpm, degC, mm2/s)")
        ->type_name("FIGURE=NUMBER...");
    command->add_option("--found", options->found, "what the old part looked like")
        ->check(CLI::IsMember({"worn", "damaged", "good", "other"}));
    add_note_option(command, *options);
}

}  // namespace slipledger::command
